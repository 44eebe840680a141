#include "brink/orientation/borehole.hpp"

#include <gtest/gtest.h>

#include <Eigen/Geometry>

#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"

namespace brink {
namespace {

Hole hole(double trend, double plunge, ReferenceLine reference = ReferenceLine::top) {
  return {{Angle::degrees(trend), Angle::degrees(plunge)}, reference};
}

struct Case {
  Hole hole;
  double alpha, beta, dip, direction, tolerance;
};

// Computed outside this project by cutting a cylinder with a plane; three decimals, or whole
// degrees where the geometry is exact.
TEST(Borehole, WorkedTable) {
  const Case cases[] = {
      {hole(0, 60), 40, 70, 46.554, 97.478, 5e-4},
      {hole(120, 55), 35, 210, 86.391, 324.229, 5e-4},
      {hole(225, 70, ReferenceLine::bottom), 50, 300, 52.416, 0.375, 5e-4},
      {hole(0, 60), 90, 0, 30, 180, 1e-9},
      {hole(0, 60), 30, 0, 30, 0, 1e-9},
      {hole(0, 90), 50, 120, 40, 120, 1e-9},
      {hole(0, -30), 40, 70, 84.58, 313.69, 5e-3},
  };
  for (const Case& c : cases) {
    const Plane plane = plane_of_core({Angle::degrees(c.alpha), Angle::degrees(c.beta)}, c.hole);
    EXPECT_NEAR(plane.dip.deg(), c.dip, c.tolerance);
    EXPECT_NEAR(azimuth_difference(plane.dip_direction, Angle::degrees(c.direction)).deg(), 0.0,
                c.tolerance);
  }
}

// A second way, from the definitions: walk round the core's skin, find where the plane lies deepest
// down the hole, and measure alpha and beta there.
CoreAngles measured_on_cylinder(const Plane& plane, const Hole& h) {
  const Vector3 along = direction(h.axis);
  // Uppermost side of the core: the vertical, made square to the axis.
  Vector3 line = (Vector3::UnitZ() - along.z() * along).normalized();
  if (h.reference == ReferenceLine::bottom) line = -line;
  const Vector3 n = upward_normal(plane);
  double best_depth = -1e300;
  double best_beta = 0.0;
  for (int i = 0; i < 36000; ++i) {
    const double turn = i * 0.01;
    const Vector3 skin = Eigen::AngleAxisd(turn * std::numbers::pi / 180.0, along) * line;
    // The point skin + s along lies on the plane through the centre: n . (skin + s along) = 0.
    const double depth = -n.dot(skin) / n.dot(along);
    if (depth > best_depth) {
      best_depth = depth;
      best_beta = turn;
    }
  }
  return {asin(std::abs(n.dot(along))), Angle::degrees(best_beta)};
}

TEST(Borehole, AgreesWithAWalkRoundTheCore) {
  for (std::uint64_t i = 0; i < 40; ++i) {
    const auto draw = [&](std::uint64_t stream) { return random_uniform(3, stream, i); };
    const Hole h = hole(360.0 * draw(0), -80.0 + 160.0 * draw(1),
                        i % 2 == 0 ? ReferenceLine::top : ReferenceLine::bottom);
    const CoreAngles angles{Angle::degrees(5.0 + 80.0 * draw(2)), Angle::degrees(360.0 * draw(3))};
    const CoreAngles measured = measured_on_cylinder(plane_of_core(angles, h), h);
    EXPECT_NEAR(measured.alpha.deg(), angles.alpha.deg(), 1e-9);
    EXPECT_NEAR(azimuth_difference(measured.beta, angles.beta).deg(), 0.0, 0.011);
  }
}

TEST(Borehole, CoreAnglesComeBack) {
  for (int plunge = -90; plunge <= 90; plunge += 15) {
    for (int dip = 0; dip <= 90; dip += 10) {
      for (int azimuth = 0; azimuth < 360; azimuth += 45) {
        const Plane plane{Angle::degrees(dip), Angle::degrees(dip == 0 ? 0 : azimuth)};
        const Hole h = hole(30, plunge, ReferenceLine::bottom);
        const CoreAngles angles = core_of_plane(plane, h);
        const Plane back = plane_of_core(angles, h);
        EXPECT_LT(axis_angle(upward_normal(back), upward_normal(plane)).deg(), 1e-9);
        EXPECT_GE(angles.alpha.deg(), 0.0);
        EXPECT_LE(angles.alpha.deg(), 90.0);
      }
    }
  }
}

}  // namespace
}  // namespace brink
