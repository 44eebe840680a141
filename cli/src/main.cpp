#include <unistd.h>

#include <csignal>
#include <iostream>

#include "commands.hpp"

// The locale is never set: numbers have a decimal point wherever the program runs.
int main(int argc, char** argv) {
  // A reader that goes away (head, a pager) ends the program quietly, as with any filter.
  std::signal(SIGPIPE, SIG_DFL);
  std::ios::sync_with_stdio(false);
  brink::cli::Streams streams{std::cin, std::cout, std::cerr, isatty(STDERR_FILENO) != 0};
  const std::vector<std::string> arguments(argv + (argc > 0 ? 1 : 0), argv + argc);
  return brink::cli::run_program(arguments, brink::cli::all_commands(), streams);
}
