// The help pages, written from the option tree.
#pragma once

#include <string>
#include <vector>

#include "command_line.hpp"

namespace brink::cli {

// What `brink --help` prints: the commands and where to read on.
std::string program_help(const std::vector<Command>& commands);

// What `brink NAME --help` prints: usage, description, options by group, examples, conventions.
std::string command_help(const Command& command);

}  // namespace brink::cli
