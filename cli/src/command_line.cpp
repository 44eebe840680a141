#include "command_line.hpp"

#include <CLI/CLI.hpp>
#include <algorithm>
#include <map>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/base/near_name.hpp"
#include "brink/record/document.hpp"
#include "exit_status.hpp"
#include "help.hpp"

namespace brink::cli {

namespace {

using Arguments = std::vector<std::string>;

Error command_line_error(std::string key, std::string_view what, std::string_view value = {},
                         std::string_view accepted = {}) {
  return Error(ErrorKind::argument, Place{.key = std::move(key)}, what, value, accepted);
}

std::vector<std::string> option_names(const Command& command) {
  std::vector<std::string> names{"--help"};
  for (const Option& option : command.options) names.push_back(option.name);
  return names;
}

// One occurrence of an option on the command line, in the order typed.
struct Occurrence {
  const Option* option;
  std::string value;
};

struct Parsed {
  bool help = false;
  std::vector<Occurrence> occurrences;
  Arguments operands;
  Arguments unknown;
};

// CLI11 splits the words; what they mean is checked here. Its own "required" and value checks stay
// unused: they would hide an unknown name, and its numbers accept nan and hexadecimal.
class Parser {
 public:
  explicit Parser(const Command& command) {
    app_.set_help_flag();
    app_.allow_extras();
    app_.add_flag("-h,--help", help_);
    for (const Option& option : command.options) add(option);
  }

  // Everything behind "--" is an operand. So is every other word that is no option's value and does
  // not begin with "-" ("-" itself is standard input); CLI11's own positionals would split a FILE
  // named "[a,b]".
  Parsed parse(const Arguments& arguments) {
    const auto dashes = std::find(arguments.begin(), arguments.end(), "--");
    app_.parse(Arguments(std::reverse_iterator(dashes), arguments.rend()));
    Parsed parsed;
    parsed.help = help_;
    std::map<const CLI::Option*, std::size_t> seen;
    for (const CLI::Option* given : app_.parse_order()) {
      const auto found = known_.find(given);
      if (found == known_.end()) continue;
      parsed.occurrences.push_back({found->second, given->results()[seen[given]++]});
    }
    for (const std::string& word : app_.remaining()) {
      const bool operand = word == "-" || !word.starts_with("-");
      (operand ? parsed.operands : parsed.unknown).push_back(word);
    }
    if (dashes != arguments.end()) {
      parsed.operands.insert(parsed.operands.end(), dashes + 1, arguments.end());
    }
    return parsed;
  }

 private:
  void add(const Option& option) {
    const std::string names =
        option.short_name.empty() ? option.name : option.short_name + "," + option.name;
    CLI::Option* added = nullptr;
    if (option.value.empty()) {
      added = app_.add_flag(names)->multi_option_policy(CLI::MultiOptionPolicy::TakeAll);
    } else {
      // One value an occurrence, so that it does not swallow the FILEs behind it.
      added = app_.add_option(names, values_)->allow_extra_args(false);
    }
    known_[added] = &option;
  }

