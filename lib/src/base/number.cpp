#include "brink/base/number.hpp"

#include <fmt/format.h>

#include <charconv>
#include <cmath>

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

}  // namespace

std::optional<double> parse_decimal(std::string_view text) {
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
