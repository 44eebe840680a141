#include "brink/readings/filter.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"

namespace brink {
namespace {

bool passes_text(const char* filter, const char* cell, bool decimal_comma = false) {
  return passes(parse_filter(filter), cell, decimal_comma);
}

TEST(Filter, Values) {
  EXPECT_TRUE(passes_text("kind=joint,bedding", "bedding"));
  EXPECT_TRUE(passes_text("kind = joint , bedding", "joint"));
  EXPECT_FALSE(passes_text("kind=joint", "Joint"));
  EXPECT_FALSE(passes_text("kind=joint", ""));
  EXPECT_TRUE(passes_text("kind=joint,", ""));
  EXPECT_TRUE(passes_text("set=1", "1.0"));
  EXPECT_TRUE(passes_text("set=1,5", "5"));
  EXPECT_FALSE(passes_text("set=1", "1,0"));
  EXPECT_TRUE(passes_text("set=1", "1,0", true));
  EXPECT_TRUE(passes_text("note=a..b", "a..b"));
}

TEST(Filter, RangesAreInclusive) {
  EXPECT_TRUE(passes_text("length>=2", "2"));
  EXPECT_FALSE(passes_text("length>=2", "1.99"));
  EXPECT_FALSE(passes_text("length>=2", "long"));
  EXPECT_FALSE(passes_text("length>=2", ""));
  EXPECT_TRUE(passes_text("length<=2", "-7"));
  EXPECT_TRUE(passes_text("position=10..25", "10"));
  EXPECT_TRUE(passes_text("position=10..25", "25.0"));
  EXPECT_FALSE(passes_text("position=10..25", "25.1"));
  EXPECT_TRUE(passes_text("position=-5..-1", "-2"));
  EXPECT_TRUE(passes_text("length>=2", "2,5", true));
}

TEST(Filter, OtherTextsAreErrorsThatSayTheForms) {
  for (const char* text : {"", "kind", "=joint", " =joint", "length>2", "length<2", "length>=x",
                           "length>=nan", "position=25..10", "position=1..x", "length>"}) {
    try {
      parse_filter(text);
      ADD_FAILURE() << text;
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::argument);
      EXPECT_NE(error.accepted().find("COLUMN=VALUE"), std::string::npos);
    }
  }
}

}  // namespace
}  // namespace brink
