#include "brink/base/angle.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace brink {
namespace {

TEST(Angle, SineAndCosineAreExactAtTheCardinals) {
  for (int turn = -2; turn <= 2; ++turn) {
    const double base = 360.0 * turn;
    EXPECT_EQ(sin(Angle::degrees(base)), 0.0);
    EXPECT_EQ(cos(Angle::degrees(base)), 1.0);
    EXPECT_EQ(sin(Angle::degrees(base + 90)), 1.0);
    EXPECT_EQ(cos(Angle::degrees(base + 90)), 0.0);
    EXPECT_EQ(sin(Angle::degrees(base + 180)), 0.0);
    EXPECT_EQ(cos(Angle::degrees(base + 180)), -1.0);
    EXPECT_EQ(sin(Angle::degrees(base + 270)), -1.0);
    EXPECT_EQ(cos(Angle::degrees(base + 270)), 0.0);
  }
}

TEST(Angle, ZerosCarryNoSign) {
  for (const double degrees : {0.0, -0.0, 90.0, 180.0, 270.0, 360.0, -90.0, -180.0}) {
    const SinCos at = sincos(Angle::degrees(degrees));
    EXPECT_FALSE(at.sin == 0.0 && std::signbit(at.sin)) << degrees;
    EXPECT_FALSE(at.cos == 0.0 && std::signbit(at.cos)) << degrees;
  }
}

TEST(Angle, RationalSinesAreExact) {
  EXPECT_EQ(sin(30_deg), 0.5);
  EXPECT_EQ(cos(60_deg), 0.5);
  EXPECT_EQ(sin(150_deg), 0.5);
  EXPECT_EQ(cos(120_deg), -0.5);
  EXPECT_EQ(sin(210_deg), -0.5);
}

TEST(Angle, AgreesWithTheStandardLibraryEverywhere) {
  for (int tenth = -7200; tenth <= 7200; tenth += 7) {
    const Angle a = Angle::degrees(tenth / 10.0);
    EXPECT_NEAR(sin(a), std::sin(a.rad()), 4e-15);
    EXPECT_NEAR(cos(a), std::cos(a.rad()), 4e-15);
  }
}

TEST(Angle, WrapKeepsAzimuthsInOneTurn) {
  EXPECT_EQ(wrap_360(360_deg).deg(), 0.0);
  EXPECT_EQ(wrap_360(Angle::degrees(-90)).deg(), 270.0);
  EXPECT_EQ(wrap_360(Angle::degrees(725)).deg(), 5.0);
  EXPECT_FALSE(std::signbit(wrap_360(Angle::degrees(-0.0)).deg()));
  EXPECT_EQ(wrap_360(Angle::degrees(-1e-20)).deg(), 0.0);
}

TEST(Angle, AzimuthDifferenceIsAtMostHalfATurn) {
  EXPECT_EQ(azimuth_difference(350_deg, 10_deg).deg(), 20.0);
  EXPECT_EQ(azimuth_difference(10_deg, 350_deg).deg(), 20.0);
  EXPECT_EQ(azimuth_difference(0_deg, 180_deg).deg(), 180.0);
  EXPECT_EQ(azimuth_difference(90_deg, 810_deg).deg(), 0.0);
}

TEST(Angle, TangentIsInfiniteAtNinety) {
  EXPECT_TRUE(std::isinf(tan(90_deg)));
  EXPECT_EQ(tan(45_deg), 1.0);
}

}  // namespace
}  // namespace brink
