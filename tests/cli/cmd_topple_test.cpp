// brink topple as a user types it.
#include <gtest/gtest.h>

#include <nlohmann/json.hpp>

#include "support/run_brink.hpp"

namespace brink {
namespace {

using testing::Outcome;
using testing::run_brink;

// Goodman & Bray 1976 (from memory; see tests/published).
constexpr auto kTable =
    "number,height_m\n1,4\n2,8\n3,12\n4,16\n5,20\n6,24\n7,28\n8,32\n9,36\n10,40\n11,34\n12,28\n13,"
    "22\n"
    "14,16\n15,10\n16,4\n";

std::vector<std::string> table_with(const std::vector<std::string>& more) {
  std::vector<std::string> arguments{"topple", "--blocks",      "-",  "--width", "10", "--base-dip",
                                     "30",     "--crest",       "10", "--a1",    "5",  "--a2",
                                     "5",      "--unit-weight", "25"};
  arguments.insert(arguments.end(), more.begin(), more.end());
  return arguments;
}

TEST(ToppleCommand, PublishedTable) {
  const Outcome outcome = run_brink(table_with({"--friction", "38.1500", "--json"}), kTable);
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_EQ(outcome.out.find("nan"), std::string::npos);
  const auto document = nlohmann::json::parse(outcome.out);
  const auto& result = document["result"];
  ASSERT_EQ(result["blocks"].size(), 16U);
  EXPECT_EQ(result["blocks"][0]["number"], 1);
  EXPECT_EQ(result["blocks"][15]["mode"], "stable");
  EXPECT_EQ(result["blocks"][6]["mode"], "topples");
  EXPECT_EQ(result["blocks"][2]["mode"], "slides");
  EXPECT_NEAR(result["blocks"][6]["force_on_next_kN_m"].get<double>(), 4837.0, 1.0);
  EXPECT_NEAR(result["friction_for_balance_deg"].get<double>(), 38.15, 0.01);
  EXPECT_NEAR(result["factor_of_safety"].get<double>(), 1.0, 0.001);
  EXPECT_EQ(document["inputs"]["blocks_file"]["sha256"].get<std::string>().size(), 64U);
}

TEST(ToppleCommand, BoltOnTheToe) {
  const Outcome outcome =
      run_brink(table_with({"--friction", "33.0238675557965", "--json"}), kTable);  // tan 0.65
  EXPECT_NEAR(nlohmann::json::parse(outcome.out)["result"]["bolt_for_balance_kN_m"].get<double>(),
              2013.0, 1.0);
}

TEST(ToppleCommand, BlocksFromTheGeometry) {
  const Outcome outcome = run_brink(
      {"topple", "--face-dip", "56.6", "--height", "92.5", "--upper-dip", "4", "--base-dip", "30",
       "--width", "10", "--step", "1", "--unit-weight", "25", "--friction", "38.15", "--json"});
  ASSERT_EQ(outcome.status, 0) << outcome.err;
  const auto document = nlohmann::json::parse(outcome.out);
  EXPECT_EQ(document["result"]["blocks"].size(), 16U);
  EXPECT_EQ(document["inputs"]["columns"]["crest"], 10);
}

TEST(ToppleCommand, TextListsBlocksFromTheTop) {
  const Outcome outcome = run_brink(table_with({"--friction", "36"}), kTable);
  EXPECT_EQ(outcome.status, 0);
  EXPECT_LT(outcome.out.find("   16 "), outcome.out.find("    1 "));
  EXPECT_NE(outcome.out.find("The toe does not stand"), std::string::npos);
}

TEST(ToppleCommand, FortyFiveDegreesAndMoreLockTheColumns) {
  for (const char* friction : {"45", "60", "89.9"}) {
    const Outcome outcome = run_brink(table_with({"--friction", friction, "--json"}), kTable);
    EXPECT_EQ(outcome.status, 0);
    const auto document = nlohmann::json::parse(outcome.out);
    for (const auto& block : document["result"]["blocks"]) {
      EXPECT_NE(block["mode"], "slides");
      EXPECT_TRUE(block["force_to_stop_sliding_kN_m"].is_null());
    }
  }
}

struct BadLine {
  std::vector<std::string> more;
  std::string message;
};

TEST(ToppleCommand, BadInputIsNamed) {
  for (const BadLine& bad :
       {BadLine{
            {"--friction", "90"},
            "error: --friction: '90' is out of range; accepted: 0 or above and below 90 degrees\n"},
        {{"--friction", "30", "--height", "10"},
         "error: --height: is given together with --blocks; accepted: blocks given or made from "
         "the geometry\n"},
        {{"--friction", "30", "--water", "3:4"},
         "error: --water: '3:4' does not begin with the number of a block; accepted: "
         "BLOCK=BEHIND/FRONT in m, "
         "as in 3=4.5/2\n"},
        {{"--friction", "30", "--load", "3=100"},
         "error: --load: '3=100' is not a force with its plunge; accepted: BLOCK=KN_M@PLUNGE or "
         "BLOCK=KN_M@PLUNGE@HEIGHT, as in 1=500@10@2\n"},
        {{"--friction", "30", "--bolt", "17=100@10"},
         "error: bolt: '17' is on a block that does not exist; accepted: block 1 to 16\n"},
        {{"--friction", "30", "--water", "3=4/2", "--water-fill", "0.5"},
         "error: water: is given twice, as a fill of every joint and block by block; accepted: one "
         "of the "
         "two\n"}}) {
    const Outcome outcome = run_brink(table_with(bad.more), kTable);
    EXPECT_EQ(outcome.status, 2) << bad.message;
    EXPECT_EQ(outcome.err.substr(0, bad.message.size()), bad.message);
  }
  const Outcome gap = run_brink(table_with({"--friction", "30"}), "number,height_m\n1,4\n3,5\n");
  EXPECT_EQ(gap.status, 1);
  const Outcome missing = run_brink({"topple", "--blocks", "/nowhere/blocks.csv", "--width", "1",
                                     "--base-dip", "30", "--crest", "1", "--a1", "1", "--a2", "1",
                                     "--unit-weight", "25", "--friction", "30"});
  EXPECT_EQ(missing.status, 3);
}

}  // namespace
}  // namespace brink
