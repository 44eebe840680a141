#include "brink/orientation/orientation.hpp"

#include <gtest/gtest.h>

#include "brink/orientation/intersection.hpp"

namespace brink {
namespace {

// Check O6 of the published values: a posted textbook exercise; plane dipping 38 towards 110,
// upward normal printed to four digits.
TEST(Orientation, PublishedUpwardNormal) {
  const Vector3 n = upward_normal({38_deg, 110_deg});
  EXPECT_NEAR(n.x(), 0.5785, 5e-5);
  EXPECT_NEAR(n.y(), -0.2106, 5e-5);
  EXPECT_NEAR(n.z(), 0.7880, 5e-5);
}

// Brady & Brown, Rock Mechanics for Underground Mining, 3rd ed., app. A.3: planes 50/130 and 30/250
// meet along trend 201, plunge 21, read off a net to whole degrees.
TEST(Orientation, PublishedIntersection) {
  const auto line = intersection({50_deg, 130_deg}, {30_deg, 250_deg});
  ASSERT_TRUE(line);
  EXPECT_NEAR(line->trend.deg(), 201.0, 0.5);
  EXPECT_NEAR(line->plunge.deg(), 21.0, 0.5);
  EXPECT_NEAR(line->trend.deg(), 201.34, 0.005);
  EXPECT_NEAR(line->plunge.deg(), 20.87, 0.005);
}

// Brady & Brown, app. A.5: apparent dip 40 towards 140 and strike 020-200: the plane dips 44
// towards 110.
TEST(Orientation, PublishedPlaneOfApparentDipAndStrike) {
  const auto plane = plane_of_lines({140_deg, 40_deg}, {20_deg, 0_deg});
  ASSERT_TRUE(plane);
  EXPECT_NEAR(plane->dip.deg(), 44.0, 0.5);
  EXPECT_NEAR(plane->dip_direction.deg(), 110.0, 1e-9);
  EXPECT_NEAR(apparent_dip(*plane, 140_deg).deg(), 40.0, 1e-9);
}

TEST(Orientation, EveryWholeDegreePlaneComesBack) {
  for (int dip = 0; dip <= 90; ++dip) {
    for (int azimuth = 0; azimuth < 360; ++azimuth) {
      const Plane plane{Angle::degrees(dip), Angle::degrees(dip == 0 ? 0 : azimuth)};
      const Plane back = plane_of_normal(upward_normal(plane));
      EXPECT_NEAR(back.dip.deg(), dip, 1e-12);
      // A vertical plane may come back with its other dip direction.
      const Angle turn = azimuth_difference(back.dip_direction, plane.dip_direction);
      EXPECT_NEAR(dip == 90 && turn.deg() > 90 ? 180.0 - turn.deg() : turn.deg(), 0.0, 1e-10);
    }
  }
}

TEST(Orientation, PoleIsTheDownwardNormal) {
  const Plane plane{30_deg, 135_deg};
  EXPECT_EQ(pole(plane), (Line{315_deg, 60_deg}));
  EXPECT_EQ(plane_of_pole(pole(plane)), plane);
  EXPECT_NEAR((direction(pole(plane)) + upward_normal(plane)).norm(), 0.0, 1e-15);
  EXPECT_EQ(pole({}), (Line{0_deg, 90_deg}));
  EXPECT_EQ(plane_of_pole({315_deg, Angle::degrees(-60)}), (Plane{30_deg, 315_deg}));
}

TEST(Orientation, ParallelPlanesHaveNoLine) {
  EXPECT_FALSE(intersection({30_deg, 135_deg}, {30_deg, 135_deg}));
  EXPECT_FALSE(intersection({90_deg, 45_deg}, {90_deg, 225_deg}));
  EXPECT_TRUE(intersection({30_deg, 135_deg}, {Angle::degrees(30.001), 135_deg}));
}

TEST(Orientation, ApparentDipOfCardinalSections) {
  const Plane plane{30_deg, 90_deg};
  EXPECT_NEAR(apparent_dip(plane, 90_deg).deg(), 30.0, 1e-12);
  EXPECT_EQ(apparent_dip(plane, 0_deg).deg(), 0.0);
  EXPECT_NEAR(apparent_dip(plane, 270_deg).deg(), -30.0, 1e-12);
  EXPECT_EQ(apparent_dip({90_deg, 90_deg}, 45_deg).deg(), 90.0);
}

}  // namespace
}  // namespace brink
