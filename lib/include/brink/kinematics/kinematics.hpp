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
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

// Counts of one set, or of one pair of sets (indices into the sets handed in, from 1; 0 is "no
// set").
struct SetCount {
  int set_a = 0;
  int set_b = 0;  // 0 for planes; for pairs set_a <= set_b
  std::uint64_t tested = 0;
  std::uint64_t admissible = 0;
  double tested_weight = 0.0;
  double admissible_weight = 0.0;
};

// share = admissible / tested; absent where nothing was tested.
struct ModeCount {
  std::uint64_t tested = 0;
  std::uint64_t admissible = 0;
  std::optional<double> share;
  std::optional<double> weighted_share;
  std::optional<double> share_low;  // 95 % interval, bootstrap over readings
  std::optional<double> share_high;
  std::vector<SetCount> by_set;  // planes: sets with set_b == 0; pairs: pairs of sets
};

struct FaceKinematics {
  Face face;
  ModeCount planar_sliding;
  ModeCount wedge_sliding;
  ModeCount flexural_toppling;
  ModeCount block_toppling;
  std::uint64_t parallel_pairs = 0;  // no line; in neither `tested` nor by_set
  std::uint64_t unstable_dry =
      0;                    // pairs that daylight with a dry, cohesionless factor of safety below 1
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
// Definitions: kinematics/modes.hpp. Throws ErrorKind::argument for a face, friction or tolerance
// out of its range.
KinematicsResult test_kinematics(const Readings& readings, const std::vector<int>& assignment,
                                 std::size_t set_count, const KinematicsOptions& options);

}  // namespace brink
