// How often a face stays within its limits when the readings are resampled. Private to design.
#pragma once

#include <cstdint>
#include <vector>

#include "brink/design/steepest.hpp"
#include "brink/kinematics/chords.hpp"

namespace brink {

class Resampler {
 public:
  // `readings` and `pairs` must outlive this.
  Resampler(const PairReadings& readings, const ChordCounter& pairs, std::uint64_t seed);

  // Part of the resamples in which every share is within its limit, 0..1. A resample with nothing
  // to test is within.
  double holds(const FaceLimits& face, const ModeShares& limits) const;

 private:
  using Sums = std::vector<double>;  // one a group of readings
  template <typename Value>
  Sums grouped(const Value& value) const;
  Sums drawn(const Sums& sums) const;

  const PairReadings& readings_;
  const ChordCounter& pairs_;
  std::size_t groups_;
  std::vector<std::uint32_t> group_of_;  // of each reading; readings of a group are drawn together
  std::vector<float> times_;             // resample by resample, how often each group is drawn
  Sums all_readings_, all_lines_;        // of each resample
  double lines_ = 0.0;
};

}  // namespace brink
