#include "brink/readings/table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cstdint>
#include <cstring>

#include "brink/base/error.hpp"

namespace brink {

namespace {

constexpr std::string_view kByteOrderMark = "\xEF\xBB\xBF";
constexpr std::string_view kAcceptedFiles = "a CSV text file with a heading line, or AGS4";

struct Signature {
  std::string_view bytes;
  std::string_view what;
  std::string_view accepted;
};

using namespace std::string_view_literals;
constexpr Signature kNotText[] = {
    {"PK\x03\x04"sv, "is a spreadsheet or an archive, not text",
     "the sheet of readings saved as CSV (in the spreadsheet: save as, CSV UTF-8)"},
    {"\xD0\xCF\x11\xE0"sv, "is a spreadsheet in the old binary form, not text",
     "the sheet of readings saved as CSV (in the spreadsheet: save as, CSV UTF-8)"},
    {"%PDF-"sv, "is a PDF, not a table", kAcceptedFiles},
    {"\xFF\xFE"sv, "is text in UTF-16", "the file saved as UTF-8"},
    {"\xFE\xFF"sv, "is text in UTF-16", "the file saved as UTF-8"},
};

void refuse_other_files(std::string_view bytes, const std::string& file) {
  for (const Signature& known : kNotText) {
    if (bytes.starts_with(known.bytes)) {
      throw Error(ErrorKind::input, {file, 0, 0, {}}, known.what, {}, known.accepted);
    }
  }
  const std::size_t null = bytes.find('\0');
  if (null == std::string_view::npos) return;
  const auto line = 1 + std::count(bytes.begin(), bytes.begin() + static_cast<long>(null), '\n');
  throw Error(ErrorKind::input, {file, static_cast<std::size_t>(line), 0, {}},
              "holds a null byte, so the file is not text", {}, kAcceptedFiles);
}

// Length of the well-formed UTF-8 sequence at `at` (RFC 3629), 0 where there is none.
std::size_t sequence_length(std::string_view text, std::size_t at) {
  const auto byte = [&](std::size_t i) {
    return at + i < text.size() ? static_cast<unsigned char>(text[at + i]) : 0U;
  };
  const unsigned lead = byte(0);
  if (lead < 0x80) return 1;
  const auto follows = [&](std::size_t i) { return (byte(i) & 0xC0U) == 0x80U; };
  if (lead >= 0xC2 && lead < 0xE0) return follows(1) ? 2 : 0;
  if (lead >= 0xE0 && lead < 0xF0) {
    const bool overlong = lead == 0xE0 && byte(1) < 0xA0;
    const bool surrogate = lead == 0xED && byte(1) >= 0xA0;
    return follows(1) && follows(2) && !overlong && !surrogate ? 3 : 0;
  }
  if (lead >= 0xF0 && lead < 0xF5) {
    const bool overlong = lead == 0xF0 && byte(1) < 0x90;
    const bool beyond = lead == 0xF4 && byte(1) >= 0x90;
    return follows(1) && follows(2) && follows(3) && !overlong && !beyond ? 4 : 0;
  }
  return 0;
}

// Index of the first byte that is not UTF-8, or the size.
std::size_t first_bad_byte(std::string_view text, std::size_t from) {
  std::size_t at = from;
  while (at < text.size()) {
    while (at + 8 <= text.size()) {  // eight ASCII bytes at a time
      std::uint64_t eight = 0;
      std::memcpy(&eight, text.data() + at, 8);
      if ((eight & 0x8080808080808080ULL) != 0) break;
      at += 8;
    }
    if (at >= text.size()) break;
    const std::size_t length = sequence_length(text, at);
    if (length == 0) return at;
    at += length;
  }
  return text.size();
}

// Windows-1252 0x80..0x9F (the Encoding Standard, index windows-1252); 0 where it has no character.
constexpr std::array<std::uint16_t, 32> kWindows1252 = {
    0x20AC, 0,      0x201A, 0x0192, 0x201E, 0x2026, 0x2020, 0x2021, 0x02C6, 0x2030, 0x0160,
    0x2039, 0x0152, 0,      0x017D, 0,      0,      0x2018, 0x2019, 0x201C, 0x201D, 0x2022,
    0x2013, 0x2014, 0x02DC, 0x2122, 0x0161, 0x203A, 0x0153, 0,      0x017E, 0x0178};

void append_code_point(std::string& out, unsigned code) {
  const auto put = [&](unsigned byte) { out += static_cast<char>(byte); };
  if (code < 0x80) {
    put(code);
  } else if (code < 0x800) {
    put(0xC0U | (code >> 6));
    put(0x80U | (code & 0x3FU));
  } else {
    put(0xE0U | (code >> 12));
    put(0x80U | ((code >> 6) & 0x3FU));
    put(0x80U | (code & 0x3FU));
  }
}

void append_windows_1252(std::string& out, std::string_view line) {
  constexpr unsigned kReplacement = 0xFFFD;
  for (const char c : line) {
    const auto byte = static_cast<unsigned char>(c);
    const bool special = byte >= 0x80 && byte < 0xA0;
    const unsigned code = special ? kWindows1252[byte - 0x80U] : byte;
    append_code_point(out, code == 0 && special ? kReplacement : code);
  }
}

// "lines 3, 8 and 12", "line 3", "lines 3, 8, 12 and 97 more".
std::string name_lines(const std::vector<std::size_t>& lines) {
  constexpr std::size_t kNamed = 10;
  if (lines.size() == 1) return fmt::format("line {}", lines.front());
  const std::size_t named = std::min(lines.size(), kNamed);
  std::string text = "lines ";
  for (std::size_t i = 0; i < named; ++i) {
    const bool last = i + 1 == lines.size();
    text += fmt::format("{}{}", i == 0 ? "" : last ? " and " : ", ", lines[i]);
  }
  if (lines.size() > named) text += fmt::format(" and {} more", lines.size() - named);
  return text;
}

// The text with every line that is not UTF-8 taken as Windows-1252.
std::string decode_lines(std::string_view text, std::vector<std::size_t>& changed_lines) {
  std::string out;
  out.reserve(text.size() + text.size() / 8);
  std::size_t line = 1;
  for (std::size_t at = 0; at < text.size(); ++line) {
    const std::size_t end = std::min(text.find('\n', at), text.size() - 1) + 1;
    const std::string_view piece = text.substr(at, end - at);
    if (first_bad_byte(piece, 0) == piece.size()) {
      out += piece;
    } else {
      append_windows_1252(out, piece);
      changed_lines.push_back(line);
    }
    at = end;
  }
  return out;
}

}  // namespace

std::string_view trimmed(std::string_view text) {
  const auto blank = [](char c) { return c == ' ' || c == '\t' || c == '\r'; };
  while (!text.empty() && blank(text.front())) text.remove_prefix(1);
  while (!text.empty() && blank(text.back())) text.remove_suffix(1);
  return text;
}

Text::Text(std::string_view bytes, const std::string& file) : view_(bytes) {
  refuse_other_files(bytes, file);
  if (view_.starts_with(kByteOrderMark)) view_.remove_prefix(kByteOrderMark.size());
  const bool only_returns =
      view_.find('\r') != std::string_view::npos && view_.find('\n') == std::string_view::npos;
  if (only_returns) {
    changed_ = view_;
    std::replace(changed_.begin(), changed_.end(), '\r', '\n');
    view_ = changed_;
  }
  if (first_bad_byte(view_, 0) == view_.size()) return;
  std::vector<std::size_t> lines;
  std::string decoded = decode_lines(view_, lines);
  changed_ = std::move(decoded);
  view_ = changed_;
  warnings_.push_back(fmt::format("{}:{}: {} not UTF-8 and {} read as Windows-1252", file,
                                  lines.front(),
                                  name_lines(lines) + (lines.size() == 1 ? " is" : " are"),
                                  lines.size() == 1 ? "was" : "were"));
}

}  // namespace brink
