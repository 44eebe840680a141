// Projections against PROJ, the reference library for map projections.
#include <gtest/gtest.h>
#include <proj.h>

#include <memory>

#include "brink/base/random.hpp"
#include "brink/sphere/net_curve.hpp"

namespace brink {
namespace {

struct Proj {
  using Handle = std::unique_ptr<PJ, decltype(&proj_destroy)>;
  explicit Proj(const char* definition)
      : handle(proj_create(PJ_DEFAULT_CTX, definition), &proj_destroy) {}

  // The sphere seen from above with straight down as its south pole: longitude = trend, latitude =
  // -plunge.
  Point2 operator()(const Line& line) const {
    const PJ_COORD in =
        proj_coord(proj_torad(line.trend.deg()), proj_torad(-line.plunge.deg()), 0.0, 0.0);
    const PJ_COORD out = proj_trans(handle.get(), PJ_FWD, in);
    return {out.xy.x, out.xy.y};
  }
  Handle handle;
};

const Proj& proj_of(Projection projection) {
  static const Proj angle("+proj=stere +lat_0=-90 +lon_0=0 +R=1 +k_0=0.5");
  static const Proj area("+proj=laea +lat_0=-90 +lon_0=0 +R=0.70710678118654752");
  return projection == Projection::equal_angle ? angle : area;
}

TEST(ProjReference, RandomLinesAgree) {
  for (const Projection projection : {Projection::equal_angle, Projection::equal_area}) {
    ASSERT_NE(proj_of(projection).handle, nullptr);
    for (std::uint64_t i = 0; i < 5000; ++i) {
      const Line line{Angle::degrees(360.0 * random_uniform(3, 0, i)),
                      Angle::degrees(90.0 * random_uniform(3, 1, i))};
      EXPECT_LT((project(projection, line) - proj_of(projection)(line)).norm(), 2e-15);
    }
  }
}

TEST(ProjReference, ArcsPassThroughProjectedPointsOfTheirCircle) {
  for (std::uint64_t i = 0; i < 300; ++i) {
    const Line axis{Angle::degrees(360.0 * random_uniform(4, 0, i)),
                    Angle::degrees(90.0 * random_uniform(4, 1, i))};
    const Angle half_angle = Angle::degrees(1.0 + 88.0 * random_uniform(4, 2, i));
    const SphereCircle circle{direction(axis), cos(half_angle)};
    const auto arc = std::get<NetArc>(arc_on_net(Projection::equal_angle, circle, 0_deg, 360_deg));
    for (int step = 0; step < 36; ++step) {
      const Line line = line_with_sense(circle_point(circle, Angle::degrees(10.0 * step)));
      if (line.plunge.deg() < -60.0) continue;  // far outside the net
      const Point2 point = proj_of(Projection::equal_angle)(line);
      EXPECT_NEAR((point - arc.centre).norm(), arc.radius, 1e-13 * (1.0 + arc.radius));
    }
  }
}

}  // namespace
}  // namespace brink
