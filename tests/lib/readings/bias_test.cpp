#include "brink/readings/bias.hpp"

#include <gtest/gtest.h>

#include <numeric>

#include "brink/base/error.hpp"

namespace {

using namespace brink;

Readings three_readings() {
  Readings readings;
  readings.files = {{"pit.csv", ""}};
  readings.extra.push_back({"Traverse", {}});
  const std::vector<std::pair<Plane, const char*>> rows = {
      {{90_deg, 0_deg}, "A"}, {{90_deg, 60_deg}, "A"}, {{90_deg, 85_deg}, "B"}};
  for (const auto& [plane, traverse] : rows) {
    readings.planes.push_back(plane);
    readings.normals.push_back(upward_normal(plane));
    readings.weights.push_back(1.0);
    readings.places.push_back({0, readings.size() + 1});
    readings.extra[0].cells.push_back(traverse);
  }
  return readings;
}

BiasOptions north_lines() {
  BiasOptions options;
  options.traverses = {parse_traverse("A=scanline@0/0", ""), parse_traverse("B=scanline@0/0", "")};
  return options;
}

TEST(Bias, WeightsByTraverseAndSumToTheNumberOfReadings) {
  Readings readings = three_readings();
  weigh_readings(readings, north_lines());
  EXPECT_NEAR(std::accumulate(readings.weights.begin(), readings.weights.end(), 0.0), 3.0, 1e-12);
  EXPECT_NEAR(readings.weights[1] / readings.weights[0], 2.0, 1e-12);
  // 5 degrees from the line: weighs as at 15, and is pointed out.
  EXPECT_NEAR(readings.weights[2] / readings.weights[0], 3.8637033051562732, 1e-12);
  ASSERT_EQ(readings.warnings.size(), 1U);
  EXPECT_EQ(readings.warnings[0],
            "pit.csv: line 4: in the blind zone of scanline B (0/0), less than 15 degrees from it; "
            "weighed as at 15 degrees");
}

TEST(Bias, KeepsTheUsersWeights) {
  Readings readings = three_readings();
  readings.weights = {2.0, 0.5, 0.5};
  weigh_readings(readings, north_lines());
  EXPECT_NEAR(readings.weights[1] / readings.weights[0], 0.5, 1e-12);
}

TEST(Bias, UnweightedMakesAllEqual) {
  Readings readings = three_readings();
  readings.weights = {2.0, 0.5, 0.5};
  BiasOptions options = north_lines();
  options.unweighted = true;
  weigh_readings(readings, options);
  EXPECT_EQ(readings.weights, (std::vector<double>{1.0, 1.0, 1.0}));
  EXPECT_TRUE(readings.warnings.empty());
}

TEST(Bias, ReadingsOfUnknownTraversesAreNamed) {
  Readings readings = three_readings();
  BiasOptions options = north_lines();
  options.traverses.pop_back();
  weigh_readings(readings, options);
  ASSERT_EQ(readings.warnings.size(), 1U);
  EXPECT_EQ(readings.warnings[0].substr(0, 34), "pit.csv: line 4: on no traverse th");
}

TEST(Bias, RefusesTraversesThatCannotBeTold) {
  Readings readings = three_readings();
  BiasOptions options = north_lines();
  options.column = "borehole";
  EXPECT_THROW(weigh_readings(readings, options), Error);
  options = north_lines();
  options.traverses[1].name = "A";
  EXPECT_THROW(weigh_readings(readings, options), Error);
  options.traverses[1].name = "";
  EXPECT_THROW(weigh_readings(readings, options), Error);
}

TEST(Bias, OneNamelessTraverseHoldsForAll) {
  Readings readings = three_readings();
  readings.extra.clear();
  BiasOptions options;
  options.traverses = {parse_traverse("scanline@0/0", "")};
  weigh_readings(readings, options);
  EXPECT_GT(readings.weights[2], readings.weights[0]);
}

TEST(Bias, EffectiveNumber) {
  EXPECT_EQ(effective_number(std::vector<double>{1.0, 1.0, 1.0, 1.0}), 4.0);
  EXPECT_NEAR(effective_number(std::vector<double>{3.0, 1.0}), 1.6, 1e-15);
  EXPECT_EQ(effective_number({}), 0.0);
}

TEST(Traverse, ReadsEveryKind) {
  const Traverse scanline = parse_traverse("SL1=scanline@062/2", "");
  EXPECT_EQ(scanline.name, "SL1");
  EXPECT_EQ(scanline.line, (Line{62_deg, 2_deg}));
  EXPECT_EQ(parse_traverse("BH=2=borehole@360/-85.5", "").name, "BH=2");
  EXPECT_EQ(parse_traverse("BH=2=borehole@360/-85.5", "").line, (Line{0_deg, -85.5_deg}));
  EXPECT_EQ(parse_traverse("window@80/215", "").window, (Plane{80_deg, 215_deg}));
}

TEST(Traverse, RefusesWhatIsNone) {
  for (const char* text :
       {"", "SL1", "scanline", "scanline@", "scanline@10", "line@10/10", "=scanline@10/10",
        "scanline@400/10", "scanline@10/95", "window@95/10", "scanline@x/1", "scanline@10/1/2"}) {
    EXPECT_THROW(parse_traverse(text, "--traverse"), Error) << text;
  }
}

TEST(Traverse, SineOfTheAngleAtWhichThePlaneIsMet) {
  const Traverse borehole = parse_traverse("borehole@0/90", "");
  EXPECT_NEAR(meeting_sine(borehole, normal(0_deg, 0_deg)), 1.0, 1e-15);
  EXPECT_NEAR(meeting_sine(borehole, normal(60_deg, 77_deg)), 0.5, 1e-15);
  EXPECT_NEAR(meeting_sine(borehole, -normal(60_deg, 77_deg)), 0.5, 1e-15);
  const Traverse window = parse_traverse("window@90/0", "");
  EXPECT_NEAR(meeting_sine(window, normal(90_deg, 0_deg)), 0.0, 1e-15);
  EXPECT_NEAR(meeting_sine(window, normal(90_deg, 90_deg)), 1.0, 1e-15);
  EXPECT_NEAR(meeting_sine(window, normal(60_deg, 0_deg)), 0.5, 1e-15);
}

TEST(Traverse, BlindZoneIsStrict) {
  const Traverse borehole = parse_traverse("borehole@0/90", "");
  EXPECT_FALSE(in_blind_zone(borehole, normal(75_deg, 10_deg), 15_deg));
  EXPECT_TRUE(in_blind_zone(borehole, normal(76_deg, 10_deg), 15_deg));
}

}  // namespace