  CLI::App app_;
  bool help_ = false;
  Arguments values_;  // CLI11 wants a target; the values are read from the options themselves
  std::map<const CLI::Option*, const Option*> known_;
};

// "--face=" would take the next word as its value.
void refuse_empty_assignments(const Command& command, const Arguments& arguments) {
  for (const std::string& word : arguments) {
    if (word == "--") return;
    for (const Option& option : command.options) {
      if (word != option.name + "=") continue;
      throw command_line_error(option.name, "needs a value", {},
                               option.value.empty() ? "no '=' behind it" : option.value);
    }
  }
}

Parsed parse(const Command& command, const Arguments& arguments) {
  refuse_empty_assignments(command, arguments);
  try {
    return Parser(command).parse(arguments);
  } catch (const CLI::ArgumentMismatch&) {
    // Values are taken greedily, so only the last word can lack one.
    const auto dashes = std::find(arguments.begin(), arguments.end(), "--");
    const std::string last = dashes == arguments.begin() ? "" : *(dashes - 1);
    for (const Option& option : command.options) {
      if (option.name == last || option.short_name == last) {
        throw command_line_error(option.name, "needs a value", {}, option.value);
      }
    }
    throw command_line_error("", "the command line cannot be read near its end", last);
  } catch (const CLI::ParseError& error) {
    throw command_line_error("", std::string("the command line cannot be read: ") + error.what());
  }
}

void refuse_unknown(const Command& command, const Parsed& parsed) {
  if (parsed.unknown.empty()) return;
  const std::string word = parsed.unknown.front().substr(0, parsed.unknown.front().find('='));
  throw command_line_error(
      "", "is not an option of brink " + command.name + did_you_mean(word, option_names(command)),
      word);
}

bool names_an_option(const Command& command, const std::string& word) {
  return word.starts_with("--") &&
         std::any_of(command.options.begin(), command.options.end(),
                     [&](const Option& option) { return option.name == word; });
}

void take_options(const Command& command, const Parsed& parsed) {
  std::map<const Option*, int> count;
  for (const auto& [option, value] : parsed.occurrences) {
    if (++count[option] > 1 && !option->repeatable && !option->value.empty()) {
      throw command_line_error(option->name, "is given twice, the second time here", value,
                               "one " + option->value);
    }
    if (option->value.empty()) {
      if (value != "true")
        throw command_line_error(option->name, "is too much: it takes no value", value);
      option->take("");
      continue;
    }
    if (value.empty() || names_an_option(command, value)) {
      throw command_line_error(option->name, "needs a value", {}, option->value);
    }
    option->take(value);
  }
  for (const Option& option : command.options) {
    if (option.required && count[&option] == 0) {
      throw command_line_error(option.name, "is missing", {}, option.name + " " + option.value);
    }
  }
}

void check_operands(const Command& command, const Arguments& operands) {
  if (command.positionals == Positionals::none && !operands.empty()) {
    throw command_line_error("", "is too much: brink " + command.name + " reads no file",
                             operands.front(), "options only");
  }
  if (command.positionals == Positionals::site && operands.size() != 1) {
    const std::string extra = operands.size() > 1 ? operands[1] : "";
    throw command_line_error("",
                             extra.empty() ? "the site file is missing" : "is one file too many",
                             extra, "brink " + command.name + " SITE.toml");
  }
}

int run_command(const Command& command, const Arguments& arguments, Streams& streams) {
  const Parsed parsed = parse(command, arguments);
  if (parsed.help) {
    streams.out << command_help(command);
    return kDone;
  }
  refuse_unknown(command, parsed);
  take_options(command, parsed);
  check_operands(command, parsed.operands);
  return command.run(parsed.operands, streams);
}

const Command& find_command(const std::string& name, const std::vector<Command>& commands) {
  std::vector<std::string> names;
  for (const Command& command : commands) {
    if (command.name == name) return command;
    names.push_back(command.name);
  }
  if (name.starts_with("-")) {
    throw command_line_error("", "stands before the command", name, "brink COMMAND [options]");
  }
  std::string list;
  for (const std::string& known : names) list += (list.empty() ? "" : ", ") + known;
  throw command_line_error("", "is not a command" + did_you_mean(name, names), name, list);
}

int dispatch(const Arguments& arguments, const std::vector<Command>& commands, Streams& streams) {
  if (arguments.empty()) {
    streams.err << program_help(commands);
    return kCommandLineWrong;
  }
  const std::string& first = arguments.front();
  if (first == "--help" || first == "-h") {
    streams.out << program_help(commands);
    return kDone;
  }
  if (first == "--version") {
    streams.out << "brink " << version() << '\n';
    return kDone;
  }
  return run_command(find_command(first, commands), {arguments.begin() + 1, arguments.end()},
                     streams);
}

void print_error(const Error& error, const Arguments& arguments,
                 const std::vector<Command>& commands, Streams& streams) {
  streams.err << "error: " << error.what() << '\n';
  if (error.kind() != ErrorKind::argument) return;
  const bool known = !arguments.empty() &&
                     std::any_of(commands.begin(), commands.end(),
                                 [&](const Command& c) { return c.name == arguments.front(); });
  streams.err << "See 'brink " << (known ? arguments.front() + " " : "") << "--help'.\n";
}

}  // namespace

int run_program(const std::vector<std::string>& arguments, const std::vector<Command>& commands,
                Streams& streams) {
  int status = kDone;
  try {
    status = dispatch(arguments, commands, streams);
  } catch (const Error& error) {
    print_error(error, arguments, commands, streams);
    status = exit_status(error.kind());
  } catch (const std::bad_alloc&) {
    streams.err << "error: there is not enough memory for this input\n";
    status = kInputWrong;
  } catch (const std::exception& error) {
    streams.err << "error: a defect of brink itself: " << error.what() << '\n';
    status = kInputWrong;
  }
  streams.out.flush();
  if (!streams.out) {
    streams.err << "error: standard output could not be written\n";
    status = kFileFailed;
  }
  return status;
}

}  // namespace brink::cli
