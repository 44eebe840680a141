#include "brink/mechanics/strength.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "brink/base/error.hpp"

namespace brink {
namespace {

TEST(Strength, MohrCoulombIsItsOwnTangent) {
  const TangentStrength line = tangent_strength(MohrCoulomb{20.0, 30_deg}, 100.0);
  EXPECT_EQ(line.cohesion_kPa, 20.0);
  EXPECT_EQ(line.friction, 30_deg);
  EXPECT_NEAR(line.shear_strength_kPa, 20.0 + 100.0 * std::tan(Angle::degrees(30).rad()), 1e-12);
}

// The tangent against a central difference of the law itself.
TEST(Strength, TangentTouchesTheLaw) {
  const BartonBandis law{27_deg, 9.0, 60000.0};
  for (double stress = 50.0; stress < 50000.0; stress *= 1.37) {
    const double h = stress * 1e-5;
    const double slope = (tangent_strength(law, stress + h).shear_strength_kPa -
                          tangent_strength(law, stress - h).shear_strength_kPa) /
                         (2.0 * h);
    const TangentStrength line = tangent_strength(law, stress);
    EXPECT_NEAR(tan(line.friction), slope, 1e-6) << stress;
    EXPECT_NEAR(line.cohesion_kPa + stress * tan(line.friction), line.shear_strength_kPa,
                1e-9 * line.shear_strength_kPa);
  }
}

TEST(Strength, TotalAngleStopsAtSeventyDegrees) {
  const TangentStrength line = tangent_strength(BartonBandis{30_deg, 20.0, 100000.0}, 10.0);
  EXPECT_EQ(line.friction, 70_deg);
  EXPECT_EQ(line.cohesion_kPa, 0.0);
  EXPECT_NEAR(line.shear_strength_kPa, 10.0 * std::tan(Angle::degrees(70).rad()), 1e-12);
  // The corner: 30 + 20 log10(JCS/s) = 70 at s = JCS/100.
  EXPECT_NEAR(tangent_strength(BartonBandis{30_deg, 20.0, 100000.0}, 1000.1).shear_strength_kPa,
              1000.1 * std::tan(Angle::degrees(70).rad()), 3.0);
}

TEST(Strength, BeyondTheWallStrengthOnlyTheResidualAngleIsLeft) {
  const TangentStrength line = tangent_strength(BartonBandis{28_deg, 10.0, 500.0}, 800.0);
  EXPECT_EQ(line.friction, 28_deg);
  EXPECT_EQ(line.cohesion_kPa, 0.0);
}

TEST(Strength, SmoothJointIsItsResidualFriction) {
  for (const double stress : {0.0, 1.0, 1000.0})
    EXPECT_NEAR(tangent_strength(BartonBandis{31_deg, 0.0, 5000.0}, stress).friction.deg(), 31.0,
                1e-12);
}

TEST(Strength, NoStressOrTensionGivesTheLineAtZero) {
  for (const double stress : {0.0, -50.0}) {
    EXPECT_EQ(tangent_strength(MohrCoulomb{12.0, 20_deg}, stress).shear_strength_kPa, 12.0);
    EXPECT_EQ(tangent_strength(BartonBandis{30_deg, 8.0, 1e4}, stress).shear_strength_kPa, 0.0);
    EXPECT_EQ(tangent_strength(BilinearPatton{30_deg, 10_deg, 100.0}, stress).shear_strength_kPa,
              0.0);
  }
}

TEST(Strength, BilinearLinesMeetAtTheTransition) {
  const BilinearPatton law{30_deg, 15_deg, 200.0};
  const TangentStrength below = tangent_strength(law, 200.0);
  const TangentStrength above = tangent_strength(law, std::nextafter(200.0, 1e9));
  EXPECT_EQ(below.friction, 45_deg);
  EXPECT_EQ(below.cohesion_kPa, 0.0);
  EXPECT_EQ(above.friction, 30_deg);
  EXPECT_NEAR(above.shear_strength_kPa, below.shear_strength_kPa, 1e-9);
  EXPECT_NEAR(above.cohesion_kPa, 200.0 * (1.0 - std::tan(Angle::degrees(30).rad())), 1e-9);
}

// Barton & Bandis 1982: JRC0 10 and JCS0 100 MPa of a 0.1 m sample on a 1 m joint:
// 10 x 10^-0.2 and 100 x 10^-0.3.
TEST(Strength, LongerJointsAreSmootherAndWeaker) {
  const BartonBandis joint = scaled_to_length({30_deg, 10.0, 100000.0}, 1.0);
  EXPECT_NEAR(joint.jrc, 6.30957, 1e-5);
  EXPECT_NEAR(joint.jcs_kPa, 50118.7, 0.1);
  EXPECT_EQ(scaled_to_length({30_deg, 10.0, 1e5}, 0.05), (BartonBandis{30_deg, 10.0, 1e5}));
}

TEST(Strength, SettlesWithAStressThatDependsOnIt) {
  const Strength law = BartonBandis{28_deg, 8.0, 40000.0};
  const auto stress = [](const TangentStrength& line) { return 100.0 + 30.0 * tan(line.friction); };
  const TangentStrength line = settle_tangent_strength(law, stress);
  EXPECT_NEAR(line.normal_stress_kPa, stress(line), 1e-9);
}

std::string refusal(const Strength& law) {
  try {
    check_strength(law);
  } catch (const Error& e) {
    EXPECT_EQ(e.kind(), ErrorKind::argument);
    return e.what();
  }
  return "accepted";
}

TEST(Strength, RefusesImpossibleParameters) {
  const double nan = std::numeric_limits<double>::quiet_NaN();
  EXPECT_EQ(refusal(MohrCoulomb{-1.0, 30_deg}), "cohesion: '-1' is below 0; accepted: 0 or more");
  EXPECT_EQ(refusal(MohrCoulomb{0.0, 90_deg}),
            "friction: '90' is no friction angle; accepted: 0 or more and below 90 degrees");
  EXPECT_EQ(refusal(MohrCoulomb{nan, 30_deg}),
            "cohesion: 'nan' is not finite; accepted: a finite number");
  EXPECT_EQ(refusal(BartonBandis{30_deg, 25.0, 1e4}), "JRC: '25' is too large; accepted: 0 to 20");
  EXPECT_EQ(refusal(BartonBandis{30_deg, 5.0, 0.0}),
            "JCS: '0' is not above 0; accepted: a number above 0");
  EXPECT_EQ(
      refusal(BilinearPatton{60_deg, 30_deg, 10.0}),
      "friction + roughness: '90' is no friction angle; accepted: 0 or more and below 90 degrees");
  EXPECT_EQ(refusal(BilinearPatton{30_deg, 10_deg, 10.0}), "accepted");
}

}  // namespace
}  // namespace brink
