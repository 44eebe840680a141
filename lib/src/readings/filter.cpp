#include "brink/readings/filter.hpp"

#include <algorithm>
#include <limits>
#include <optional>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/readings/table.hpp"

namespace brink {

namespace {

constexpr std::string_view kForms =
    "COLUMN=VALUE[,VALUE...], COLUMN>=NUMBER, COLUMN<=NUMBER or COLUMN=FROM..TO";

[[noreturn]] void refuse(std::string_view text, std::string_view why) {
  throw Error(ErrorKind::argument, {{}, 0, 0, "filter"}, why, text, kForms);
}

double number_or_refuse(std::string_view number, std::string_view text) {
  const auto value = parse_decimal(trimmed(number));
  if (!value) refuse(text, "has a limit that is not a number");
  return *value;
}

std::optional<double> number_in(std::string_view cell, bool decimal_comma) {
  if (const auto value = parse_decimal(cell)) return value;
  if (!decimal_comma || cell.find(',') == std::string_view::npos) return std::nullopt;
  std::string with_point(cell);
  std::replace(with_point.begin(), with_point.end(), ',', '.');
  return parse_decimal(with_point);
}

std::vector<std::string> split_values(std::string_view list) {
  std::vector<std::string> values;
  for (;;) {
    const std::size_t comma = std::min(list.find(','), list.size());
    values.emplace_back(trimmed(list.substr(0, comma)));
    if (comma == list.size()) return values;
    list.remove_prefix(comma + 1);
  }
}

void read_equals(Filter& filter, std::string_view right) {
  const std::size_t dots = right.find("..");
  const bool range =
      dots != std::string_view::npos && parse_decimal(trimmed(right.substr(0, dots)));
  if (!range) {
    filter.values = split_values(right);
    return;
  }
  filter.kind = Filter::Kind::range;
  filter.from = number_or_refuse(right.substr(0, dots), filter.text);
  filter.to = number_or_refuse(right.substr(dots + 2), filter.text);
  if (filter.from > filter.to) refuse(filter.text, "has a range that ends before it begins");
}

}  // namespace

Filter parse_filter(std::string_view text) {
  constexpr double kInfinity = std::numeric_limits<double>::infinity();
  const std::size_t sign = text.find_first_of("=<>");
  if (sign == std::string_view::npos || sign == 0) refuse(text, "is not a filter");
  Filter filter{std::string(text),    std::string(trimmed(text.substr(0, sign))),
                Filter::Kind::values, {},
                -kInfinity,           kInfinity};
  if (filter.heading.empty()) refuse(text, "names no column");
  if (text[sign] == '=') {
    read_equals(filter, text.substr(sign + 1));
    return filter;
  }
  if (sign + 1 >= text.size() || text[sign + 1] != '=') refuse(text, "is not a filter");
  const double limit = number_or_refuse(text.substr(sign + 2), text);
  filter.kind = Filter::Kind::range;
  (text[sign] == '>' ? filter.from : filter.to) = limit;
  return filter;
}

bool passes(const Filter& filter, std::string_view cell, bool decimal_comma) {
  if (filter.kind == Filter::Kind::range) {
    const auto number = number_in(cell, decimal_comma);
    return number && *number >= filter.from && *number <= filter.to;
  }
  return std::any_of(filter.values.begin(), filter.values.end(), [&](const std::string& value) {
    if (value == cell) return true;
    const auto wanted = parse_decimal(value);
    return wanted && wanted == number_in(cell, decimal_comma);
  });
}

}  // namespace brink
