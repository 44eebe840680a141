#include "brink/sphere/goodness.hpp"

#include <algorithm>
#include <array>
#include <boost/math/distributions/chi_squared.hpp>
#include <boost/math/distributions/fisher_f.hpp>
#include <boost/math/distributions/normal.hpp>
#include <cassert>
#include <cmath>
#include <numbers>

#include "brink/base/parallel.hpp"
#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr std::size_t kThinnedTo = 1000;

// Largest distances of the empirical distribution above and below the stated one, from the sorted
// values of the stated distribution function at the data.
struct Distances {
  double above = 0.0;
  double below = 0.0;
};

Distances empirical_distances(std::vector<double> probabilities) {
  std::sort(probabilities.begin(), probabilities.end());
  const auto n = static_cast<double>(probabilities.size());
  Distances d;
  for (std::size_t i = 0; i < probabilities.size(); ++i) {
    const auto rank = static_cast<double>(i);
    d.above = std::max(d.above, (rank + 1.0) / n - probabilities[i]);
    d.below = std::max(d.below, probabilities[i] - rank / n);
  }
  return d;
}

double kolmogorov(std::vector<double> probabilities) {
  const Distances d = empirical_distances(std::move(probabilities));
  return std::max(d.above, d.below);
}

double kuiper(std::vector<double> probabilities) {
  const Distances d = empirical_distances(std::move(probabilities));
  return d.above + d.below;
}

// One vector in the frame of the mean: along the mean, and the two tangents.
struct Local {
  double along_mean;
  double across;
  double along;
};

std::vector<Local> in_frame_of(const Vector3& mean, std::span<const Vector3> vectors) {
  const Tangents t = tangents(mean);
  std::vector<Local> local;
  local.reserve(vectors.size());
  for (const Vector3& v : vectors) {
    local.push_back({v.dot(mean), v.dot(t.across), v.dot(t.along)});
  }
  return local;
}

double colatitude_statistic(const std::vector<Local>& local, double kappa) {
  std::vector<double> p;
  p.reserve(local.size());
  for (const Local& v : local) p.push_back(-std::expm1(-kappa * std::max(0.0, 1 - v.along_mean)));
  const auto n = static_cast<double>(local.size());
  return (kolmogorov(std::move(p)) - 0.2 / n) * (std::sqrt(n) + 0.26 + 0.5 / std::sqrt(n));
}

double longitude_statistic(const std::vector<Local>& local) {
  std::vector<double> p;
  p.reserve(local.size());
  for (const Local& v : local) {
    const double turns = std::atan2(v.along, v.across) / (2.0 * std::numbers::pi);
    p.push_back(turns < 0.0 ? turns + 1.0 : turns);
  }
  const double root = std::sqrt(static_cast<double>(local.size()));
  return kuiper(std::move(p)) * (root - 0.467 + 1.623 / root);
}

double two_variable_statistic(const std::vector<Local>& local) {
  std::vector<double> x;
  x.reserve(local.size());
  double squares = 0.0;
  for (const Local& v : local) {
    const double longitude = std::atan2(v.across, v.along_mean);
    x.push_back(longitude * std::sqrt(std::hypot(v.across, v.along_mean)));
    squares += x.back() * x.back();
  }
  const auto n = static_cast<double>(local.size());
  const boost::math::normal standard;
  const double spread = std::sqrt(squares / n);
  for (double& value : x) value = spread > 0.0 ? cdf(standard, value / spread) : 0.5;
  const double root = std::sqrt(n);
  return kolmogorov(std::move(x)) * (root - 0.01 + 0.85 / root);
}

constexpr std::array kTestNames = {"colatitude (exponential)", "longitude (uniform)",
                                   "two-variable (normal)"};

std::array<double, 3> as_array(const FisherFitStatistics& s) {
  return {s.colatitude, s.longitude, s.two_variable};
}

FisherFitTests with_p_values(const std::array<double, 3>& observed,
                             const std::array<std::size_t, 3>& as_large, std::size_t used) {
  std::array<TestResult, 3> tests;
  std::size_t worst = 0;
  for (std::size_t k = 0; k < 3; ++k) {
    const auto p = static_cast<double>(1 + as_large[k]) / static_cast<double>(1 + used);
    tests[k] = {observed[k], p};
    if (p < tests[worst].p_value) worst = k;
  }
  return {tests[0], tests[1], tests[2],
          FisherFit{kTestNames[worst], observed[worst], std::min(1.0, 3.0 * tests[worst].p_value)}};
}

// Every n-th axis, so that at most kThinnedTo are left.
std::vector<Vector3> thinned(std::span<const Vector3> axes) {
  const std::size_t step = (axes.size() + kThinnedTo - 1) / kThinnedTo;
  std::vector<Vector3> kept;
  for (std::size_t i = 0; i < axes.size(); i += std::max<std::size_t>(step, 1)) {
    kept.push_back(axes[i]);
  }
  return kept;
}

