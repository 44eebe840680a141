#include "brink/record/site.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"
#include "support/temporary_folder.hpp"

namespace brink {
namespace {

constexpr auto kSmall = R"([[readings]]
file = "readings.csv"
[[face]]
dip_deg = 70
dip_direction_deg = 145
)";

constexpr auto kFull = R"(title = "Älvö cut"
[[readings]]
file = "a.csv"
notation = "strike/dip"
strike_rule = "left"
declination_deg = -3.5
only = ["bench=2", "trace_length>=1"]
[[readings]]
file = "/data/b.csv"
[[traverse]]
name = "SL1"
kind = "scanline"
trend_deg = 118
plunge_deg = -1
[[traverse]]
name = "W"
kind = "window"
dip_deg = 80
dip_direction_deg = 215
[bias]
traverse_column = "line"
blind_angle_deg = 10
[sets]
count = 3
[[set]]
name = "bedding"
dip_deg = 24
dip_direction_deg = 360
friction_deg = 28
cohesion_kPa = 5
[[face]]
name = "west"
dip_deg = 110
dip_direction_deg = 145.5
height_m = 12
upper_dip_deg = 5
upper_dip_direction_deg = 140
[strength]
friction_deg = 34
[rock]
unit_weight_kN_m3 = 26
[water]
fill = 0.5
unit_weight_kN_m3 = 10
[seismic]
horizontal = 0.1
vertical = -0.02
trend_deg = 90
[kinematics]
friction_deg = 30
strike_tolerance_deg = 25
[target]
factor_of_safety = 1.3
)";

TEST(Site, ReadsEveryKey) {
  const Site site = parse_site(kFull, "pit/site.toml");
  EXPECT_EQ(site.title, "Älvö cut");
  ASSERT_EQ(site.readings.size(), 2U);
  EXPECT_EQ(site.readings[0].file, "pit/a.csv");
  EXPECT_EQ(site.readings[0].options.notation, Notation::strike_dip);
  EXPECT_EQ(site.readings[0].options.strike_rule, StrikeRule::left);
  EXPECT_EQ(site.readings[0].options.declination, Angle::degrees(-3.5));
  EXPECT_EQ(site.readings[0].options.only.size(), 2U);
  EXPECT_EQ(site.readings[1].file, "/data/b.csv");
  ASSERT_EQ(site.bias.traverses.size(), 2U);
  EXPECT_EQ(site.bias.traverses[0].line, (Line{118_deg, -1_deg}));
  EXPECT_EQ(site.bias.traverses[1].window, (Plane{80_deg, 215_deg}));
  EXPECT_EQ(site.bias.column, "line");
  EXPECT_EQ(site.bias.blind_angle, 10_deg);
  EXPECT_EQ(site.sets.count, 3U);
  ASSERT_EQ(site.sets.known.size(), 1U);
  EXPECT_EQ(site.sets.known[0].near, (Plane{24_deg, 0_deg}));
  EXPECT_EQ(site.sets.known[0].strength->friction, 28_deg);
  EXPECT_EQ(site.sets.known[0].strength->cohesion_kPa, 5.0);
  EXPECT_EQ(site.faces[0].face, (Face{110_deg, 145.5_deg}));
  EXPECT_EQ(site.faces[0].height_m, 12.0);
  EXPECT_EQ(site.faces[0].upper, (Plane{5_deg, 140_deg}));
  EXPECT_EQ(site.strength->friction, 34_deg);
  EXPECT_EQ(site.unit_weight_kN_m3, 26.0);
  EXPECT_EQ(site.water.fill, 0.5);
  EXPECT_EQ(site.seismic.vertical, -0.02);
  EXPECT_EQ(site.seismic.trend, 90_deg);
  EXPECT_EQ(kinematic_friction(site), 30_deg);
  EXPECT_EQ(site.kinematics.strike_tolerance, 25_deg);
  EXPECT_EQ(site.kinematics.toppling_tolerance, 30_deg);
  EXPECT_EQ(site.target_factor_of_safety, 1.3);
}

TEST(Site, DefaultsOfTheSmallestFile) {
  const Site site = parse_site(kSmall, "site.toml");
  EXPECT_EQ(site.title, "site");
  EXPECT_EQ(site.readings[0].file, "readings.csv");
  EXPECT_EQ(site.faces[0].name, "face 1");
  EXPECT_EQ(site.faces[0].upper, kLevelGround);
  EXPECT_FALSE(kinematic_friction(site).has_value());
  EXPECT_EQ(site.water.unit_weight_kN_m3, 9.81);
}

