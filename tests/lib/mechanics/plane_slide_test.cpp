#include "brink/mechanics/plane_slide.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "brink/base/error.hpp"

namespace brink {
namespace {

PlaneSlideInput simple_block() {
  PlaneSlideInput in;
  in.plane = {35_deg, 90_deg};
  in.face = {70_deg, 90_deg};
  in.height_m = 10.0;
  in.unit_weight_kN_m3 = 25.0;
  in.strength = MohrCoulomb{10.0, 30_deg};
  return in;
}

std::string refusal(const PlaneSlideInput& in) {
  try {
    analyse_plane_slide(in);
  } catch (const Error& e) {
    EXPECT_EQ(e.kind(), ErrorKind::argument);
    return e.what();
  }
  return "accepted";
}

TEST(PlaneSlide, SaysWhyNoBlockForms) {
  PlaneSlideInput in = simple_block();
  in.plane.dip = 70_deg;
  EXPECT_EQ(analyse_plane_slide(in).reason,
            "the plane does not daylight: it dips 70.0 degrees, the face 70.0 in the section "
            "towards 90.0");
  in.plane = {35_deg, 270_deg};
  EXPECT_EQ(analyse_plane_slide(in).reason,
            "the plane dips into the slope: towards 270.0, away from the face");
  in = simple_block();
  in.upper = {35_deg, 90_deg};
  EXPECT_EQ(
      analyse_plane_slide(in).reason,
      "the plane never reaches the upper ground, which rises 35.0 degrees behind the crest where "
      "the plane rises 35.0");
  in = simple_block();
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = -5.0;
  EXPECT_EQ(analyse_plane_slide(in).reason,
            "the crack comes out in the face in front of the plane's toe: no block is left between "
            "it and the "
            "face (the toe is 3.640 m in front of the crest)");
}

TEST(PlaneSlide, ADryPlaneIsOnePlainCall) {
  const PlaneSlide slide =
      dry_plane_slide({35_deg, 90_deg}, {70_deg, 90_deg}, 10.0, 25.0, 30_deg, 0.0);
  ASSERT_TRUE(slide.forms);
  EXPECT_NEAR(slide.factor_of_safety,
              std::tan(Angle::degrees(30).rad()) / std::tan(Angle::degrees(35).rad()), 1e-12);
  EXPECT_FALSE(slide.crack_depth_m);
  EXPECT_TRUE(slide.warnings.empty());
}

// Hoek, Practical Rock Engineering, chapter on a slope in Hong Kong (from memory): H 60 m, face 50,
// plane 35: crack 14.0 m deep, 15.3 m behind the crest.
TEST(PlaneSlide, PublishedCriticalCrack) {
  PlaneSlideInput in = simple_block();
  in.plane.dip = 35_deg;
  in.face.dip = 50_deg;
  in.height_m = 60.0;
  in.crack = CrackChoice::critical;
  const PlaneSlide slide = analyse_plane_slide(in);
  EXPECT_NEAR(slide.crack_depth_m.value(), 14.0, 0.05);
  EXPECT_NEAR(slide.crack_setback_m.value(), 15.3, 0.05);
}

// A surcharge of nothing to speak of sends the same case through the search.
TEST(PlaneSlide, SearchAgreesWithTheClosedForm) {
  PlaneSlideInput in = simple_block();
  in.crack = CrackChoice::critical;
  const PlaneSlide closed = analyse_plane_slide(in);
  in.surcharge_kPa = 1e-12;
  const PlaneSlide searched = analyse_plane_slide(in);
  EXPECT_NEAR(searched.crack_setback_m.value(), closed.crack_setback_m.value(), 1e-5);
  EXPECT_NEAR(searched.factor_of_safety, closed.factor_of_safety, 1e-10);
}

TEST(PlaneSlide, CrackBehindTheBlockLeavesItWhole) {
  PlaneSlideInput in = simple_block();
  const PlaneSlide whole = analyse_plane_slide(in);
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = 50.0;
  const PlaneSlide slide = analyse_plane_slide(in);
  EXPECT_EQ(slide.crack_depth_m, 0.0);
  EXPECT_EQ(slide.weight_kN_m, whole.weight_kN_m);
  ASSERT_EQ(slide.warnings.size(), 1U);
  in.water_depth_m = 1.0;
  EXPECT_EQ(refusal(in),
            "water depth: '1' has no crack to stand in, since the crack does not reach the block; "
            "accepted: 0, or no crack, the depth then measured above the toe");
}

TEST(PlaneSlide, CrackOnTheFaceLeavesATriangle) {
  PlaneSlideInput in = simple_block();
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = -1.0;
  const PlaneSlide slide = analyse_plane_slide(in);
  ASSERT_EQ(slide.section.outline.size(), 3U);
  const double x = 10.0 / std::tan(Angle::degrees(70).rad()) - 1.0;
  const double depth =
      x * (std::tan(Angle::degrees(70).rad()) - std::tan(Angle::degrees(35).rad()));
  EXPECT_NEAR(slide.crack_depth_m.value(), depth, 1e-12);
  EXPECT_NEAR(slide.weight_kN_m, 25.0 * x * depth / 2.0, 1e-9);
}

// Triangle of pressure, zero at the toe and where the water ends, half the head half-way: Hoek &
// Bray 1981, ch. 7.
TEST(PlaneSlide, WaterOnAPlaneWithoutCrack) {
  PlaneSlideInput in = simple_block();
  in.water_depth_m = 6.0;
  const PlaneSlide slide = analyse_plane_slide(in);
  EXPECT_NEAR(slide.uplift_kN_m, 9.81 * 36.0 / (4.0 * std::sin(Angle::degrees(35).rad())), 1e-9);
  EXPECT_EQ(slide.crack_water_kN_m, 0.0);
  in.water_depth_m = 10.001;
  EXPECT_EQ(refusal(in),
            "water depth: '10.001' is above the ground where the plane comes out; accepted: 0 to "
            "10.000 m");
}

TEST(PlaneSlide, WaterFillsTheCrackAtMost) {
  PlaneSlideInput in = simple_block();
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = 2.0;
  in.water_depth_m = analyse_plane_slide(in).crack_depth_m.value();
  EXPECT_EQ(refusal(in), "accepted");
  in.water_depth_m = 6.06;
  EXPECT_EQ(refusal(in), "water depth: '6.06' is deeper than the crack; accepted: 0 to 6.051 m");
  in.crack = CrackChoice::critical;
  in.water_depth_m = 9.0;
  EXPECT_EQ(refusal(in),
            "water depth: '9' is deeper than a crack can be anywhere on the block; accepted: 0 to "
            "7.451 m");
}

TEST(PlaneSlide, ABlockThatLiftsHasNoSafety) {
  PlaneSlideInput in = simple_block();
  in.loads = {{1500.0, {90_deg, -60_deg}}};
  const PlaneSlide slide = analyse_plane_slide(in);
  ASSERT_TRUE(slide.forms);
  EXPECT_EQ(slide.mode, PlaneSlideMode::lifts);
  EXPECT_LT(slide.normal_kN_m, 0.0);
  EXPECT_EQ(slide.factor_of_safety, 0.0);
}

TEST(PlaneSlide, NothingDrivesABlockOnALevelPlane) {
  PlaneSlideInput in = simple_block();
  in.plane = {};
  in.upper = {20_deg, 270_deg};
  const PlaneSlide slide = analyse_plane_slide(in);
  ASSERT_TRUE(slide.forms) << slide.reason;
  EXPECT_EQ(slide.section.azimuth, 90_deg);
  EXPECT_EQ(slide.factor_of_safety, std::numeric_limits<double>::infinity());
}

TEST(PlaneSlide, AVerticalPlaneBehindAnOverhang) {
  PlaneSlideInput in = simple_block();
  in.plane = {90_deg, 270_deg};
  in.face = {120_deg, 90_deg};
  in.strength = MohrCoulomb{30.0, 30_deg};
  const PlaneSlide slide = analyse_plane_slide(in);
  ASSERT_TRUE(slide.forms) << slide.reason;
  EXPECT_EQ(slide.section.azimuth, 90_deg);
  const double width = 10.0 * std::tan(Angle::degrees(30).rad());
  EXPECT_NEAR(slide.weight_kN_m, 25.0 * width * 10.0 / 2.0, 1e-9);
  EXPECT_NEAR(slide.factor_of_safety, 30.0 * 10.0 / slide.weight_kN_m, 1e-12);
}

TEST(PlaneSlide, TooStrongABoltPushesTheBlockUp) {
  PlaneSlideInput in = simple_block();
  in.bolts = {{5000.0, {270_deg, 0_deg}}};
  const PlaneSlide slide = analyse_plane_slide(in);
  EXPECT_LT(slide.driving_kN_m, 0.0);
  EXPECT_NEAR(slide.factor_of_safety, slide.resisting_kN_m / -slide.driving_kN_m, 1e-12);
  ASSERT_EQ(slide.warnings.size(), 1U);
  EXPECT_NE(slide.warnings[0].find("up the plane"), std::string::npos);
}

TEST(PlaneSlide, WarnsOfStrikesThatDiffer) {
  PlaneSlideInput in = simple_block();
  in.face.dip_direction = 110_deg;
  EXPECT_TRUE(analyse_plane_slide(in).warnings.empty());
  in.face.dip_direction = 111_deg;
  ASSERT_EQ(analyse_plane_slide(in).warnings.size(), 1U);
}

// An active bolt is best at atan(tan phi / FS) - dip below horizontal, a passive one at phi - dip.
TEST(PlaneSlide, LeastBoltLiesAtTheTextbookAngle) {
  PlaneSlideInput in = simple_block();
  in.strength = MohrCoulomb{0.0, 30_deg};
  in.target = 1.5;
  const auto active = analyse_plane_slide(in).bolt_for_target;
  ASSERT_TRUE(active);
  EXPECT_NEAR(active->direction.plunge.deg(), atan2(tan(30_deg), 1.5).deg() - 35.0, 1e-9);
  EXPECT_NEAR(active->direction.trend.deg(), 270.0, 1e-9);
  in.bolt_action = BoltAction::passive;
  const auto passive = analyse_plane_slide(in).bolt_for_target;
  ASSERT_TRUE(passive);
  EXPECT_NEAR(passive->direction.plunge.deg(), 30.0 - 35.0, 1e-9);
  in.target = 0.5;
  EXPECT_EQ(analyse_plane_slide(in).bolt_for_target->force_kN_m, 0.0);
}

TEST(PlaneSlide, LeastBoltWithACurvedStrength) {
  PlaneSlideInput in = simple_block();
  in.strength = BartonBandis{25_deg, 4.0, 20000.0};
  in.target = 2.0;
  const auto bolt = analyse_plane_slide(in).bolt_for_target;
  ASSERT_TRUE(bolt);
  in.bolts = {{bolt->force_kN_m, bolt->direction}};
  EXPECT_NEAR(analyse_plane_slide(in).factor_of_safety, 2.0, 1e-9);
}

TEST(PlaneSlide, SaysWhichStrengthItUsed) {
  PlaneSlideInput in = simple_block();
  in.strength = BartonBandis{28_deg, 8.0, 50000.0};
  const PlaneSlide slide = analyse_plane_slide(in);
  EXPECT_NEAR(slide.strength.normal_stress_kPa, slide.normal_kN_m / slide.sliding_length_m, 1e-9);
  // Cohesion and friction as reported give the same factor of safety.
  in.strength = MohrCoulomb{slide.strength.cohesion_kPa, slide.strength.friction};
  EXPECT_NEAR(analyse_plane_slide(in).factor_of_safety, slide.factor_of_safety, 1e-12);
}

TEST(PlaneSlide, RefusesValuesOutOfRange) {
  PlaneSlideInput in = simple_block();
  in.height_m = 0.0;
  EXPECT_EQ(refusal(in), "height: '0' is not above 0; accepted: a number above 0");
  in = simple_block();
  in.strength = MohrCoulomb{10.0, 90_deg};
  EXPECT_EQ(refusal(in),
            "friction: '90' is no friction angle; accepted: 0 or more and below 90 degrees");
  in = simple_block();
  in.face.dip = 180_deg;
  EXPECT_EQ(refusal(in),
            "face dip: '180' is out of range; accepted: above 0 and below 180 degrees");
  in = simple_block();
  in.surcharge_kPa = std::numeric_limits<double>::infinity();
  EXPECT_EQ(refusal(in), "surcharge: 'infinity' is not finite; accepted: a finite number");
  in = simple_block();
  in.target = 0.0;
  EXPECT_EQ(refusal(in), "target: '0' is not above 0; accepted: a number above 0");
}

}  // namespace
}  // namespace brink
