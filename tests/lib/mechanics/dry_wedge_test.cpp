#include "brink/mechanics/dry_wedge.hpp"

#include <gtest/gtest.h>

#include <Eigen/Dense>
#include <optional>
#include <random>

#include "brink/orientation/face.hpp"
#include "brink/orientation/intersection.hpp"

namespace brink {
namespace {

double safety(Plane a, Plane b, Angle friction_a, Angle friction_b, Face face,
              Plane upper = kLevelGround) {
  return dry_factor_of_safety(upward_normal(a), upward_normal(b), tan(friction_a), tan(friction_b),
                              outward_normal(face), upward_normal(upper));
}

Vector3 meet(const Vector3& a, const Vector3& b, const Vector3& c, const Vector3& right_side) {
  Eigen::Matrix3d rows;
  rows << a.transpose(), b.transpose(), c.transpose();
  return rows.fullPivLu().solve(right_side);
}

// The long way: corners of the tetrahedron by three-plane systems, reactions by a least-squares
// solution, the sliding direction of one plane from the forces left over.
double safety_by_corners(const Vector3& a, const Vector3& b, double tan_a, double tan_b,
                         const Vector3& face, const Vector3& upper) {
  const Vector3 along = *intersection_vector(a, b);
  const Vector3 up(0, 0, 1);
  const Vector3 crest = (up - up.dot(face) * face) / (1.0 - face.z() * face.z());
  const double rise = upper.dot(crest);
  const Vector3 corner_a = meet(a, face, upper, {0, 0, rise});
  const Vector3 corner_b = meet(b, face, upper, {0, 0, rise});
  const Vector3 into_a = a.dot(corner_b) > 0 ? a : Vector3(-a);
  const Vector3 into_b = b.dot(corner_a) > 0 ? b : Vector3(-b);
  const Vector3 pull(0, 0, -1);
  Eigen::Matrix3d columns;
  columns << into_a, into_b, -along;
  const Vector3 n_n_s = columns.fullPivLu().solve(-pull);
  if (n_n_s[0] >= 0 && n_n_s[1] >= 0) return (n_n_s[0] * tan_a + n_n_s[1] * tan_b) / n_n_s[2];
  for (const bool first : {true, false}) {
    const Vector3& m = first ? into_a : into_b;
    const double press = -pull.dot(m);
    const Vector3 rest = pull + press * m;
    if (press > 0 && rest.dot(first ? into_b : into_a) > 0) {
      return press * (first ? tan_a : tan_b) / rest.norm();
    }
  }
  return 0.0;
}

// Hoek & Bray, Rock Slope Engineering, 3rd ed. 1981, ch. 8 (from memory): friction-only charts,
// A = 1.5, B = 0.7 read to about 0.05, FS 1.30 within 0.03; no face or height enters.
TEST(DryWedge, PublishedFrictionOnly) {
  const Plane a{40_deg, 165_deg}, b{70_deg, 285_deg};
  EXPECT_NEAR(safety(a, b, 35_deg, 20_deg, {65_deg, 200_deg}), 1.30, 0.03);
  EXPECT_NEAR(safety(a, b, 35_deg, 0_deg, {65_deg, 200_deg}), 1.5 * tan(35_deg), 0.05);
  EXPECT_NEAR(safety(a, b, 0_deg, 20_deg, {65_deg, 200_deg}), 0.7 * tan(20_deg), 0.05);
  EXPECT_DOUBLE_EQ(safety(a, b, 35_deg, 20_deg, {65_deg, 200_deg}),
                   safety(a, b, 35_deg, 20_deg, {80_deg, 240_deg}, {10_deg, 200_deg}));
}

// Hocking 1976 (Int. J. Rock Mech. Min. Sci. 13:225): the dip direction of plane a lies between the
// line's trend (150) and the face's dip direction, so the block slides on a alone.
TEST(DryWedge, SlidesOnOnePlaneAlone) {
  const Plane a{40_deg, 170_deg}, b{90_deg, 60_deg};
  EXPECT_NEAR(safety(a, b, 30_deg, 45_deg, {70_deg, 180_deg}), tan(30_deg) / tan(40_deg), 1e-12);
}

// The line runs down the dip of plane a, so a bears everything and a vertical b nothing, whatever
// the rounding: the factor of safety is that of plane a and both modes agree.
TEST(DryWedge, TieBetweenModes) {
  for (int azimuth = 0; azimuth < 360; ++azimuth) {
    const Angle dir = Angle::degrees(azimuth);
    EXPECT_NEAR(
        safety({35_deg, dir}, {90_deg, dir + 90_deg}, 35_deg, 60_deg, {70_deg, dir + 10_deg}), 1.0,
        1e-12);
  }
}

TEST(DryWedge, PlaneThatStrikesAlongTheFaceBoundsNoBlock) {
  const double value =
      safety({40_deg, 180_deg}, {80_deg, 100_deg}, 30_deg, 45_deg, {70_deg, 180_deg});
  EXPECT_TRUE(std::isnan(value));
  EXPECT_FALSE(strictly_below(value, 1.0));
}

// A level line of intersection daylights under sloping ground; nothing drives the block along it.
TEST(DryWedge, NothingDrivesALevelWedge) {
  EXPECT_EQ(safety({40_deg, 90_deg}, {40_deg, 270_deg}, 30_deg, 30_deg, {70_deg, 180_deg},
                   {10_deg, 0_deg}),
            std::numeric_limits<double>::infinity());
}

TEST(DryWedge, BlockHangingUnderBothPlanesFalls) {
  EXPECT_EQ(safety({80_deg, 5_deg}, {60_deg, 230_deg}, 60_deg, 60_deg, {125_deg, 180_deg}), 0.0);
}

TEST(DryWedge, RisesToCrest) {
  const Vector3 gentle = outward_normal({30_deg, 180_deg});
  EXPECT_TRUE(rises_to_crest(gentle, upward_normal(kLevelGround)));
  EXPECT_FALSE(rises_to_crest(gentle, upward_normal({30_deg, 180_deg})));
  EXPECT_FALSE(rises_to_crest(gentle, upward_normal({40_deg, 180_deg})));
  EXPECT_TRUE(rises_to_crest(outward_normal({120_deg, 180_deg}), upward_normal({20_deg, 90_deg})));
}

TEST(DryWedge, EqualsTheLongWayOnRandomWedges) {
  std::mt19937_64 draw(7);
  const auto in = [&](double from, double to) {
    return Angle::degrees(std::uniform_real_distribution<double>(from, to)(draw));
  };
  int slides = 0, falls = 0;
  for (int i = 0; i < 200000; ++i) {
    const Vector3 a = normal(in(1, 90), in(0, 360)), b = normal(in(1, 90), in(0, 360));
    const Vector3 face = normal(in(20, 120), in(0, 360)), upper = normal(in(0, 30), in(0, 360));
    const double tan_a = tan(in(0, 60)), tan_b = tan(in(0, 60));
    const auto along = intersection_vector(a, b);
    if (!along || !daylights(*along, face, upper) || !rises_to_crest(face, upper)) continue;
    const double value = dry_factor_of_safety(a, b, tan_a, tan_b, face, upper);
    const double twin = safety_by_corners(a, b, tan_a, tan_b, face, upper);
    ASSERT_NEAR(value, twin, 1e-8 * std::max(1.0, twin)) << i;
    // Neither the order of the planes nor the sense of a normal matters.
    EXPECT_NEAR(value, dry_factor_of_safety(-b, a, tan_b, tan_a, face, upper),
                1e-12 * std::max(1.0, value));
    (value == 0.0 ? falls : slides)++;
  }
  EXPECT_GT(slides, 10000);
  EXPECT_GT(falls, 10);
}

}  // namespace
}  // namespace brink
