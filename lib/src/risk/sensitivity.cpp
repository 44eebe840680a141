#include "brink/risk/sensitivity.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"

namespace brink {

namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();

double at_step(double low, double high, std::size_t i, std::size_t steps, bool by_ratio) {
  if (i == 0) return low;
  if (i == steps) return high;
  const double part = static_cast<double>(i) / static_cast<double>(steps);
  return by_ratio ? low * std::pow(high / low, part) : low + (high - low) * part;
}

// Narrows a change of side between a and b.
Crossing narrow(const std::function<double(double)>& excess, double a, double b) {
  const bool rising = excess(a) < 0.0;
  constexpr int most_halvings = 200;
  for (int i = 0; i < most_halvings; ++i) {
    const double middle = a + (b - a) / 2.0;
    if (middle == a || middle == b || b - a <= 1e-14 * std::abs(middle)) break;
    ((excess(middle) < 0.0) == rising ? a : b) = middle;
  }
  const double safe = rising ? b : a;
  // A continuous curve has all but closed the gap by now.
  const double gap = std::abs(excess(a)) + std::abs(excess(b));
  return {safe, rising, !(gap <= 1e-6)};
}

}  // namespace

double SensitivityCurve::swing() const {
  return least ? *greatest - *least : 0.0;
}

SensitivityCurve sensitivity_curve(const VariedInput& input, const VariedRange& range) {
  constexpr std::size_t most_points = 100000;
  if (range.points < 2 || range.points > most_points) {
    throw Error(ErrorKind::argument, Place{.key = input.name}, "has too few or too many points",
                std::to_string(range.points), "2 to 100000");
  }
  if (!std::isfinite(range.from) || !std::isfinite(range.to)) {
    throw Error(ErrorKind::argument, Place{.key = input.name}, "has an end that is not finite", {},
                "two numbers");
  }
  SensitivityCurve curve{input.name, input.unit, {}, std::nullopt, std::nullopt};
  for (std::size_t i = 0; i < range.points; ++i) {
    const double value = at_step(range.from, range.to, i, range.points - 1, false);
    const std::optional<double> safety = input.safety(value);
    curve.points.push_back({value, safety});
    if (!safety || !std::isfinite(*safety)) continue;
    curve.least = std::min(curve.least.value_or(*safety), *safety);
    curve.greatest = std::max(curve.greatest.value_or(*safety), *safety);
  }
  return curve;
}

std::vector<std::size_t> rank_by_swing(const std::vector<SensitivityCurve>& curves) {
  std::vector<std::size_t> order(curves.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  std::stable_sort(order.begin(), order.end(), [&](std::size_t a, std::size_t b) {
    return curves[a].swing() > curves[b].swing();
  });
  return order;
}

std::vector<Crossing> find_crossings(const SafetyAt& safety, double target, double low, double high,
                                     bool by_ratio) {
  constexpr std::size_t steps = 400;
  const auto excess = [&](double value) { return safety(value).value_or(kInfinity) - target; };
  std::vector<Crossing> crossings;
  double before = low;
  bool safe_before = excess(low) >= 0.0;
  for (std::size_t i = 1; i <= steps; ++i) {
    const double value = at_step(low, high, i, steps, by_ratio);
    const bool safe = excess(value) >= 0.0;
    if (safe != safe_before) crossings.push_back(narrow(excess, before, value));
    before = value;
    safe_before = safe;
  }
  return crossings;
}

}  // namespace brink
