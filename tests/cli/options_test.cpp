#include "options.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"

namespace brink::cli {
namespace {

// The message of the Error that `action` throws.
template <typename Action>
std::string message(const Action& action) {
  try {
    action();
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::argument);
    return error.what();
  }
  return "no error";
}

TEST(Options, IntervalsSayWhatTheyAccept) {
  EXPECT_EQ(from_to(0, 90, "degrees").text(), "0 to 90 degrees");
  EXPECT_EQ(between(0, 180, "degrees").text(), "above 0 and below 180 degrees");
  EXPECT_EQ(above(0, "m").text(), "above 0 m");
  EXPECT_EQ(at_least_value(0, "kPa").text(), "0 kPa or above");
  EXPECT_EQ((Interval{0, 90, false, true, "degrees"}.text()), "0 or above and below 90 degrees");
  EXPECT_EQ(any_number("kN").text(), "a number of kN");
}

TEST(Options, NumbersAreFiniteDecimalsInRange) {
  EXPECT_EQ(parse_number("--height", " 12.5 ", above(0, "m")), 12.5);
  EXPECT_EQ(parse_number("--height", "1e2", above(0, "m")), 100.0);
  for (const char* text : {"nan", "inf", "0x10", "1e999", "12m", "", "1,5", "--1"}) {
    EXPECT_NE(
        message([&] { parse_number("--height", text, above(0, "m")); }).find("is not a number"),
        std::string::npos)
        << text;
  }
  EXPECT_EQ(message([] { parse_number("--height", "0", above(0, "m")); }),
            "--height: '0' is out of range; accepted: above 0 m");
}

TEST(Options, WholeNumbers) {
  EXPECT_EQ(parse_whole("--count", "3", 1, 9), 3U);
  for (const char* text : {"3.0", "0", "10", "-1", "three", "99999999999999999999"}) {
    EXPECT_NE(message([&] { parse_whole("--count", text, 1, 9); }), "no error") << text;
  }
}

TEST(Options, PlanesAreNormalised) {
  EXPECT_EQ(parse_plane("--plane", "65/120"), (Plane{65_deg, 120_deg}));
  EXPECT_EQ(parse_plane("--plane", "65/360"), (Plane{65_deg, 0_deg}));
  EXPECT_EQ(parse_plane("--plane", "0/120"), (Plane{0_deg, 0_deg}));
  EXPECT_EQ(parse_plane("--plane", " 90 / 359.5 "), (Plane{90_deg, 359.5_deg}));
  for (const char* text :
       {"65", "65/", "/120", "65/120/3", "91/0", "-1/0", "65/361", "65/-1", "a/b"}) {
    EXPECT_NE(message([&] { parse_plane("--plane", text); }), "no error") << text;
  }
  EXPECT_EQ(message([] { parse_plane("--plane", "120/65"); }),
            "--plane: '120/65' has a dip of 120; accepted: a dip of 0 to 90 degrees");
}

TEST(Options, FacesMayOverhangButNotLieFlat) {
  EXPECT_EQ(parse_face("--face", "110/090"), (Face{110_deg, 90_deg}));
  for (const char* text : {"0/90", "180/90", "-5/90", "60-90"}) {
    EXPECT_NE(message([&] { parse_face("--face", text); }), "no error") << text;
  }
}

TEST(Options, LinesMayPointUp) {
  EXPECT_EQ(parse_line("--line", "120/-35"), (Line{120_deg, -35_deg}));
  EXPECT_EQ(parse_line("--line", "120/90"), (Line{0_deg, 90_deg}));
  EXPECT_NE(message([] { parse_line("--line", "120/91"); }), "no error");
}

TEST(Options, ForcesHaveASizeAndADirection) {
  const ForceAlong force = parse_force("--bolt", "250@120/-5", "KN@TREND/PLUNGE");
  EXPECT_EQ(force.magnitude, 250.0);
  EXPECT_EQ(force.direction, (Line{120_deg, -5_deg}));
  EXPECT_EQ(message([] { parse_force("--bolt", "250", "KN@TREND/PLUNGE"); }),
            "--bolt: '250' is not a force; accepted: KN@TREND/PLUNGE, as in 250@120/35");
  EXPECT_NE(message([] { parse_force("--bolt", "-250@120/5", "KN@TREND/PLUNGE"); }), "no error");
}

}  // namespace
}  // namespace brink::cli
