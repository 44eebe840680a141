#include "brink/design/alignment.hpp"

#include <gtest/gtest.h>

#include <string>
#include <string_view>

#include "brink/base/error.hpp"

namespace {

using namespace brink;

std::string refusal(std::string_view text) {
  try {
    parse_centreline(text, "line.csv");
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::input);
    return error.what();
  }
  return "accepted";
}

TEST(Centreline, CsvWithChainage) {
  const Centreline line =
      parse_centreline("chainage_m,easting_m,northing_m\n100,5000,7000\n200,5100,7000\n", "a.csv");
  ASSERT_EQ(line.points.size(), 2U);
  EXPECT_EQ(line.points[1].chainage_m, 200.0);
  EXPECT_EQ(line.points[1].line, 3U);
  EXPECT_TRUE(line.warnings.empty());
  EXPECT_FALSE(line.closed);
}

TEST(Centreline, ChainageIsMeasuredWhereThereIsNone) {
  const Centreline line = parse_centreline("x;y\n0;0\n30;40\n30;140\n", "a.csv");
  EXPECT_EQ(line.points[1].chainage_m, 50.0);
  EXPECT_EQ(line.points[2].chainage_m, 150.0);
}

TEST(Centreline, GeoJsonInAnyWrapper) {
  const std::string geometry =
      R"({"type":"LineString","coordinates":[[500000,4100000],[500100,4100000,12.5]]})";
  const std::string feature = R"({"type":"Feature","properties":{},"geometry":)" + geometry + "}";
  const std::string collection = R"({"type":"FeatureCollection","features":[)" + feature + "]}";
  for (const std::string& text : {geometry, feature, collection}) {
    const Centreline line = parse_centreline(text, "a.geojson");
    ASSERT_EQ(line.points.size(), 2U);
    EXPECT_EQ(line.points[1].chainage_m, 100.0);
  }
}

TEST(Centreline, GeographicCoordinatesAreRefused) {
  for (
      const std::string_view text :
      {"easting,northing\n-7.25,43.10\n-7.24,43.11\n", "lon,lat\n500000,4100000\n500100,4100000\n",
       R"({"type":"LineString","coordinates":[[-7.25,43.1],[-7.24,43.11]]})",
       R"({"type":"LineString","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:OGC:1.3:CRS84"}},"coordinates":[[500000,4100000],[500100,4100000]]})"}) {
    EXPECT_NE(refusal(text).find("project the coordinates first"), std::string::npos) << text;
  }
  // A local grid of the site is no pair of angles.
  EXPECT_EQ(parse_centreline("x,y\n0,0\n60,0\n", "a.csv").points.size(), 2U);
}

TEST(Centreline, RepeatedPointsAreLeftOutWithAWarning) {
  const Centreline line = parse_centreline("easting,northing\n0,0\n100,0\n100,0\n200,0\n", "a.csv");
  EXPECT_EQ(line.points.size(), 3U);
  ASSERT_EQ(line.warnings.size(), 1U);
  EXPECT_EQ(line.warnings[0], "a.csv: line 4 repeats the point before it and is left out");
}

TEST(Centreline, RefusesWhatHasNoDirection) {
  EXPECT_NE(refusal("easting,northing\n5000,7000\n").find("one point only"), std::string::npos);
  EXPECT_NE(refusal("easting,northing\n5000,7000\n5000,7000\n").find("one point only"),
            std::string::npos);
  EXPECT_NE(refusal("easting,northing\n").find("has no points"), std::string::npos);
  EXPECT_NE(refusal("easting,northing\n1,two\n").find("line.csv:2:2: northing: 'two'"),
            std::string::npos);
  EXPECT_NE(refusal("chainage,easting,northing\n10,0,0\n5,100,0\n").find("chainage does not grow"),
            std::string::npos);
  EXPECT_NE(refusal("{\"type\":").find("not valid JSON"), std::string::npos);
  EXPECT_NE(refusal(R"({"type":"Point","coordinates":[1,2]})").find("no lines"), std::string::npos);
}

