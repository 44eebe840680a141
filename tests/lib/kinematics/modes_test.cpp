// Ties and degenerate cases of the kinematic tests, one by one.
#include "brink/kinematics/modes.hpp"

#include <gtest/gtest.h>

#include "brink/orientation/intersection.hpp"

namespace {

using namespace brink;

const Face kFace{60_deg, 90_deg};

ModeSettings settings(double friction, double strike = 20.0, double toppling = 30.0) {
  return {kLevelGround, Angle::degrees(friction), Angle::degrees(strike), Angle::degrees(toppling)};
}

Vector3 plane(double dip, double direction) {
  return normal(Angle::degrees(dip), Angle::degrees(direction));
}
Vector3 line(double trend, double plunge) {
  return direction({Angle::degrees(trend), Angle::degrees(plunge)});
}

TEST(Modes, PlaneSlidesFromTheFrictionAngleUpToBelowTheFace) {
  const FaceLimits limits = prepare_limits(kFace, settings(30));
  EXPECT_TRUE(planar_sliding(limits, plane(30, 90)));
  EXPECT_FALSE(planar_sliding(limits, plane(29, 90)));
  EXPECT_TRUE(planar_sliding(limits, plane(59, 90)));
  EXPECT_FALSE(planar_sliding(limits, plane(60, 90)));  // lies in the face
}

TEST(Modes, AzimuthEqualToTheToleranceIsInside) {
  const FaceLimits limits = prepare_limits(kFace, settings(20));
  EXPECT_TRUE(planar_sliding(limits, plane(40, 70)));
  EXPECT_TRUE(planar_sliding(limits, plane(40, 110)));
  EXPECT_FALSE(planar_sliding(limits, plane(40, 69)));
  EXPECT_FALSE(planar_sliding(limits, plane(40, 111)));
}

TEST(Modes, ToleranceOfNothingAndOfEverything) {
  const FaceLimits narrow = prepare_limits(kFace, settings(20, 0, 0));
  EXPECT_TRUE(planar_sliding(narrow, plane(40, 90)));
  EXPECT_FALSE(planar_sliding(narrow, plane(40, 91)));
  EXPECT_FALSE(flexural_toppling(narrow, plane(80, 90)));
  EXPECT_TRUE(flexural_toppling(narrow, plane(80, 270)));
  const FaceLimits wide = prepare_limits({100_deg, 90_deg}, settings(20, 180, 180));
  EXPECT_TRUE(planar_sliding(wide, plane(85, 270)));  // under an overhanging face
  EXPECT_FALSE(planar_sliding(wide, plane(0, 0)));
  EXPECT_TRUE(block_toppling(wide, line(90, 30)));
  EXPECT_FALSE(block_toppling(wide, line(0, 90)));
}

TEST(Modes, VerticalFaceLetsEveryDipDaylight) {
  const FaceLimits limits = prepare_limits({90_deg, 90_deg}, settings(30));
  EXPECT_TRUE(planar_sliding(limits, plane(89, 90)));
  EXPECT_FALSE(planar_sliding(limits, plane(90, 90)));  // straight down: along the face
  EXPECT_TRUE(wedge_sliding(limits, line(10, 40)));
  EXPECT_FALSE(wedge_sliding(limits, line(0, 40)));  // along the strike: lies in the face
}

TEST(Modes, VerticalPlaneHasTwoDipDirections) {
  const FaceLimits overhang = prepare_limits({110_deg, 90_deg}, settings(30));
  EXPECT_TRUE(planar_sliding(overhang, plane(90, 90)));
  EXPECT_TRUE(planar_sliding(overhang, plane(90, 270)));
  EXPECT_FALSE(planar_sliding(overhang, plane(90, 180)));
  const FaceLimits limits = prepare_limits(kFace, settings(30));
  EXPECT_TRUE(flexural_toppling(limits, plane(90, 270)));
  EXPECT_TRUE(flexural_toppling(limits, plane(90, 90)));
  EXPECT_TRUE(flexural_toppling(limits, plane(90, 60)));
  EXPECT_FALSE(flexural_toppling(limits, plane(90, 59)));
}

TEST(Modes, HorizontalPlaneHasNoDipDirection) {
  ModeSettings sloping = settings(0, 180, 180);
  sloping.upper = {10_deg, 90_deg};
  const FaceLimits limits = prepare_limits(kFace, sloping);
  EXPECT_FALSE(planar_sliding(limits, plane(0, 90)));
  EXPECT_FALSE(toppling_base(limits, plane(0, 90)));
  EXPECT_FALSE(flexural_toppling(limits, plane(0, 270)));
}

TEST(Modes, FlexuralSlipLimitIncludesItsLimit) {
  // Face 60, friction 30: poles may plunge up to 30 along the face's direction, dips from 60.
  const FaceLimits limits = prepare_limits(kFace, settings(30));
  EXPECT_TRUE(flexural_toppling(limits, plane(60, 270)));
  EXPECT_FALSE(flexural_toppling(limits, plane(59, 270)));
  // A face as steep as the friction angle lets a vertical plane topple, a flatter face none.
  EXPECT_TRUE(flexural_toppling(prepare_limits({30_deg, 90_deg}, settings(30)), plane(90, 270)));
  EXPECT_FALSE(flexural_toppling(prepare_limits({29_deg, 90_deg}, settings(30)), plane(90, 270)));
}

TEST(Modes, LineAsSteepAsFrictionSlidesAndLineInTheFaceDoesNot) {
  const FaceLimits limits = prepare_limits(kFace, settings(30));
  EXPECT_TRUE(wedge_sliding(limits, line(90, 30)));
  EXPECT_FALSE(wedge_sliding(limits, line(90, 29)));
  EXPECT_FALSE(wedge_sliding(limits, line(90, 60)));
  const auto in_face = intersection_vector(outward_normal(kFace), plane(50, 140));
  EXPECT_FALSE(wedge_sliding(limits, in_face.value()));
}

TEST(Modes, HorizontalLineHasTwoTrends) {
  ModeSettings sloping = settings(0);
  sloping.upper = {10_deg, 270_deg};  // falls away from the face: meets a level line behind it
  const FaceLimits limits = prepare_limits(kFace, sloping);
  EXPECT_TRUE(wedge_sliding(limits, line(90, 0)));
  EXPECT_TRUE(wedge_sliding(limits, line(270, 0)));
  // On level ground it reaches the ground nowhere.
  EXPECT_FALSE(wedge_sliding(prepare_limits(kFace, settings(0)), line(90, 0)));
  const FaceLimits overhang = prepare_limits({91_deg, 90_deg}, settings(30));
  EXPECT_TRUE(block_toppling(overhang, line(90, 0)));
  EXPECT_TRUE(block_toppling(overhang, line(270, 0)));
  EXPECT_FALSE(block_toppling(prepare_limits({90_deg, 90_deg}, settings(30)), line(270, 0)));
}

TEST(Modes, BlockNeedsALineSteeperThanTheComplementOfTheFace) {
  const FaceLimits limits = prepare_limits(kFace, settings(30));
  EXPECT_FALSE(block_toppling(limits, line(270, 30)));
  EXPECT_TRUE(block_toppling(limits, line(270, 31)));
  EXPECT_TRUE(block_toppling(limits, line(300, 31)));
  EXPECT_FALSE(block_toppling(limits, line(301, 31)));
  EXPECT_FALSE(block_toppling(limits, line(0, 90)));
}

TEST(Modes, NearlyVerticalLinesKeepTheirAngle) {
  // A sine or cosine alone cannot tell these from the limit.
  const double small = 1e-5;
  const FaceLimits limits = prepare_limits({Angle::degrees(small), 90_deg}, settings(0, 20, 180));
  EXPECT_TRUE(block_toppling(limits, line(270, 90.0 - 0.9 * small)));
  EXPECT_FALSE(block_toppling(limits, line(270, 90.0 - 1.1 * small)));
}

TEST(Modes, TurningTheNormalAboutChangesNothing) {
  for (const double face_dip : {30.0, 60.0, 90.0, 120.0}) {
    const FaceLimits limits =
        prepare_limits({Angle::degrees(face_dip), 90_deg}, settings(15, 45, 45));
    for (int dip = 0; dip <= 90; dip += 15) {
      for (int direction = 0; direction < 360; direction += 15) {
        const Vector3 n = plane(dip, direction);
        EXPECT_EQ(planar_sliding(limits, n), planar_sliding(limits, -n));
        EXPECT_EQ(flexural_toppling(limits, n), flexural_toppling(limits, -n));
        EXPECT_EQ(wedge_sliding(limits, n), wedge_sliding(limits, -n));
        EXPECT_EQ(block_toppling(limits, n), block_toppling(limits, -n));
      }
    }
  }
}

TEST(Modes, WholeDegreesTurnedAboutTheVerticalCountTheSame) {
  for (int turn = 1; turn < 360; turn += 7) {
    for (const double face_dip : {45.0, 70.0, 90.0, 105.0}) {
      const FaceLimits at0 = prepare_limits({Angle::degrees(face_dip), 0_deg}, settings(30));
      const FaceLimits turned =
          prepare_limits({Angle::degrees(face_dip), Angle::degrees(turn)}, settings(30));
      for (int dip = 0; dip <= 90; dip += 5) {
        for (int direction = 0; direction < 360; direction += 10) {
          const Vector3 a = plane(dip, direction);
          const Vector3 b = plane(dip, direction + turn);
          EXPECT_EQ(planar_sliding(at0, a), planar_sliding(turned, b));
          EXPECT_EQ(flexural_toppling(at0, a), flexural_toppling(turned, b));
          EXPECT_EQ(wedge_sliding(at0, a), wedge_sliding(turned, b));
          EXPECT_EQ(block_toppling(at0, a), block_toppling(turned, b));
        }
      }
    }
  }
}

}  // namespace
