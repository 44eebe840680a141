#include "brink/plot/hatch.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace brink::plot {
namespace {

double total_length(const std::vector<std::pair<Point, Point>>& lines) {
  double sum = 0.0;
  for (const auto& [a, b] : lines) sum += std::hypot(a.x_mm - b.x_mm, a.y_mm - b.y_mm);
  return sum;
}

const std::vector<Point> kSquare{{0, 0}, {10, 0}, {10, 10}, {0, 10}};

TEST(Hatch, LengthTimesSpacingIsTheArea) {
  for (const double angle : {0.0, 30.0, 45.0, 90.0, 135.0}) {
    EXPECT_NEAR(0.05 * total_length(hatch({kSquare}, Angle::degrees(angle), 0.05)), 100.0, 0.8)
        << angle;
  }
}

TEST(Hatch, HolesStayEmpty) {
  const std::vector<Point> hole{{3, 3}, {7, 3}, {7, 7}, {3, 7}};
  EXPECT_NEAR(0.05 * total_length(hatch({kSquare, hole}, 45_deg, 0.05)), 84.0, 0.8);
}

TEST(Hatch, LinesThroughVerticesAreCountedOnce) {
  // A diamond whose corners lie on hatch lines.
  const std::vector<Point> diamond{{5, 0}, {10, 5}, {5, 10}, {0, 5}};
  const auto lines = hatch({diamond}, 0_deg, 1.0);
  ASSERT_EQ(lines.size(), 10u);  // y = 0 .. 9; the first has no length
  EXPECT_NEAR(total_length(lines), 50.0, 1e-9);
}

TEST(Hatch, NothingGivesNothing) {
  EXPECT_TRUE(hatch({}, 45_deg, 1.0).empty());
  EXPECT_TRUE(hatch({{}}, 45_deg, 1.0).empty());
  EXPECT_TRUE(hatch({{{1.0, 1.0}}}, 45_deg, 1.0).empty());
}

}  // namespace
}  // namespace brink::plot
