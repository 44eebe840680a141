#include "brink/readings/readings.hpp"

#include <gtest/gtest.h>

#include <numeric>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"

namespace brink {
namespace {

Readings read(std::string_view bytes, const ReadingOptions& options = {}) {
  const InputBytes file{"t.csv", bytes};
  const Readings readings = read_readings({&file, 1}, options);
  EXPECT_EQ(readings.read, readings.size() + readings.rejected.size() + readings.filtered);
  EXPECT_EQ(readings.normals.size(), readings.size());
  EXPECT_EQ(readings.weights.size(), readings.size());
  EXPECT_EQ(readings.places.size(), readings.size());
  for (const ExtraColumn& column : readings.extra) EXPECT_EQ(column.cells.size(), readings.size());
  return readings;
}

std::string error_of(std::string_view bytes, const ReadingOptions& options = {}) {
  try {
    read(bytes, options);
  } catch (const Error& error) {
    return error.what();
  }
  return {};
}

Plane plane(double dip, double direction) {
  return {Angle::degrees(dip), Angle::degrees(direction)};
}

void expect_plane(const Plane& got, double dip, double direction) {
  EXPECT_NEAR(got.dip.deg(), dip, 1e-9);
  EXPECT_NEAR(azimuth_difference(got.dip_direction, Angle::degrees(direction)).deg(), 0.0, 1e-9);
}

TEST(Readings, GoodLinesGoOnAndBadOnesAreNamed) {
  const Readings r = read(
      "dip,dip_direction,kind\n"
      "65,120,joint\n"
      "120,45,joint\n"
      "-,45,joint\n"
      "45,400,bedding\n"
      "90,360,bedding\n"
      "0,,bedding\n"
      "0,250,bedding\n"
      "-0,-0,joint\n");
  EXPECT_EQ(r.planes, (std::vector<Plane>{plane(65, 120), plane(90, 0), {}, {}, {}}));
  EXPECT_EQ(r.read, 8U);
  ASSERT_EQ(r.rejected.size(), 3U);
  EXPECT_EQ(r.rejected[0].file, "t.csv");
  EXPECT_EQ(r.rejected[0].line, 3U);
  EXPECT_EQ(r.rejected[0].column, 1U);
  EXPECT_EQ(r.rejected[0].heading, "dip");
  EXPECT_EQ(r.rejected[0].value, "120");
  EXPECT_EQ(r.rejected[0].reason,
            "is above 90; accepted: 0 to 90 degrees (are dip and dip direction swapped?)");
  EXPECT_EQ(r.rejected[1].reason, "is missing; accepted: 0 to 90 degrees");
  EXPECT_EQ(r.rejected[2].reason, "is above 360; accepted: 0 to 360 degrees");
  EXPECT_EQ(r.rejected[2].column, 2U);
  EXPECT_EQ(r.places[1].line, 6U);
  ASSERT_NE(r.find_column("Type"), nullptr);
  EXPECT_EQ(r.find_column("Type")->cells[0], "joint");
  EXPECT_EQ(r.find_column("nothing"), nullptr);
  for (std::size_t i = 0; i < r.size(); ++i) {
    EXPECT_EQ(r.normals[i], upward_normal(r.planes[i]));
    EXPECT_FALSE(std::signbit(r.planes[i].dip_direction.deg()));
  }
}

TEST(Readings, StrikeNeedsItsSide) {
  const char* bare = "strike,dip\n045,30\n";
  const std::string message = error_of(bare);
  EXPECT_NE(message.find("t.csv:2:1: strike: '045'"), std::string::npos) << message;
  EXPECT_NE(message.find("--strike-rule right"), std::string::npos) << message;
  ReadingOptions options;
  options.strike_rule = StrikeRule::right;
  expect_plane(read(bare, options).planes[0], 30, 135);
  options.strike_rule = StrikeRule::left;
  expect_plane(read(bare, options).planes[0], 30, 315);
  expect_plane(read("strike_left,dip\n045,30\n").planes[0], 30, 315);
  EXPECT_NE(error_of("strike_right,dip\n045,30\n", options).find("contradicts"), std::string::npos);

  const Readings r = read(
      "strike,dip,quadrant\n"
      "045,30,SE\n225,30,SE\nN45E,30,nw\nN10W,60,E\n045,30,NE\n045,30,\n045,30,Q\n045,90,\n");
  EXPECT_EQ(r.planes, (std::vector<Plane>{plane(30, 135), plane(30, 135), plane(30, 315),
                                          plane(60, 80), plane(90, 135)}));
  ASSERT_EQ(r.rejected.size(), 3U);
  EXPECT_EQ(r.rejected[0].column, 3U);
  EXPECT_EQ(r.rejected[1].reason.substr(0, 10), "is missing");
  expect_plane(read("strike,dip\nN45E,30SE\n").planes[0], 30, 135);
}

TEST(Readings, QuadrantFarOffItsSideIsUsedWithAWarning) {
  const Readings r = read("strike,dip,quadrant\n020,30,S\n");
  ASSERT_EQ(r.size(), 1U);
  expect_plane(r.planes[0], 30, 110);
  ASSERT_EQ(r.warnings.size(), 1U);
  EXPECT_EQ(r.warnings[0].substr(0, 9), "t.csv:2: ");
}

TEST(Readings, PoleAndCoreColumns) {
  const Readings poles = read("pole_trend,pole_plunge\n315,60\n-,90\n10,95\n10,-5\n");
  EXPECT_EQ(poles.planes, (std::vector<Plane>{plane(30, 135), {}}));
  EXPECT_EQ(poles.rejected.size(), 2U);

  const Readings core = read(
      "alpha,beta,hole_trend,hole_plunge,reference_line\n"
      "40,70,0,60,top\n50,300,225,70,bottom\n90,,0,60,\n40,,0,60,\n40,70,,60,\n40,70,0,95,\n");
  ASSERT_EQ(core.size(), 3U);
  EXPECT_NEAR(core.planes[0].dip.deg(), 46.554, 5e-4);
  EXPECT_NEAR(core.planes[1].dip_direction.deg(), 0.375, 5e-4);
  expect_plane(core.planes[2], 30, 180);
  EXPECT_EQ(core.rejected.size(), 3U);

  ReadingOptions options;
  options.hole = Hole{{0_deg, 60_deg}, ReferenceLine::top};
  expect_plane(read("alpha,beta\n30,0\n", options).planes[0], 30, 0);
  const Readings without = read("alpha,beta\n30,0\n");
  ASSERT_EQ(without.rejected.size(), 1U);
  EXPECT_NE(without.rejected[0].reason.find("hole_trend"), std::string::npos);
}

TEST(Readings, TextColumnMixesNotationsThatNameThemselves) {
  const Readings r = read("orientation;id\nN45E 30SE;a\n045/30SE;b\n315->60;c\nN45E, 30,0SE;d\n");
  ASSERT_EQ(r.size(), 4U);
  for (const Plane& p : r.planes) expect_plane(p, 30, 135);
}

TEST(Readings, BarePairsInATextColumnNeedEvidenceOrANotation) {
  EXPECT_EQ(read("orientation\n45/30\n45/130\n").planes,
            (std::vector<Plane>{plane(45, 30), plane(45, 130)}));
  EXPECT_NE(error_of("orientation\n45/30\n50/60\n").find("may be dip/dip direction or strike/dip"),
            std::string::npos);
  EXPECT_NE(error_of("orientation\n45/130\n130/45\n").find("azimuth first"), std::string::npos);
  EXPECT_NE(error_of("orientation\n045/30\n").find("azimuth first"), std::string::npos);
  ReadingOptions options;
  options.notation = Notation::dip_direction;
  expect_plane(read("orientation\n45/30\n", options).planes[0], 45, 30);
  options.notation = Notation::pole;
  expect_plane(read("orientation\n315/60\n", options).planes[0], 30, 135);
  options.notation = Notation::strike_dip;
  EXPECT_NE(error_of("orientation\n045/30\n", options).find("--strike-rule"), std::string::npos);
  options.strike_rule = StrikeRule::right;
  expect_plane(read("orientation\n045/30\n", options).planes[0], 30, 135);
}

TEST(Readings, DeclinationIsAddedOnceToEveryAzimuth) {
  ReadingOptions options;
  options.declination = 10_deg;
  expect_plane(read("dip,dd\n30,355\n", options).planes[0], 30, 5);
  expect_plane(read("pole_trend,pole_plunge\n315,60\n", options).planes[0], 30, 145);
  expect_plane(read("strike,dip,quadrant\n45,30,SE\n", options).planes[0], 30, 145);
  expect_plane(read("orientation\nN45E 30SE\n", options).planes[0], 30, 145);
  expect_plane(read("alpha,beta,hole_trend,hole_plunge\n30,0,0,60\n", options).planes[0], 30, 10);
  EXPECT_EQ(read("dip,dd\n0,0\n", options).planes[0], Plane{});
  const Readings rows = read("dip,dd,declination\n30,100,-2\n30,100,\n30,100,x\n", options);
  ASSERT_EQ(rows.size(), 2U);
  expect_plane(rows.planes[0], 30, 98);
  expect_plane(rows.planes[1], 30, 110);
}

TEST(Readings, OverturnedBedsOnlyWhereStated) {
  const char* bytes = "dip,dd,id\n30,90,a\n120,90,b\n181,90,c\n";
  EXPECT_EQ(read(bytes).size(), 1U);
  ReadingOptions options;
  options.overturned = true;
  const Readings r = read(bytes, options);
  EXPECT_EQ(r.planes, (std::vector<Plane>{plane(30, 90), plane(60, 270)}));
  ASSERT_NE(r.find_column("overturned"), nullptr);
  EXPECT_EQ(r.find_column("overturned")->cells[0], "");
  EXPECT_EQ(r.find_column("overturned")->cells[1], "yes");
}

TEST(Readings, DecimalCommasWhereTheyCanBeTold) {
  EXPECT_EQ(read("dip;dd\n65,5;120,25\n66.5;121\n").planes,
            (std::vector<Plane>{plane(65.5, 120.25), plane(66.5, 121)}));
  const Readings r = read("dip,dd\n65,5,120\n\"65,5\",120\n");
  ASSERT_EQ(r.rejected.size(), 2U);
  EXPECT_NE(r.rejected[0].reason.find("has 3 fields (a decimal comma?)"), std::string::npos);
  EXPECT_NE(r.rejected[1].reason.find("decimal comma"), std::string::npos);
}

TEST(Readings, FiltersCountWhatTheyLeaveOut) {
  const char* bytes =
      "dip,dd,kind,length\n65,120,joint,2\n66,121,fault,x\nbad,1,fault,3\n67,122,joint,4\n";
  ReadingOptions options;
  options.only = {parse_filter("Type=joint")};
  EXPECT_EQ(read(bytes, options).size(), 2U);
  EXPECT_EQ(read(bytes, options).filtered, 2U);
  EXPECT_TRUE(read(bytes, options).rejected.empty());
  options.only.push_back(parse_filter("length>=3"));
  EXPECT_EQ(read(bytes, options).planes, (std::vector<Plane>{plane(67, 122)}));
  options.only = {parse_filter("colour=red")};
  EXPECT_NE(error_of(bytes, options).find("not there"), std::string::npos);
}

TEST(Readings, WeightsAreScaledToTheNumberOfReadings) {
  const Readings r =
      read("dip,dd,weight,count\n30,90,1,1\n30,90,2,3\n30,90,0,1\n30,90,,1\n30,90,x,1\n");
  ASSERT_EQ(r.size(), 2U);
  EXPECT_NEAR(r.weights[0], 2.0 / 7.0, 1e-15);
  EXPECT_NEAR(r.weights[1], 12.0 / 7.0, 1e-15);
  EXPECT_EQ(r.rejected.size(), 3U);
  EXPECT_EQ(read("dip,dd\n30,90\n30,90\n").weights, (std::vector<double>{1.0, 1.0}));
}

TEST(Readings, FilesJoinTheirColumnsByHeading) {
  const InputBytes files[] = {
      {"a.csv", "dip,dd,kind\n30,90,joint\n"},
      {"b.csv", "Type;length;dip_direction;dip\nfault;2;100;40\n;;100;41\n"}};
  const Readings r = read_readings(files, {});
  ASSERT_EQ(r.size(), 3U);
  ASSERT_EQ(r.extra.size(), 2U);
  EXPECT_EQ(r.find_column("kind")->cells[1], "fault");
  EXPECT_EQ(r.find_column("length")->cells[0], "");
  EXPECT_EQ(r.find_column("length")->cells[1], "2");
  EXPECT_EQ(r.places[2].file, 1U);
  EXPECT_EQ(r.places[2].line, 3U);
  EXPECT_EQ(r.files[0].sha256.size(), 64U);
}

TEST(Readings, EmptyAndHeaderOnlyFiles) {
  EXPECT_NE(error_of("").find("empty"), std::string::npos);
  EXPECT_EQ(read("dip,dd\n").read, 0U);
  EXPECT_EQ(read("dip,dd\n").size(), 0U);
}

TEST(Readings, TableOfGarbageStopsBeforeItFillsTheMemory) {
  std::string bytes = "dip,dd\n";
  for (int i = 0; i < 120'000; ++i) bytes += "x,y\n";
  EXPECT_NE(error_of(bytes).find("more than 100000 lines"), std::string::npos);
}

// The tables for whole tenths of a degree give the same bits as the trigonometry.
TEST(Readings, ManyReadingsHaveTheNormalsOfFew) {
  std::string bytes = "dip,dd\n";
  std::vector<Plane> expected;
  for (std::uint64_t i = 0; i < 5000; ++i) {
    const double scale = i % 3 == 0 ? 1.0 : i % 3 == 1 ? 10.0 : 100.0;
    const double dip = std::floor(random_uniform(1, 0, i) * 90.0 * scale) / scale;
    const double azimuth = std::floor(random_uniform(1, 1, i) * 360.0 * scale) / scale;
    expected.push_back(plane(dip, dip == 0.0 ? 0.0 : azimuth));
    bytes +=
        print_degrees(Angle::degrees(dip)) + "," + print_degrees(Angle::degrees(azimuth)) + "\n";
  }
  const Readings r = read(bytes);
  ASSERT_EQ(r.planes, expected);
  for (std::size_t i = 0; i < r.size(); ++i) {
    ASSERT_EQ(r.normals[i], upward_normal(r.planes[i])) << i;
  }
}

// Property: random bytes are read, rejected or refused with a message, never worse.
TEST(Readings, RandomBytes) {
  const std::string_view headings[] = {"dip,dd,note\n", "orientation\n", "strike,dip,quadrant\n",
                                       "alpha;beta;hole_trend;hole_plunge\n", ""};
  constexpr std::string_view kAlphabet = "0123456789.,;/->NESWnesw°'\"\t \n\n#\xB0\xFF";
  for (std::uint64_t seed = 0; seed < 600; ++seed) {
    std::string bytes(headings[seed % std::size(headings)]);
    for (std::uint64_t i = 0; i < 300; ++i) {
      bytes += seed < 300 ? kAlphabet[random_index(seed, 1, i, kAlphabet.size())]
                          : static_cast<char>(random_index(seed, 2, i, 256));
    }
    try {
      read(bytes);
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::input) << error.what();
    }
  }
}

}  // namespace
}  // namespace brink
