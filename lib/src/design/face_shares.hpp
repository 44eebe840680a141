// Shares of the modes on the faces of a grid, computed when asked for or all at once. Private to
// design.
#pragma once

#include <cstddef>
#include <optional>
#include <vector>

#include "brink/design/dip_sweep.hpp"
#include "brink/design/steepest.hpp"
#include "brink/kinematics/chords.hpp"

namespace brink {

class FaceShares {
 public:
  // `pairs` counts the pairs of `readings`; both must outlive this.
  FaceShares(const PairReadings& readings, const ChordCounter& pairs, const FaceGrid& grid,
             const SteepestOptions& options);

  ModeShares at(std::size_t azimuth, std::size_t dip) const;
  const FaceLimits& limits(std::size_t azimuth, std::size_t dip) const {
    return limits_[azimuth * grid_.dips.size() + dip];
  }
  const FaceGrid& grid() const { return grid_; }
  // Whether at() only looks up.
  bool swept() const { return sweep_.has_value(); }

 private:
  void count_planes(const PairReadings& readings, const SteepestOptions& options);

  FaceGrid grid_;
  const ChordCounter& pairs_;
  bool weighted_;
  double tested_readings_ = 0.0;
  double tested_pairs_ = 0.0;
  std::vector<FaceLimits> limits_;
  std::vector<double> planar_, flexural_;  // counts or weights on every face
  std::optional<SweepSums> sweep_;
};

}  // namespace brink
