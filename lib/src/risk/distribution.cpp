#include "brink/risk/distribution.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <optional>
#include <vector>

#include "base/clones.hpp"
#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "risk/normal_quantile.hpp"

namespace brink {

namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();
constexpr auto kForms =
    "a number, normal(MEAN, SD), lognormal(MEAN, SD), triangular(LEAST, LIKELIEST, GREATEST) or "
    "uniform(LEAST, GREATEST), the last four with limits as in normal(30, 3)[20..40]";

[[noreturn]] void refuse(std::string_view option, std::string_view text, std::string_view what,
                         std::string_view accepted = kForms) {
  throw Error(ErrorKind::argument, Place{.key = std::string(option)}, what, text, accepted);
}

std::string_view trimmed(std::string_view text) {
  const std::size_t first = text.find_first_not_of(" \t");
  if (first == std::string_view::npos) return {};
  return text.substr(first, text.find_last_not_of(" \t") - first + 1);
}

struct ShapeName {
  const char* name;
  DistributionShape shape;
  std::size_t parameters;
};

constexpr ShapeName kShapes[] = {{"normal", DistributionShape::normal, 2},
                                 {"lognormal", DistributionShape::lognormal, 2},
                                 {"triangular", DistributionShape::triangular, 3},
                                 {"uniform", DistributionShape::uniform, 2}};

const ShapeName* shape_named(std::string_view name) {
  for (const ShapeName& shape : kShapes) {
    if (name == shape.name) return &shape;
  }
  return nullptr;
}

std::optional<std::vector<double>> numbers_of(std::string_view list) {
  std::vector<double> numbers;
  for (;;) {
    const std::size_t comma = list.find(',');
    const auto number = parse_decimal(trimmed(list.substr(0, comma)));
    if (!number) return std::nullopt;
    numbers.push_back(*number);
    if (comma == std::string_view::npos) return numbers;
    list.remove_prefix(comma + 1);
  }
}

// "[LOW..HIGH]", either end may be left out.
bool take_limits(std::string_view text, Distribution& d) {
  if (text.empty()) return true;
  const std::size_t dots = text.find("..");
  if (text.front() != '[' || text.back() != ']' || dots == std::string_view::npos) return false;
  const std::string_view low = trimmed(text.substr(1, dots - 1));
  const std::string_view high = trimmed(text.substr(dots + 2, text.size() - dots - 3));
  const auto least = low.empty() ? std::optional(-kInfinity) : parse_decimal(low);
  const auto greatest = high.empty() ? std::optional(kInfinity) : parse_decimal(high);
  if (!least || !greatest) return false;
  d.low = *least;
  d.high = *greatest;
  return true;
}

void check(const Distribution& d, std::string_view option, std::string_view text) {
  switch (d.shape) {
    case DistributionShape::normal:
      if (!(d.second > 0.0)) refuse(option, text, "has a standard deviation that is not above 0");
      break;
    case DistributionShape::lognormal:
      if (!(d.first > 0.0) || !(d.second > 0.0)) {
        refuse(option, text, "has a mean or a standard deviation that is not above 0");
      }
      break;
    case DistributionShape::triangular:
      if (!(d.first <= d.second && d.second <= d.third && d.first < d.third)) {
        refuse(option, text, "has values that do not rise from least to greatest");
      }
      break;
    case DistributionShape::uniform:
      if (!(d.first < d.second)) refuse(option, text, "has a greatest value not above its least");
      break;
    case DistributionShape::fixed:
      break;
  }
  if (!(d.low < d.high)) refuse(option, text, "has limits that do not rise");
}

double log_sd(const Distribution& d) {
  const double ratio = d.second / d.first;
  return std::sqrt(std::log1p(ratio * ratio));
}

double log_mean(const Distribution& d) {
  const double sd = log_sd(d);
  return std::log(d.first) - 0.5 * sd * sd;
}

double normal_share(double z) {
  return 0.5 * std::erfc(-z / std::numbers::sqrt2);
}

double triangular_share(const Distribution& d, double x) {
  if (x <= d.first) return 0.0;
  if (x >= d.third) return 1.0;
  const double whole = d.third - d.first;
  if (x < d.second) return (x - d.first) * (x - d.first) / (whole * (d.second - d.first));
  return 1.0 - (d.third - x) * (d.third - x) / (whole * (d.third - d.second));
}

double triangular_quantile(const Distribution& d, double p) {
  const double whole = d.third - d.first;
  const double turn = (d.second - d.first) / whole;
  if (p < turn) return d.first + std::sqrt(p * whole * (d.second - d.first));
  return d.third - std::sqrt((1.0 - p) * whole * (d.third - d.second));
}

// Without the limits.
double whole_share(const Distribution& d, double x) {
  switch (d.shape) {
    case DistributionShape::normal:
      return normal_share((x - d.first) / d.second);
    case DistributionShape::lognormal:
      return x <= 0.0 ? 0.0 : normal_share((std::log(x) - log_mean(d)) / log_sd(d));
    case DistributionShape::triangular:
      return triangular_share(d, x);
    case DistributionShape::uniform:
      return std::clamp((x - d.first) / (d.second - d.first), 0.0, 1.0);
    case DistributionShape::fixed:
      break;
  }
  return x < d.first ? 0.0 : 1.0;
}

// Share below the low limit, and share between the limits.
struct Cut {
  double below;
  double within;
};

Cut cut_of(const Distribution& d) {
  const double below = std::isfinite(d.low) ? whole_share(d, d.low) : 0.0;
  const double up_to = std::isfinite(d.high) ? whole_share(d, d.high) : 1.0;
  return {below, up_to - below};
}

BRINK_CLONES void normal_values(const double* __restrict p, double* __restrict out,
                                std::size_t count, double mean, double sd, double below,
                                double within) {
  for (std::size_t i = 0; i < count; ++i) {
    out[i] = mean + sd * normal_quantile(below + p[i] * within);
  }
}

void clamp_all(const Distribution& d, std::span<double> values) {
  if (!std::isfinite(d.low) && !std::isfinite(d.high)) return;
  for (double& value : values) value = std::clamp(value, d.low, d.high);
}

std::string least_greatest(double low, double high) {
  if (std::isinf(low)) return fmt::format("[..{}]", shortest(high));
  if (std::isinf(high)) return fmt::format("[{}..]", shortest(low));
  return fmt::format("[{}..{}]", shortest(low), shortest(high));
}

}  // namespace

