// Planar slides printed in handbooks.
#include "brink/mechanics/plane_slide.hpp"

#include <gtest/gtest.h>

namespace brink {
namespace {

// Wyllie & Mah, Rock Slope Engineering, 4th ed. 2004, ch. 6, example 6.1 (from memory). Tolerances
// are half of the last digit printed.
PlaneSlideInput wyllie_mah_example() {
  PlaneSlideInput in;
  in.plane = {35_deg, 150_deg};
  in.face = {60_deg, 150_deg};
  in.height_m = 12.0;
  in.unit_weight_kN_m3 = 26.0;
  in.strength = MohrCoulomb{25.0, 37_deg};
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = 4.0;
  in.water_depth_m = 3.0;
  return in;
}

TEST(PublishedPlaneSlide, WyllieMahGeometryAndForces) {
  const PlaneSlide slide = analyse_plane_slide(wyllie_mah_example());
  ASSERT_TRUE(slide.forms);
  EXPECT_NEAR(slide.crack_depth_m.value(), 4.35, 0.005);
  EXPECT_NEAR(slide.sliding_length_m, 13.34, 0.005);
  EXPECT_NEAR(slide.weight_kN_m, 1241.70, 0.05);
  EXPECT_NEAR(slide.uplift_kN_m, 196.31, 0.05);
  EXPECT_NEAR(slide.crack_water_kN_m, 44.15, 0.05);
}

double wyllie_mah_factor(double water_m, double cohesion_kPa, double bolt_kN, Angle plunge) {
  PlaneSlideInput in = wyllie_mah_example();
  in.water_depth_m = water_m;
  in.strength = MohrCoulomb{cohesion_kPa, 37_deg};
  if (bolt_kN > 0.0) in.bolts = {{bolt_kN, {330_deg, plunge}}};
  return analyse_plane_slide(in).factor_of_safety;
}

TEST(PublishedPlaneSlide, WyllieMahFactorsOfSafety) {
  EXPECT_NEAR(wyllie_mah_factor(3.0, 25.0, 0.0, 0_deg), 1.25, 0.006);
  EXPECT_NEAR(wyllie_mah_factor(0.0, 25.0, 0.0, 0_deg), 1.54, 0.006);
  EXPECT_NEAR(wyllie_mah_factor(0.0, 0.0, 0.0, 0_deg), 1.08, 0.006);
  EXPECT_NEAR(wyllie_mah_factor(0.0, 0.0, 400.0, 55_deg), 1.5, 0.006);
  EXPECT_NEAR(wyllie_mah_factor(0.0, 0.0, 400.0, 20_deg), 2.10, 0.006);
}

// Hoek & Bray, Rock Slope Engineering, 3rd ed. 1981, ch. 7 (from memory), in feet and pounds; the
// factors are printed truncated to two decimals.
TEST(PublishedPlaneSlide, HoekBrayWaterInTheCrack) {
  PlaneSlideInput in;
  in.plane = {30_deg, 0_deg};
  in.face = {60_deg, 0_deg};
  in.height_m = 100.0;
  in.unit_weight_kN_m3 = 160.0;
  in.water_unit_weight_kN_m3 = 62.5;
  in.strength = MohrCoulomb{1000.0, 30_deg};
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = 29.0;
  const double depth = analyse_plane_slide(in).crack_depth_m.value();
  const auto factor = [&](double share) {
    in.water_depth_m = share * depth;
    return analyse_plane_slide(in).factor_of_safety;
  };
  EXPECT_NEAR(factor(1.0), 0.77, 0.01);
  EXPECT_NEAR(factor(0.5), 1.10, 0.01);
  EXPECT_NEAR(factor(0.0), 1.34, 0.01);
}

}  // namespace
}  // namespace brink
