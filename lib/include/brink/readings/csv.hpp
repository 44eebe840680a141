// Comma-separated text as field notebooks and spreadsheets write it (RFC 4180 and its relatives).
#pragma once

#include <deque>
#include <optional>
#include <string>
#include <string_view>

#include "brink/readings/table.hpp"

namespace brink {

// Reads rows of a text in which commas, semicolons or tabs separate cells; the heading line decides
// which (the one that stands in it most often, outside quotes and brackets). A heading of one word
// has no separator: the line is the cell. Blank lines and lines that begin with # are skipped.
//
// A cell may stand in quotes, with a doubled quote for a quote, and may then hold separators and
// line breaks. A quote that is never closed, or closes in the middle of a later cell, is a problem
// of the line that opens it: that row comes back with `problem` set and reading goes on with the
// next line. Where a quoted cell swallows whole lines that look like rows, there is a warning.
//
// Cost: linear in the text, whatever it holds; no allocation a cell.
class CsvReader final : public RowSource {
 public:
  // `text` must outlive the reader. Error(input) where there is no heading line, where it can't be
  // read, and, here and in next(), for a line above 1 MiB.
  CsvReader(std::string_view text, std::string file);

  const Row& headings() const override { return headings_; }
  bool next(Row& row) override;
  bool comma_separates() const override { return separator_ == ','; }
  const std::vector<std::string>& warnings() const override { return warnings_; }

 private:
  struct Quoted {
    std::size_t end = 0;  // just past the closing quote
    std::size_t line_breaks = 0;
    bool doubled = false;
  };

  std::string_view line_at(std::size_t position) const;
  void advance_past(std::size_t end, std::size_t line_breaks);
  void split_plain(std::string_view line, Row& row) const;
  void split_quoted(std::string_view line, Row& row);
  std::optional<Quoted> scan_quoted(std::size_t begin) const;
  std::string_view quoted_cell(std::size_t begin, const Quoted& quoted);
  bool ends_cell(std::size_t at) const;
  void reject_line(std::string_view line, Row& row, std::string problem);
  void warn_of_swallowed_rows(std::string_view cell, std::size_t line);

  std::string_view text_;
  std::string file_;
  std::size_t position_ = 0;
  std::size_t line_ = 1;
  char separator_ = '\0';
  bool has_quotes_ = false;
  std::deque<std::string> unquoted_;           // cells of the row that had doubled quotes
  std::deque<std::string> unquoted_headings_;  // the same of the headings
  Row headings_;
  std::vector<std::string> warnings_;
};

}  // namespace brink
