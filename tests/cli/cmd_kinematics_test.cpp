#include <gtest/gtest.h>

#include <nlohmann/json.hpp>

#include "support/run_brink.hpp"

namespace brink {
namespace {

using testing::Outcome;
using testing::run_brink;
using Words = std::vector<std::string>;

// Two sets whose planes meet in lines that plunge out of a face towards 180, and one stray.
constexpr const char* kReadings =
    "dip,dip direction,set,line\n"
    "60,130,J1,A\n62,132,J1,A\n58,128,J1,B\n"
    "60,230,J2,A\n61,228,J2,B\n"
    "40,180,,B\n";

Outcome kinematics(const Words& more, const std::string& input = kReadings) {
  Words words{"kinematics", "-", "--face", "75/180", "--friction", "30"};
  words.insert(words.end(), more.begin(), more.end());
  return run_brink(words, input);
}

nlohmann::json document(Words more) {
  more.push_back("--json");
  const Outcome outcome = kinematics(more);
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  return nlohmann::json::parse(outcome.out);
}

bool has(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

TEST(CmdKinematics, JsonHasEveryKey) {
  const auto doc = document({"--set-column", "set"});
  EXPECT_EQ(doc["command"], "kinematics");
  EXPECT_EQ(doc["inputs"]["strike_tolerance_deg"], 20.0);
  EXPECT_EQ(doc["inputs"]["upper"]["dip_deg"], 0.0);
  EXPECT_EQ(doc["inputs"]["files"][0]["sha256"].get<std::string>().size(), 64U);
  const auto& face = doc["result"]["faces"].at(0);
  EXPECT_EQ(face["face"]["dip_deg"], 75.0);
  EXPECT_EQ(face["friction_deg"], 30.0);
  for (const char* mode :
       {"planar_sliding", "wedge_sliding", "flexural_toppling", "block_toppling"}) {
    for (const char* key :
         {"tested", "admissible", "share", "weighted_share", "share_low", "share_high", "by_set"}) {
      EXPECT_TRUE(face["modes"][mode].contains(key)) << mode << " " << key;
    }
  }
  EXPECT_TRUE(face["modes"]["wedge_sliding"].contains("unstable_dry"));
  EXPECT_TRUE(face["modes"]["wedge_sliding"].contains("parallel_pairs"));
  EXPECT_TRUE(face["modes"]["block_toppling"].contains("bases"));
  EXPECT_TRUE(face["modes"]["block_toppling"].contains("sliding_bases"));
}

TEST(CmdKinematics, CountsBySetAndPairOfSets) {
  const auto doc = document({"--set-column", "set"});
  const auto& modes = doc["result"]["faces"][0]["modes"];
  const auto& planar = modes["planar_sliding"];
  EXPECT_EQ(planar["tested"], 6);
  EXPECT_EQ(planar["admissible"], 1);
  ASSERT_EQ(planar["by_set"].size(), 3U);
  EXPECT_EQ(planar["by_set"][2]["set"], "none");
  EXPECT_EQ(planar["by_set"][2]["admissible"], 1);
  const auto& wedge = modes["wedge_sliding"];
  EXPECT_EQ(wedge["tested"], 15);
  EXPECT_EQ(wedge["by_set"][1]["sets"], (Words{"J1", "J2"}));
  EXPECT_EQ(wedge["by_set"][1]["tested"], 6);
  EXPECT_EQ(wedge["by_set"][1]["admissible"], 6);
}

TEST(CmdKinematics, TextNamesLeadingSetsAndCautions) {
  const Outcome outcome = kinematics({"--set-column", "set", "--face", "60/180", "--quiet"});
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  EXPECT_EQ(outcome.err, "");
  EXPECT_TRUE(has(outcome.out, "Face 75/180, friction 30 degrees"));
  EXPECT_TRUE(has(outcome.out, "Face 60/180, friction 30 degrees"));
  EXPECT_TRUE(has(outcome.out, "J1 + J2 6"));
  EXPECT_TRUE(has(outcome.out, "Kinematic tests are a screen."));
  EXPECT_FALSE(has(outcome.out, "by weight"));
}

TEST(CmdKinematics, WeightsStandBesideCountsOnceTraversesAreGiven) {
  const Words traverses{"--set-column",    "set",        "--traverse-column", "line", "--traverse",
                        "A=scanline@40/0", "--traverse", "B=borehole@0/90"};
  const auto doc = document(traverses);
  const auto& planar = doc["result"]["faces"][0]["modes"]["planar_sliding"];
  EXPECT_NE(planar["share"], planar["weighted_share"]);
  EXPECT_EQ(doc["inputs"]["traverses"][1]["plunge_deg"], 90.0);
  EXPECT_TRUE(has(kinematics(traverses).out, "by weight"));
  Words plain = traverses;
  plain.push_back("--unweighted");
  const auto unweighted = document(plain);
  const auto& same = unweighted["result"]["faces"][0]["modes"]["planar_sliding"];
  EXPECT_EQ(same["share"], same["weighted_share"]);
}

TEST(CmdKinematics, SameBytesForAnyNumberOfThreads) {
  const Outcome one = kinematics({"--no-sets", "--json", "--threads", "1"});
  EXPECT_EQ(one.out, kinematics({"--no-sets", "--json", "--threads", "7"}).out);
  EXPECT_NE(one.out, kinematics({"--no-sets", "--json", "--seed", "2"}).out);
}

TEST(CmdKinematics, RefusesWhatCannotBe) {
  EXPECT_EQ(kinematics({"--face", "0/180"}).status, 2);
  EXPECT_EQ(kinematics({"--face", "180/180"}).status, 2);
  EXPECT_EQ(kinematics({"--friction", "90"}).status, 2);
  EXPECT_EQ(kinematics({"--strike-tolerance", "-1"}).status, 2);
  EXPECT_EQ(kinematics({"--upper", "95/0"}).status, 2);
  EXPECT_EQ(kinematics({"--set-column", "families"}).status, 2);
  EXPECT_EQ(kinematics({"--set-column", "set", "--no-sets"}).status, 2);
  EXPECT_EQ(kinematics({"--traverse", "A=line@10/20"}).status, 2);
  EXPECT_EQ(run_brink({"kinematics", "-", "--friction", "30"}, kReadings).status, 2);
  EXPECT_EQ(kinematics({}, "dip,dip direction\n").status, 1);
  EXPECT_EQ(kinematics({}, "dip,dip direction\n120,10\n").status, 1);
}

TEST(CmdKinematics, WarnsWhereTheFaceHasNoCrest) {
  const Outcome outcome = kinematics({"--no-sets", "--face", "20/180", "--upper", "30/180"});
  EXPECT_EQ(outcome.status, 0);
  EXPECT_TRUE(has(outcome.err, "warning: face 20/180: the ground above it (30/180)"));
}

}  // namespace
}  // namespace brink
