#include "brink/readings/csv.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"

namespace brink {
namespace {

struct ReadTable {
  std::vector<std::string> headings;
  std::vector<std::vector<std::string>> rows;
  std::vector<std::size_t> lines;
  std::vector<std::string> problems;  // "line:column problem"
  std::vector<std::string> warnings;
};

ReadTable read_all(std::string_view bytes) {
  const Text text(bytes, "t.csv");
  CsvReader reader(text.view(), "t.csv");
  ReadTable table;
  table.headings.assign(reader.headings().cells.begin(), reader.headings().cells.end());
  Row row;
  while (reader.next(row)) {
    if (!row.problem.empty()) {
      table.problems.push_back(std::to_string(row.line) + ":" + std::to_string(row.problem_column) +
                               " " + row.problem);
      continue;
    }
    table.rows.emplace_back(row.cells.begin(), row.cells.end());
    table.lines.push_back(row.line);
  }
  table.warnings = text.warnings();
  table.warnings.insert(table.warnings.end(), reader.warnings().begin(), reader.warnings().end());
  return table;
}

using Rows = std::vector<std::vector<std::string>>;

TEST(Csv, FindsTheSeparator) {
  for (const char separator : {',', ';', '\t'}) {
    const std::string s(1, separator);
    const ReadTable table = read_all("dip" + s + "dd" + s + "note\n65" + s + "120" + s + "x\n");
    EXPECT_EQ(table.rows, (Rows{{"65", "120", "x"}}));
  }
  EXPECT_EQ(read_all("dip (deg, true);dd [a,b]\n65;120\n").rows, (Rows{{"65", "120"}}));
  EXPECT_EQ(read_all("\"a,b,c\";dd\n65;120\n").rows, (Rows{{"65", "120"}}));
  EXPECT_EQ(read_all("orientation\nN45E, 30SE\n").rows, (Rows{{"N45E, 30SE"}}));
}

TEST(Csv, LineEndsBlankLinesAndComments) {
  const ReadTable table = read_all(
      "\xEF\xBB\xBF# made by hand\r\n\r\n dip , dd \r\n65,120\r\n\n  \n# x\n  # y\n66,121");
  EXPECT_EQ(table.headings, (std::vector<std::string>{"dip", "dd"}));
  EXPECT_EQ(table.rows, (Rows{{"65", "120"}, {"66", "121"}}));
  EXPECT_EQ(table.lines, (std::vector<std::size_t>{4, 9}));
  EXPECT_EQ(read_all("dip,dd\r65,120\r66,121\r").rows, (Rows{{"65", "120"}, {"66", "121"}}));
}

TEST(Csv, QuotedCells) {
  const ReadTable table = read_all(
      "dip,dd,note\n"
      "\"65\",120,\"a, \"\"b\"\"\"\n"
      "66, \"121\" ,\"two\nlines\"\n"
      "67,122,\"\"\n"
      "68,123,5\" gap\n");
  EXPECT_EQ(table.rows, (Rows{{"65", "120", "a, \"b\""},
                              {"66", "121", "two\nlines"},
                              {"67", "122", ""},
                              {"68", "123", "5\" gap"}}));
  EXPECT_EQ(table.lines, (std::vector<std::size_t>{2, 3, 5, 6}));
  EXPECT_TRUE(table.warnings.empty());
}

TEST(Csv, UnclosedQuoteRejectsOnlyTheLineThatOpensIt) {
  const ReadTable to_end = read_all("dip,dd,note\n65,120,\"tight\n66,121,x\n67,122,y\n");
  ASSERT_EQ(to_end.problems.size(), 1U);
  EXPECT_EQ(to_end.problems[0].substr(0, 4), "2:3 ");
  EXPECT_EQ(to_end.rows, (Rows{{"66", "121", "x"}, {"67", "122", "y"}}));

  // The next quote opens another cell: it doesn't close the first.
  const ReadTable crossing = read_all("dip,dd,note\n65,120,\"tight\n66,121,\"x\"\n67,122,y\n");
  ASSERT_EQ(crossing.problems.size(), 1U);
  EXPECT_EQ(crossing.problems[0].substr(0, 4), "2:3 ");
  EXPECT_EQ(crossing.rows, (Rows{{"66", "121", "x"}, {"67", "122", "y"}}));

  const ReadTable trailing = read_all("dip,dd,note\n65,120,\"tight\" joint\n66,121,x\n");
  ASSERT_EQ(trailing.problems.size(), 1U);
  EXPECT_NE(trailing.problems[0].find("text after a closing quote"), std::string::npos);
  EXPECT_EQ(trailing.rows.size(), 1U);
}

TEST(Csv, WarnsWhereAQuotedCellHoldsRows) {
  const ReadTable table = read_all("dip,dd,note\n65,120,\"tight\n66,121,x\n67,122,y\"\n68,123,z\n");
  EXPECT_EQ(table.rows.size(), 2U);
  ASSERT_EQ(table.warnings.size(), 1U);
  EXPECT_NE(table.warnings[0].find("t.csv:2:"), std::string::npos);
}

TEST(Csv, Windows1252LinesAreReadWithAWarning) {
  const ReadTable table = read_all("dip,dd,note\n65\xB0,120\xB0,\x93ok\x94\n66,121,caf\xC3\xA9\n");
  EXPECT_EQ(table.rows, (Rows{{"65°", "120°", "“ok”"}, {"66", "121", "café"}}));
  ASSERT_EQ(table.warnings.size(), 1U);
  EXPECT_NE(table.warnings[0].find("line 2"), std::string::npos) << table.warnings[0];
  EXPECT_NE(table.warnings[0].find("Windows-1252"), std::string::npos);
}

std::string error_of(std::string_view bytes) {
  try {
    read_all(bytes);
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::input);
    return error.what();
  }
  return {};
}

TEST(Csv, OtherFilesAreErrorsThatSayWhatToDo) {
  using namespace std::string_view_literals;
  EXPECT_NE(error_of("").find("empty"), std::string::npos);
  EXPECT_NE(error_of("\n# only a comment\n\n").find("empty"), std::string::npos);
  EXPECT_NE(error_of("\xEF\xBB\xBF").find("empty"), std::string::npos);
  EXPECT_NE(error_of("PK\x03\x04 and so on"sv).find("saved as CSV"), std::string::npos);
  EXPECT_NE(error_of("\xD0\xCF\x11\xE0 and so on"sv).find("saved as CSV"), std::string::npos);
  EXPECT_NE(error_of("\xFF\xFE"
                     "d\0i\0p\0"sv)
                .find("UTF-16"),
            std::string::npos);
  EXPECT_NE(error_of("%PDF-1.4\n"sv).find("PDF"), std::string::npos);
  EXPECT_NE(error_of("dip,dd\n65,\0\n"sv).find("t.csv:2: holds a null byte"), std::string::npos);
  EXPECT_NE(error_of("\"dip,dd\n65,120\n").find("t.csv:1:1: "), std::string::npos);
  EXPECT_NE(error_of("dip,dd\n" + std::string(2'000'000, '5') + "\n").find("t.csv:2: "),
            std::string::npos);
  EXPECT_NE(error_of(std::string(2'000'000, 'x')).find("1 MiB"), std::string::npos);
}

// Many quotes that never close must not be scanned to the end of the file each.
TEST(Csv, PairedQuotesAreReadInLinearTime) {
  std::string bytes = "dip,dd,note\n65,120,\"open\n";
  for (int i = 0; i < 200'000; ++i) bytes += i % 2 == 0 ? "65,120,\"\"\n" : "65,120,\"\"\"\"\n";
  const ReadTable table = read_all(bytes);
  EXPECT_EQ(table.rows.size(), 200'000U);
  EXPECT_EQ(table.problems.size(), 1U);
}

// Property: whatever the bytes, every line is read or named, and the reader ends.
TEST(Csv, RandomTextNeitherCrashesNorHangs) {
  constexpr std::string_view kAlphabet = "\"\"\",,;\t\n\n\r #5.aé\xB0\x80\xFF-";
  for (std::uint64_t seed = 0; seed < 400; ++seed) {
    std::string bytes = seed % 2 == 0 ? "dip,dd,note\n" : "";
    const std::uint64_t length = random_index(seed, 0, 0, 400);
    for (std::uint64_t i = 0; i < length; ++i) {
      bytes += kAlphabet[random_index(seed, 1, i, kAlphabet.size())];
    }
    try {
      const ReadTable table = read_all(bytes);
      const auto breaks = std::count(bytes.begin(), bytes.end(), '\n') +
                          std::count(bytes.begin(), bytes.end(), '\r') + 1;
      EXPECT_LE(table.rows.size() + table.problems.size(), static_cast<std::size_t>(breaks));
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::input);
    }
  }
}

}  // namespace
}  // namespace brink
