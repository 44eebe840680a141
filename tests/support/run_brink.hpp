// Runs the whole program within the test: arguments and standard input in, streams and exit status
// out.
#pragma once

#include <sstream>
#include <string>
#include <vector>

#include "commands.hpp"

namespace brink::testing {

struct Outcome {
  int status = 0;
  std::string out;
  std::string err;
};

inline Outcome run_brink(const std::vector<std::string>& arguments,
                         const std::vector<cli::Command>& commands, const std::string& input = {}) {
  std::istringstream in(input);
  std::ostringstream out;
  std::ostringstream err;
  cli::Streams streams{in, out, err};
  const int status = cli::run_program(arguments, commands, streams);
  return {status, out.str(), err.str()};
}

inline Outcome run_brink(const std::vector<std::string>& arguments, const std::string& input = {}) {
  return run_brink(arguments, cli::all_commands(), input);
}

}  // namespace brink::testing
