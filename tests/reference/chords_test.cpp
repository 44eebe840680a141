// The chord count against the loop over all pairs: equal to the last pair, on data built to be
// awkward. The loop is in turn held to spherical trigonometry by kinematics_test.cpp.
#include "brink/kinematics/chords.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <cstdint>
#include <string>
#include <vector>

#include "support/awkward_readings.hpp"

namespace {

using namespace brink;
using namespace brink::awkward;

void expect_equal(const PairTally& chords, const PairTally& loop) {
  ASSERT_EQ(chords.by_groups.size(), loop.by_groups.size());
  for (std::size_t i = 0; i < loop.by_groups.size(); ++i) {
    EXPECT_EQ(chords.by_groups[i].count, loop.by_groups[i].count);
    EXPECT_NEAR(chords.by_groups[i].weight, loop.by_groups[i].weight,
                1e-10 * (1.0 + loop.by_groups[i].weight));
  }
  EXPECT_EQ(chords.of_reading, loop.of_reading);
}

TEST(Chords, CountWhatTheLoopOverPairsCountsOnEveryFace) {
  std::uint64_t slides = 0;
  std::uint64_t topples = 0;
  for (std::uint64_t seed = 0; seed < 150; ++seed) {
    Numbers numbers(seed);
    const PairReadings readings = draw_readings(numbers, kKinds[seed % kKinds.size()]);
    const ChordCounter counter(readings);
    expect_equal(counter.lines(), count_lines(readings, 1));
    for (int f = 0; f < 15; ++f) {
      const Face face = draw_face(numbers);
      const ModeSettings settings = draw_settings(numbers, face);
      SCOPED_TRACE("seed " + std::to_string(seed) + ": " + in_words(face, settings));
      const FaceLimits limits = prepare_limits(face, settings);
      const PairCounts loop = count_pairs(readings, limits, settings.friction, 1);
      expect_equal(counter.wedge_sliding(limits, 1), loop.wedge_sliding);
      expect_equal(counter.block_toppling(limits, 1), loop.block_toppling);
      EXPECT_EQ(counter.wedge_sliding_total(limits).count, loop.wedge_sliding.total().count);
      EXPECT_EQ(counter.block_toppling_total(limits).count, loop.block_toppling.total().count);
      if (HasFailure()) return;
      slides += loop.wedge_sliding.total().count;
      topples += loop.block_toppling.total().count;
    }
  }
  EXPECT_GT(slides, 1'000'000U);
  EXPECT_GT(topples, 1'000'000U);
}

TEST(Chords, EveryWholeDegreePlaneAtOnce) {
  // All planes of a compass read to 10 degrees, each twice: every tie that such data can have.
  Readings readings;
  for (int copy = 0; copy < 2; ++copy) {
    for (int dip = 0; dip <= 90; dip += 10) {
      for (int direction = 0; direction < 360; direction += 10) {
        const Plane plane{Angle::degrees(dip), Angle::degrees(direction)};
        readings.planes.push_back(plane);
        readings.normals.push_back(upward_normal(plane));
        readings.weights.push_back(1.0);
      }
    }
  }
  const PairReadings arranged = arrange_by_set(readings, std::vector<int>(readings.size()), 0);
  const ChordCounter counter(arranged);
  for (int dip = 10; dip <= 180; dip += 10) {
    for (const int direction : {0, 40, 90, 130}) {
      for (const Plane& upper : {kLevelGround, Plane{Angle::degrees(20), Angle::degrees(100)}}) {
        const ModeSettings settings{.upper = upper,
                                    .friction = Angle::degrees(dip % 40),
                                    .toppling_tolerance = Angle::degrees(dip % 70)};
        const Face face{Angle::degrees(dip), Angle::degrees(direction)};
        SCOPED_TRACE(in_words(face, settings));
        const FaceLimits limits = prepare_limits(face, settings);
        const PairCounts loop = count_pairs(arranged, limits, settings.friction, 1);
        expect_equal(counter.wedge_sliding(limits, 1), loop.wedge_sliding);
        expect_equal(counter.block_toppling(limits, 1), loop.block_toppling);
      }
    }
  }
}

TEST(Chords, SameForAnyNumberOfThreads) {
  Numbers numbers(7);
  const PairReadings readings = draw_readings(numbers, Kind::coarse);
  const ChordCounter counter(readings);
  const FaceLimits limits =
      prepare_limits({Angle::degrees(70), Angle::degrees(120)}, {.friction = Angle::degrees(30)});
  const PairTally one = counter.wedge_sliding(limits, 1);
  for (const unsigned threads : {2U, 7U}) {
    const PairTally many = counter.wedge_sliding(limits, threads);
    EXPECT_EQ(many.of_reading, one.of_reading);
    for (std::size_t i = 0; i < one.by_groups.size(); ++i) {
      EXPECT_EQ(many.by_groups[i].count, one.by_groups[i].count);
      EXPECT_EQ(many.by_groups[i].weight, one.by_groups[i].weight);
    }
  }
}

TEST(Chords, NothingToCount) {
  const ChordCounter nothing(arrange_by_set({}, {}, 0));
  const FaceLimits limits = prepare_limits({Angle::degrees(70), Angle::degrees(120)}, {});
  EXPECT_EQ(nothing.distinct(), 0U);
  EXPECT_EQ(nothing.lines().total().count, 0U);
  EXPECT_EQ(nothing.wedge_sliding(limits, 1).total().count, 0U);
  EXPECT_EQ(nothing.block_toppling(limits, 1).total().count, 0U);
}

}  // namespace
