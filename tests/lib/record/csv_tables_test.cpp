#include "brink/record/csv_tables.hpp"

#include <gtest/gtest.h>

#include <limits>
#include <stdexcept>

namespace brink {
namespace {

TEST(CsvTables, QuotesWhatWouldNotReadBack) {
  CsvTable table({"a", "b, c"});
  table.cell("say \"x\"").cell("two\nlines").end_row();
  table.cell(" edge").cell("#note").end_row();
  EXPECT_EQ(table.text(), "a,\"b, c\"\n\"say \"\"x\"\"\",\"two\nlines\"\n\" edge\",\"#note\"\n");
}

TEST(CsvTables, NumbersReadBackAndMissingOnesAreBlank) {
  CsvTable table({"a", "b", "c", "d"});
  table.cell(0.1).cell(std::optional<double>()).whole(12);
  table.cell(std::numeric_limits<double>::infinity()).end_row();
  EXPECT_EQ(table.text(), "a,b,c,d\n0.1,,12,infinite\n");
}

TEST(CsvTables, ARowOfTheWrongLengthIsADefect) {
  CsvTable table({"a", "b"});
  table.cell("only one");
  EXPECT_THROW(table.end_row(), std::logic_error);
}

}  // namespace
}  // namespace brink
