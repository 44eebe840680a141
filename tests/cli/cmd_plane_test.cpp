// brink plane as a user types it.
#include <gtest/gtest.h>

#include <nlohmann/json.hpp>

#include "support/run_brink.hpp"

namespace brink {
namespace {

using testing::Outcome;
using testing::run_brink;

std::vector<std::string> plane_with(const std::vector<std::string>& more) {
  std::vector<std::string> arguments{"plane",    "--plane", "35/150",        "--face", "60/150",
                                     "--height", "12",      "--unit-weight", "26"};
  arguments.insert(arguments.end(), more.begin(), more.end());
  return arguments;
}

nlohmann::json json_of(std::vector<std::string> more) {
  more.emplace_back("--json");
  const Outcome outcome = run_brink(plane_with(more));
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_EQ(outcome.out.find("nan"), std::string::npos);
  return nlohmann::json::parse(outcome.out);
}

// Wyllie & Mah, Rock Slope Engineering, 4th ed. 2004, example 6.1 (from memory).
TEST(PlaneCommand, PublishedExample) {
  const auto document = json_of(
      {"--friction", "37", "--cohesion", "25", "--crack-setback", "4", "--water-depth", "3"});
  EXPECT_EQ(document["command"], "plane");
  const auto& result = document["result"];
  EXPECT_EQ(result["forms"], true);
  EXPECT_TRUE(result["reason"].is_null());
  EXPECT_EQ(result["mode"], "slides");
  EXPECT_NEAR(result["weight_kN_m"].get<double>(), 1241.70, 0.05);
  EXPECT_NEAR(result["uplift_kN_m"].get<double>(), 196.31, 0.05);
  EXPECT_NEAR(result["crack_water_kN_m"].get<double>(), 44.15, 0.05);
  EXPECT_NEAR(result["crack_depth_m"].get<double>(), 4.35, 0.005);
  EXPECT_NEAR(result["factor_of_safety"].get<double>(), 1.25, 0.006);
  EXPECT_EQ(result["crack_setback_m"], 4.0);
  EXPECT_TRUE(result["bolt_for_target_kN_m"].is_null());
  EXPECT_EQ(document["inputs"]["water_unit_weight_kN_m3"], 9.81);
}

TEST(PlaneCommand, ABlockThatDoesNotFormIsAResult) {
  const auto result = json_of({"--friction", "30", "--crack-setback", "-8"})["result"];
  EXPECT_EQ(result["forms"], false);
  EXPECT_FALSE(result["reason"].get<std::string>().empty());
  for (const char* key : {"mode", "weight_kN_m", "sliding_length_m", "crack_depth_m", "normal_kN_m",
                          "driving_kN_m", "resisting_kN_m", "factor_of_safety", "strength_used"})
    EXPECT_TRUE(result[key].is_null()) << key;
}

TEST(PlaneCommand, NothingDrivesIsTheWordInfinite) {
  const Outcome outcome =
      run_brink({"plane", "--plane", "0/0", "--face", "60/150", "--upper", "10/330", "--height",
                 "10", "--unit-weight", "25", "--friction", "30", "--json"});
  EXPECT_EQ(nlohmann::json::parse(outcome.out)["result"]["factor_of_safety"], "infinite");
}

TEST(PlaneCommand, TargetAndBoltGoTogether) {
  const auto result = json_of({"--friction", "37", "--target", "1.5"})["result"];
  const double force = result["bolt_for_target_kN_m"];
  const double plunge = result["bolt_for_target"]["plunge_deg"];
  const auto held = json_of({"--friction", "37", "--bolt",
                             std::to_string(force) + "@330/" + std::to_string(plunge)})["result"];
  EXPECT_NEAR(held["factor_of_safety"].get<double>(), 1.5, 1e-6);
}

TEST(PlaneCommand, TextSaysWhatWasUsed) {
  const Outcome outcome = run_brink(plane_with(
      {"--residual-friction", "28", "--jrc", "8", "--jcs", "60000", "--joint-length", "15"}));
  EXPECT_EQ(outcome.status, 0);
  EXPECT_NE(outcome.out.find("strength used         cohesion"), std::string::npos) << outcome.out;
  EXPECT_NE(outcome.out.find("Factor of safety: "), std::string::npos);
  EXPECT_NE(outcome.out.find("Progressive failure"), std::string::npos);
  EXPECT_TRUE(outcome.err.empty()) << outcome.err;
}

struct BadLine {
  std::vector<std::string> more;
  std::string message;
};

TEST(PlaneCommand, BadInputIsNamed) {
  for (const BadLine& bad :
       {BadLine{
            {"--friction", "90"},
            "error: --friction: '90' is out of range; accepted: 0 or above and below 90 degrees\n"},
        {{"--friction", "30", "--cohesion", "-1"},
         "error: --cohesion: '-1' is out of range; accepted: 0 kPa or above\n"},
        {{"--friction", "nan"},
         "error: --friction: 'nan' is not a number; accepted: 0 or above and below 90 degrees\n"},
        {{},
         "error: --friction: is missing; accepted: --friction DEG, or the options of another "
         "strength law\n"},
        {{"--friction", "30", "--jrc", "8"},
         "error: --friction: does not belong to Barton-Bandis strength; accepted: the options of "
         "one law\n"},
        {{"--jrc", "8", "--jcs", "50000"},
         "error: --residual-friction: is missing for Barton-Bandis strength; accepted: "
         "--residual-friction\n"},
        {{"--friction", "30", "--roughness", "10"},
         "error: --transition: is missing for bilinear strength; accepted: --transition\n"},
        {{"--friction", "30", "--crack-setback", "2", "--crack", "critical"},
         "error: --crack: is given together with --crack-setback; accepted: one of the two\n"},
        {{"--friction", "30", "--crack", "worst"},
         "error: --crack: 'worst' is not a choice of crack; accepted: critical, or --crack-setback "
         "M\n"},
        {{"--friction", "30", "--crack-setback", "4", "--water-depth", "5"},
         "error: water depth: '5' is deeper than the crack; accepted: 0 to 4.348 m\n"},
        {{"--friction", "30", "--target", "0"},
         "error: --target: '0' is out of range; accepted: above 0\n"}}) {
    const Outcome outcome = run_brink(plane_with(bad.more));
    EXPECT_EQ(outcome.status, 2) << bad.message;
    EXPECT_EQ(outcome.err.substr(0, bad.message.size()), bad.message);
    EXPECT_TRUE(outcome.out.empty());
  }
  const Outcome flat = run_brink({"plane", "--plane", "35/150", "--face", "60/150", "--height", "0",
                                  "--unit-weight", "26", "--friction", "30"});
  EXPECT_EQ(flat.status, 2);
  EXPECT_NE(flat.err.find("--height: '0' is out of range; accepted: above 0 m"), std::string::npos);
}

}  // namespace
}  // namespace brink
