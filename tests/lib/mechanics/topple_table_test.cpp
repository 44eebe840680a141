#include "brink/mechanics/topple_table.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"

namespace brink {
namespace {

TEST(ToppleTable, ReadsHeightsInAnyOrder) {
  const ToppleTable table = read_topple_table("height_m,number\n3,2\n2.5,1\n", "slope.csv");
  EXPECT_EQ(table.heights_m, (std::vector<double>{2.5, 3.0}));
  EXPECT_TRUE(table.water.empty());
}

TEST(ToppleTable, ReadsWaterLoadsAndBolts) {
  const ToppleTable table = read_topple_table(
      "number,height_m,water_behind_m,water_front_m,load_kN_m,load_plunge_deg,bolt_kN_m,"
      "bolt_plunge_deg\n"
      "1,4,,,,,120,10\n"
      "2,5,2.5,1,50,90,,\n",
      "slope.csv");
  ASSERT_EQ(table.water.size(), 1U);
  EXPECT_EQ(table.water[0].block, 2U);
  EXPECT_EQ(table.water[0].upper_m, 2.5);
  EXPECT_EQ(table.water[0].lower_m, 1.0);
  ASSERT_EQ(table.loads.size(), 1U);
  EXPECT_EQ(table.loads[0].block, 2U);
  EXPECT_EQ(table.loads[0].plunge, 90_deg);
  ASSERT_EQ(table.bolts.size(), 1U);
  EXPECT_EQ(table.bolts[0].force_kN_m, 120.0);
}

std::string refusal(std::string_view text) {
  try {
    read_topple_table(text, "slope.csv");
  } catch (const Error& e) {
    EXPECT_EQ(e.kind(), ErrorKind::input);
    return e.what();
  }
  return "accepted";
}

TEST(ToppleTable, RefusesWhatIsNoSlope) {
  EXPECT_EQ(
      refusal("number,width\n1,2\n"),
      "slope.csv:1: there is no column 'height_m'; accepted: the columns number and height_m");
  EXPECT_EQ(refusal("number,height_m\n"), "slope.csv: there is no block; accepted: at least 1 row");
  EXPECT_EQ(refusal("number,height_m\n1,4\n3,5\n"),
            "slope.csv: block 2 is missing; accepted: blocks numbered from 1 without a gap");
  EXPECT_EQ(refusal("number,height_m\n1,4\n1,5\n"),
            "slope.csv:3:1: number: '1' stands in the table twice; accepted: each block once");
  EXPECT_EQ(refusal("number,height_m\n1,tall\n"),
            "slope.csv:2:2: height_m: 'tall' is not a number; accepted: above 0 m");
  EXPECT_EQ(refusal("number,height_m\n1,-4\n"),
            "slope.csv:2:2: height_m: '-4' is out of range; accepted: above 0 m");
  EXPECT_EQ(refusal("number,height_m\n1.5,4\n"),
            "slope.csv:2:1: number: '1.5' is not the number of a block; accepted: a whole number, "
            "1 to 10000");
  EXPECT_EQ(
      refusal("number,height_m,load_kN_m\n1,4,3\n"),
      "slope.csv:1: one of two columns that belong together is missing; accepted: load_kN_m with "
      "load_plunge_deg");
  EXPECT_EQ(refusal("number,height_m,water_behind_m\n1,4,5\n"),
            "slope.csv:2:3: water_behind_m: '5' is out of range; accepted: 0 to 4 m");
}

}  // namespace
}  // namespace brink
