// Aligned tables for people. Units stand in the headings.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace brink::cli {

// Columns that `text` takes on a terminal: combining marks take none, East Asian wide characters
// two, a byte that is not UTF-8 one.
std::size_t display_width(std::string_view text);

// `text` broken at spaces into lines of at most `width` columns (a longer word keeps its own line).
// Line breaks in the text are kept.
std::vector<std::string> wrap(std::string_view text, std::size_t width);

// wrap() with every line indented, each ended by a line break.
std::string paragraph(std::string_view text, std::size_t width = 80, std::size_t indent = 0);

enum class Align { left, right };

class TextTable {
 public:
  struct Column {
    std::string heading;  // unit included: "dip, deg"; a line break makes a heading of two lines
    Align align = Align::right;
  };

  explicit TextTable(std::vector<Column> columns);
  // One cell a column (missing ones are blank). Control bytes and broken UTF-8 are shown as \xNN.
  void add_row(std::vector<std::string> cells);
  bool empty() const { return rows_.empty(); }
  // Heading, a rule and the rows, two spaces apart, no blanks at line ends.
  std::string text() const;

 private:
  std::vector<Column> columns_;
  std::vector<std::vector<std::string>> rows_;
};

}  // namespace brink::cli
