// The kinematic tests as people read them.
#pragma once

#include <span>
#include <string>

#include "brink/kinematics/kinematics.hpp"
#include "brink/sets/sets.hpp"

namespace brink::cli {

// One table a face with the sets that lead each mode, what goes with the counts in words, and the
// cautions. `weights` are the readings'; where they differ shares by weight are shown too.
std::string kinematics_text(const KinematicsResult& result, const SetsResult& sets,
                            std::span<const double> weights);

// The table of one face's modes; `weighted`: with shares by weight.
std::string mode_table(const FaceKinematics& face, const SetsResult& sets, bool weighted);

// Whether the weights differ.
bool weights_differ(std::span<const double> weights);

}  // namespace brink::cli
