#include "brink/record/set_names.hpp"

#include <gtest/gtest.h>

namespace brink {
namespace {

SetsResult found(const std::vector<Plane>& means) {
  SetsResult sets;
  for (std::size_t i = 0; i < means.size(); ++i) {
    SetStatistics set;
    set.name = "J" + std::to_string(i + 1);
    set.mean = means[i];
    sets.sets.push_back(set);
  }
  return sets;
}

SiteSet known(const std::string& name, const Plane& near) {
  SiteSet set;
  set.name = name;
  set.near = near;
  set.line = 7;
  return set;
}

TEST(SetNames, FollowTheOrientationAndNotTheOrder) {
  SetsResult sets = found({{20_deg, 30_deg}, {60_deg, 200_deg}});
  SiteSets site;
  site.known = {known("J1", {58_deg, 195_deg}), known("bedding", {15_deg, 20_deg})};
  const auto matches = name_sets(sets, site);
  EXPECT_EQ(sets.sets[0].name, "bedding");
  EXPECT_EQ(sets.sets[1].name, "J1");
  EXPECT_EQ(matches[0], 1U);
  EXPECT_EQ(matches[1], 0U);
  EXPECT_TRUE(sets.warnings.empty());
}

TEST(SetNames, ASteepSetIsTheSameOnBothSidesOfTheRim) {
  SetsResult sets = found({{88_deg, 100_deg}});
  SiteSets site;
  site.known = {known("steep", {88_deg, 280_deg})};
  name_sets(sets, site);
  EXPECT_EQ(sets.sets[0].name, "steep");
}

TEST(SetNames, TheNearestPairComesFirst) {
  // Both known sets lie near the one found; the nearer has it, and the other is told.
  SetsResult sets = found({{60_deg, 200_deg}});
  SiteSets site;
  site.known = {known("A", {60_deg, 215_deg}), known("B", {60_deg, 205_deg})};
  const auto matches = name_sets(sets, site);
  EXPECT_EQ(matches[0], 1U);
  ASSERT_EQ(sets.warnings.size(), 1U);
  EXPECT_NE(sets.warnings[0].find("set 'A' of the site file (line 7)"), std::string::npos);
}

TEST(SetNames, UnmatchedSetsTakeFreeNumbers) {
  SetsResult sets = found({{20_deg, 30_deg}, {60_deg, 200_deg}, {80_deg, 100_deg}});
  SiteSets site;
  site.known = {known("J1", {80_deg, 100_deg})};
  name_sets(sets, site);
  EXPECT_EQ(sets.sets[0].name, "J2");
  EXPECT_EQ(sets.sets[1].name, "J3");
  EXPECT_EQ(sets.sets[2].name, "J1");
}

TEST(SetNames, FurtherThanTheLimitIsNoMatch) {
  SetsResult sets = found({{60_deg, 200_deg}});
  SiteSets site;
  site.known = {known("far", {60_deg, 240_deg})};
  EXPECT_FALSE(name_sets(sets, site)[0].has_value());
  EXPECT_EQ(sets.sets[0].name, "J1");
  EXPECT_EQ(sets.warnings.size(), 1U);
}

TEST(SetNames, AColumnNamesByItself) {
  SetsResult sets = found({{60_deg, 200_deg}, {20_deg, 30_deg}});
  sets.sets[0].name = "B";
  sets.sets[1].name = "A";
  SiteSets site;
  site.column = "set";
  site.known = {{"A", {}, {}, 3}, {"C", {}, {}, 9}};
  const auto matches = name_sets(sets, site);
  EXPECT_FALSE(matches[0].has_value());
  EXPECT_EQ(matches[1], 0U);
  EXPECT_EQ(sets.sets[0].name, "B");
  ASSERT_EQ(sets.warnings.size(), 1U);
  EXPECT_EQ(sets.warnings[0], "set 'C' of the site file (line 9) is not in column 'set'");
}

}  // namespace
}  // namespace brink
