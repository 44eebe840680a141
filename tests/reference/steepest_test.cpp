// Counts on every face of a grid, and the steepest faces found with them, against the loop over all
// pairs repeated on each face.
#include "brink/design/steepest.hpp"

#include <gtest/gtest.h>

#include <array>
#include <string>
#include <vector>

#include "brink/design/dip_sweep.hpp"
#include "support/awkward_readings.hpp"

namespace {

using namespace brink;
using namespace brink::awkward;

FaceGrid draw_grid(Numbers& numbers) {
  SteepestOptions options;
  const std::array steps = {30.0, 45.0, 72.0, 37.0, 90.0};
  const std::array resolutions = {1.0, 0.5, 5.0, 3.3, 15.0};
  options.every = Angle::degrees(steps[static_cast<std::size_t>(numbers.whole(5.0))]);
  options.resolution = Angle::degrees(resolutions[static_cast<std::size_t>(numbers.whole(5.0))]);
  return {azimuths_tried(options), dips_tried(options)};
}

TEST(DipSweep, CountsWhatTheLoopCountsOnEveryFace) {
  for (std::uint64_t seed = 0; seed < 60; ++seed) {
    Numbers numbers(1000 + seed);
    PairReadings readings = draw_readings(numbers, kKinds[seed % kKinds.size()], 60.0);
    const ModeSettings settings = draw_settings(numbers, {Angle::degrees(60.0), Angle{}});
    const FaceGrid grid = draw_grid(numbers);
    SCOPED_TRACE("seed " + std::to_string(seed) + ": " + in_words({}, settings));
    const std::vector<double> ones(readings.size(), 1.0);
    const SweepSums counts = sweep_pairs(readings, ones, grid, settings, 1);
    const SweepSums weights = sweep_pairs(readings, readings.weight, grid, settings, 2);
    for (std::size_t a = 0; a < grid.azimuths.size(); ++a) {
      for (std::size_t k = 0; k < grid.dips.size(); ++k) {
        const FaceLimits limits = prepare_limits({grid.dips[k], grid.azimuths[a]}, settings);
        const PairCounts loop = count_pairs(readings, limits, settings.friction, 1);
        const std::size_t face = a * grid.dips.size() + k;
        const PairSum wedge = loop.wedge_sliding.total();
        const PairSum block = loop.block_toppling.total();
        ASSERT_EQ(counts.wedge_sliding[face], static_cast<double>(wedge.count))
            << grid.dips[k].deg() << "/" << grid.azimuths[a].deg();
        ASSERT_EQ(counts.block_toppling[face], static_cast<double>(block.count))
            << grid.dips[k].deg() << "/" << grid.azimuths[a].deg();
        ASSERT_NEAR(weights.wedge_sliding[face], wedge.weight, 1e-10 * (1.0 + wedge.weight));
        ASSERT_NEAR(weights.block_toppling[face], block.weight, 1e-10 * (1.0 + block.weight));
      }
    }
  }
}

TEST(DipSweep, FinestStepsToo) {
  Numbers numbers(5);
  const PairReadings readings = draw_readings(numbers, Kind::whole_degrees, 40.0);
  const ModeSettings settings{.friction = Angle::degrees(25.0)};
  SteepestOptions options;
  options.every = Angle::degrees(60.0);
  options.resolution = Angle::degrees(0.1);
  const FaceGrid grid{azimuths_tried(options), dips_tried(options)};
  ASSERT_EQ(grid.dips.size(), 900U);
  const SweepSums counts =
      sweep_pairs(readings, std::vector<double>(readings.size(), 1.0), grid, settings, 1);
  for (std::size_t k = 0; k < 900; k += 7) {
    const FaceLimits limits = prepare_limits({grid.dips[k], grid.azimuths[2]}, settings);
    const PairCounts loop = count_pairs(readings, limits, settings.friction, 1);
    ASSERT_EQ(counts.wedge_sliding[2 * 900 + k],
              static_cast<double>(loop.wedge_sliding.total().count))
        << grid.dips[k].deg();
  }
}

TEST(DipSweep, SameBitsForAnyNumberOfThreads) {
  Numbers numbers(11);
  const PairReadings readings = draw_readings(numbers, Kind::smooth, 200.0);
  const FaceGrid grid{{Angle{}, Angle::degrees(90.0), Angle::degrees(180.0)},
                      {Angle::degrees(30.0), Angle::degrees(60.0)}};
  const SweepSums one = sweep_pairs(readings, readings.weight, grid, {}, 1);
  const SweepSums many = sweep_pairs(readings, readings.weight, grid, {}, 5);
  EXPECT_EQ(one.wedge_sliding, many.wedge_sliding);
  EXPECT_EQ(one.block_toppling, many.block_toppling);
}

// The definition, face by face: counts of the plain tests, limits compared one dip after the other.
struct PlainFace {
  double steepest = 0.0;
  ModeShares shares{};
  std::optional<ModeShares> next;
};

ModeShares plain_shares(const PairReadings& readings, const FaceLimits& limits, Angle friction) {
  const PairCounts pairs = count_pairs(readings, limits, friction, 1);
  const auto lines = static_cast<double>(count_lines(readings, 1).total().count);
  double planar = 0.0;
  double flexural = 0.0;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const Vector3 n{readings.x[i], readings.y[i], readings.z[i]};
    planar += planar_sliding(limits, n) ? 1.0 : 0.0;
    flexural += flexural_toppling(limits, n) ? 1.0 : 0.0;
  }
  const auto size = static_cast<double>(readings.size());
  return {planar / size, static_cast<double>(pairs.wedge_sliding.total().count) / lines,
          flexural / size, static_cast<double>(pairs.block_toppling.total().count) / lines};
}

