#include "brink/readings/csv.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <utility>

#include "brink/base/error.hpp"

namespace brink {

namespace {

// No table of readings has lines, or cells with line breaks, of this length.
constexpr std::size_t kLongest = std::size_t{1} << 20;

constexpr auto npos = std::string_view::npos;

// How often `separator` stands in the line outside quotes and brackets.
std::size_t count_separators(std::string_view line, char separator) {
  std::size_t count = 0;
  int depth = 0;
  bool quoted = false;
  for (const char c : line) {
    if (c == '"') quoted = !quoted;
    if (quoted) continue;
    if (c == '(' || c == '[') ++depth;
    if ((c == ')' || c == ']') && depth > 0) --depth;
    if (depth == 0 && c == separator) ++count;
  }
  return count;
}

char sniff_separator(std::string_view heading) {
  char best = '\0';
  std::size_t most = 0;
  for (const char candidate : {'\t', ';', ','}) {
    const std::size_t count = count_separators(heading, candidate);
    if (count > most) {
      most = count;
      best = candidate;
    }
  }
  return best;
}

bool is_comment_or_blank(std::string_view line) {
  const std::string_view rest = trimmed(line);
  return rest.empty() || rest.front() == '#';
}

}  // namespace

CsvReader::CsvReader(std::string_view text, std::string file)
    : text_(text), file_(std::move(file)), has_quotes_(text.find('"') != npos) {
  constexpr std::string_view kAccepted = "a line of headings, then one line a reading";
  while (position_ < text_.size() && is_comment_or_blank(line_at(position_))) {
    advance_past(position_ + line_at(position_).size(), 0);
  }
  if (position_ >= text_.size()) {
    throw Error(ErrorKind::input, {file_, 1, 0, {}}, "the file is empty", {}, kAccepted);
  }
  separator_ = sniff_separator(line_at(position_));
  next(headings_);
  unquoted_headings_.swap(unquoted_);
  if (!headings_.problem.empty()) {
    throw Error(ErrorKind::input, {file_, headings_.line, headings_.problem_column, {}},
                "is a heading that " + headings_.problem, headings_.text);
  }
  while (!headings_.cells.empty() && headings_.cells.back().empty()) headings_.cells.pop_back();
}

std::string_view CsvReader::line_at(std::size_t position) const {
  const std::string_view window = text_.substr(position, kLongest + 1);
  const std::size_t end = window.find('\n');
  if (end != npos) return window.substr(0, end);
  if (window.size() <= kLongest) return window;
  throw Error(ErrorKind::input, {file_, line_, 0, {}}, "the line is longer than 1 MiB",
              window.substr(0, 24), "a table of readings with one line a reading");
}

void CsvReader::advance_past(std::size_t end, std::size_t line_breaks) {
  position_ = std::min(end + 1, text_.size());
  line_ += line_breaks + 1;
}

bool CsvReader::next(Row& row) {
  while (position_ < text_.size()) {
    const std::string_view line = line_at(position_);
    if (is_comment_or_blank(line)) {
      advance_past(position_ + line.size(), 0);
      continue;
    }
    row.line = line_;
    row.text = trimmed(line);
    row.cells.clear();
    row.problem.clear();
    row.problem_column = 0;
    if (has_quotes_ && line.find('"') != npos) {
      split_quoted(line, row);
    } else {
      split_plain(line, row);
      advance_past(position_ + line.size(), 0);
    }
    return true;
  }
  return false;
}

void CsvReader::split_plain(std::string_view line, Row& row) const {
  if (separator_ == '\0') {
    row.cells.push_back(trimmed(line));
    return;
  }
  std::size_t begin = 0;
  for (std::size_t at = 0; at < line.size(); ++at) {
    if (line[at] != separator_) continue;
    row.cells.push_back(trimmed(line.substr(begin, at - begin)));
    begin = at + 1;
  }
  row.cells.push_back(trimmed(line.substr(begin)));
}

bool CsvReader::ends_cell(std::size_t at) const {
  return at >= text_.size() || text_[at] == '\n' || (text_[at] == separator_ && separator_ != '\0');
}

// Each failed scan passes only quotes that stand in pairs, and a later cell that opens with such a
// pair closes within it, so that no text is scanned to its end twice.
std::optional<CsvReader::Quoted> CsvReader::scan_quoted(std::size_t begin) const {
  Quoted quoted;
  const std::string_view window = text_.substr(begin, kLongest);
  std::size_t at = 0;
  for (;;) {
    const std::size_t quote = window.find('"', at);
    if (quote == npos) return std::nullopt;
    if (quote + 1 >= window.size() || window[quote + 1] != '"') {
      quoted.end = begin + quote + 1;
      break;
    }
    quoted.doubled = true;
    at = quote + 2;
  }
  const std::string_view inside = text_.substr(begin, quoted.end - 1 - begin);
  quoted.line_breaks = static_cast<std::size_t>(std::count(inside.begin(), inside.end(), '\n'));
  return quoted;
}

std::string_view CsvReader::quoted_cell(std::size_t begin, const Quoted& quoted) {
  const std::string_view inside = text_.substr(begin, quoted.end - 1 - begin);
  if (!quoted.doubled) return trimmed(inside);
  std::string& cell = unquoted_.emplace_back();
  cell.reserve(inside.size());
  for (std::size_t i = 0; i < inside.size(); ++i) {
    cell += inside[i];
    if (inside[i] == '"') ++i;
  }
  return trimmed(cell);
}

void CsvReader::reject_line(std::string_view line, Row& row, std::string problem) {
  row.problem_column = row.cells.size() + 1;
  row.cells.clear();
  row.problem = std::move(problem);
  advance_past(position_ + line.size(), 0);
}

void CsvReader::split_quoted(std::string_view line, Row& row) {
  unquoted_.clear();
  const auto skip_blanks = [&](std::size_t at) {
    while (at < text_.size() && text_[at] != separator_ &&
           (text_[at] == ' ' || text_[at] == '\t' || text_[at] == '\r')) {
      ++at;
    }
    return at;
  };
  std::size_t line_breaks = 0;
  std::size_t at = position_;
  for (;;) {
    const std::size_t begin = skip_blanks(at);
    if (begin < text_.size() && text_[begin] == '"') {
      const auto quoted = scan_quoted(begin + 1);
      at = quoted ? skip_blanks(quoted->end) : begin;
      const bool closed = quoted && ends_cell(at);
      if (!closed) {
        const bool same_line = quoted && quoted->line_breaks == 0;
        reject_line(line, row,
                    same_line ? "has text after a closing quote; accepted: a separator there"
                              : "opens a quote that is not closed; accepted: a closing quote");
        return;
      }
      row.cells.push_back(quoted_cell(begin + 1, *quoted));
      line_breaks += quoted->line_breaks;
      if (quoted->line_breaks > 0) warn_of_swallowed_rows(row.cells.back(), row.line);
    } else {
      at = begin;
      while (!ends_cell(at)) ++at;
      row.cells.push_back(trimmed(text_.substr(begin, at - begin)));
    }
    if (at >= text_.size() || text_[at] == '\n') break;
    ++at;
  }
  advance_past(at, line_breaks);
}

void CsvReader::warn_of_swallowed_rows(std::string_view cell, std::size_t line) {
  const std::size_t separators = headings_.cells.empty() ? 0 : headings_.cells.size() - 1;
  if (separators == 0) return;
  std::size_t rows = 0;
  for (std::size_t at = 0; at < cell.size();) {
    const std::size_t end = std::min(cell.find('\n', at), cell.size());
    const std::string_view inner = cell.substr(at, end - at);
    const auto count = std::count(inner.begin(), inner.end(), separator_);
    if (static_cast<std::size_t>(count) >= separators) ++rows;
    at = end + 1;
  }
  if (rows == 0) return;
  warnings_.push_back(
      fmt::format("{}:{}: the quoted cell runs on over {} line{} that look{} like readings; if a "
                  "quote was left open there, they are lost",
                  file_, line, rows, rows == 1 ? "" : "s", rows == 1 ? "s" : ""));
}

}  // namespace brink
