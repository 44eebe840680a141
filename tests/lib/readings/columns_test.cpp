#include "brink/readings/columns.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"
#include "brink/readings/csv.hpp"

namespace brink {
namespace {

Columns columns_of(std::string headings, std::optional<Notation> notation = {}) {
  headings += "\n";
  const CsvReader reader(headings, "t.csv");
  return understand_columns(reader.headings(), "t.csv", notation);
}

std::string error_of(const std::string& headings, std::optional<Notation> notation = {}) {
  try {
    columns_of(headings, notation);
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::input);
    return error.what();
  }
  return {};
}

TEST(Columns, SpellingsOfTheTrade) {
  for (const char* heading :
       {"dip_direction", "Dip Direction", "DIP-DIR", "dipdirection", "dd", "DD (deg)",
        "dip azimuth", "Dip_Direction [°]", "dip_direction_deg", "dip_dir (true, deg)"}) {
    EXPECT_EQ(meaning_of(heading), Meaning::dip_direction) << heading;
  }
  for (const char* heading : {"dip", "DIP", "Dip (°)", "dip °", "dip_deg", " dip ", "dip angle"}) {
    EXPECT_EQ(meaning_of(heading), Meaning::dip) << heading;
  }
  EXPECT_EQ(meaning_of("Dip Quadrant"), Meaning::quadrant);
  EXPECT_EQ(meaning_of("pole trend"), Meaning::pole_trend);
  EXPECT_EQ(meaning_of("Pole-Plunge (deg)"), Meaning::pole_plunge);
  EXPECT_EQ(meaning_of("hole trend"), Meaning::hole_trend);
  for (const char* heading : {"azimuth", "trend", "kind", "dipper", "d", "", "deg", "m"}) {
    EXPECT_FALSE(meaning_of(heading)) << heading;
  }
  EXPECT_EQ(heading_key("Trace Length (m)"), heading_key("trace_length"));
  EXPECT_EQ(heading_key("trace_length_m"), heading_key("trace_length"));
  EXPECT_EQ(heading_key("Type"), "kind");
  EXPECT_EQ(heading_key("distance"), "position");
}

TEST(Columns, HeadingsDecideTheLayout) {
  EXPECT_EQ(columns_of("dip,dd").layout, Layout::dip_direction);
  EXPECT_EQ(columns_of("strike,dip").layout, Layout::strike);
  EXPECT_EQ(columns_of("strike,dip,quadrant").layout, Layout::strike);
  EXPECT_EQ(columns_of("pole_trend,pole_plunge").layout, Layout::pole);
  EXPECT_EQ(columns_of("alpha,beta").layout, Layout::core);
  EXPECT_EQ(columns_of("orientation").layout, Layout::text);
  EXPECT_EQ(columns_of("strike_right_hand_rule_deg,dip_deg").strike_rule, StrikeRule::right);
  EXPECT_EQ(columns_of("strike (deg),dip").strike_rule, std::nullopt);
}

TEST(Columns, OtherColumnsTravelAlong) {
  const Columns columns = columns_of("id,dip,dd,,set,azimuth");
  EXPECT_EQ(columns.extra, (std::vector<std::size_t>{0, 4, 5}));
}

TEST(Columns, AmbiguousHeadingsAsk) {
  for (const char* headings :
       {"dip,azimuth", "trend,plunge", "azimuth", "dip,trend", "dip,bearing"}) {
    const std::string message = error_of(headings);
    EXPECT_NE(message.find("can mean several things"), std::string::npos) << headings << message;
    EXPECT_NE(message.find("t.csv:1:"), std::string::npos) << message;
  }
  EXPECT_EQ(columns_of("dip,azimuth", Notation::dip_direction).layout, Layout::dip_direction);
  EXPECT_EQ(columns_of("azimuth,dip", Notation::strike_dip).layout, Layout::strike);
  EXPECT_EQ(columns_of("trend,plunge", Notation::pole).layout, Layout::pole);
  EXPECT_NE(error_of("dip,azimuth", Notation::pole), "");
}

TEST(Columns, IncompleteAndRepeatedHeadingsAreErrors) {
  EXPECT_NE(error_of("dip,note").find("no dip direction"), std::string::npos);
  EXPECT_NE(error_of("dd,note").find("no dip"), std::string::npos);
  EXPECT_NE(error_of("strike,quadrant").find("no dip"), std::string::npos);
  EXPECT_NE(error_of("pole_trend").find("plunge"), std::string::npos);
  EXPECT_NE(error_of("x,y").find("accepted: dip with dip_direction"), std::string::npos);
  EXPECT_NE(error_of("65,120").find("where the headings are expected"), std::string::npos);
  EXPECT_NE(error_of("dip,dd,Dip").find("same as column 1"), std::string::npos);
  EXPECT_NE(error_of("dip,dd,dip_direction").find("same as column 2"), std::string::npos);
  EXPECT_NE(error_of("dip,dd,note,Note").find("same as column 3"), std::string::npos);
}

TEST(Columns, SaysWhichOrientationColumnsAreNotRead) {
  const Columns columns = columns_of("dip,dd,strike");
  ASSERT_EQ(columns.warnings.size(), 1U);
  EXPECT_NE(columns.warnings[0].find("not read: strike"), std::string::npos);
  EXPECT_TRUE(columns_of("dip,dd,kind").warnings.empty());
}

}  // namespace
}  // namespace brink