// Appends `more` to the smallest file and returns the message.
std::string refusal(const std::string& more) {
  try {
    parse_site(kSmall + more, "s.toml");
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::input);
    return error.what();
  }
  return "no error";
}

TEST(Site, RefusalsNameLineColumnKeyValueAndWhatIsAccepted) {
  EXPECT_EQ(refusal("hieght_m = 12\n"),
            "s.toml:6:1: 'hieght_m' is not a key of [face] (did you mean 'height_m'?); accepted: "
            "name, dip_deg, dip_direction_deg, height_m, upper_dip_deg, upper_dip_direction_deg");
  EXPECT_EQ(refusal("height_m = \"12\"\n"),
            "s.toml:6:12: face.height_m: '12' is not a number; accepted: above 0 m");
  EXPECT_EQ(refusal("height_m = 0\n"),
            "s.toml:6:12: face.height_m: '0' is out of range; accepted: above 0 m");
  EXPECT_NE(refusal("[[readings]]\nfile = \"b.csv\"\nonly = [\"bench\"]\n")
                .find("s.toml:8:8: readings.only: 'bench' is not a filter; accepted: COLUMN=VALUE"),
            std::string::npos);
  EXPECT_EQ(refusal("height_m = nan\n"),
            "s.toml:6:12: face.height_m: 'nan' is not a number; accepted: above 0 m");
  EXPECT_EQ(refusal("name = 2024-01-01\n"),
            "s.toml:6:8: face.name: '2024-01-01' is not a text; accepted: a text in quotes");
  EXPECT_EQ(refusal("upper_dip_deg = 5\n"),
            "s.toml:3: face.upper_dip_direction_deg: is missing; accepted: 0 to 360 degrees");
  EXPECT_EQ(refusal("[wather]\nfill = 1\n"),
            "s.toml:6:2: 'wather' is not a key of the site file (did you mean 'water'?); accepted: "
            "title, readings, traverse, bias, sets, set, face, strength, rock, water, seismic, "
            "kinematics, target");
  EXPECT_EQ(refusal("[water]\nfill = 1.5\n"),
            "s.toml:7:8: water.fill: '1.5' is out of range; accepted: 0 to 1");
  EXPECT_EQ(refusal("[sets]\ncount = 2.5\n"),
            "s.toml:7:9: sets.count: '2.5' is not a whole number; accepted: a whole number, 1 to "
            "99");
  EXPECT_EQ(refusal("[[set]]\nname = \"J1\"\n"),
            "s.toml:6: set.dip_deg: is missing; accepted: 0 to 90 degrees");
  EXPECT_EQ(refusal("[[traverse]]\nkind = \"line\"\n"),
            "s.toml:7:8: traverse.kind: 'line' is not a kind of traverse; accepted: scanline, "
            "borehole, window");
  EXPECT_EQ(refusal("[strength]\ncohesion_kPa = 4\n"),
            "s.toml:6: strength.friction_deg: is missing; accepted: 0 or above and below 90 "
            "degrees");
  EXPECT_EQ(
      refusal("[[readings]]\nfile = \"b.csv\"\nnotation = \"dip\"\n"),
      "s.toml:8:12: readings.notation: 'dip' is not a notation; accepted: " + notation_names());
}

TEST(Site, ThingsThatAreNotTomlNameTheirPlace) {
  EXPECT_EQ(refusal("[water\n").find("s.toml:6:7: this is not TOML: "), 0U) << refusal("[water\n");
  EXPECT_NE(refusal("[water]\nfill = 1\nfill = 2\n").find("s.toml:8:"), std::string::npos);
  EXPECT_NE(refusal("\xFF\xFE").find("this is not TOML"), std::string::npos);
}

TEST(Site, NeedsReadingsAndAFace) {
  try {
    parse_site("", "s.toml");
    FAIL();
  } catch (const Error& error) {
    EXPECT_STREQ(error.what(), "s.toml: readings: is missing; accepted: [[readings]] with a file");
  }
}

TEST(Site, AFileThatCannotBeReadIsAFileError) {
  const testing::TemporaryFolder folder;
  for (const std::string& path : {folder.path().string(), folder.file("none.toml")}) {
    try {
      read_site(path);
      FAIL() << path;
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::file);
      EXPECT_NE(std::string(error.what()).find(path + ": cannot be read: "), std::string::npos);
    }
  }
}

}  // namespace
}  // namespace brink
