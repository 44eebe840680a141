#include "confidence.hpp"

#include <algorithm>
#include <numeric>

#include "brink/base/random.hpp"
#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr std::size_t kResamples = 499;
constexpr std::size_t kMostGroups = 2000;

}  // namespace

Resampler::Resampler(const PairReadings& readings, const ChordCounter& pairs, std::uint64_t seed)
    : readings_(readings), pairs_(pairs), groups_(std::min(readings.size(), kMostGroups)) {
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const bool single = readings.size() <= kMostGroups;
    group_of_.push_back(
        static_cast<std::uint32_t>(single ? i : random_index(seed, kResamples, i, groups_)));
  }
  times_.resize(kResamples * groups_);
  for (std::size_t b = 0; b < kResamples; ++b) {
    for (std::size_t draw = 0; draw < groups_; ++draw) {
      times_[b * groups_ + random_index(seed, b, draw, groups_)] += 1.0F;
    }
  }
  const std::vector<std::uint64_t> lines = pairs.lines().of_reading;
  all_readings_ = drawn(grouped([](std::size_t) { return 1.0; }));
  all_lines_ = drawn(grouped([&](std::size_t i) { return static_cast<double>(lines[i]); }));
  for (const std::uint64_t count : lines) lines_ += static_cast<double>(count);
}

template <typename Value>
Resampler::Sums Resampler::grouped(const Value& value) const {
  Sums sums(groups_);
  for (std::size_t i = 0; i < group_of_.size(); ++i) sums[group_of_[i]] += value(i);
  return sums;
}

// The sum over each resample.
Resampler::Sums Resampler::drawn(const Sums& sums) const {
  Sums out(kResamples);
  for (std::size_t b = 0; b < kResamples; ++b) {
    for (std::size_t g = 0; g < groups_; ++g) {
      out[b] += static_cast<double>(times_[b * groups_ + g]) * sums[g];
    }
  }
  return out;
}

double Resampler::holds(const FaceLimits& face, const ModeShares& limits) const {
  std::vector<bool> within(kResamples, true);
  const auto test = [&](Mode mode, const Sums& admissible, const Sums& tested, double whole) {
    for (std::size_t b = 0; b < kResamples; ++b) {
      if (tested[b] <= 0.0) continue;
      const double share = admissible[b] / tested[b];
      // A pair counts twice over: the first-order part of the share moves twice as far.
      const double resampled = whole > 0.0 ? share * share / whole : share;
      if (!at_most(resampled, limits[static_cast<std::size_t>(mode)])) within[b] = false;
    }
  };
  const auto test_planes = [&](Mode mode, bool (*passes)(const FaceLimits&, const Vector3&)) {
    const auto flag = [&](std::size_t i) {
      return passes(face, {readings_.x[i], readings_.y[i], readings_.z[i]}) ? 1.0 : 0.0;
    };
    test(mode, drawn(grouped(flag)), all_readings_, 0.0);
  };
  const auto test_pairs = [&](Mode mode, const PairTally& tally) {
    const auto degree = [&](std::size_t i) { return static_cast<double>(tally.of_reading[i]); };
    const Sums sums = grouped(degree);
    const double all = std::accumulate(sums.begin(), sums.end(), 0.0);
    if (all > 0.0) test(mode, drawn(sums), all_lines_, all / lines_);
  };
  test_planes(Mode::planar_sliding, planar_sliding);
  test_planes(Mode::flexural_toppling, flexural_toppling);
  test_pairs(Mode::wedge_sliding, pairs_.wedge_sliding(face, 1));
  test_pairs(Mode::block_toppling, pairs_.block_toppling(face, 1));
  return static_cast<double>(std::ranges::count(within, true)) / static_cast<double>(kResamples);
}

}  // namespace brink
