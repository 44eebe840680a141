#include <gtest/gtest.h>

#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>

#include "support/run_brink.hpp"

namespace brink {
namespace {

using testing::Outcome;
using testing::run_brink;

std::string file(const std::string& name) {
  std::ifstream in(BRINK_TEST_DIR "/published/data/" + name);
  std::ostringstream text;
  text << in.rdbuf();
  return text.str();
}

nlohmann::json document(const Outcome& outcome) {
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  return nlohmann::json::parse(outcome.out);
}

bool has(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

TEST(CmdSets, TableForPeople) {
  const Outcome outcome = run_brink({"sets", "-"}, file("three_sets_120.csv"));
  EXPECT_EQ(outcome.status, 0);
  EXPECT_EQ(outcome.err, "");
  EXPECT_TRUE(has(outcome.out, "J3")) << outcome.out;
  EXPECT_FALSE(has(outcome.out, "J4"));
  EXPECT_TRUE(has(outcome.out, "(N-1)/(N-R)"));
  EXPECT_TRUE(has(outcome.out, "of 120 readings belong to no set"));
  EXPECT_TRUE(has(outcome.out, "3 sets chosen by the Bayesian criterion"));
}

TEST(CmdSets, JsonHasEveryKey) {
  const auto doc = document(
      run_brink({"sets", "-", "--json", "--containment", "95"}, file("three_sets_120.csv")));
  EXPECT_EQ(doc["command"], "sets");
  EXPECT_TRUE(doc["inputs"]["count"].is_null());
  const auto& result = doc["result"];
  ASSERT_EQ(result["sets"].size(), 3U);
  for (const char* key : {"name", "count", "weight", "mean", "resultant_length", "fisher_k",
                          "confidence_cone_deg", "variability_cone_deg", "eigenvalues",
                          "woodcock_shape", "woodcock_strength", "fisher_fit"}) {
    EXPECT_TRUE(result["sets"][0].contains(key)) << key;
  }
  EXPECT_EQ(result["sets"][0]["containment"][0]["share"], 0.95);
  EXPECT_EQ(result["assignment"].size(), 120U);
  EXPECT_TRUE(result["log_likelihood"].is_number());
  EXPECT_TRUE(result["bic"].is_number());
}

TEST(CmdSets, ByColumn) {
  const auto doc = document(
      run_brink({"sets", "-", "--json", "--set-column", "true_set"}, file("three_sets_120.csv")));
  const auto& result = doc["result"];
  ASSERT_EQ(result["sets"].size(), 3U);
  EXPECT_TRUE(result["bic"].is_null());
  for (const auto& set : result["sets"]) {
    if (set["name"] != "1") continue;
    EXPECT_NEAR(set["resultant_length"].get<double>(), 35.66015450, 1e-8);
  }
}

TEST(CmdSets, WritesReadingsWithTheirSets) {
  const Outcome outcome = run_brink({"sets", "-", "-o", "-", "--count", "2"},
                                    "dip,dip_direction\n30,40\n32,41\n31,39\n"
                                    "33,42\n29,40\n80,200\n81,201\n79,199\n"
                                    "80,202\n78,200\n");
  EXPECT_EQ(outcome.status, 0);
  EXPECT_TRUE(has(outcome.out, "set")) << outcome.out;
  EXPECT_TRUE(has(outcome.out, "J1"));
  EXPECT_TRUE(has(outcome.out, "J2"));
}

TEST(CmdSets, WrongCountIsRefused) {
  EXPECT_EQ(run_brink({"sets", "-", "--count", "two"}).status, 2);
  EXPECT_EQ(run_brink({"sets", "-", "--count", "31"}).status, 2);
  const Outcome both =
      run_brink({"sets", "-", "--count", "2", "--set-column", "s"}, "dip,dip_direction,s\n1,2,A\n");
  EXPECT_EQ(both.status, 2);
  EXPECT_TRUE(has(both.err, "--set-column"));
}

TEST(CmdSets, FileWithoutUsableReading) {
  EXPECT_EQ(run_brink({"sets", "-"}, "dip,dip_direction\n").status, 1);
}

}  // namespace
}  // namespace brink
