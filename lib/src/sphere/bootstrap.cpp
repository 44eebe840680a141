#include "brink/sphere/bootstrap.hpp"

#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"
#include "brink/sphere/fisher.hpp"

namespace brink {

namespace {

constexpr std::size_t kFewest = 5;
constexpr std::size_t kLargeSample = 2000;

double weight_of(std::span<const double> weights, std::size_t i) {
  return weights.empty() ? 1.0 : weights[i];
}

std::optional<Angle> large_sample_cone(std::span<const Vector3> axes,
                                       std::span<const double> weights, const Resultant& sample,
                                       double level) {
  double squares = 0.0;
  double total = 0.0;
  for (std::size_t i = 0; i < axes.size(); ++i) {
    const double t = axes[i].dot(sample.mean);
    squares += weight_of(weights, i) * t * t;
    total += weight_of(weights, i);
  }
  const double scatter = std::max(0.0, 1.0 - squares / total);
  const double r = sample.length / sample.count;
  const double sine = std::sqrt(-std::log1p(-level) * scatter / (sample.count * r * r));
  if (sine > 1.0) return std::nullopt;
  return asin(sine);
}

// Sine of the angle from the sample's mean to the mean of one resample.
double resample_sine(const std::vector<Vector3>& turned, std::span<const double> weights,
                     const Vector3& mean, std::uint64_t seed, std::uint64_t draw) {
  Vector3 sum = Vector3::Zero();
  for (std::size_t i = 0; i < turned.size(); ++i) {
    const std::size_t k = random_index(seed, draw, i, turned.size());
    sum += weight_of(weights, k) * turned[k];
  }
  const double length = sum.norm();
  if (length == 0.0) return 1.0;
  return (sum - sum.dot(mean) * mean).norm() / length;
}

}  // namespace

std::vector<std::uint32_t> resample_counts(std::size_t count, std::uint64_t seed,
                                           std::uint64_t draw) {
  std::vector<std::uint32_t> counts(count, 0);
  for (std::size_t i = 0; i < count; ++i) ++counts[random_index(seed, draw, i, count)];
  return counts;
}

std::optional<Angle> bootstrap_cone(std::span<const Vector3> axes, std::span<const double> weights,
                                    double level, std::uint64_t seed, std::size_t draws) {
  if (axes.size() < kFewest || draws == 0) return std::nullopt;
  const std::vector<Vector3> turned = turned_to_principal_axis(axes, weights);
  const Resultant sample = vector_resultant(turned, weights);
  if (axes.size() > kLargeSample) return large_sample_cone(turned, weights, sample, level);
  std::vector<double> sines(draws);
  for (std::size_t d = 0; d < draws; ++d) {
    sines[d] = resample_sine(turned, weights, sample.mean, seed, d);
  }
  std::sort(sines.begin(), sines.end());
  const auto rank = static_cast<std::size_t>(std::ceil(level * static_cast<double>(draws + 1)));
  return asin(sines[std::min(rank, draws) - 1]);
}

}  // namespace brink
