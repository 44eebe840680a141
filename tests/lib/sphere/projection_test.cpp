#include "brink/sphere/projection.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/random.hpp"

namespace brink {
namespace {

constexpr Projection kBoth[] = {Projection::equal_angle, Projection::equal_area};

struct Row {
  double trend, plunge, angle_x, angle_y, area_x, area_y;
};

// Computed from the closed forms tan((90-p)/2) and sqrt(2) sin((90-p)/2) and, to 7e-16, by PROJ
// 9.1.1 (stere and laea, lat_0 = 90); twelve decimals, or fifteen in the second block.
constexpr Row kTwelveDecimals[] = {
    {0, 0, 0, 1, 0, 1},
    {90, 0, 1, 0, 1, 0},
    {225, 0, -0.707106781187, -0.707106781187, -0.707106781187, -0.707106781187},
    {0, 90, 0, 0, 0, 0},
    {30, 10, 0.419549815589, 0.726681596906, 0.454519477672, 0.787250828358},
    {75, 45, 0.400099577495, 0.107206358682, 0.522755290218, 0.140071857853},
    {120, 30, 0.5, -0.288675134595, 0.612372435696, -0.353553390593},
    {180, 60, 0, -0.267949192431, 0, -0.366025403784},
    {210, 5, -0.458165587009, -0.793566074979, -0.477714417108, -0.827425641940},
    {275, 85, -0.043494799839, 0.003805301908, -0.061452391044, 0.005376387563},
    {315, 22.5, -0.472473645917, 0.472473645917, -0.555570233020, 0.555570233020},
    {359.9, 0.1, -0.001742284848, 0.998254671634, -0.001743804615, 0.999125432956},
};
constexpr Row kFifteenDecimals[] = {
    {45, 30, 0.408248290463863, 0.408248290463863, 0.5, 0.5},
    {123.456, 12.345, 0.671461565029204, -0.443689545501466, 0.739765905781683, -0.488823807062553},
    {200, 89.9, -0.000298468956224, -0.000820036717635, -0.000422098685117, -0.001159706606140},
    {271.25, 0.001, -0.999744578093071, 0.021814504296314, -0.999753302472287, 0.021814694662946},
    {359.999, 45, -0.000007229390469, 0.414213562310007, -0.000009445653846, 0.541196100063768},
    {315, 60, -0.189468690981506, 0.189468690981506, -0.258819045102521, 0.258819045102521},
    {10.5, 77.7, 0.019636221284229, 0.105947569177786, 0.027609990547006, 0.148970178179160},
};

void expect_row(const Row& row, double tolerance) {
  const Line line{Angle::degrees(row.trend), Angle::degrees(row.plunge)};
  const Point2 angle = project(Projection::equal_angle, line);
  const Point2 area = project(Projection::equal_area, line);
  EXPECT_NEAR(angle.x(), row.angle_x, tolerance) << row.trend << "/" << row.plunge;
  EXPECT_NEAR(angle.y(), row.angle_y, tolerance) << row.trend << "/" << row.plunge;
  EXPECT_NEAR(area.x(), row.area_x, tolerance) << row.trend << "/" << row.plunge;
  EXPECT_NEAR(area.y(), row.area_y, tolerance) << row.trend << "/" << row.plunge;
}

TEST(Projection, AgreesWithTheTables) {
  for (const Row& row : kTwelveDecimals) expect_row(row, 5.1e-13);
  for (const Row& row : kFifteenDecimals) expect_row(row, 1e-15);
}

TEST(Projection, IsExactAtTheRimAndTheCentre) {
  for (const Projection projection : kBoth) {
    EXPECT_EQ(project(projection, Line{0_deg, 0_deg}), Point2(0, 1));
    EXPECT_EQ(project(projection, Line{90_deg, 0_deg}), Point2(1, 0));
    EXPECT_EQ(project(projection, Line{180_deg, 0_deg}), Point2(0, -1));
    EXPECT_EQ(project(projection, Line{270_deg, 0_deg}), Point2(-1, 0));
    EXPECT_EQ(project(projection, Line{123_deg, 90_deg}), Point2(0, 0));
  }
}

TEST(Projection, InverseReturnsEveryLowerDirection) {
  for (std::uint64_t i = 0; i < 2000; ++i) {
    const Angle trend = Angle::degrees(360.0 * random_uniform(1, 0, i));
    const Vector3 v = direction({trend, asin(random_uniform(1, 1, i))});
    for (const Projection projection : kBoth) {
      EXPECT_LT((unproject(projection, project(projection, v)) - v).norm(), 5e-16 * 4);
    }
  }
}

TEST(Projection, EqualAreaKeepsAreas) {
  // The cap about straight down with half angle t has area 2 pi (1 - cos t) of 2 pi, its disc pi
  // r^2 of pi.
  for (double t = 1.0; t <= 90.0; t += 1.0) {
    const double r = project(Projection::equal_area, Line{40_deg, Angle::degrees(90.0 - t)}).norm();
    EXPECT_NEAR(r * r, 1.0 - cos(Angle::degrees(t)), 1e-15);
  }
}

TEST(Projection, UpwardDirectionsFallOutside) {
  for (const Projection projection : kBoth) {
    EXPECT_GT(project(projection, Line{30_deg, Angle::degrees(-10)}).norm(), 1.0);
    // The two ends of an axis are opposite each other; their radii multiply to 1 on the equal-angle
    // net.
    const Point2 down = project(projection, Line{30_deg, 25_deg});
    const Point2 up = project(projection, Line{210_deg, Angle::degrees(-25)});
    EXPECT_NEAR(down.x() * up.y() - down.y() * up.x(), 0.0, 1e-15);
  }
}

TEST(Projection, LowerEndTurnsUpwardVectorsOnly) {
  EXPECT_EQ(lower_end({0.0, 0.6, 0.8}), Vector3(0.0, -0.6, -0.8));
  EXPECT_EQ(lower_end({0.0, 0.6, -0.8}), Vector3(0.0, 0.6, -0.8));
  EXPECT_EQ(lower_end({-1.0, 0.0, 0.0}), Vector3(-1.0, 0.0, 0.0));
}

}  // namespace
}  // namespace brink
