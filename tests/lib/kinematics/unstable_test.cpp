#include "brink/kinematics/unstable.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <vector>

#include "brink/base/random.hpp"
#include "brink/kinematics/chords.hpp"

namespace {

using namespace brink;

PairReadings draw(std::size_t size, double step) {
  Readings readings;
  for (std::size_t i = 0; i < size; ++i) {
    const double dip = step * std::floor(91.0 / step * random_uniform(3, 0, i));
    const double direction = step * std::floor(360.0 / step * random_uniform(3, 1, i));
    readings.planes.push_back({Angle::degrees(dip), Angle::degrees(direction)});
    readings.normals.push_back(upward_normal(readings.planes.back()));
    readings.weights.push_back(1.0);
  }
  return arrange_by_set(readings, std::vector<int>(size), 0);
}

const Angle kFriction = Angle::degrees(30.0);

FaceLimits limits(double dip) {
  return prepare_limits({Angle::degrees(dip), Angle::degrees(140.0)}, {.friction = kFriction});
}

TEST(Unstable, CopiesCountAsReadings) {
  const PairReadings readings = draw(900, 15.0);
  const DistinctPlanes distinct = ChordCounter(readings).distinct_planes();
  ASSERT_LT(distinct.copies.size(), 170U);
  for (const double dip : {50.0, 75.0, 110.0}) {
    const std::uint64_t each = count_unstable_dry(readings, {}, limits(dip), kFriction, 1);
    EXPECT_GT(each, 1000U);
    EXPECT_EQ(count_unstable_dry(distinct.planes, distinct.copies, limits(dip), kFriction, 2),
              each);
  }
}

TEST(Unstable, SampleAgreesWithTheCountWithinItsStandardError) {
  const PairReadings readings = draw(3000, 1.0);
  int beyond_two = 0;
  for (int dip = 40; dip <= 120; dip += 10) {
    const FaceLimits face = limits(dip);
    const auto exact = static_cast<double>(count_unstable_dry(readings, {}, face, kFriction, 2));
    const UnstableDry sample = sample_unstable_dry(readings, face, kFriction, 200'000, 5, 2);
    ASSERT_TRUE(sample.standard_error);
    EXPECT_NEAR(static_cast<double>(sample.sampled), 200'000.0, 2000.0);
    const double off = std::abs(static_cast<double>(sample.count) - exact) / *sample.standard_error;
    EXPECT_LT(off, 4.0) << dip;
    beyond_two += off > 2.0 ? 1 : 0;
    // Strata never lose against plain draws: sqrt(p (1 - p) / n) of all pairs.
    const double all = 3000.0 * 2999.0 / 2.0;
    const double share = exact / all;
    EXPECT_LT(*sample.standard_error, all * std::sqrt(share * (1.0 - share) / 200'000.0));
  }
  EXPECT_LE(beyond_two, 2);
}

TEST(Unstable, SampleIsTheSameForAnyNumberOfThreads) {
  const PairReadings readings = draw(500, 1.0);
  const UnstableDry one = sample_unstable_dry(readings, limits(70.0), kFriction, 20'000, 9, 1);
  const UnstableDry many = sample_unstable_dry(readings, limits(70.0), kFriction, 20'000, 9, 7);
  EXPECT_EQ(one.count, many.count);
  EXPECT_EQ(one.standard_error, many.standard_error);
}

TEST(Unstable, FewReadingsAreSampledToo) {
  const PairReadings readings = draw(3, 1.0);
  const UnstableDry sample = sample_unstable_dry(readings, limits(70.0), kFriction, 1000, 1, 1);
  EXPECT_LE(sample.count, 3U);
  const PairReadings none = draw(0, 1.0);
  EXPECT_EQ(sample_unstable_dry(none, limits(70.0), kFriction, 1000, 1, 1).count, 0U);
}

}  // namespace
