#include "brink/kinematics/pairs.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"
#include "brink/mechanics/dry_wedge.hpp"
#include "brink/orientation/intersection.hpp"

namespace {

using namespace brink;

Readings random_readings(std::size_t count) {
  Readings readings;
  for (std::size_t i = 0; i < count; ++i) {
    const Plane plane{Angle::degrees(static_cast<double>(random_index(5, 0, i, 91))),
                      Angle::degrees(static_cast<double>(random_index(5, 1, i, 360)))};
    readings.planes.push_back(plane);
    readings.normals.push_back(upward_normal(plane));
    readings.weights.push_back(0.5 + random_uniform(5, 2, i));
  }
  return readings;
}

std::vector<int> random_sets(std::size_t count, std::uint64_t sets) {
  std::vector<int> assignment;
  for (std::size_t i = 0; i < count; ++i) {
    assignment.push_back(static_cast<int>(random_index(5, 3, i, sets + 1)));
  }
  return assignment;
}

TEST(Pairs, SlotsNumberTheUpperTriangle) {
  std::size_t expected = 0;
  for (std::size_t a = 0; a < 5; ++a) {
    for (std::size_t b = a; b < 5; ++b) EXPECT_EQ(pair_slot(a, b, 5), expected++);
  }
}

TEST(Pairs, ReadingsAreSortedBySetWithTheUnassignedLast) {
  const PairReadings r = arrange_by_set(random_readings(5), {2, 0, 1, 2, 0}, 3);
  EXPECT_EQ(r.source, (std::vector<std::size_t>{2, 0, 3, 1, 4}));
  EXPECT_EQ(r.group_begin, (std::vector<std::size_t>{0, 1, 3, 3, 5}));
}

TEST(Pairs, RefusesAnAssignmentThatDoesNotFit) {
  EXPECT_THROW(arrange_by_set(random_readings(3), {1, 1}, 1), Error);
  EXPECT_THROW(arrange_by_set(random_readings(2), {1, 2}, 1), Error);
  EXPECT_THROW(arrange_by_set(random_readings(2), {1, -1}, 1), Error);
}

TEST(Pairs, SameBitsForAnyNumberOfThreads) {
  const PairReadings r = arrange_by_set(random_readings(900), random_sets(900, 3), 3);
  const FaceLimits limits = prepare_limits({70_deg, 200_deg}, {.friction = 30_deg});
  const PairCounts one = count_pairs(r, limits, 30_deg, 1);
  for (const unsigned threads : {2U, 7U}) {
    const PairCounts many = count_pairs(r, limits, 30_deg, threads);
    EXPECT_EQ(one.unstable_dry, many.unstable_dry);
    EXPECT_EQ(one.wedge_sliding.of_reading, many.wedge_sliding.of_reading);
    for (std::size_t s = 0; s < one.wedge_sliding.by_groups.size(); ++s) {
      EXPECT_EQ(one.wedge_sliding.by_groups[s].count, many.wedge_sliding.by_groups[s].count);
      EXPECT_EQ(one.wedge_sliding.by_groups[s].weight, many.wedge_sliding.by_groups[s].weight);
      EXPECT_EQ(one.block_toppling.by_groups[s].weight, many.block_toppling.by_groups[s].weight);
    }
  }
}

TEST(Pairs, EveryPairIsInTwoReadings) {
  const PairReadings r = arrange_by_set(random_readings(500), random_sets(500, 2), 2);
  const PairCounts counts =
      count_pairs(r, prepare_limits({70_deg, 200_deg}, {.friction = 30_deg}), 30_deg, 2);
  for (const PairTally* tally : {&counts.wedge_sliding, &counts.block_toppling}) {
    std::uint64_t sum = 0;
    for (const std::uint64_t count : tally->of_reading) sum += count;
    EXPECT_GT(sum, 0U);
    EXPECT_EQ(sum, 2 * tally->total().count);
  }
}

// The division-free loop against the factor of safety itself, pair by pair.
TEST(Pairs, UnstableWhereTheDryFactorOfSafetyIsBelowOne) {
  const Readings readings = random_readings(300);
  const PairReadings r = arrange_by_set(readings, std::vector<int>(300, 0), 0);
  for (const double dip : {40.0, 60.0, 75.0, 90.0, 110.0}) {
    for (const double friction : {0.0, 20.0, 45.0, 89.0}) {
      ModeSettings settings{.friction = Angle::degrees(friction)};
      if (dip == 60.0) settings.upper = {15_deg, 100_deg};
      const Face face{Angle::degrees(dip), 120_deg};
      const FaceLimits limits = prepare_limits(face, settings);
      std::uint64_t expected = 0;
      for (std::size_t i = 0; i < r.size(); ++i) {
        for (std::size_t j = i + 1; j < r.size(); ++j) {
          const Vector3& a = readings.normals[i];
          const Vector3& b = readings.normals[j];
          const auto v = intersection_vector(a, b);
          if (!v || !line_daylights(limits, *v)) continue;
          const double t = tan(settings.friction);
          if (strictly_below(
                  dry_factor_of_safety(a, b, t, t, limits.face_normal, limits.upper_normal), 1.0)) {
            ++expected;
          }
        }
      }
      EXPECT_EQ(count_pairs(r, limits, settings.friction, 2).unstable_dry, expected)
          << dip << " " << friction;
    }
  }
}

}  // namespace
