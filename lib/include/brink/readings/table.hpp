// Rows of cells, whatever the format of the file they stood in, and the text they point into.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace brink {

// A file's bytes as UTF-8 text. A byte-order mark is taken off; a line that is not UTF-8 is read as
// Windows-1252, with a warning that names it; a file whose only line ends are carriage returns gets
// line feeds. What is plainly no text (a null byte, the first bytes of a spreadsheet, a PDF or an
// archive, UTF-16) is Error(input) with what to do instead.
// Cost: one pass over the bytes, and a copy only where something had to be changed.
class Text {
 public:
  // `bytes` must outlive the text. `file` is for messages.
  Text(std::string_view bytes, const std::string& file);
  Text(const Text&) = delete;
  Text& operator=(const Text&) = delete;

  std::string_view view() const { return view_; }
  const std::vector<std::string>& warnings() const { return warnings_; }

 private:
  std::string changed_;
  std::string_view view_;
  std::vector<std::string> warnings_;
};

// One row. The cells are trimmed of blanks and freed of their quotes; the views hold until the next
// row is read.
struct Row {
  std::size_t line = 0;  // where it starts, from 1
  std::vector<std::string_view> cells;
  std::string_view text;           // the line as it stands, for messages
  std::string problem;             // not empty: the row can't be read, and has no cells
  std::size_t problem_column = 0;  // 1-based; 0: the whole line

  // The cell, empty where the row is too short to have it.
  std::string_view cell(std::size_t index) const {
    return index < cells.size() ? cells[index] : std::string_view{};
  }
};

// Where rows come from: a CSV file, or the group of an exchange file.
class RowSource {
 public:
  virtual ~RowSource() = default;
  // The headings, read when the source was made.
  virtual const Row& headings() const = 0;
  // The next row of data; false at the end.
  virtual bool next(Row& row) = 0;
  // Whether the comma separates cells, so that it can't be a decimal mark.
  virtual bool comma_separates() const = 0;
  // Doubtful things met so far, each with its file and line.
  virtual const std::vector<std::string>& warnings() const = 0;

  RowSource(const RowSource&) = delete;
  RowSource& operator=(const RowSource&) = delete;

 protected:
  RowSource() = default;
};

// Blanks and tabs off both ends.
std::string_view trimmed(std::string_view text);

}  // namespace brink
