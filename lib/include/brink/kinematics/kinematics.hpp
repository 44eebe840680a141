// Which readings and pairs of readings can move on a face: counts, shares and their intervals.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "brink/orientation/face.hpp"
#include "brink/readings/readings.hpp"

namespace brink {

struct KinematicsOptions {
  std::vector<Face> faces;
  Plane upper = kLevelGround;
  Angle friction;                                 // 0 <= friction < 90
  Angle strike_tolerance = Angle::degrees(20.0);  // planar sliding, and the bases of block toppling
  Angle toppling_tolerance = Angle::degrees(30.0);
  std::uint64_t pairs = 4'000'000;  // sampled for unstable_dry where not every pair is looked at
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

// Counts of one set, or of one pair of sets (indices into the sets handed in, from 1; 0 is "no
// set").
struct SetCount {
  int set_a = 0;
  int set_b = 0;  // pairs: the second set, after set_a in order, "no set" being the last
  std::uint64_t tested = 0;
  std::uint64_t admissible = 0;
  double tested_weight = 0.0;
  double admissible_weight = 0.0;
};

// share = admissible / tested; absent where nothing was tested. A pair weighs the product of its
// readings' weights.
struct ModeCount {
  std::uint64_t tested = 0;
  std::uint64_t admissible = 0;
  std::optional<double> share;
  std::optional<double> weighted_share;
  // 95 % interval of `share`, bootstrap over readings; absent for a single reading. No width where
  // none or all are admissible: resampling cannot show what was never seen.
  std::optional<double> share_low;
  std::optional<double> share_high;
  // Planes: each set, then the readings of no set; pairs: each pair of sets in that order. Where
  // nothing was tested there is no entry; the entries add up to the counts above.
  std::vector<SetCount> by_set;
};

struct FaceKinematics {
  Face face;
  Plane upper = kLevelGround;  // the ground above that it was tested with
  ModeCount planar_sliding;
  ModeCount wedge_sliding;
  ModeCount flexural_toppling;
  ModeCount block_toppling;
  std::uint64_t parallel_pairs = 0;  // no line; in neither `tested` nor by_set
  // Pairs that daylight with a dry, cohesionless factor of safety below 1. With more than 20,000
  // different readings an estimate from `unstable_dry_sampled` pairs, with its standard error.
  std::uint64_t unstable_dry = 0;
  std::optional<double> unstable_dry_standard_error;
  std::uint64_t unstable_dry_sampled = 0;
  std::uint64_t bases = 0;  // block toppling
  std::uint64_t sliding_bases = 0;
};

struct KinematicsResult {
  KinematicsOptions options;
  std::vector<FaceKinematics> faces;  // in the order of options.faces
  std::vector<std::string> warnings;
};

// Tests every reading and every pair of readings on every face. `assignment` is one integer a
// reading, 0 for no set (all zeros where sets are not wanted); `set_count` the number of sets.
// Definitions: kinematics/modes.hpp; a dry wedge's factor of safety: mechanics/dry_wedge.hpp. Cost:
// pairs are counted by chords.hpp, below a microsecond a reading, face and pair of sets; for
// unstable_dry some nanoseconds a pair up to 20,000 different readings. Memory grows with N. Throws
// ErrorKind::argument for a face, friction or tolerance out of its range.
KinematicsResult test_kinematics(const Readings& readings, const std::vector<int>& assignment,
                                 std::size_t set_count, const KinematicsOptions& options);

}  // namespace brink
