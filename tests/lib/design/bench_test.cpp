#include "brink/design/bench.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <vector>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"

namespace {

using namespace brink;

constexpr double kDegree = std::numbers::pi / 180.0;

Readings readings_of(const std::vector<Plane>& planes) {
  Readings readings;
  for (const Plane& plane : planes) {
    readings.planes.push_back(plane);
    readings.normals.push_back(upward_normal(plane));
    readings.weights.push_back(1.0);
  }
  return readings;
}

Plane plane(double dip, double direction) {
  return {Angle::degrees(dip), Angle::degrees(direction)};
}

BenchOptions bench() {
  BenchOptions options;
  options.face = {Angle::degrees(70.0), Angle::degrees(100.0)};
  options.height_m = 12.0;
  options.berm_m = 8.0;
  options.settings.friction = Angle::degrees(30.0);
  return options;
}

TEST(Bench, BermOfAnInterRampAngle) {
  // Trade article on pit wall angles, as printed: 50 and 70 degrees, benches 5, 10 and 15 m high.
  const double printed[] = {2.4, 4.8, 7.1};
  for (int i = 0; i < 3; ++i) {
    const double height = 5.0 * (i + 1);
    const double width = berm_width_m(height, Angle::degrees(50.0), Angle::degrees(70.0));
    EXPECT_NEAR(width, printed[i], 0.05);
    EXPECT_NEAR(inter_ramp_angle(height, width, Angle::degrees(70.0)).deg(), 50.0, 1e-12);
  }
  EXPECT_DOUBLE_EQ(ritchie_width_m(10.0), 6.5);  // 0.2 H + 4.5 m, common practice, no source
}

TEST(Bench, OnePlaneByHand) {
  // It dips 45 degrees straight out of the face: 12 (cot 45 - cot 70) = 7.632 m.
  const BenchResult result = design_bench(readings_of({plane(45.0, 100.0)}), bench());
  const double by_hand = 12.0 * (1.0 - 1.0 / std::tan(70.0 * kDegree));
  EXPECT_EQ(result.planes.share, 1.0);
  ASSERT_EQ(result.planes.percentiles.size(), 3U);
  for (const BackBreak& p : result.planes.percentiles) {
    EXPECT_NEAR(p.back_break_m, by_hand, 1e-6);
    EXPECT_NEAR(p.effective_face.deg(), 45.0, 1e-6);
    EXPECT_NEAR(p.berm_left_m, 8.0 - by_hand, 1e-6);
    EXPECT_FALSE(p.keeps_ritchie);
    // Toe to toe 12 cot 70 + 6.9 + the break.
    EXPECT_NEAR(p.inter_ramp_to_keep.deg(), std::atan2(12.0, 12.0 + 6.9) / kDegree, 1e-6);
  }
  EXPECT_EQ(result.wedges.tested, 0.0);
  EXPECT_TRUE(result.wedges.percentiles.empty());
  EXPECT_EQ(result.governing.size(), 3U);
}

TEST(Bench, OneWedgeByHand) {
  // Two planes whose line plunges towards the face direction, mirrored about it.
  const BenchResult result =
      design_bench(readings_of({plane(60.0, 60.0), plane(60.0, 140.0)}), bench());
  const double plunge = std::atan(std::tan(60.0 * kDegree) * std::cos(40.0 * kDegree));
  const double by_hand = 12.0 * (1.0 / std::tan(plunge) - 1.0 / std::tan(70.0 * kDegree));
  EXPECT_EQ(result.wedges.breaking, 1.0);
  EXPECT_NEAR(result.wedges.percentiles[0].back_break_m, by_hand, 1e-6);
  EXPECT_TRUE(result.planes.percentiles.empty());
}

TEST(Bench, PercentilesOfPlanesAndWedgesOneByOne) {
  std::vector<Plane> planes;
  for (std::uint64_t i = 0; i < 60; ++i) {
    planes.push_back(plane(30.0 + std::floor(55.0 * random_uniform(2, 0, i)),
                           std::fmod(50.0 + std::floor(100.0 * random_uniform(2, 1, i)), 360.0)));
  }
  BenchOptions options = bench();
  options.percentiles = {10.0, 50.0, 90.0};
  const BenchResult result = design_bench(readings_of(planes), options);
  const FaceLimits limits = prepare_limits(options.face, options.settings);
  // Distance square to the crest at which a line from the toe reaches the bench's level.
  const auto behind_crest = [&](const Vector3& v) {
    const SinCos a = sincos(options.face.dip_direction);
    const double rise = 12.0 / -v.z();
    return rise * (v.x() * a.sin + v.y() * a.cos) - 12.0 / std::tan(70.0 * kDegree);
  };
  std::vector<double> by_plane;
  std::vector<double> by_wedge;
  for (std::size_t i = 0; i < planes.size(); ++i) {
    const Vector3 n = upward_normal(planes[i]);
    if (planar_sliding(limits, n)) {
      by_plane.push_back(behind_crest(dip_vector(planes[i].dip, planes[i].dip_direction)));
    }
    for (std::size_t j = i + 1; j < planes.size(); ++j) {
      const auto v = intersection_vector(n, upward_normal(planes[j]));
      if (v && wedge_sliding(limits, *v)) by_wedge.push_back(behind_crest(*v));
    }
  }
  EXPECT_EQ(result.planes.breaking, static_cast<double>(by_plane.size()));
  EXPECT_EQ(result.wedges.breaking, static_cast<double>(by_wedge.size()));
  EXPECT_GT(by_wedge.size(), 100U);
  const auto expect_percentiles = [&](std::vector<double> values, const BreakingJoints& joints) {
    std::ranges::sort(values);
    for (const BackBreak& p : joints.percentiles) {
      // The least value with at least this part of all at or below it.
      const auto rank = static_cast<std::size_t>(
          std::ceil(p.percentile / 100.0 * static_cast<double>(values.size()) - 1e-9));
      EXPECT_NEAR(p.back_break_m, values[rank - 1], 1e-6) << p.percentile;
    }
  };
  expect_percentiles(by_plane, result.planes);
  expect_percentiles(by_wedge, result.wedges);
}

TEST(Bench, NothingBreaks) {
  const BenchResult result = design_bench(readings_of({plane(80.0, 100.0)}), bench());
  EXPECT_EQ(result.planes.share, 0.0);
  EXPECT_TRUE(result.governing.empty());
}

TEST(Bench, RefusesValuesOutOfRange) {
  const Readings readings = readings_of({plane(45.0, 100.0)});
  BenchOptions options = bench();
  options.height_m = 0.0;
  EXPECT_THROW(design_bench(readings, options), Error);
  options = bench();
  options.settings.friction = Angle{};
  EXPECT_THROW(design_bench(readings, options), Error);
  options = bench();
  options.face.dip = Angle::degrees(100.0);
  EXPECT_THROW(design_bench(readings, options), Error);
}

}  // namespace
