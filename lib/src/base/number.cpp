#include "brink/base/number.hpp"

#include <fmt/format.h>

#include <charconv>
#include <cmath>
#include <cstddef>
#include <cstdint>

namespace brink {

namespace {

template <typename Number>
std::optional<Number> parse_whole(std::string_view text) {
  if (!text.empty() && text.front() == '+') {
    text.remove_prefix(1);
    if (!text.empty() && text.front() == '-') return std::nullopt;
  }
  Number value{};
  const char* const end = text.data() + text.size();
  const auto [stop, status] = std::from_chars(text.data(), end, value);
  if (status != std::errc{} || stop != end) return std::nullopt;
  return value;
}

// Up to 15 digits with at most one point, the form of nearly every field reading. The digits as an
// integer and the power of ten are both exact doubles, so their quotient is the correctly rounded
// value, the same bits as from_chars gives (Clinger 1990, PLDI '90, 92-101).
bool parse_short(std::string_view text, double& value) {
  constexpr double kPowers[] = {1e0, 1e1, 1e2,  1e3,  1e4,  1e5,  1e6,  1e7,
                                1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15};
  const char* at = text.data();
  const char* const end = at + text.size();
  const bool negative = at != end && *at == '-';
  if (negative) ++at;
  if (end - at > 16) return false;
  std::int64_t digits = 0;
  const auto take_digits = [&] {
    const char* const from = at;
    for (; at != end; ++at) {
      const unsigned digit = static_cast<unsigned char>(*at) - unsigned{'0'};
      if (digit > 9) break;
      digits = digits * 10 + digit;
    }
    return at - from;
  };
  const auto whole = take_digits();
  std::ptrdiff_t decimals = 0;
  if (at != end && *at == '.') {
    ++at;
    decimals = take_digits();
  }
  const auto count = whole + decimals;
  if (at != end || count == 0 || count > 15) return false;
  value = static_cast<double>(digits) / kPowers[decimals];
  if (negative) value = -value;
  return true;
}

}  // namespace

std::optional<double> parse_decimal(std::string_view text) {
  if (double plain = 0.0; parse_short(text, plain)) return plain;
  const auto value = parse_whole<double>(text);
  return value && std::isfinite(*value) ? value : std::nullopt;
}

std::optional<long long> parse_integer(std::string_view text) {
  return parse_whole<long long>(text);
}

std::string shortest(double value) {
  return fmt::format("{}", value + 0.0);
}

std::string fixed(double value, int decimals) {
  std::string text = fmt::format("{:.{}f}", value, decimals);
  const bool is_zero = text.find_first_not_of("-0.") == std::string::npos;
  if (is_zero && text.front() == '-') text.erase(0, 1);
  return text;
}

}  // namespace brink
