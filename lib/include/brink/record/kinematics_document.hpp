// Results of the kinematic tests as a record.
#pragma once

#include <string>
#include <vector>

#include "brink/kinematics/kinematics.hpp"
#include "brink/record/document.hpp"
#include "brink/sets/sets.hpp"

namespace brink {

// The word for "in no set" in records and tables.
inline constexpr const char* kNoSet = "none";

// Name of set `number` of the tests: kNoSet for 0.
std::string set_name(const SetsResult& sets, int number);

// The options as a record: {faces[], upper, friction_deg, strike_tolerance_deg,
// toppling_tolerance_deg, pairs, seed}. Commands add where readings and sets came from.
Object kinematics_inputs(const KinematicsOptions& options);

// One entry of faces[] below.
Object face_kinematics_value(const FaceKinematics& face, Angle friction, const SetsResult& sets);

// {faces[] {face, upper, friction_deg, modes {planar_sliding, wedge_sliding, flexural_toppling,
// block_toppling}}, sets[] {name, count, mean}}. A mode is {tested, admissible, share,
// weighted_share, share_low, share_high, by_set[]}, an entry of by_set {set or sets[2], tested,
// admissible, share, weighted_share}; the modes of pairs add parallel_pairs, wedge sliding
// unstable_dry, unstable_dry_standard_error and unstable_dry_sampled_pairs (null where every pair
// was looked at), block toppling bases and sliding_bases.
Value kinematics_result(const KinematicsResult& result, const SetsResult& sets);

}  // namespace brink
