// The kinematic tests as people read them.
#pragma once

#include <string>

#include "brink/kinematics/kinematics.hpp"
#include "brink/sets/sets.hpp"

namespace brink::cli {

// One table a face with the sets that lead each mode, what goes with the counts in words, and the
// cautions. `weighted`: the readings' weights differ, so shares by weight are shown too.
std::string kinematics_text(const KinematicsResult& result, const SetsResult& sets, bool weighted);

}  // namespace brink::cli
