// Distributions of uncertain inputs.
#pragma once

#include <limits>
#include <span>
#include <string>
#include <string_view>

namespace brink {

enum class DistributionShape { fixed, normal, lognormal, triangular, uniform };

// A value that is known, or known only by its distribution, cut to low..high where those are
// finite.
struct Distribution {
  DistributionShape shape = DistributionShape::fixed;
  // fixed: value. normal, lognormal: mean and standard deviation (of the value itself, not of its
  // logarithm). triangular: least, likeliest, greatest. uniform: least, greatest.
  double first = 0.0;
  double second = 0.0;
  double third = 0.0;
  double low = -std::numeric_limits<double>::infinity();
  double high = std::numeric_limits<double>::infinity();
  bool operator==(const Distribution&) const = default;
};

Distribution fixed_value(double value);

// "30", "normal(30, 3)", "lognormal(20, 8)", "triangular(20, 30, 35)", "uniform(0, 40)", any but
// the first followed by limits: "normal(30, 3)[20..40]", "[20..]", "[..40]". Throws
// ErrorKind::argument naming `option` and what would be accepted.
Distribution parse_distribution(std::string_view option, std::string_view text);
// The same form back.
std::string to_string(const Distribution& distribution);

// Share of the values below x, the limits taken into account. 0 <= p <= 1.
double cumulative(const Distribution& distribution, double x);

// The value below which a share p of the values lies, 0 < p < 1.
double quantile(const Distribution& distribution, double p);
// out[i] = quantile(p[i]); equally long. About 2 ns a normal value on a wide machine.
void quantiles(const Distribution& distribution, std::span<const double> p, std::span<double> out);

// Throws ErrorKind::argument naming `option` where values below `least` or above `greatest` can be
// drawn: what to write instead stands in the message. An open end is not itself allowed.
void require_within(const Distribution& distribution, std::string_view option, double least,
                    double greatest, bool greatest_open);

}  // namespace brink
