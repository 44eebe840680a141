// Every command of the program, one source file each (cmd_NAME.cpp).
#pragma once

#include <vector>

#include "command_line.hpp"

namespace brink::cli {

Command readings_command();
Command sets_command();
Command kinematics_command();
Command stereonet_command();
Command steepest_command();
Command alignment_command();
Command bench_command();
Command wedge_command();
Command plane_command();
Command topple_command();
Command report_command();

// In the order of the help. A command joins the list when it works.
inline std::vector<Command> all_commands() {
  return {readings_command(), sets_command(),      kinematics_command(), stereonet_command(),
          steepest_command(), alignment_command(), bench_command(),      wedge_command(),
          plane_command(),    topple_command(),    report_command()};
}

}  // namespace brink::cli