TEST(Alignment, SegmentsEndWhereTheDirectionChanges) {
  // East, a kink of 5 degrees, then north.
  const Centreline line = parse_centreline(
      "easting,northing\n0,0\n100,0\n199.6195,8.7156\n199.6195,108.7156\n", "a.csv");
  const auto segments = divide_alignment(line, Angle::degrees(10.0));
  ASSERT_EQ(segments.size(), 2U);
  EXPECT_EQ(segments[0].last, 2U);
  EXPECT_NEAR(segments[0].bearing.deg(), 87.5, 1e-3);
  EXPECT_NEAR(segments[1].bearing.deg(), 0.0, 1e-9);
  EXPECT_EQ(divide_alignment(line, Angle::degrees(1.0)).size(), 3U);
}

TEST(Alignment, HairpinAndClosedLoop) {
  const Centreline hairpin =
      parse_centreline("easting,northing\n0,0\n100,0\n100,10\n0,10\n", "a.csv");
  const auto turns = divide_alignment(hairpin, Angle::degrees(45.0));
  ASSERT_EQ(turns.size(), 3U);
  EXPECT_NEAR(turns[0].bearing.deg(), 90.0, 1e-9);
  EXPECT_NEAR(turns[1].bearing.deg(), 0.0, 1e-9);
  EXPECT_NEAR(turns[2].bearing.deg(), 270.0, 1e-9);
  // Straight out and straight back on itself.
  const Centreline back = parse_centreline("easting,northing\n0,0\n100,0\n0,0\n", "a.csv");
  EXPECT_TRUE(back.closed);
  EXPECT_EQ(divide_alignment(back, Angle::degrees(45.0)).size(), 2U);
  const Centreline loop =
      parse_centreline("easting,northing\n0,0\n100,0\n100,100\n0,100\n0,0\n", "a.csv");
  EXPECT_TRUE(loop.closed);
  EXPECT_EQ(divide_alignment(loop, Angle::degrees(20.0)).size(), 4U);
}

TEST(Alignment, FacesLookAtTheRoadAndAnswersAreThoseOfTheAzimuth) {
  Readings readings;
  for (int i = 0; i < 40; ++i) {
    const Plane plane{Angle::degrees(30 + i), Angle::degrees((37 * i) % 360)};
    readings.planes.push_back(plane);
    readings.normals.push_back(upward_normal(plane));
    readings.weights.push_back(1.0);
  }
  SetsResult sets;
  sets.assignment.assign(40, 0);
  AlignmentOptions options;
  options.search.settings.friction = Angle::degrees(30.0);
  const Centreline north = parse_centreline("easting,northing\n0,0\n0,100\n", "a.csv");
  const AlignmentResult result = design_alignment(north, readings, sets, options);
  ASSERT_EQ(result.segments.size(), 1U);
  ASSERT_EQ(result.segments[0].cuts.size(), 2U);
  // A cut on the left of a road to the north looks east, one on the right looks west.
  EXPECT_EQ(result.segments[0].cuts[0].face.dip_direction.deg(), 90.0);
  EXPECT_EQ(result.segments[0].cuts[1].face.dip_direction.deg(), 270.0);
  SteepestOptions round = options.search;
  round.every = Angle::degrees(90.0);
  const SteepestResult compass = find_steepest(readings, sets, round);
  for (std::size_t i = 0; i < 2; ++i) {
    const SteepestFace& cut = result.segments[0].cuts[i].face;
    EXPECT_EQ(cut.steepest_dip.deg(), compass.azimuths[1 + 2 * i].steepest_dip.deg());
    EXPECT_EQ(cut.shares, compass.azimuths[1 + 2 * i].shares);
  }
  options.cut = CutSide::left;
  EXPECT_EQ(design_alignment(north, readings, sets, options).segments[0].cuts.size(), 1U);
}

}  // namespace
