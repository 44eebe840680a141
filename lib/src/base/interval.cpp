#include "brink/base/interval.hpp"

#include <fmt/format.h>

#include <limits>
#include <utility>

#include "brink/base/number.hpp"

namespace brink {

namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();

}  // namespace

bool Interval::contains(double value) const {
  return (low_open ? value > low : value >= low) && (high_open ? value < high : value <= high);
}

std::string Interval::text() const {
  const std::string suffix = unit.empty() ? "" : " " + unit;
  const bool bounded_below = low > -kInfinity;
  const bool bounded_above = high < kInfinity;
  if (!bounded_below && !bounded_above) return unit.empty() ? "a number" : "a number of " + unit;
  if (bounded_below && bounded_above && !low_open && !high_open) {
    return fmt::format("{} to {}{}", shortest(low), shortest(high), suffix);
  }
  std::string result;
  if (bounded_below) result = fmt::format("{}{}", low_open ? "above " : "", shortest(low));
  if (bounded_below && !low_open) result += bounded_above ? " or above" : suffix + " or above";
  if (bounded_below && bounded_above) result += " and ";
  if (bounded_above)
    result += fmt::format("{}{}", high_open ? "below " : "at most ", shortest(high));
  return bounded_above || low_open ? result + suffix : result;
}

Interval from_to(double low, double high, std::string unit) {
  return {low, high, false, false, std::move(unit)};
}
Interval between(double low, double high, std::string unit) {
  return {low, high, true, true, std::move(unit)};
}
Interval above(double low, std::string unit) {
  return {low, kInfinity, true, true, std::move(unit)};
}
Interval at_least_value(double low, std::string unit) {
  return {low, kInfinity, false, true, std::move(unit)};
}
Interval any_number(std::string unit) {
  return {-kInfinity, kInfinity, true, true, std::move(unit)};
}

}  // namespace brink
