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

TEST(CsvTables, ReadingsKeepTheirColumnsAndGainTheirSet) {
  Readings readings;
  readings.planes = {{65_deg, 120_deg}, {20_deg, 30.5_deg}};
  readings.weights = {1.0, 1.0};
  readings.places = {{0, 2}, {0, 4}};
  readings.files = {{"a.csv", ""}};
  readings.extra.resize(2);
  readings.extra[0].heading = "kind";
  readings.extra[1].heading = "weight";
  for (const char* cell : {"joint", "bedding"}) readings.extra[0].cells.push_back(cell);
  for (const char* cell : {"5", "6"}) readings.extra[1].cells.push_back(cell);
  SetsResult sets;
  sets.sets.resize(1);
  sets.sets[0].name = "J1";
  sets.assignment = {0, 1};
  EXPECT_EQ(assigned_readings_csv(readings, sets),
            "file,line,dip_deg,dip_direction_deg,weight,set_number,set_name,kind,weight_read\n"
            "a.csv,2,65,120,1,0,,joint,5\n"
            "a.csv,4,20,30.5,1,1,J1,bedding,6\n");
}

}  // namespace
}  // namespace brink
