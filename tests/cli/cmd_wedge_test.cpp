#include <gtest/gtest.h>

#include <nlohmann/json.hpp>

#include "support/run_brink.hpp"

namespace brink {
namespace {

using testing::Outcome;
using testing::run_brink;
using Words = std::vector<std::string>;

// A wedge that forms, with `more` behind its options.
Outcome wedge(const Words& more, const Words& size = {"--height", "30"}) {
  Words words{"wedge",  "--plane1", "45/105",        "--plane2", "70/235",
              "--face", "65/185",   "--unit-weight", "26"};
  words.insert(words.end(), size.begin(), size.end());
  words.insert(words.end(), more.begin(), more.end());
  return run_brink(words);
}

nlohmann::json document(Words more) {
  more.push_back("--json");
  const Outcome outcome = wedge(more);
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  return nlohmann::json::parse(outcome.out);
}

bool has(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

TEST(CmdWedge, TellsModeFactorAndCautions) {
  const Outcome outcome = wedge({"--friction", "30", "--cohesion", "20"});
  EXPECT_EQ(outcome.status, 0);
  EXPECT_EQ(outcome.err, "");
  EXPECT_TRUE(has(outcome.out, "slides along the line of intersection, on both planes"));
  EXPECT_TRUE(has(outcome.out, "Factor of safety: "));
  EXPECT_TRUE(has(outcome.out, "Water: none (dry)."));
  EXPECT_TRUE(has(outcome.out, "Factors of safety are for one rigid block"));
}

TEST(CmdWedge, JsonHasEveryKey) {
  const auto doc = document({"--friction1", "20", "--friction2", "30", "--cohesion", "25",
                             "--crack", "70/165", "--crack-distance", "12", "--water-fill", "0.5",
                             "--bolt", "100@10/5", "--load", "50@185/-20"});
  EXPECT_EQ(doc["command"], "wedge");
  EXPECT_EQ(doc["inputs"]["loads"][0]["plunge_deg"], -20.0);
  EXPECT_EQ(doc["inputs"]["water"]["fill"], 0.5);
  EXPECT_EQ(doc["inputs"]["water_unit_weight_kN_m3"], 9.81);
  const auto& r = doc["result"];
  for (const char* key :
       {"forms", "reason", "line", "volume_m3", "weight_kN", "areas_m2", "mode", "normal_kN",
        "water_kN", "driving_kN", "resisting_kN", "factor_of_safety"}) {
    EXPECT_TRUE(r.contains(key)) << key;
  }
  EXPECT_EQ(r["mode"], "both");
  EXPECT_TRUE(r["reason"].is_null());
  EXPECT_GT(r["areas_m2"]["crack"].get<double>(), 0.0);
  EXPECT_NEAR(r["factor_of_safety"].get<double>(),
              r["resisting_kN"].get<double>() / r["driving_kN"].get<double>(), 1e-12);
}

TEST(CmdWedge, WedgeThatDoesNotFormIsAResult) {
  const Outcome outcome =
      run_brink({"wedge", "--plane1", "45/105", "--plane2", "45/105", "--face", "65/185",
                 "--unit-weight", "26", "--height", "10", "--friction", "30", "--json"});
  EXPECT_EQ(outcome.status, 0);
  const auto doc = nlohmann::json::parse(outcome.out);
  EXPECT_FALSE(doc["result"]["forms"].get<bool>());
  EXPECT_EQ(doc["result"]["reason"], "the planes are parallel: they meet in no line");
  EXPECT_TRUE(doc["result"]["factor_of_safety"].is_null());
}

TEST(CmdWedge, CrackThatMissesIsAWarning) {
  const Outcome outcome =
      wedge({"--friction", "30", "--crack", "90/185", "--crack-distance", "500", "--json"});
  EXPECT_EQ(outcome.status, 0);
  EXPECT_TRUE(has(outcome.err, "warning: the tension crack, 500 m behind the crest"));
  const auto doc = nlohmann::json::parse(outcome.out);
  EXPECT_EQ(doc["warnings"].size(), 1U);
  EXPECT_EQ(doc["result"]["areas_m2"]["crack"], 0.0);
}

TEST(CmdWedge, NothingDrivesIsInfinite) {
  const auto doc = nlohmann::json::parse(
      run_brink({"wedge", "--plane1", "40/090", "--plane2", "40/270", "--face", "70/180", "--upper",
                 "10/000", "--unit-weight", "26", "--height", "10", "--friction", "30", "--json"})
          .out);
  EXPECT_EQ(doc["result"]["factor_of_safety"], "infinite");
}

TEST(CmdWedge, TargetGivesForceAndDirection) {
  const auto doc = document({"--friction", "25", "--target", "1.5", "--bolt-plunge", "-5..20",
                             "--bolt-direction", "000/10"});
  const auto& r = doc["result"];
  EXPECT_GT(r["bolt_for_target_kN"].get<double>(), 0.0);
  EXPECT_EQ(r["bolt_for_target"]["action"], "active");
  EXPECT_GE(r["bolt_for_target"]["plunge_deg"].get<double>(), -5.0 - 1e-9);
  EXPECT_LE(r["bolt_for_target"]["plunge_deg"].get<double>(), 20.0 + 1e-9);
  EXPECT_GE(r["bolt_in_direction_kN"].get<double>(), r["bolt_for_target_kN"].get<double>());
  EXPECT_EQ(doc["inputs"]["target"]["least_plunge_deg"], -5.0);
  const Outcome text = wedge({"--friction", "25", "--target", "1.5"});
  EXPECT_TRUE(has(text.out, "Least active bolt force for a factor of safety of 1.5: "));
  EXPECT_TRUE(document({"--friction", "25"})["result"]["bolt_for_target_kN"].is_null());
}

TEST(CmdWedge, EverySize) {
  for (const Words& size : std::vector<Words>{{"--height-on-plane1", "9"},
                                              {"--volume", "80"},
                                              {"--trace-length1", "8"},
                                              {"--trace-length2", "8"},
                                              {"--persistence1", "12"},
                                              {"--persistence2", "12"},
                                              {"--height", "20", "--persistence2", "5"}}) {
    const Outcome outcome = wedge({"--friction", "30", "--surcharge", "10"}, size);
    EXPECT_EQ(outcome.status, 0) << outcome.err;
  }
  EXPECT_EQ(wedge({"--friction", "30", "--volume", "5"}).status, 2);
}

TEST(CmdWedge, VaryAndSolve) {
  const auto r =
      document({"--friction", "30", "--cohesion", "15", "--target", "1.6", "--vary",
                "friction=20..40:5", "--vary", "water-fill=0..1", "--solve", "height"})["result"];
  const auto& curves = r["sensitivity"]["curves"];
  ASSERT_EQ(curves.size(), 2U);
  EXPECT_EQ(curves[0]["points"].size(), 5U);
  EXPECT_EQ(curves[1]["points"].size(), 21U);
  EXPECT_EQ(curves[1]["unit"], "");
  EXPECT_EQ(r["sensitivity"]["ranked"].size(), 2U);
  ASSERT_EQ(r["solve"]["values"].size(), 1U);
  const std::string height = r["solve"]["values"][0]["value"].dump();
  const auto back = nlohmann::json::parse(
      wedge({"--friction", "30", "--cohesion", "15", "--json"}, {"--height", height}).out);
  EXPECT_NEAR(back["result"]["factor_of_safety"].get<double>(), 1.6, 1e-9);
  const Outcome none = wedge({"--friction", "30", "--target", "90", "--solve", "water-fill"});
  EXPECT_TRUE(has(none.out, "No water-fill from 0 to 1 brings the factor of safety to 90."));
}

TEST(CmdWedge, DrawsAreTheSameForAnyThreads) {
  const Words draws{"--friction",   "normal(30,3)", "--cohesion",  "uniform(0,40)",
                    "--fisher-k1",  "80",           "--fisher-k2", "60",
                    "--water-fill", "uniform(0,1)", "--draws",     "20000",
                    "--target",     "1.3",          "--json",      "--threads"};
  Words one = draws, seven = draws;
  one.push_back("1");
  seven.push_back("7");
  const Outcome first = wedge(one);
  ASSERT_EQ(first.status, 0) << first.err;
  EXPECT_EQ(first.out, wedge(seven).out);
  const auto r = nlohmann::json::parse(first.out)["result"]["simulation"];
  EXPECT_EQ(r["draws"], 20000);
  EXPECT_NEAR(r["fails"]["value"].get<double>(),
              r["forms"]["value"].get<double>() * r["below_one"]["value"].get<double>(), 1e-12);
  EXPECT_GT(r["below_target"]["value"].get<double>(), r["below_one"]["value"].get<double>());
  EXPECT_EQ(nlohmann::json::parse(first.out)["inputs"]["simulation"]["friction1_deg"],
            "normal(30, 3)");
}

struct BadLine {
  Words more;
  std::string names;
};

TEST(CmdWedge, RefusesContradictionsAndGaps) {
  const std::vector<BadLine> lines{
      {{}, "--friction1: is missing"},
      {{"--friction1", "30"}, "--friction2: is missing"},
      {{"--friction", "30", "--friction1", "20"}, "--friction1: is given together with --friction"},
      {{"--friction", "30", "--cohesion", "5", "--cohesion2", "5"}, "--cohesion2"},
      {{"--friction", "90"}, "--friction"},
      {{"--friction", "30", "--cohesion", "-1"}, "--cohesion"},
      {{"--friction", "30", "--height-on-plane1", "20"}, "--height-on-plane1"},
      {{"--friction", "30", "--crack", "70/165"}, "--crack"},
      {{"--friction", "30", "--crack-distance", "3"}, "--crack-distance"},
      {{"--friction", "30", "--water-fill", "1.5"}, "--water-fill"},
      {{"--friction", "30", "--water-fill", "1", "--water-pressure1", "9"}, "--water-fill"},
      {{"--friction", "30", "--seismic-trend", "10"}, "--seismic-trend"},
      {{"--friction", "30", "--bolt", "10@20"}, "--bolt"},
      {{"--friction", "30", "--bolt-plunge", "0..10"}, "--bolt-plunge"},
      {{"--friction", "30", "--target", "1.5", "--bolt-plunge", "20..10"}, "--bolt-plunge"},
      {{"--friction", "30", "--target", "0"}, "--target"},
      {{"--friction", "30", "--vary", "friction"}, "--vary"},
      {{"--friction", "30", "--vary", "frictoin=2..3"}, "--vary"},
      {{"--friction", "30", "--vary", "friction=-2..3"}, "--vary"},
      {{"--friction", "30", "--vary", "friction=2..3:1"}, "--vary"},
      {{"--friction", "30", "--vary", "bolt-force=2..3"}, "bolt-force"},
      {{"--friction", "30", "--solve", "friction"}, "--solve"},
      {{"--friction", "30", "-o", "x.csv"}, "--output"},
      {{"--friction", "normal(30,3)"}, "--friction: is a distribution"},
      {{"--friction", "normal(30,3", "--draws", "10"}, "--friction"},
      {{"--friction", "30", "--cohesion", "normal(5,5)", "--draws", "10"}, "too small"},
      {{"--friction", "30", "--fisher-k1", "50"}, "--fisher-k1"},
      {{"--friction", "30", "--draws", "0"}, "--draws"},
      {{"--friction", "30", "--draws", "10", "--correlation", "2"}, "--correlation"},
      {{"--friction", "30", "--load", "-10@20/30"}, "--load"},
      {{"--friction", "30", "--bolt-action", "fixed"}, "--bolt-action"},
  };
  for (const BadLine& line : lines) {
    const Outcome outcome = wedge(line.more);
    EXPECT_EQ(outcome.status, 2) << line.names;
    EXPECT_EQ(outcome.out, "") << line.names;
    EXPECT_TRUE(has(outcome.err, line.names)) << outcome.err;
  }
  EXPECT_EQ(wedge({"--friction", "30"}, {}).status, 2);
  EXPECT_EQ(wedge({"--friction", "30"}, {"--height", "0"}).status, 2);
  EXPECT_EQ(run_brink({"wedge", "--plane1", "45/105", "--plane2", "70/235", "--face", "0/185",
                       "--unit-weight", "26", "--height", "3", "--friction", "30"})
                .status,
            2);
}

TEST(CmdWedge, VerticalLineNeedsASeismicTrend) {
  const Words base{"wedge",   "--plane1",
                   "90/045",  "--plane2",
                   "90/315",  "--face",
                   "100/180", "--height",
                   "10",      "--unit-weight",
                   "26",      "--friction",
                   "30",      "--seismic-horizontal",
                   "0.1"};
  const Outcome without = run_brink(base);
  EXPECT_EQ(without.status, 2);
  EXPECT_TRUE(has(without.err, "line of intersection is vertical"));
  Words with = base;
  with.insert(with.end(), {"--seismic-trend", "180"});
  EXPECT_EQ(run_brink(with).status, 0);
}

}  // namespace
}  // namespace brink
