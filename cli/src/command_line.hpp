// The option tree: plain descriptions of commands and options. One tree gives parsing, --help, man
// pages and completions. Only command_line.cpp knows the option parser (CLI11).
#pragma once

#include <functional>
#include <iosfwd>
#include <string>
#include <string_view>
#include <vector>

namespace brink::cli {

struct Option {
  std::string name;   // "--face"
  std::string value;  // "DIP/DIR" as help shows it; empty for a flag
  std::string help;   // one or two sentences; units and range included
  std::function<void(std::string_view)>
      take;                  // called for each occurrence in order ("" for a flag);
                             // throws Error(ErrorKind::argument) for a bad value
  std::string default_text;  // as help shows it; empty: none
  bool required = false;
  bool repeatable = false;
  std::string group;       // heading in the help, "Options" where empty
  std::string short_name;  // "-o"; empty: none
};

enum class Positionals { none, files, site };

// What a command reads from and writes to. Passed in, so that tests can replace it.
struct Streams {
  std::istream& in;
  std::ostream& out;  // results only
  std::ostream& err;  // warnings, errors, progress
  bool err_is_terminal = false;
};

struct Example {
  std::string command;  // as typed, from the folder sample-data
  std::string explanation;
};

struct Command {
  std::string name;         // "kinematics"
  std::string summary;      // one line for the list of commands
  std::string description;  // paragraphs for its own help
  Positionals positionals = Positionals::none;
  std::vector<Option> options;
  std::vector<Example> examples;
  // `operands` are the FILEs or the SITE as given. Throws Error; returns the exit status otherwise.
  std::function<int(const std::vector<std::string>& operands, Streams& streams)> run;
};

// Parses `arguments` (without the program's name) against the commands and runs the one named.
// Never throws: errors are printed to streams.err and become the exit status. --help and --version
// print to streams.out and give 0.
int run_program(const std::vector<std::string>& arguments, const std::vector<Command>& commands,
                Streams& streams);

}  // namespace brink::cli
