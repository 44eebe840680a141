#include "text_table.hpp"

#include <gtest/gtest.h>

namespace brink::cli {
namespace {

TEST(TextTable, DisplayWidthCountsColumnsNotBytes) {
  EXPECT_EQ(display_width("abc"), 3U);
  EXPECT_EQ(display_width("Äspö"), 4U);
  EXPECT_EQ(display_width("e\xCC\x81"), 1U);  // combining acute
  EXPECT_EQ(display_width("岩盤"), 4U);       // wide
  EXPECT_EQ(display_width("a\xFF\xC3"), 3U);  // broken UTF-8
}

TEST(TextTable, AlignsByWidthWithoutTrailingBlanks) {
  TextTable table({{"set", Align::left}, {"dip,\ndeg"}, {"note", Align::left}});
  table.add_row({"J1", "65.0", "岩 x"});
  table.add_row({"Älvö", "7.5"});
  EXPECT_EQ(table.text(),
            "set   dip,  note\n"
            "       deg\n"
            "----  ----  ----\n"
            "J1    65.0  岩 x\n"
            "Älvö   7.5\n");
}

TEST(TextTable, ControlBytesAreShown) {
  TextTable table({{"set", Align::left}});
  table.add_row({"a\x1B[2J"});
  EXPECT_EQ(table.text(), "set\n--------\na\\x1B[2J\n");
}

TEST(TextTable, WrapsAtSpaces) {
  EXPECT_EQ(wrap("one two three", 7), (std::vector<std::string>{"one two", "three"}));
  EXPECT_EQ(wrap("a\nunbreakable b", 5), (std::vector<std::string>{"a", "unbreakable", "b"}));
  EXPECT_EQ(paragraph("one two", 6, 2), "  one\n  two\n");
}

}  // namespace
}  // namespace brink::cli
