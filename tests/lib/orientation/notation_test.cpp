#include "brink/orientation/notation.hpp"

#include <gtest/gtest.h>

#include <clocale>
#include <cmath>
#include <locale>

#include "brink/base/number.hpp"
#include "brink/base/random.hpp"

namespace brink {
namespace {

Plane plane(double dip, double direction) {
  return {Angle::degrees(dip), Angle::degrees(direction)};
}

void expect_same(const Plane& got, const Plane& want, const std::string& what) {
  EXPECT_NEAR(got.dip.deg(), want.dip.deg(), 1e-9) << what;
  EXPECT_NEAR(azimuth_difference(got.dip_direction, want.dip_direction).deg(), 0.0, 1e-9) << what;
}

struct Case {
  const char* text;
  double dip;
  double direction;
};

// Common practice, no source: the same plane in the notations of the trade.
TEST(Notation, ReadsTextsThatNameThemselves) {
  const Case cases[] = {
      {"N45E 30SE", 30, 135},
      {"N45E 30NW", 30, 315},
      {"S45W 30SE", 30, 135},
      {"N10W 60E", 60, 80},
      {"EW 40N", 40, 0},
      {"NS 40E", 40, 90},
      {"NS 40W", 40, 270},
      {"EW 40S", 40, 180},
      {"N-S 40E", 40, 90},
      {"315->60", 30, 135},
      {"315 -> 60", 30, 135},
      {"315→60", 30, 135},
      {"045/30SE", 30, 135},
      {"225/30SE", 30, 135},
      {"045/30NW", 30, 315},
      {"045-30SE", 30, 135},
      {"045 30 SE", 30, 135},
      {"45/30se", 30, 135},
      {"n45e 30se", 30, 135},
      {"N45°E, 30°SE", 30, 135},
      {"N 45 E/30 SE", 30, 135},
      {"N45ºE 30˚SE", 30, 135},
      {"N45.5E 30.25SE", 30.25, 135.5},
      {"S10E 20SW", 20, 260},
      {"S10E 20W", 20, 260},
      {"N 30E", 30, 90},
      {"E 30N", 30, 0},
      {"W 30S", 30, 180},
      {"S/30W", 30, 270},
      {"000->00", 90, 180},
      {"0->90", 0, 0},
      {"90->0", 90, 270},
      {"N90E 10S", 10, 180},
      {"N0E 10E", 10, 90},
      {"N45E 90", 90, 135},
      {"N45E 0", 0, 0},
      {"045/30S", 30, 135},
      {"045/30E", 30, 135},
      {"N45°30'E 30°15'SE", 30.25, 135.5},
      {" N45E\xC2\xA0"
       "30SE ",
       30, 135},
      {"360->45", 45, 180},
  };
  for (const Case& c : cases) {
    const ParsedPlane parsed = parse_plane(c.text, {});
    ASSERT_TRUE(parsed.ok()) << c.text << ": " << parsed.problem;
    expect_same(parsed.plane, plane(c.dip, c.direction), c.text);
  }
}

TEST(Notation, ReadsBarePairsInTheStatedNotation) {
  const auto read = [](const char* text, Notation notation, StrikeRule rule = StrikeRule::right) {
    TextRules rules;
    rules.notation = notation;
    rules.strike_rule = rule;
    const ParsedPlane parsed = parse_plane(text, rules);
    EXPECT_TRUE(parsed.ok()) << text << ": " << parsed.problem;
    return parsed.plane;
  };
  for (const char* text : {"30/135", "30-135", "30 135", "30 / 135", "30 deg / 135 deg", "30°/135°",
                           "30–135", "30° 135°", "30.0/135.0"}) {
    expect_same(read(text, Notation::dip_direction), plane(30, 135), text);
  }
  for (const char* text : {"045/30", "45/30", "045-30", "45 30"}) {
    expect_same(read(text, Notation::strike_dip), plane(30, 135), text);
  }
  expect_same(read("045/30", Notation::strike_dip, StrikeRule::left), plane(30, 315), "left");
  expect_same(read("315/60", Notation::pole), plane(30, 135), "pole");
}

TEST(Notation, RefusesWhatIsNoOrientation) {
  const char* wrong[] = {
      "",           "-",          "NI",        "abc",           "30",        "30/",
      "/135",       "30/135/2",   "30//135",   "N45E",          "N45E 30",   "N45E 30NE",
      "N45E 30SW",  "045/30NE",   "045/30SW",  "045/30X",       "045/30SSE", "N95E 30SE",
      "N-5E 30SE",  "X45E 30SE",  "N45 30SE",  "N45E 95SE",     "N45E -5SE", "45E 30SE",
      "400/30SE",   "-10/30SE",   "045/91SE",  "315->",         "->60",      "315->95",
      "315->-5",    "400->60",    "315>60",    "N45E30SE?",     "NaN/120",   "nan",
      "inf/20SE",   "0x10/20SE",  "1e1/20SE",  "N30E",          "NE 30",     "30°135",
      "N45E,",      "045/30SE45", "45,5/30SE", "N45°61'E 30SE", "30/135",    "\xFF\xFE",
      "30\n/135SE",
  };
  for (const char* text : wrong) {
    const ParsedPlane parsed = parse_plane(text, {});
    EXPECT_FALSE(parsed.ok()) << text;
    EXPECT_NE(parsed.problem.find("accepted"), std::string::npos) << text << parsed.problem;
  }
}

TEST(Notation, ChecksTheRangesOfBarePairs) {
  TextRules rules;
  rules.notation = Notation::dip_direction;
  for (const char* text : {"91/135", "-1/135", "30/361", "30/-1", "120/45", "30/400"}) {
    EXPECT_FALSE(parse_plane(text, rules).ok()) << text;
  }
  EXPECT_NE(parse_plane("120/45", rules).problem.find("swapped"), std::string::npos);
  EXPECT_EQ(parse_plane("91/135", rules).problem.find("swapped"), std::string::npos);
  EXPECT_EQ(parse_plane("30/360", rules).plane, plane(30, 0));
  EXPECT_EQ(parse_plane("0/250", rules).plane, plane(0, 0));
  EXPECT_EQ(parse_plane("90/250", rules).plane, plane(90, 250));
  rules.greatest_dip = 180_deg;
  const ParsedPlane overturned = parse_plane("120/90", rules);
  EXPECT_TRUE(overturned.overturned);
  EXPECT_EQ(overturned.plane, plane(60, 270));
}

TEST(Notation, QuadrantLetterMayBeUpTo80DegreesOffWithADoubt) {
  // Strike 045 dips to 135 or 315; the letter's distance from the nearer grows by the strike.
  EXPECT_TRUE(plane_of_strike(45_deg, 30_deg, "E", {}).doubt.empty());
  EXPECT_TRUE(plane_of_strike(45_deg, 30_deg, "S", {}).doubt.empty());
  EXPECT_FALSE(plane_of_strike(44_deg, 30_deg, "S", {}).doubt.empty());
  EXPECT_TRUE(plane_of_strike(10.01_deg, 30_deg, "S", {}).ok());
  EXPECT_FALSE(plane_of_strike(10_deg, 30_deg, "S", {}).ok());
  EXPECT_FALSE(plane_of_strike(0_deg, 30_deg, "S", {}).ok());
  EXPECT_EQ(plane_of_strike(10.01_deg, 30_deg, "S", {}).plane.dip_direction.deg(), 100.01);
}

TEST(Notation, BareStrikeIsRefusedUnlessNoSideIsNeeded) {
  EXPECT_TRUE(plane_of_strike(45_deg, 30_deg, "", {}).bare_strike);
  EXPECT_EQ(plane_of_strike(45_deg, 90_deg, "", {}).plane, plane(90, 135));
  EXPECT_EQ(plane_of_strike(45_deg, 0_deg, "", {}).plane, plane(0, 0));
  EXPECT_EQ(plane_of_strike(45_deg, 30_deg, "", StrikeRule::left).plane, plane(30, 315));
  EXPECT_EQ(plane_of_strike(360_deg, 30_deg, "", StrikeRule::right).plane, plane(30, 90));
}

TEST(Notation, AnglesInOneCell) {
  const std::pair<const char*, double> right[] = {
      {"65", 65},
      {"65.5", 65.5},
      {"65°", 65},
      {"65 º", 65},
      {"65˚", 65},
      {"65 deg", 65},
      {"65 Degrees", 65},
      {"65°30'", 65.5},
      {"65° 30′", 65.5},
      {"65 30'", 65.5},
      {"\xE2\x88\x92"
       "5",
       -5},
      {"–5", -5},
      {"+65", 65},
      {"0065", 65},
      {".5", 0.5},
      {"65.", 65},
      {"\xC2\xA0"
       "65\xE2\x80\x89",
       65},
      {"1e1", 10},
  };
  for (const auto& [text, value] : right) {
    const ParsedAngle parsed = parse_angle(text, DecimalComma::no);
    ASSERT_TRUE(parsed.ok()) << text;
    EXPECT_EQ(parsed.value.deg(), value) << text;
  }
  for (const char* text : {"", "x", "65x", "6 5", "nan", "inf", "0x41", "1e400", "65°60'", "6.5.1",
                           "65,5", "--5", "+-5", "°", "'", "65''"}) {
    EXPECT_FALSE(parse_angle(text, DecimalComma::no).ok()) << text;
  }
  EXPECT_EQ(parse_angle("65,5", DecimalComma::yes).value.deg(), 65.5);
  EXPECT_EQ(parse_angle("65,5°", DecimalComma::yes).value.deg(), 65.5);
  EXPECT_FALSE(parse_angle("1.065,5", DecimalComma::yes).ok());
  EXPECT_FALSE(parse_angle("65,", DecimalComma::yes).ok());
  EXPECT_NE(parse_angle("65,5", DecimalComma::no).problem.find("decimal comma"), std::string::npos);
}

TEST(Notation, RangesOfDipAndAzimuth) {
  EXPECT_TRUE(parse_dip("90", DecimalComma::no, 90_deg).ok());
  EXPECT_FALSE(parse_dip("90.1", DecimalComma::no, 90_deg).ok());
  EXPECT_FALSE(parse_dip("-0.1", DecimalComma::no, 90_deg).ok());
  EXPECT_EQ(shortest(parse_dip("-0", DecimalComma::no, 90_deg).value.deg()), "0");
  EXPECT_FALSE(std::signbit(parse_dip("-0", DecimalComma::no, 90_deg).value.deg()));
  EXPECT_EQ(parse_azimuth("360", DecimalComma::no).value.deg(), 0.0);
  EXPECT_FALSE(std::signbit(parse_azimuth("-0.0", DecimalComma::no).value.deg()));
  EXPECT_FALSE(parse_azimuth("360.5", DecimalComma::no).ok());
  EXPECT_FALSE(parse_azimuth("-1", DecimalComma::no).ok());
}

TEST(Notation, MissingValuesAreKnown) {
  for (const char* text : {"", " ", "-", "–", "NI", "ni", "n/a", "NA", "NR", "nil"}) {
    EXPECT_TRUE(is_missing(text)) << text;
  }
  for (const char* text : {"0", "N", "NE", "no idea at all", "-1"}) EXPECT_FALSE(is_missing(text));
}

TEST(Notation, BarePairsTellWhichNumberCanBeADip) {
  EXPECT_EQ(bare_pair("45/30", DecimalComma::no), BarePair::either);
  EXPECT_EQ(bare_pair("45/130", DecimalComma::no), BarePair::dip_first);
  EXPECT_EQ(bare_pair("130/45", DecimalComma::no), BarePair::azimuth_first);
  EXPECT_EQ(bare_pair("045/30", DecimalComma::no), BarePair::azimuth_first);
  EXPECT_EQ(bare_pair("045/30SE", DecimalComma::no), BarePair::not_a_pair);
  EXPECT_EQ(bare_pair("N45E 30SE", DecimalComma::no), BarePair::not_a_pair);
  EXPECT_EQ(bare_pair("315->60", DecimalComma::no), BarePair::not_a_pair);
}

// Property: what print_plane() writes, parse_plane() reads as the same plane.
TEST(Notation, EveryNotationComesBack) {
  const Notation notations[] = {Notation::dip_direction, Notation::strike_dip,
                                Notation::strike_quadrant, Notation::quadrant_bearing,
                                Notation::pole};
  for (std::uint64_t i = 0; i < 600; ++i) {
    const bool whole = i % 2 == 0;
    const auto draw = [&](std::uint64_t stream, double range) {
      const double value = random_uniform(7, stream, i) * range;
      return whole ? std::floor(value) : std::round(value * 100.0) / 100.0;
    };
    const double dip = i < 20 ? (i < 10 ? 90.0 : 0.0) : draw(0, 91.0);
    const Plane given =
        plane(std::min(dip, 90.0), dip == 0.0 ? 0.0 : std::fmod(draw(1, 360.0), 360.0));
    for (const Notation notation : notations) {
      for (const StrikeRule rule : {StrikeRule::right, StrikeRule::left}) {
        TextRules rules;
        rules.notation = notation;
        rules.strike_rule = rule;
        const std::string text = print_plane(given, notation, rule);
        const ParsedPlane back = parse_plane(text, rules);
        ASSERT_TRUE(back.ok()) << text << ": " << back.problem;
        EXPECT_TRUE(back.doubt.empty()) << text;
        expect_same(back.plane, given, text);
      }
    }
  }
}

TEST(Notation, PrintsAsTheFieldWrites) {
  EXPECT_EQ(print_plane({30_deg, 135_deg}, Notation::dip_direction), "30/135");
  EXPECT_EQ(print_plane({30_deg, 135_deg}, Notation::strike_dip), "045/30");
  EXPECT_EQ(print_plane({30_deg, 135_deg}, Notation::strike_dip, StrikeRule::left), "225/30");
  EXPECT_EQ(print_plane({30_deg, 135_deg}, Notation::strike_quadrant), "045/30SE");
  EXPECT_EQ(print_plane({30_deg, 135_deg}, Notation::quadrant_bearing), "N45E 30SE");
  EXPECT_EQ(print_plane({30_deg, 135_deg}, Notation::pole), "315->60");
  EXPECT_EQ(print_plane({60_deg, 80_deg}, Notation::quadrant_bearing), "N10W 60E");
  EXPECT_EQ(print_plane({40_deg, 0_deg}, Notation::quadrant_bearing), "EW 40N");
  EXPECT_EQ(print_plane({5.5_deg, 7.25_deg}, Notation::dip_direction), "5.5/007.25");
}

TEST(Notation, NamesRoundTrip) {
  for (const char* name : {"dip/dip-direction", "strike/dip", "strike/dip/quadrant",
                           "quadrant-bearing", "pole", "core"}) {
    ASSERT_TRUE(notation_named(name)) << name;
    EXPECT_EQ(name_of(*notation_named(name)), name);
    EXPECT_NE(notation_names().find(name), std::string::npos);
  }
  EXPECT_FALSE(notation_named("dip"));
}

struct CommaNumbers : std::numpunct<char> {
  char do_decimal_point() const override { return ','; }
  char do_thousands_sep() const override { return '.'; }
  std::string do_grouping() const override { return "\3"; }
};

// Decimals are read and written by their own rules, not by those of the user's country. The C
// locale is changed too where one with a decimal comma is installed.
TEST(Notation, CommaLocaleChangesNothing) {
  const std::string before = std::setlocale(LC_ALL, nullptr);
  const std::locale previous =
      std::locale::global(std::locale(std::locale::classic(), new CommaNumbers));
  for (const char* name : {"de_DE.UTF-8", "fr_FR.UTF-8", "de_DE"}) {
    if (std::setlocale(LC_ALL, name) != nullptr) break;
  }
  EXPECT_EQ(parse_angle("1065.5", DecimalComma::no).value.deg(), 1065.5);
  EXPECT_EQ(print_plane({5.5_deg, 7.25_deg}, Notation::dip_direction), "5.5/007.25");
  std::locale::global(previous);
  std::setlocale(LC_ALL, before.c_str());
}

}  // namespace
}  // namespace brink
