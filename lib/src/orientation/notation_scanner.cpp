#include "notation_scanner.hpp"

#include <algorithm>
#include <utility>

#include "brink/base/number.hpp"

namespace brink {

namespace {

struct Spelling {
  std::string_view written;
  std::string_view meant;
};

constexpr Spelling kSpellings[] = {
    {"\xC2\xA0", " "},       // no-break space
    {"\xE2\x80\x89", " "},   // thin space
    {"\xE2\x80\xAF", " "},   // narrow no-break space
    {"\xE2\x88\x92", "-"},   // minus sign
    {"\xE2\x80\x93", "-"},   // en dash
    {"\xE2\x80\x94", "-"},   // em dash
    {"\xC2\xB0", "\xB0"},    // degree sign
    {"\xC2\xBA", "\xB0"},    // ordinal indicator
    {"\xCB\x9A", "\xB0"},    // ring above
    {"\xE2\x80\xB2", "'"},   // prime
    {"\xE2\x80\x99", "'"},   // apostrophe
    {"\xE2\x86\x92", "->"},  // arrow
    {"\t", " "},
};

bool is_digit(char c) {
  return c >= '0' && c <= '9';
}

std::string_view trim(std::string_view text) {
  while (!text.empty() && text.front() == ' ') text.remove_prefix(1);
  while (!text.empty() && text.back() == ' ') text.remove_suffix(1);
  return text;
}

}  // namespace

std::string normalise_notation(std::string_view text) {
  std::string plain;
  plain.reserve(text.size());
  while (!text.empty()) {
    const auto* const found =
        std::find_if(std::begin(kSpellings), std::end(kSpellings),
                     [&](const Spelling& s) { return text.starts_with(s.written); });
    if (found == std::end(kSpellings)) {
      plain += text.front();
      text.remove_prefix(1);
    } else {
      plain += found->meant;
      text.remove_prefix(found->written.size());
    }
  }
  return std::string(trim(plain));
}

std::string in_capitals(std::string text) {
  for (char& c : text) {
    if (c >= 'a' && c <= 'z') c = static_cast<char>(c - 'a' + 'A');
  }
  return text;
}

bool NotationScanner::skip_blanks() {
  const std::size_t count = std::min(rest_.find_first_not_of(' '), rest_.size());
  rest_.remove_prefix(count);
  return count > 0;
}

bool NotationScanner::take(std::string_view piece) {
  if (!rest_.starts_with(piece)) return false;
  rest_.remove_prefix(piece.size());
  return true;
}

std::string_view NotationScanner::take_letters() {
  std::size_t count = 0;
  while (count < rest_.size() && rest_[count] >= 'A' && rest_[count] <= 'Z') ++count;
  const std::string_view letters = rest_.substr(0, count);
  rest_.remove_prefix(count);
  return letters;
}

// No exponent: in "30E" the letter is east.
std::optional<double> NotationScanner::take_number() {
  std::string digits;
  const auto take_digits = [&] {
    while (!rest_.empty() && is_digit(rest_.front())) {
      digits += rest_.front();
      rest_.remove_prefix(1);
    }
  };
  if (peek() == '-' || peek() == '+') {
    digits += peek();
    rest_.remove_prefix(1);
  }
  take_digits();
  const bool point = peek() == '.' || (peek() == ',' && comma_ == DecimalComma::yes &&
                                       rest_.size() > 1 && is_digit(rest_[1]));
  if (point) {
    digits += '.';
    rest_.remove_prefix(1);
    take_digits();
  }
  return parse_decimal(digits);
}

std::optional<double> NotationScanner::take_minutes() {
  NotationScanner ahead = fork();
  ahead.skip_blanks();
  if (!is_digit(ahead.peek())) return std::nullopt;
  const auto minutes = ahead.take_number();
  if (!minutes || !ahead.take("'")) return std::nullopt;
  *this = ahead;
  return minutes;
}

std::optional<double> NotationScanner::take_degrees() {
  const bool negative = peek() == '-';
  auto degrees = take_number();
  if (!degrees) return std::nullopt;
  NotationScanner ahead = fork();
  ahead.skip_blanks();
  const bool marked = ahead.take(std::string_view(&kDegreeMark, 1));
  const std::string_view word = marked ? std::string_view{} : ahead.take_letters();
  if (marked || word == "DEG" || word == "DEGREES" || word == "DEGREE") *this = ahead;
  if (const auto minutes = take_minutes()) {
    if (*minutes >= 60.0) return std::nullopt;
    *degrees += (negative ? -*minutes : *minutes) / 60.0;
  }
  return degrees;
}

}  // namespace brink
