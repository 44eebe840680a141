// Runs a program as a user does: its own process, folder, standard input and outputs.
#pragma once

#include <string>
#include <vector>

namespace brink::testing {

struct ProcessOutcome {
  int status = -1;  // exit status; 128 + the signal's number where one ended it
  std::string out;
  std::string err;
};

// `environment` holds "NAME=value" settings beside those of the test. Outputs pass through files in
// `scratch`, which has to exist and may not be `folder`.
ProcessOutcome run_process(const std::vector<std::string>& command, const std::string& folder,
                           const std::string& scratch, const std::string& input = {},
                           const std::vector<std::string>& environment = {});

}  // namespace brink::testing
