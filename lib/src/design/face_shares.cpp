#include "face_shares.hpp"

#include <algorithm>
#include <numeric>

#include "brink/base/parallel.hpp"

namespace brink {

namespace {

// Up to here one pass over the pairs costs less than chords face by face.
constexpr std::size_t kMostSwept = 30'000;

double amount(const PairSum& sum, bool weighted) {
  return weighted ? sum.weight : static_cast<double>(sum.count);
}

std::vector<FaceLimits> prepare_all(const FaceGrid& grid, const ModeSettings& settings) {
  std::vector<FaceLimits> limits;
  limits.reserve(grid.azimuths.size() * grid.dips.size());
  for (const Angle azimuth : grid.azimuths) {
    for (const Angle dip : grid.dips) limits.push_back(prepare_limits({dip, azimuth}, settings));
  }
  return limits;
}

}  // namespace

FaceShares::FaceShares(const PairReadings& readings, const ChordCounter& pairs,
                       const FaceGrid& grid, const SteepestOptions& options)
    : grid_(grid),
      pairs_(pairs),
      weighted_(options.weighted),
      tested_pairs_(amount(pairs.lines().total(), options.weighted)),
      limits_(prepare_all(grid, options.settings)) {
  count_planes(readings, options);
  if (pairs.distinct() > kMostSwept || grid.dips.back() > Angle::degrees(90.0)) return;
  const DistinctPlanes distinct = pairs.distinct_planes();
  const std::vector<double> copies(distinct.copies.begin(), distinct.copies.end());
  sweep_ = sweep_pairs(distinct.planes, weighted_ ? distinct.planes.weight : copies, grid,
                       options.settings, options.threads);
}

// Tests on planes pass from some dip up, as those on lines do.
void FaceShares::count_planes(const PairReadings& readings, const SteepestOptions& options) {
  const std::size_t dips = grid_.dips.size();
  planar_.resize(limits_.size());
  flexural_.resize(limits_.size());
  tested_readings_ = weighted_
                         ? std::accumulate(readings.weight.begin(), readings.weight.end(), 0.0)
                         : static_cast<double>(readings.size());
  const auto count = [&](std::size_t azimuth, auto test, std::vector<double>& sums) {
    const auto faces = limits_.begin() + static_cast<std::ptrdiff_t>(azimuth * dips);
    for (std::size_t i = 0; i < readings.size(); ++i) {
      const Vector3 n{readings.x[i], readings.y[i], readings.z[i]};
      if (!test(faces[static_cast<std::ptrdiff_t>(dips) - 1], n)) continue;
      const auto first =
          std::partition_point(faces, faces + static_cast<std::ptrdiff_t>(dips),
                               [&](const FaceLimits& face) { return !test(face, n); });
      sums[azimuth * dips + static_cast<std::size_t>(first - faces)] +=
          weighted_ ? readings.weight[i] : 1.0;
    }
    for (std::size_t k = 1; k < dips; ++k) sums[azimuth * dips + k] += sums[azimuth * dips + k - 1];
  };
  for_each_chunk(grid_.azimuths.size(), 1, options.threads,
                 [&](std::size_t azimuth, std::size_t, std::size_t) {
                   count(azimuth, planar_sliding, planar_);
                   count(azimuth, flexural_toppling, flexural_);
                 });
}

ModeShares FaceShares::at(std::size_t azimuth, std::size_t dip) const {
  const std::size_t face = azimuth * grid_.dips.size() + dip;
  const double wedge = sweep_ ? sweep_->wedge_sliding[face]
                              : amount(pairs_.wedge_sliding_total(limits_[face]), weighted_);
  const double block = sweep_ ? sweep_->block_toppling[face]
                              : amount(pairs_.block_toppling_total(limits_[face]), weighted_);
  const auto share = [](double part, double whole) { return whole > 0.0 ? part / whole : 0.0; };
  return {share(planar_[face], tested_readings_), share(wedge, tested_pairs_),
          share(flexural_[face], tested_readings_), share(block, tested_pairs_)};
}

}  // namespace brink
