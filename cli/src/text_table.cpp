#include "text_table.hpp"

#include <algorithm>
#include <array>
#include <cstdint>
#include <utility>

#include "brink/base/error.hpp"

namespace brink::cli {

namespace {

struct CodeRange {
  std::uint32_t first;
  std::uint32_t last;
};

// Main blocks of Unicode 15 only: enough to align names of places and people.
constexpr std::array<CodeRange, 10> kNoWidth{{{0x0300, 0x036F},
                                              {0x0483, 0x0489},
                                              {0x0591, 0x05BD},
                                              {0x0610, 0x061A},
                                              {0x064B, 0x065F},
                                              {0x0E34, 0x0E3A},
                                              {0x1AB0, 0x1AFF},
                                              {0x200B, 0x200F},
                                              {0x20D0, 0x20F0},
                                              {0xFE00, 0xFE0F}}};
constexpr std::array<CodeRange, 7> kTwoColumns{{{0x1100, 0x115F},
                                                {0x2E80, 0x303E},
                                                {0x3041, 0xA4CF},
                                                {0xAC00, 0xD7A3},
                                                {0xF900, 0xFAFF},
                                                {0xFF00, 0xFF60},
                                                {0x1F300, 0x1FAFF}}};

template <std::size_t N>
bool within(const std::array<CodeRange, N>& ranges, std::uint32_t code) {
  return std::any_of(ranges.begin(), ranges.end(), [code](const CodeRange& range) {
    return code >= range.first && code <= range.last;
  });
}

std::size_t columns_of(std::uint32_t code) {
  if (within(kNoWidth, code)) return 0;
  return within(kTwoColumns, code) ? 2 : 1;
}

std::vector<std::string> split_lines(std::string_view text) {
  std::vector<std::string> lines;
  while (true) {
    const std::size_t end = text.find('\n');
    lines.emplace_back(text.substr(0, end));
    if (end == std::string_view::npos) return lines;
    text.remove_prefix(end + 1);
  }
}

std::string padded(const std::string& cell, std::size_t width, Align align) {
  const std::size_t used = display_width(cell);
  const std::string blanks(width > used ? width - used : 0, ' ');
  return align == Align::left ? cell + blanks : blanks + cell;
}

void append_line(std::string& text, std::string line) {
  line.erase(line.find_last_not_of(' ') + 1);
  text += line + '\n';
}

}  // namespace

std::size_t display_width(std::string_view text) {
  std::size_t width = 0;
  for (std::size_t i = 0; i < text.size();) {
    const auto lead = static_cast<unsigned char>(text[i]);
    const std::size_t length = lead >= 0xF0 ? 4 : lead >= 0xE0 ? 3 : lead >= 0xC2 ? 2 : 1;
    std::uint32_t code = length == 1 ? lead : lead & (0xFFU >> (length + 1));
    std::size_t taken = 1;
    while (taken < length && i + taken < text.size()) {
      const auto next = static_cast<unsigned char>(text[i + taken]);
      if ((next & 0xC0U) != 0x80U) break;
      code = (code << 6U) | (next & 0x3FU);
      ++taken;
    }
    width += taken == length ? columns_of(code) : taken;
    i += taken;
  }
  return width;
}

std::vector<std::string> wrap(std::string_view text, std::size_t width) {
  std::vector<std::string> result;
  for (const std::string& line : split_lines(text)) {
    std::string current;
    std::string_view rest = line;
    while (!rest.empty()) {
      const std::size_t end = rest.find(' ');
      const std::string word(rest.substr(0, end));
      rest.remove_prefix(end == std::string_view::npos ? rest.size() : end + 1);
      if (word.empty()) continue;
      if (!current.empty() && display_width(current) + 1 + display_width(word) > width) {
        result.push_back(std::exchange(current, {}));
      }
      current += (current.empty() ? "" : " ") + word;
    }
    result.push_back(current);
  }
  return result;
}

std::string paragraph(std::string_view text, std::size_t width, std::size_t indent) {
  std::string result;
  for (const std::string& line : wrap(text, width - std::min(width, indent))) {
    append_line(result, std::string(indent, ' ') + line);
  }
  return result;
}

TextTable::TextTable(std::vector<Column> columns) : columns_(std::move(columns)) {}

void TextTable::add_row(std::vector<std::string> cells) {
  cells.resize(columns_.size());
  for (std::string& cell : cells) cell = printable(cell);
  rows_.push_back(std::move(cells));
}

std::string TextTable::text() const {
  std::vector<std::vector<std::string>> headings;
  std::vector<std::size_t> widths;
  std::size_t heading_lines = 1;
  for (const Column& column : columns_) {
    headings.push_back(split_lines(column.heading));
    heading_lines = std::max(heading_lines, headings.back().size());
    std::size_t width = 0;
    for (const std::string& line : headings.back()) width = std::max(width, display_width(line));
    for (const auto& row : rows_) width = std::max(width, display_width(row[widths.size()]));
    widths.push_back(width);
  }
  std::string text;
  const auto add_line = [&](const auto& cell_of) {
    std::string line;
    for (std::size_t i = 0; i < columns_.size(); ++i) {
      line += (i > 0 ? "  " : "") + padded(cell_of(i), widths[i], columns_[i].align);
    }
    append_line(text, line);
  };
  for (std::size_t k = 0; k < heading_lines; ++k) {
    add_line(
        [&](std::size_t i) { return k < headings[i].size() ? headings[i][k] : std::string(); });
  }
  add_line([&](std::size_t i) { return std::string(widths[i], '-'); });
  for (const auto& row : rows_) {
    add_line([&](std::size_t i) { return row[i]; });
  }
  return text;
}

}  // namespace brink::cli
