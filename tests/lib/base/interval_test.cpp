#include "brink/base/interval.hpp"

#include <gtest/gtest.h>

namespace brink {
namespace {

TEST(Interval, OpenEndsAreOutside) {
  EXPECT_TRUE(from_to(0, 90).contains(0));
  EXPECT_TRUE(from_to(0, 90).contains(90));
  EXPECT_FALSE(between(0, 90).contains(0));
  EXPECT_FALSE(between(0, 90).contains(90));
  EXPECT_FALSE(above(0).contains(0));
  EXPECT_TRUE(at_least_value(0).contains(0));
  EXPECT_TRUE(any_number().contains(-1e300));
}

TEST(Interval, SaysWhatItAccepts) {
  EXPECT_EQ(from_to(0, 90, "degrees").text(), "0 to 90 degrees");
  EXPECT_EQ(between(0, 180, "degrees").text(), "above 0 and below 180 degrees");
  EXPECT_EQ(above(0, "m").text(), "above 0 m");
  EXPECT_EQ(at_least_value(0, "kPa").text(), "0 kPa or above");
  EXPECT_EQ((Interval{0, 90, false, true, "degrees"}.text()), "0 or above and below 90 degrees");
  EXPECT_EQ(any_number("kN").text(), "a number of kN");
}

}  // namespace
}  // namespace brink
