#include "brink/mechanics/half_spaces.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <random>

#include "reference/qhull_solid.hpp"

namespace brink {
namespace {

std::vector<HalfSpace> box(double x, double y, double z) {
  return {{{-1, 0, 0}, 0}, {{1, 0, 0}, x},  {{0, -1, 0}, 0},
          {{0, 1, 0}, y},  {{0, 0, -1}, 0}, {{0, 0, 1}, z}};
}

TEST(HalfSpaces, Box) {
  const Solid solid = common_solid(box(2, 3, 4));
  ASSERT_EQ(solid.state, SolidState::solid);
  EXPECT_NEAR(solid.volume_m3, 24, 1e-12);
  EXPECT_NEAR((solid.centroid - Vector3(1, 1.5, 2)).norm(), 0, 1e-12);
  EXPECT_NEAR(solid.faces[0].area_m2, 12, 1e-12);
  EXPECT_NEAR(solid.faces[5].area_m2, 6, 1e-12);
  EXPECT_EQ(solid.faces[5].corners.size(), 4U);
  EXPECT_NEAR((solid.faces[5].centroid - Vector3(1, 1.5, 4)).norm(), 0, 1e-12);
}

TEST(HalfSpaces, EmptyUnboundedAndTouching) {
  auto spaces = box(1, 1, 1);
  spaces.push_back({{1, 0, 0}, -0.5});
  EXPECT_EQ(common_solid(spaces).state, SolidState::empty);
  spaces = box(1, 1, 1);
  spaces.pop_back();
  EXPECT_EQ(common_solid(spaces).state, SolidState::unbounded);
  EXPECT_EQ(common_solid({}).state, SolidState::empty);
  // A plane through one corner only, and one that repeats a side.
  spaces = box(1, 1, 1);
  spaces.push_back({Vector3(1, 1, 1).normalized(), std::sqrt(3.0)});
  spaces.push_back({{0, 0, 1}, 1});
  const Solid solid = common_solid(spaces);
  ASSERT_EQ(solid.state, SolidState::solid);
  EXPECT_NEAR(solid.volume_m3, 1, 1e-12);
  EXPECT_EQ(solid.faces[6].area_m2, 0);
  EXPECT_EQ(solid.faces[7].area_m2, 0);
  EXPECT_NEAR(solid.faces[5].area_m2, 1, 1e-12);
}

TEST(HalfSpaces, EqualsQhullOnRandomSolids) {
  std::mt19937_64 draw(3);
  std::normal_distribution<double> coordinate;
  std::uniform_real_distribution<double> away(0.2, 5.0);
  int bounded = 0;
  for (int i = 0; i < 2000; ++i) {
    std::vector<HalfSpace> spaces(4 + static_cast<std::size_t>(i) % 6);
    for (HalfSpace& h : spaces) {
      h.outward = Vector3(coordinate(draw), coordinate(draw), coordinate(draw)).normalized();
      h.offset_m = away(draw);
    }
    const Solid solid = common_solid(spaces);
    if (solid.state != SolidState::solid) {
      EXPECT_EQ(solid.state, SolidState::unbounded);
      continue;
    }
    ++bounded;
    const auto twin = reference::qhull_solid(spaces, Vector3::Zero());
    // Long thin solids lose digits in both; measured against their own size.
    ASSERT_NEAR(solid.volume_m3, twin.volume, 1e-9 * twin.volume) << i;
    double surface = 0;
    for (const double area : twin.areas) surface += area;
    for (std::size_t k = 0; k < spaces.size(); ++k) {
      EXPECT_NEAR(solid.faces[k].area_m2, twin.areas[k], 1e-8 * surface) << i;
    }
  }
  EXPECT_GT(bounded, 500);
}

}  // namespace
}  // namespace brink