std::optional<CommonMean> watson_williams(std::span<const Resultant> samples,
                                          const std::vector<Vector3>& means) {
  const auto groups = static_cast<double>(samples.size());
  double total = 0.0;
  double lengths = 0.0;
  Vector3 sum = Vector3::Zero();
  for (std::size_t i = 0; i < samples.size(); ++i) {
    total += samples[i].count;
    lengths += samples[i].length;
    sum += samples[i].length * means[i];
  }
  if (samples.size() < 2 || total <= groups || at_least(lengths / total, 1.0)) return std::nullopt;
  const double between = std::max(0.0, lengths - sum.norm());
  CommonMean result;
  result.numerator_freedom = 2.0 * (groups - 1.0);
  result.denominator_freedom = 2.0 * (total - groups);
  result.test.statistic = (total - groups) / (groups - 1.0) * between / (total - lengths);
  const boost::math::fisher_f f(result.numerator_freedom, result.denominator_freedom);
  result.test.p_value = cdf(complement(f, result.test.statistic));
  return result;
}

double chi_square_tail(double statistic, double freedom) {
  return cdf(complement(boost::math::chi_squared(freedom), statistic));
}

}  // namespace

bool scatters(const Resultant& sample) {
  return sample.count > 1.0 && strictly_below(sample.length / sample.count, 1.0);
}

FisherFitStatistics fisher_fit_statistics(std::span<const Vector3> vectors) {
  const Resultant sample = vector_resultant(vectors);
  assert(scatters(sample));
  const std::vector<Local> local = in_frame_of(sample.mean, vectors);
  return {colatitude_statistic(local, *kappa_fisher(sample)), longitude_statistic(local),
          two_variable_statistic(local)};
}

std::optional<FisherFitTests> fisher_fit(std::span<const Vector3> vectors,
                                         std::span<const FisherFitStatistics> replicates) {
  if (vectors.size() < kLeastForFit || replicates.empty() || !scatters(vector_resultant(vectors))) {
    return std::nullopt;
  }
  const std::array<double, 3> observed = as_array(fisher_fit_statistics(vectors));
  std::array<std::size_t, 3> as_large{};
  for (const FisherFitStatistics& one : replicates) {
    const std::array<double, 3> values = as_array(one);
    for (std::size_t k = 0; k < 3; ++k) as_large[k] += values[k] >= observed[k] ? 1 : 0;
  }
  return with_p_values(observed, as_large, replicates.size());
}

std::size_t fit_draws(std::size_t count) {
  return std::clamp<std::size_t>(200000 / std::max<std::size_t>(count, 1), 199, 999);
}

std::optional<FisherFitTests> fisher_fit_axes(std::span<const Vector3> axes, std::uint64_t seed,
                                              unsigned threads) {
  const std::vector<Vector3> sample = turned_to_principal_axis(thinned(axes));
  const Resultant resultant = vector_resultant(sample);
  if (sample.size() < kLeastForFit || !scatters(resultant)) return std::nullopt;
  const double kappa = *kappa_fisher(resultant);
  std::vector<FisherFitStatistics> replicates(fit_draws(sample.size()));
  for_each_chunk(replicates.size(), 16, threads,
                 [&](std::size_t, std::size_t begin, std::size_t end) {
                   std::vector<Vector3> drawn(sample.size());
                   for (std::size_t d = begin; d < end; ++d) {
                     for (std::size_t i = 0; i < drawn.size(); ++i) {
                       drawn[i] = draw_fisher(resultant.mean, kappa, seed, d, i);
                     }
                     replicates[d] = fisher_fit_statistics(turned_to_principal_axis(drawn));
                   }
                 });
  return fisher_fit(sample, replicates);
}

std::optional<TestResult> bingham_uniformity(const OrientationTensor& tensor, double count) {
  if (strictly_below(count, 10.0)) return std::nullopt;
  double squares = 0.0;
  for (const double s : tensor.eigenvalues) squares += (s - 1.0 / 3.0) * (s - 1.0 / 3.0);
  const double statistic = 7.5 * count * squares;
  return TestResult{statistic, chi_square_tail(statistic, 5.0)};
}

TestResult rayleigh_uniformity(const Resultant& sample) {
  const double statistic = 3.0 * sample.length * sample.length / sample.count;
  return {statistic, chi_square_tail(statistic, 3.0)};
}

std::optional<CommonMean> common_mean(std::span<const Resultant> samples) {
  std::vector<Vector3> means;
  for (const Resultant& sample : samples) means.push_back(sample.mean);
  return watson_williams(samples, means);
}

std::optional<CommonMean> common_mean_axial(std::span<const Resultant> samples) {
  std::vector<Vector3> means;
  std::vector<double> lengths;
  for (const Resultant& sample : samples) {
    means.push_back(sample.mean);
    lengths.push_back(sample.length);
  }
  return watson_williams(samples, turned_to_principal_axis(means, lengths));
}

}  // namespace brink
