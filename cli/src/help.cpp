#include "help.hpp"

#include <algorithm>

#include "text_table.hpp"

namespace brink::cli {

namespace {

constexpr std::size_t kWidth = 80;
constexpr std::size_t kHelpColumn = 30;

std::string operand_words(Positionals positionals) {
  switch (positionals) {
    case Positionals::files:
      return " FILE...";
    case Positionals::site:
      return " SITE.toml";
    case Positionals::none:
      return "";
  }
  return "";
}

std::string usage(const Command& command) {
  std::string text = "brink " + command.name + operand_words(command.positionals);
  for (const Option& option : command.options) {
    if (!option.required) continue;
    text += " " + (option.short_name.empty() ? option.name : option.short_name);
    if (!option.value.empty()) text += " " + option.value;
  }
  return text + " [options]";
}

std::string option_names(const Option& option) {
  std::string text = option.short_name.empty() ? "" : option.short_name + ", ";
  text += option.name;
  return option.value.empty() ? text : text + " " + option.value;
}

std::string option_notes(const Option& option) {
  std::string text = option.help;
  if (option.required) text += " Required.";
  if (option.repeatable) text += " May repeat.";
  if (!option.default_text.empty()) text += " Default: " + option.default_text + ".";
  return text;
}

// "  names      help", the help wrapped in its own column.
std::string entry(const std::string& names, const std::string& help) {
  std::string text = "  " + names;
  const std::size_t used = display_width(text);
  const std::string body = paragraph(help, kWidth, kHelpColumn);
  if (used + 2 > kHelpColumn) return text + "\n" + body;
  return text + body.substr(used);
}

std::string options_help(const Command& command) {
  std::vector<std::string> groups;
  for (const Option& option : command.options) {
    if (std::find(groups.begin(), groups.end(), option.group) == groups.end()) {
      groups.push_back(option.group);
    }
  }
  std::string text;
  for (const std::string& group : groups) {
    text += "\n" + (group.empty() ? std::string("Options") : group) + "\n";
    for (const Option& option : command.options) {
      if (option.group == group) text += entry(option_names(option), option_notes(option));
    }
  }
  return text + "\nHelp\n" + entry("-h, --help", "Shows this page.");
}

std::string examples_help(const Command& command) {
  if (command.examples.empty()) return "";
  std::string text = "\nExamples (from the folder sample-data)\n";
  for (const Example& example : command.examples) {
    text += "  " + example.command + "\n" + paragraph(example.explanation, kWidth, 6);
  }
  return text;
}

std::string conventions() {
  return "\nConventions\n" +
         paragraph(
             "Azimuths run in degrees clockwise from grid north. DIP/DIR is dip and dip direction, "
             "as in 65/120; a face's dip may pass 90, where it overhangs. TREND/PLUNGE is a line. "
             "Units are m, kN, kPa, kN/m3 and degrees. Results go to standard output, warnings and "
             "errors to standard error. Exit status: 0 done, 1 the input is wrong, 2 the command "
             "line is wrong, 3 a file could not be read or written.",
             kWidth, 2);
}

}  // namespace

std::string program_help(const std::vector<Command>& commands) {
  std::string text =
      "brink: how steep may this rock face be cut?\n\n"
      "Usage: brink COMMAND [FILE...] [options]\n\nCommands\n";
  for (const Command& command : commands) text += entry(command.name, command.summary);
  text += "\nOptions\n" + entry("-h, --help", "Shows this page.") +
          entry("--version", "Prints the program's name and version.");
  return text + "\nRun 'brink COMMAND --help' for a command's options, units and examples.\n";
}

std::string command_help(const Command& command) {
  std::string text =
      "brink " + command.name + ": " + command.summary + "\n\nUsage: " + usage(command) + "\n";
  if (!command.description.empty()) text += "\n" + paragraph(command.description, kWidth);
  return text + options_help(command) + examples_help(command) + conventions();
}

}  // namespace brink::cli
