#include "brink/sphere/fisher.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <boost/math/distributions/chi_squared.hpp>
#include <cassert>
#include <cmath>
#include <limits>
#include <numbers>

#include "brink/base/random.hpp"
#include "brink/base/ties.hpp"
#include "brink/sphere/tensor.hpp"

namespace brink {

namespace {

constexpr double kInfinite = std::numeric_limits<double>::infinity();
// Below this kappa the closed forms cancel, and five terms of the series are exact to rounding.
constexpr double kSmallKappa = 0.1;
// Above this kappa exp(-2 kappa) is nothing beside 1 and sinh would soon overflow.
constexpr double kLargeKappa = 300.0;

double weight_of(std::span<const double> weights, std::size_t i) {
  return weights.empty() ? 1.0 : weights[i];
}

// Identical directions: R = N on paper.
bool identical(const Resultant& sample) {
  return at_least(sample.length / sample.count, 1.0);
}

std::optional<double> kappa_with(const Resultant& sample, double loss) {
  if (!strictly_above(sample.count, std::max(loss, 1.0))) return std::nullopt;
  if (identical(sample)) return kInfinite;
  return (sample.count - loss) / (sample.count - sample.length);
}

// dA/dkappa = 1/kappa^2 - 1/sinh^2 kappa.
double mean_cosine_slope(double kappa) {
  if (kappa < kSmallKappa) {
    const double k2 = kappa * kappa;
    return 1.0 / 3.0 - k2 * (1.0 / 15.0 - k2 * (2.0 / 189.0 - k2 / 675.0));
  }
  const double s = std::exp(-kappa);
  const double cosecant = 2.0 * s / (1.0 - s * s);
  return 1.0 / (kappa * kappa) - cosecant * cosecant;
}

// From 1 - cos a, which keeps its digits for small angles.
Angle angle_of_versine(double versine) {
  return asin(std::sqrt(std::clamp(versine / 2.0, 0.0, 1.0))) * 2.0;
}

}  // namespace

Resultant vector_resultant(std::span<const Vector3> directions, std::span<const double> weights) {
  assert(weights.empty() || weights.size() == directions.size());
  Vector3 sum = Vector3::Zero();
  double total = 0.0;
  double squares = 0.0;
  for (std::size_t i = 0; i < directions.size(); ++i) {
    const double w = weight_of(weights, i);
    sum += w * directions[i];
    total += w;
    squares += w * w;
  }
  Resultant result;
  if (total == 0.0) return result;
  result.count = total * total / squares;
  result.length = result.count * std::min(1.0, sum.norm() / total);
  if (strictly_above(sum.norm() / total, 0.0)) result.mean = sum.normalized();
  return result;
}

std::vector<Vector3> turned_to_principal_axis(std::span<const Vector3> axes,
                                              std::span<const double> weights) {
  std::vector<Vector3> turned(axes.begin(), axes.end());
  if (axes.empty()) return turned;
  const Vector3 principal = orientation_tensor(axes, weights).axes[0];
  for (Vector3& axis : turned) {
    if (strictly_below(axis.dot(principal), 0.0)) axis = -axis;
  }
  return turned;
}

Resultant axial_resultant(std::span<const Vector3> axes, std::span<const double> weights) {
  return vector_resultant(turned_to_principal_axis(axes, weights), weights);
}

double mean_cosine(double kappa) {
  if (kappa < kSmallKappa) {
    const double k2 = kappa * kappa;
    return kappa *
           (1.0 / 3.0 -
            k2 * (1.0 / 45.0 - k2 * (2.0 / 945.0 - k2 * (1.0 / 4725.0 - k2 * 2.0 / 93555.0))));
  }
  return 1.0 / std::tanh(kappa) - 1.0 / kappa;
}

double kappa_of_mean_cosine(double r) {
  if (r <= 0.0) return 0.0;
  if (r >= 1.0) return kInfinite;
  // From kappa 20 up, coth kappa is 1 to rounding.
  if (r > 0.95) return 1.0 / (1.0 - r);
  double kappa = r * (3.0 - r * r) / (1.0 - r * r);
  for (int i = 0; i < 20; ++i) {
    const double step = (mean_cosine(kappa) - r) / mean_cosine_slope(kappa);
    kappa -= step;
    if (std::abs(step) <= 1e-15 * kappa) break;
  }
  return kappa;
}

std::optional<double> kappa_fisher(const Resultant& sample) {
  return kappa_with(sample, 1.0);
}

std::optional<double> kappa_unbiased(const Resultant& sample) {
  return kappa_with(sample, 2.0);
}

std::optional<double> kappa_maximum_likelihood(const Resultant& sample) {
  if (!strictly_above(sample.count, 1.0)) return std::nullopt;
  if (identical(sample)) return kInfinite;
  return kappa_of_mean_cosine(sample.length / sample.count);
}

std::optional<KappaInterval> kappa_interval(const Resultant& sample, double level) {
  assert(level > 0.0 && level < 1.0);
  if (!strictly_above(sample.count, 1.0) || identical(sample)) return std::nullopt;
  const boost::math::chi_squared chi(2.0 * (sample.count - 1.0));
  const double scale = 2.0 * (sample.count - sample.length);
  const double tail = (1.0 - level) / 2.0;
  return KappaInterval{quantile(chi, tail) / scale, quantile(complement(chi, tail)) / scale};
}

std::optional<Angle> confidence_cone(const Resultant& sample, double level) {
  assert(level > 0.0 && level < 1.0);
  if (!strictly_above(sample.count, 1.0) || sample.length <= 0.0) return std::nullopt;
  if (identical(sample)) return Angle{};
  const double spread = (sample.count - sample.length) / sample.length;
  const double versine = spread * std::expm1(-std::log1p(-level) / (sample.count - 1.0));
  if (versine > 2.0) return std::nullopt;
  return angle_of_versine(versine);
}

Angle containment_cone(double kappa, double share) {
  assert(kappa >= 0.0 && share >= 0.0 && share <= 1.0);
  if (kappa == 0.0) return angle_of_versine(2.0 * share);
  return angle_of_versine(-std::log1p(share * std::expm1(-2.0 * kappa)) / kappa);
}

Angle containment_cone_axial(double kappa, double share) {
  assert(kappa >= 0.0 && share >= 0.0 && share <= 1.0);
  if (kappa > kLargeKappa) {
    return share == 1.0 ? Angle::degrees(90.0) : angle_of_versine(-std::log1p(-share) / kappa);
  }
  if (kappa == 0.0) return acos(1.0 - share);
  return acos(std::asinh((1.0 - share) * std::sinh(kappa)) / kappa);
}

double log_axial_density(double kappa, double t) {
  assert(kappa >= 0.0);
  const double lean = std::min(std::abs(t), 1.0);
  if (kappa < 1e-8) return -std::log(4.0 * std::numbers::pi);
  // The bracket is kept together: apart, the large terms cancel.
  return std::log(kappa / (4.0 * std::numbers::pi)) + kappa * (lean - 1.0) +
         std::log1p(std::exp(-2.0 * kappa * lean)) - std::log(-std::expm1(-2.0 * kappa));
}

Tangents tangents(const Vector3& axis) {
  const Vector3 horizontal = Vector3::UnitZ().cross(axis);
  const bool vertical = at_most(horizontal.norm(), 0.0);
  const Vector3 across = vertical ? Vector3::UnitX() : Vector3(horizontal.normalized());
  return {across, axis.cross(across)};
}

Vector3 draw_fisher(const Vector3& mean, double kappa, double u, double v) {
  assert(kappa > 0.0);
  // 1 - cos theta, so that tight clusters keep their digits.
  const double versine = -std::log(u + (1.0 - u) * std::exp(-2.0 * kappa)) / kappa;
  const double sine = std::sqrt(std::max(0.0, versine * (2.0 - versine)));
  const double turn = 2.0 * std::numbers::pi * v;
  const Tangents t = tangents(mean);
  return ((1.0 - versine) * mean + sine * (std::cos(turn) * t.across + std::sin(turn) * t.along))
      .normalized();
}

Vector3 draw_fisher(const Vector3& mean, double kappa, std::uint64_t seed, std::uint64_t stream,
                    std::uint64_t index) {
  return draw_fisher(mean, kappa, random_uniform(seed, stream, 2 * index),
                     random_uniform(seed, stream, 2 * index + 1));
}

Vector3 draw_uniform(double u, double v) {
  const double z = 2.0 * u - 1.0;
  const double r = std::sqrt(std::max(0.0, 1.0 - z * z));
  return {r * std::cos(2.0 * std::numbers::pi * v), r * std::sin(2.0 * std::numbers::pi * v), z};
}

}  // namespace brink