Distribution fixed_value(double value) {
  Distribution d;
  d.first = value;
  return d;
}

Distribution parse_distribution(std::string_view option, std::string_view text) {
  const std::string_view whole = trimmed(text);
  if (const auto number = parse_decimal(whole)) return fixed_value(*number);
  const std::size_t open = whole.find('(');
  const std::size_t close = whole.find(')');
  if (open == std::string_view::npos || close == std::string_view::npos || close < open) {
    refuse(option, text, "is neither a number nor a distribution");
  }
  const ShapeName* shape = shape_named(trimmed(whole.substr(0, open)));
  if (shape == nullptr) refuse(option, text, "is no distribution known here");
  const auto numbers = numbers_of(whole.substr(open + 1, close - open - 1));
  if (!numbers || numbers->size() != shape->parameters) {
    refuse(option, text, "does not have the numbers that its distribution takes");
  }
  Distribution d;
  d.shape = shape->shape;
  d.first = (*numbers)[0];
  d.second = (*numbers)[1];
  if (numbers->size() > 2) d.third = (*numbers)[2];
  if (!take_limits(trimmed(whole.substr(close + 1)), d)) {
    refuse(option, text, "has limits that cannot be read");
  }
  check(d, option, text);
  if (!(cut_of(d).within > 0.0)) refuse(option, text, "has no values between its limits");
  return d;
}

std::string to_string(const Distribution& d) {
  if (d.shape == DistributionShape::fixed) return shortest(d.first);
  std::string text;
  for (const ShapeName& shape : kShapes) {
    if (shape.shape != d.shape) continue;
    text = fmt::format("{}({}, {}", shape.name, shortest(d.first), shortest(d.second));
    if (shape.parameters == 3) text += ", " + shortest(d.third);
    text += ")";
  }
  if (std::isfinite(d.low) || std::isfinite(d.high)) text += least_greatest(d.low, d.high);
  return text;
}

double cumulative(const Distribution& d, double x) {
  if (d.shape == DistributionShape::fixed) return whole_share(d, x);
  if (x <= d.low) return 0.0;
  if (x >= d.high) return 1.0;
  const Cut cut = cut_of(d);
  return (whole_share(d, x) - cut.below) / cut.within;
}

double quantile(const Distribution& d, double p) {
  double value = 0.0;
  quantiles(d, {&p, 1}, {&value, 1});
  return value;
}

void quantiles(const Distribution& d, std::span<const double> p, std::span<double> out) {
  const Cut cut = cut_of(d);
  const auto whole = [&](std::size_t i) { return cut.below + p[i] * cut.within; };
  switch (d.shape) {
    case DistributionShape::fixed:
      std::fill(out.begin(), out.end(), d.first);
      return;
    case DistributionShape::normal:
      normal_values(p.data(), out.data(), out.size(), d.first, d.second, cut.below, cut.within);
      break;
    case DistributionShape::lognormal:
      normal_values(p.data(), out.data(), out.size(), log_mean(d), log_sd(d), cut.below,
                    cut.within);
      for (double& value : out) value = std::exp(value);
      break;
    case DistributionShape::triangular:
      for (std::size_t i = 0; i < out.size(); ++i) out[i] = triangular_quantile(d, whole(i));
      break;
    case DistributionShape::uniform:
      for (std::size_t i = 0; i < out.size(); ++i) {
        out[i] = d.first + whole(i) * (d.second - d.first);
      }
      break;
  }
  clamp_all(d, out);
}

void require_within(const Distribution& d, std::string_view option, double least, double greatest,
                    bool greatest_open) {
  const bool fixed = d.shape == DistributionShape::fixed;
  const double low = fixed ? d.first : quantile(d, 1e-9);
  const double high = fixed ? d.first : quantile(d, 1.0 - 1e-9);
  const bool too_high = greatest_open ? high >= greatest : high > greatest;
  if (low >= least && !too_high) return;
  std::string accepted = fmt::format("{} or more", shortest(least));
  if (std::isfinite(greatest)) {
    accepted = fmt::format("{} {} {}", shortest(least), greatest_open ? "up to below" : "to",
                           shortest(greatest));
  }
  if (!fixed) {
    accepted +=
        ", by limits behind the distribution, as in " +
        fmt::format(
            "[{}..{}]", shortest(least),
            std::isfinite(greatest) ? shortest(greatest_open ? greatest - 1.0 : greatest) : "");
  }
  refuse(option, to_string(d),
         low < least ? "draws values that are too small" : "draws values that are too large",
         accepted);
}

}  // namespace brink