PlainFace search_plainly(const PairReadings& readings, Angle azimuth, const SteepestOptions& o) {
  PlainFace face;
  for (const Angle dip : dips_tried(o)) {
    const ModeShares shares =
        plain_shares(readings, prepare_limits({dip, azimuth}, o.settings), o.settings.friction);
    bool within = true;
    for (std::size_t m = 0; m < kModes; ++m) within = within && shares[m] <= o.limits[m] + 1e-9;
    if (!within) {
      face.next = shares;
      return face;
    }
    face.steepest = dip.deg();
    face.shares = shares;
  }
  return face;
}

struct Drawn {
  Readings readings;
  SetsResult sets;
};

Drawn unarrange(const PairReadings& arranged) {
  Drawn drawn;
  drawn.sets.assignment.assign(arranged.size(), 0);
  for (std::size_t i = 0; i < arranged.size(); ++i) {
    drawn.readings.normals.emplace_back(arranged.x[i], arranged.y[i], arranged.z[i]);
    drawn.readings.planes.push_back(plane_of_normal(drawn.readings.normals.back()));
    drawn.readings.weights.push_back(arranged.weight[i]);
  }
  return drawn;
}

TEST(Steepest, EqualsTheDefinitionAtEveryAzimuth) {
  for (std::uint64_t seed = 0; seed < 24; ++seed) {
    Numbers numbers(4000 + seed);
    const PairReadings readings = draw_readings(numbers, kKinds[seed % kKinds.size()], 60.0);
    SteepestOptions options;
    options.settings = draw_settings(numbers, {Angle::degrees(60.0), Angle{}});
    options.every = Angle::degrees(40.0);
    options.resolution = Angle::degrees(seed % 2 == 0 ? 3.0 : 1.0);
    if (seed % 3 == 0) options.greatest_dip = Angle::degrees(130.0);
    for (double& limit : options.limits) limit = 0.01 * numbers.whole(15.0);
    options.threads = 1;
    SCOPED_TRACE("seed " + std::to_string(seed) + ": " + in_words({}, options.settings));
    const Drawn drawn = unarrange(readings);
    const SteepestResult result = find_steepest(drawn.readings, drawn.sets, options);
    for (const SteepestFace& face : result.azimuths) {
      const PlainFace plain = search_plainly(readings, face.dip_direction, options);
      ASSERT_EQ(face.steepest_dip.deg(), plain.steepest) << face.dip_direction.deg();
      EXPECT_EQ(face.shares, plain.shares);
      EXPECT_EQ(face.shares_one_step_steeper, plain.next);
    }
  }
}

}  // namespace
