#include "brink/mechanics/wedge_geometry.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/error.hpp"

namespace brink {
namespace {

// Two planes that dip 45 to the south-east and south-west; their line plunges south.
WedgeGeometry plain() {
  WedgeGeometry g;
  g.plane1 = {45_deg, 135_deg};
  g.plane2 = {45_deg, 225_deg};
  g.face = {90_deg, 180_deg};
  g.size.value = 10;
  return g;
}

std::string reason(const WedgeGeometry& g) {
  const WedgeBlock block = wedge_block(g);
  EXPECT_FALSE(block.forms);
  return block.reason;
}

bool has(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

// By hand: the line falls 1 in sqrt 2 to the south, traces on the vertical face rise at 1 in sqrt
// 2 too, so 10 m of face give a base 10 sqrt 2 back and 20 sqrt 2 wide.
TEST(WedgeGeometry, ByHand) {
  const WedgeBlock block = wedge_block(plain());
  ASSERT_TRUE(block.forms);
  EXPECT_NEAR(block.areas.face_m2, 100 * std::sqrt(2.0), 1e-9);
  EXPECT_NEAR(block.areas.upper_m2, 200, 1e-9);
  EXPECT_NEAR(block.volume_m3, 2000.0 / 3, 1e-9);
  EXPECT_NEAR(block.areas.plane1_m2, block.areas.plane2_m2, 1e-9);
  EXPECT_NEAR(block.total_height_m, 10, 1e-12);
  EXPECT_FALSE(block.cut);
  EXPECT_EQ(block.surfaces[0].corners.size(), 3U);
}

// A vertical crack half-way back along plane 1's trace (which is 20 m long and runs at 45 degrees
// in plan) leaves 7/8 of the volume.
TEST(WedgeGeometry, CrackHalfWay) {
  WedgeGeometry g = plain();
  g.crack = TensionCrack{{90_deg, 180_deg}, 10.0};
  const WedgeBlock block = wedge_block(g);
  ASSERT_TRUE(block.forms);
  EXPECT_TRUE(block.cut);
  EXPECT_NEAR(block.volume_m3, 2000.0 / 3 * 7 / 8, 1e-9);
  EXPECT_NEAR(block.crack_depth_m, 5, 1e-9);
  EXPECT_NEAR(block.areas.crack_m2, 25 * std::sqrt(2.0), 1e-9);
  EXPECT_LT(block.into_from_crack.y(), 0);  // towards the face, which looks south
}

TEST(WedgeGeometry, CrackBeyondTheWedgeLeavesItWhole) {
  WedgeGeometry g = plain();
  g.crack = TensionCrack{{90_deg, 180_deg}, 21.0};
  const WedgeBlock block = wedge_block(g);
  ASSERT_TRUE(block.forms);
  EXPECT_FALSE(block.cut);
  EXPECT_EQ(block.areas.crack_m2, 0);
  EXPECT_NEAR(block.volume_m3, 2000.0 / 3, 1e-9);
  ASSERT_EQ(block.warnings.size(), 1U);
  EXPECT_TRUE(has(block.warnings[0], "21 m behind the crest"));
}

TEST(WedgeGeometry, CrackThatComesOutInTheFace) {
  WedgeGeometry g = plain();
  g.crack = TensionCrack{{20_deg, 180_deg}, 1.0};
  EXPECT_TRUE(has(reason(g), "comes out in the face"));
}

TEST(WedgeGeometry, CrackAlongTheTraceCannotBePlaced) {
  WedgeGeometry g = plain();
  g.crack = TensionCrack{{80_deg, 135_deg}, 1.0};
  EXPECT_THROW(wedge_block(g), Error);
}

TEST(WedgeGeometry, WhyNoWedgeForms) {
  WedgeGeometry g = plain();
  g.plane2 = g.plane1;
  EXPECT_TRUE(has(reason(g), "parallel"));
  g = plain();
  g.face = {90_deg, 0_deg};
  EXPECT_TRUE(has(reason(g), "plunges into the rock"));
  g.face = {20_deg, 180_deg};
  EXPECT_TRUE(has(reason(g), "plunges into the rock"));
  g = plain();
  g.upper = {40_deg, 180_deg};
  EXPECT_TRUE(has(reason(g), "never reaches the upper ground"));
  g = plain();
  g.face = {40_deg, 180_deg};
  g.upper = {30_deg, 180_deg};
  EXPECT_TRUE(wedge_block(g).forms);
  g.plane1 = {60_deg, 90_deg};
  g.plane2 = {60_deg, 270_deg};
  EXPECT_TRUE(has(reason(g), "never reaches the upper ground"));
  g = plain();
  g.plane1 = {30_deg, 180_deg};
  EXPECT_TRUE(has(reason(g), "plane 1's trace on the face runs parallel"));
}

TEST(WedgeGeometry, LineInTheFaceDoesNotDaylight) {
  WedgeGeometry g = plain();
  g.plane1 = {90_deg, 90_deg};
  g.plane2 = {40_deg, 180_deg};
  g.face = {40_deg, 180_deg};
  EXPECT_TRUE(has(reason(g), "lies in the face"));
}

TEST(WedgeGeometry, HeightOnPlane1) {
  WedgeGeometry g = plain();
  g.face = {65_deg, 185_deg};
  g.upper = {12_deg, 195_deg};
  g.size = {WedgeMeasure::height_on_plane1, 30};
  const WedgeBlock block = wedge_block(g);
  ASSERT_TRUE(block.forms);
  double top = -1;  // plane 1's corner on the face and the ground, but not on plane 2
  for (const Vector3& x : block.surfaces[0].corners) {
    if (std::abs(x.dot(outward_normal(g.face))) < 1e-9 && x.norm() > 1e-6) top = x.z();
  }
  EXPECT_NEAR(top, 30, 1e-9);
}

// Every measure of one wedge gives that wedge.
TEST(WedgeGeometry, SizesAgree) {
  WedgeGeometry g = plain();
  g.face = {65_deg, 185_deg};
  g.upper = {12_deg, 195_deg};
  const WedgeBlock block = wedge_block(g);
  const auto far_corner = [&](WedgeSurface plane) {
    double length = 0;
    for (const Vector3& x : block.surfaces[static_cast<std::size_t>(plane)].corners) {
      if (std::abs(x.dot(outward_normal(g.face))) < 1e-9) length = std::max(length, x.norm());
    }
    return length;
  };
  const std::vector<WedgeSize> sizes{
      {WedgeMeasure::volume, block.volume_m3},
      {WedgeMeasure::trace_length1, far_corner(WedgeSurface::plane1)},
      {WedgeMeasure::trace_length2, far_corner(WedgeSurface::plane2)}};
  for (const WedgeSize& size : sizes) {
    g.size = size;
    EXPECT_NEAR(wedge_block(g).height_m, 10, 1e-9);
  }
}

TEST(WedgeGeometry, PersistenceLimitsTheWedge) {
  WedgeGeometry g = plain();
  g.size = {WedgeMeasure::persistence, 0};
  EXPECT_THROW(wedge_block(g), Error);
  // The longest side of plane 1's triangle is its trace on the upper ground, 20 m for a 10 m face.
  g.persistence1_m = 10.0;
  EXPECT_NEAR(wedge_block(g).height_m, 5, 1e-9);
  g.persistence2_m = 4.0;
  EXPECT_NEAR(wedge_block(g).height_m, 2, 1e-9);
  EXPECT_TRUE(wedge_block(g).warnings.empty());
  g.size = {WedgeMeasure::height, 10};
  const WedgeBlock limited = wedge_block(g);
  EXPECT_NEAR(limited.height_m, 2, 1e-9);
  ASSERT_EQ(limited.warnings.size(), 1U);
  EXPECT_TRUE(has(limited.warnings[0], "plane 2 reaches only 4 m"));
  g.size = {WedgeMeasure::height, 1.5};
  EXPECT_NEAR(wedge_block(g).height_m, 1.5, 1e-12);
}

TEST(WedgeGeometry, RefusesValuesOutOfRange) {
  WedgeGeometry g = plain();
  g.size.value = 0;
  EXPECT_THROW(wedge_block(g), Error);
  g = plain();
  g.face.dip = 180_deg;
  EXPECT_THROW(wedge_block(g), Error);
  g = plain();
  g.upper.dip = 90_deg;
  EXPECT_THROW(wedge_block(g), Error);
  g = plain();
  g.crack = TensionCrack{{70_deg, 180_deg}, -1.0};
  EXPECT_THROW(wedge_block(g), Error);
}

}  // namespace
}  // namespace brink
