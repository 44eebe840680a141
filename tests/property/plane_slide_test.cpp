// What must hold for any planar slide.
#include "brink/mechanics/plane_slide.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/random.hpp"

namespace brink {
namespace {

double uniform(std::uint64_t i, std::uint64_t k, double low, double high) {
  return low + (high - low) * random_uniform(4711, i, k);
}

// A block on its plane: c, phi and dip vary; water to part of the crack.
PlaneSlideInput block(std::uint64_t i) {
  PlaneSlideInput in;
  in.plane = {Angle::degrees(uniform(i, 0, 20, 50)), Angle::degrees(uniform(i, 1, 0, 360))};
  in.face = {Angle::degrees(uniform(i, 2, 60, 85)), in.plane.dip_direction};
  in.height_m = uniform(i, 3, 5, 60);
  in.unit_weight_kN_m3 = 26.0;
  in.strength = MohrCoulomb{uniform(i, 4, 5, 80), Angle::degrees(uniform(i, 5, 15, 45))};
  in.crack = CrackChoice::at_setback;
  const double exit = in.height_m / tan(in.plane.dip);
  const double crest = in.height_m / tan(in.face.dip);
  in.crack_setback_m = uniform(i, 6, 0.05, 0.8) * (exit - crest);
  const double depth = in.height_m - (crest + in.crack_setback_m) * tan(in.plane.dip);
  in.water_depth_m = uniform(i, 7, 0.1, 0.5) * depth;
  return in;
}

double factor(const PlaneSlideInput& in) {
  return analyse_plane_slide(in).factor_of_safety;
}

// Common practice, no source: water only ever hurts a block that lies on its plane.
TEST(PlaneSlideProperty, DrainingNeverLowersTheFactorOfSafety) {
  for (std::uint64_t i = 0; i < 500; ++i) {
    PlaneSlideInput in = block(i);
    double drier = 0.0;
    for (int step = 10; step >= 0; --step) {
      PlaneSlideInput drained = in;
      drained.water_depth_m = in.water_depth_m * step / 10.0;
      const double now = factor(drained);
      EXPECT_GE(now, drier) << i;
      drier = now;
    }
  }
}

// Common practice, no source: c A is shared by more weight.
TEST(PlaneSlideProperty, SurchargeLowersADryCohesiveBlock) {
  for (std::uint64_t i = 0; i < 500; ++i) {
    PlaneSlideInput in = block(i);
    in.water_depth_m = 0.0;
    const double bare = factor(in);
    in.surcharge_kPa = 50.0;
    EXPECT_LT(factor(in), bare) << i;
  }
}

// Common practice, no source.
TEST(PlaneSlideProperty, ShakingTowardsTheFaceLowersIt) {
  for (std::uint64_t i = 0; i < 500; ++i) {
    PlaneSlideInput in = block(i);
    const double still = factor(in);
    in.seismic_horizontal = 0.1;
    EXPECT_LT(factor(in), still) << i;
  }
}

TEST(PlaneSlideProperty, TurningEverythingChangesNothing) {
  for (std::uint64_t i = 0; i < 200; ++i) {
    PlaneSlideInput in = block(i);
    in.upper = {10_deg, wrap_360(in.plane.dip_direction + 40_deg)};
    in.bolts = {{100.0, {wrap_360(in.plane.dip_direction + 170_deg), 10_deg}}};
    const double before = factor(in);
    const Angle turn = Angle::degrees(uniform(i, 9, 0, 360));
    for (Angle* a : {&in.plane.dip_direction, &in.face.dip_direction, &in.upper.dip_direction,
                     &in.bolts[0].towards.trend})
      *a = wrap_360(*a + turn);
    EXPECT_NEAR(factor(in), before, 1e-9 * before) << i;
  }
}

TEST(PlaneSlideProperty, ScaleDoesNotMatterWithoutCohesion) {
  for (std::uint64_t i = 0; i < 200; ++i) {
    PlaneSlideInput in = block(i);
    std::get<MohrCoulomb>(in.strength).cohesion_kPa = 0.0;
    const double before = factor(in);
    for (double* length : {&in.height_m, &in.crack_setback_m, &in.water_depth_m}) *length *= 7.0;
    EXPECT_NEAR(factor(in), before, 1e-9 * before) << i;
  }
}

// Dry and cohesionless: tan(phi)/tan(p), whatever the rest (exact).
TEST(PlaneSlideProperty, DryFrictionOnlyIsTheRatioOfTangents) {
  for (std::uint64_t i = 0; i < 200; ++i) {
    PlaneSlideInput in = block(i);
    auto& law = std::get<MohrCoulomb>(in.strength);
    law.cohesion_kPa = 0.0;
    in.water_depth_m = 0.0;
    in.surcharge_kPa = uniform(i, 11, 0, 100);
    EXPECT_NEAR(factor(in), tan(law.friction) / tan(in.plane.dip), 1e-9) << i;
  }
}

TEST(PlaneSlideProperty, CriticalCrackIsNoSaferThanAnyOther) {
  for (std::uint64_t i = 0; i < 100; ++i) {
    PlaneSlideInput in = block(i);
    PlaneSlideInput critical = in;
    critical.crack = CrackChoice::critical;
    EXPECT_LE(factor(critical), factor(in) * (1.0 + 1e-12)) << i;
  }
}

}  // namespace
}  // namespace brink
