// Intervals of shares of pairs, by projection, against resampling the readings and counting their
// pairs again.
#include "../../../lib/src/kinematics/intervals.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "brink/base/random.hpp"
#include "brink/kinematics/kinematics.hpp"
#include "brink/kinematics/modes.hpp"
#include "brink/orientation/intersection.hpp"

namespace {

using namespace brink;

struct PairMatrix {
  std::size_t size;
  std::vector<char> line, yes;
};

// Readings in two clusters and a scatter, tested on one face.
Readings clustered(std::size_t count, std::uint64_t seed) {
  Readings readings;
  for (std::size_t i = 0; i < count; ++i) {
    const double spread = 12.0 * (random_uniform(seed, 0, i) - 0.5);
    const double turn = 40.0 * (random_uniform(seed, 1, i) - 0.5);
    Plane plane{Angle::degrees(60.0 + spread), Angle::degrees(130.0 + turn)};
    if (i % 3 == 1) plane = {Angle::degrees(55.0 + spread), Angle::degrees(235.0 + turn)};
    if (i % 3 == 2) {
      plane = {Angle::degrees(90.0 * random_uniform(seed, 2, i)),
               Angle::degrees(360.0 * random_uniform(seed, 3, i))};
    }
    readings.planes.push_back(plane);
    readings.normals.push_back(upward_normal(plane));
    readings.weights.push_back(1.0);
  }
  return readings;
}

PairMatrix pair_matrix(const Readings& readings, const FaceLimits& limits) {
  const std::size_t n = readings.size();
  PairMatrix m{n, std::vector<char>(n * n), std::vector<char>(n * n)};
  for (std::size_t i = 0; i < n; ++i) {
    for (std::size_t j = 0; j < n; ++j) {
      const auto v = intersection_vector(readings.normals[i], readings.normals[j]);
      m.line[i * n + j] = v.has_value();
      m.yes[i * n + j] = v && wedge_sliding(limits, *v);
    }
  }
  return m;
}

ShareInterval resample_pairs(const PairMatrix& m, std::uint64_t seed) {
  std::vector<double> shares;
  for (std::uint64_t b = 0; b < 1999; ++b) {
    std::vector<std::size_t> drawn(m.size);
    for (std::size_t k = 0; k < m.size; ++k) drawn[k] = random_index(seed, b, k, m.size);
    double tested = 0.0;
    double admissible = 0.0;
    for (std::size_t i = 0; i < m.size; ++i) {
      for (std::size_t j = 0; j < i; ++j) {
        tested += m.line[drawn[i] * m.size + drawn[j]];
        admissible += m.yes[drawn[i] * m.size + drawn[j]];
      }
    }
    shares.push_back(admissible / tested);
  }
  std::sort(shares.begin(), shares.end());
  return {shares[49], shares[1949]};
}

TEST(Intervals, ProjectionAgreesWithResamplingThePairs) {
  for (const std::size_t size : {40U, 120U}) {
    for (std::uint64_t seed = 1; seed <= 4; ++seed) {
      KinematicsOptions options;
      options.faces = {{70_deg, 180_deg}};
      options.friction = 30_deg;
      const Readings readings = clustered(size, seed);
      const auto result =
          test_kinematics(readings, std::vector<int>(size, 0), 0, options).faces.at(0);
      const FaceLimits limits = prepare_limits(options.faces[0], {.friction = 30_deg});
      const ShareInterval brute = resample_pairs(pair_matrix(readings, limits), 77);
      const ModeCount& wedge = result.wedge_sliding;
      // The projection leaves out the second-order term of a resample, of relative size 1/n.
      const double width = brute.high - brute.low;
      EXPECT_NEAR(*wedge.share_low, brute.low, 0.12 * width) << size << " " << seed;
      EXPECT_NEAR(*wedge.share_high, brute.high, 0.12 * width) << size << " " << seed;
      EXPECT_LT(*wedge.share_low, *wedge.share);
      EXPECT_GT(*wedge.share_high, *wedge.share);
    }
  }
}

TEST(Intervals, SharesOfReadingsFollowTheBinomial) {
  const std::size_t n = 400;
  std::vector<std::uint64_t> admissible(n);
  std::fill(admissible.begin(), admissible.begin() + 100, 1);
  const std::vector<std::uint64_t> tested(n, 1);
  const auto interval = share_intervals({{admissible, tested, 1}}, 1, 1).at(0).value();
  const double deviation = std::sqrt(0.25 * 0.75 / static_cast<double>(n));
  EXPECT_NEAR(interval.low, 0.25 - 1.96 * deviation, 0.25 * deviation);
  EXPECT_NEAR(interval.high, 0.25 + 1.96 * deviation, 0.25 * deviation);
}

TEST(Intervals, GroupsOfManyReadingsGiveTheSameWidth) {
  const std::size_t n = 40000;
  std::vector<std::uint64_t> admissible(n);
  std::fill(admissible.begin(), admissible.begin() + 10000, 1);
  const std::vector<std::uint64_t> tested(n, 1);
  const auto interval = share_intervals({{admissible, tested, 1}}, 1, 0).at(0).value();
  const double deviation = std::sqrt(0.25 * 0.75 / static_cast<double>(n));
  EXPECT_NEAR(interval.low, 0.25 - 1.96 * deviation, 0.25 * deviation);
  EXPECT_NEAR(interval.high, 0.25 + 1.96 * deviation, 0.25 * deviation);
}

TEST(Intervals, NothingAndAll) {
  const std::vector<std::uint64_t> none(20, 0);
  const std::vector<std::uint64_t> all(20, 1);
  const auto intervals = share_intervals({{none, all, 1}, {all, all, 1}, {none, none, 2}}, 1, 1);
  EXPECT_EQ(intervals[0]->high, 0.0);
  EXPECT_EQ(intervals[1]->low, 1.0);
  EXPECT_FALSE(intervals[2].has_value());
  EXPECT_FALSE(share_intervals({{std::span(all).first(1), std::span(all).first(1), 1}}, 1, 1)
                   .at(0)
                   .has_value());
}

}  // namespace
