#include "brink/sphere/net_curve.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"

namespace brink {
namespace {

constexpr Projection kBoth[] = {Projection::equal_angle, Projection::equal_area};

const NetArc& arc_of(const NetPiece& piece) {
  return std::get<NetArc>(piece);
}

Vector3 random_direction(std::uint64_t i) {
  return direction(
      {Angle::degrees(360.0 * random_uniform(7, 0, i)), asin(2.0 * random_uniform(7, 1, i) - 1.0)});
}

struct CircleRow {
  double trend, plunge, half_angle, x, y, radius;
};
// Checked against PROJ's points of each circle, worst distance 7e-15 for a radius of 57.
constexpr CircleRow kCircles[] = {
    {30, 40, 20, 0.242039182660, 0.419224161790, 0.216129172889},
    {200, 10, 35, -0.339266734016, -0.932127690881, 0.577736007372},
    {90, 0, 30, 1.154700538379, 0, 0.577350269190},
};
struct PlaneRow {
  double dip, dip_direction, x, y, radius;
};
constexpr PlaneRow kPlanes[] = {
    {30, 135, -0.408248290464, 0.408248290464, 1.154700538379},
    {60, 270, 1.732050807569, 0, 2},
    {85, 10, -1.984807753012, -11.256404125094, 11.473713245670},
};

TEST(NetCurve, EqualAngleCirclesHaveTheTabulatedCentreAndRadius) {
  for (const CircleRow& row : kCircles) {
    const Line axis{Angle::degrees(row.trend), Angle::degrees(row.plunge)};
    const auto pieces =
        cone_on_net(Projection::equal_angle, direction(axis), Angle::degrees(row.half_angle));
    ASSERT_FALSE(pieces.empty());
    EXPECT_NEAR(arc_of(pieces[0]).centre.x(), row.x, 1e-12);
    EXPECT_NEAR(arc_of(pieces[0]).centre.y(), row.y, 1e-12);
    EXPECT_NEAR(arc_of(pieces[0]).radius, row.radius, 1e-12);
  }
  for (const PlaneRow& row : kPlanes) {
    const NetPiece piece = great_circle_on_net(
        Projection::equal_angle, Plane{Angle::degrees(row.dip), Angle::degrees(row.dip_direction)});
    EXPECT_NEAR(arc_of(piece).centre.x(), row.x, 2e-12);
    EXPECT_NEAR(arc_of(piece).centre.y(), row.y, 2e-12);
    EXPECT_NEAR(arc_of(piece).radius, row.radius, 2e-12);
  }
}

TEST(NetCurve, EveryPointLiesOnItsCircleAndInsideTheRim) {
  for (std::uint64_t i = 0; i < 400; ++i) {
    const Vector3 axis = random_direction(i);
    const double cosine = 1.8 * random_uniform(7, 2, i) - 0.9;
    for (const Projection projection : kBoth) {
      for (const NetPiece& piece : circle_on_net(projection, {axis, cosine})) {
        for (const Point2& point : sampled(piece, 1e-4)) {
          EXPECT_NEAR(unproject(projection, point).dot(axis), cosine, 1e-11);
          EXPECT_LE(point.norm(), 1.0 + 1e-12);
        }
      }
    }
  }
}

TEST(NetCurve, OpenPiecesEndOnTheRim) {
  for (std::uint64_t i = 0; i < 400; ++i) {
    const Vector3 axis = random_direction(i);
    const double cosine = 1.8 * random_uniform(7, 2, i) - 0.9;
    const SphereCircle circle{axis, cosine};
    const bool whole = lower_half_opening(circle) == 180_deg;
    for (const Projection projection : kBoth) {
      for (const NetPiece& piece : circle_on_net(projection, circle)) {
        const auto [first, last] = ends(piece);
        if (whole) {
          EXPECT_LT((first - last).norm(), 1e-12);
        } else {
          EXPECT_NEAR(first.norm(), 1.0, 1e-12);
          EXPECT_NEAR(last.norm(), 1.0, 1e-12);
        }
      }
    }
  }
}

TEST(NetCurve, PolylinesStayWithinTheirTolerance) {
  for (std::uint64_t i = 0; i < 60; ++i) {
    const SphereCircle circle{random_direction(i), 1.8 * random_uniform(7, 2, i) - 0.9};
    const Angle half = lower_half_opening(circle);
    const auto pieces = circle_on_net(Projection::equal_area, circle);
    if (pieces.empty()) continue;
    const auto& points = std::get<NetPolyline>(pieces[0]).points;
    for (int k = 0; k <= 500; ++k) {
      const Point2 p =
          project(Projection::equal_area, circle_point(circle, half * (k / 250.0 - 1.0)));
      double nearest = 2.0;
      for (std::size_t j = 1; j < points.size(); ++j) {
        const Point2 edge = points[j] - points[j - 1];
        const double along =
            std::clamp((p - points[j - 1]).dot(edge) / edge.squaredNorm(), 0.0, 1.0);
        nearest = std::min(nearest, (p - points[j - 1] - along * edge).norm());
      }
      // The middle of a step is where a smooth curve leaves its chord most, up to higher order.
      EXPECT_LT(nearest, 1.1 * kCurveTolerance);
    }
  }
}

TEST(NetCurve, VerticalPlanesAreDiameters) {
  for (const double direction : {0.0, 37.0, 90.0, 180.0, 301.5}) {
    for (const Projection projection : kBoth) {
      const NetPiece piece =
          great_circle_on_net(projection, Plane{90_deg, Angle::degrees(direction)});
      const auto [first, last] = ends(piece);
      EXPECT_LT((first + last).norm(), 1e-12);
      for (const Point2& p : sampled(piece, 1e-4)) {
        EXPECT_NEAR(first.x() * p.y() - first.y() * p.x(), 0.0, 1e-12);
      }
    }
    EXPECT_TRUE(std::holds_alternative<NetPolyline>(
        great_circle_on_net(Projection::equal_angle, Plane{90_deg, Angle::degrees(direction)})));
  }
}

TEST(NetCurve, NearlyVerticalPlanesAreAccurate) {
  for (const double off : {1e-1, 1e-3, 1e-5, 1e-7, 1e-9, 1e-12}) {
    const Plane plane{Angle::degrees(90.0 - off), 33_deg};
    const Vector3 n = upward_normal(plane);
    for (const Point2& p : sampled(great_circle_on_net(Projection::equal_angle, plane), 1e-6)) {
      EXPECT_NEAR(unproject(Projection::equal_angle, p).dot(n), 0.0, 2e-6) << off;
    }
  }
}

TEST(NetCurve, AHorizontalPlaneIsTheRim) {
  for (const Projection projection : kBoth) {
    const NetArc rim = arc_of(great_circle_on_net(projection, Plane{}));
    EXPECT_EQ(rim.centre, Point2(0, 0));
    EXPECT_EQ(rim.radius, 1.0);
    EXPECT_EQ(rim.sweep, 360_deg);
  }
}

TEST(NetCurve, AConeAcrossTheRimComesInOnTheOtherSide) {
  for (const Projection projection : kBoth) {
    const Vector3 axis = direction({90_deg, 10_deg});
    const auto pieces = cone_on_net(projection, axis, 30_deg);
    ASSERT_EQ(pieces.size(), 2u);
    const auto [first, last] = ends(pieces[0]);
    const auto [far_first, far_last] = ends(pieces[1]);
    // What leaves the rim at one point comes in at the opposite one.
    EXPECT_LT(std::min((first + far_first).norm(), (first + far_last).norm()), 1e-12);
    EXPECT_LT(std::min((last + far_first).norm(), (last + far_last).norm()), 1e-12);
    EXPECT_GT(first.x(), 0.0);
    EXPECT_LT(far_first.x(), 0.0);
    EXPECT_EQ(cone_on_net(projection, direction({90_deg, 40_deg}), 30_deg).size(), 1u);
  }
}

TEST(NetCurve, ACircleThroughStraightUpIsAStraightLine) {
  // D = sin P + cos a = 0: the far end's cone about an axis plunging 40 degrees with half angle 50
  // passes straight up; the arc about the near end does not.
  const Vector3 axis = direction({90_deg, 40_deg});
  const SphereCircle through{-axis, cos(50_deg)};
  const NetPiece piece =
      arc_on_net(Projection::equal_angle, through, Angle::degrees(-60), Angle::degrees(60));
  EXPECT_TRUE(std::holds_alternative<NetPolyline>(piece));
}

TEST(NetCurve, SweepsBeyondHalfATurnAreKept) {
  // Three quarters of a cone about straight down.
  const SphereCircle circle{{0, 0, -1}, cos(20_deg)};
  const NetPiece piece = arc_on_net(Projection::equal_angle, circle, 0_deg, 270_deg);
  EXPECT_NEAR(std::abs(arc_of(piece).sweep.deg()), 270.0, 1e-9);
  const SphereCircle tilted{direction({20_deg, 50_deg}), cos(35_deg)};
  const NetPiece whole = arc_on_net(Projection::equal_angle, tilted, 0_deg, 360_deg);
  EXPECT_EQ(std::abs(arc_of(whole).sweep.deg()), 360.0);
}

}  // namespace
}  // namespace brink
