#include "found_fit.hpp"

#include <algorithm>

#include "brink/base/parallel.hpp"
#include "brink/base/random.hpp"
#include "em_kernel.hpp"
#include "starts.hpp"

namespace brink::detail {

namespace {

constexpr std::size_t kThinnedTo = 2000;
constexpr std::size_t kReplicatesPerChunk = 16;

using Groups = std::vector<std::vector<Vector3>>;  // the axes of each component

Mixture made_round(const Mixture& mixture) {
  Mixture round = mixture;
  for (Component& c : round.components) c = with_shape(c, Shape::fisher);
  return round;
}

// Draw `index` of stream `stream` from a mixture of Fisher components.
Vector3 draw(const Mixture& mixture, std::uint64_t seed, std::uint64_t stream, std::size_t index) {
  double left = random_uniform(seed, stream, 3 * index) - mixture.uniform_weight;
  const double u = random_uniform(seed, stream, 3 * index + 1);
  const double v = random_uniform(seed, stream, 3 * index + 2);
  if (left < 0.0 || mixture.components.empty()) return draw_uniform(u, v);
  for (const Component& c : mixture.components) {
    left -= c.weight;
    if (left < 0.0) return draw_fisher(c.mean, c.kappa, u, v);
  }
  const Component& last = mixture.components.back();
  return draw_fisher(last.mean, last.kappa, u, v);
}

Groups replicate(const Mixture& round, const Mixture& mixture, std::size_t count,
                 std::uint64_t seed, std::size_t index) {
  AxisSample sample;
  sample.size = count;
  const std::size_t padded = (count + kLanes - 1) / kLanes * kLanes;
  for (std::size_t i = 0; i < padded; ++i) {
    const Vector3 axis = draw(round, seed, index, i);
    sample.x.push_back(axis.x());
    sample.y.push_back(axis.y());
    sample.z.push_back(axis.z());
    sample.weight.push_back(1.0);
  }
  const std::vector<int> labels = classify(mixture, sample);
  Groups groups(mixture.components.size());
  for (std::size_t i = 0; i < count; ++i) {
    if (labels[i] > 0) groups[static_cast<std::size_t>(labels[i]) - 1].push_back(sample.axis(i));
  }
  return groups;
}

// Statistics of each component's axes, where it has enough of them.
std::vector<std::optional<FisherFitStatistics>> statistics_of(const Groups& groups) {
  std::vector<std::optional<FisherFitStatistics>> statistics(groups.size());
  for (std::size_t k = 0; k < groups.size(); ++k) {
    const std::vector<Vector3> turned = turned_to_principal_axis(groups[k]);
    if (turned.size() >= kLeastForFit && scatters(vector_resultant(turned))) {
      statistics[k] = fisher_fit_statistics(turned);
    }
  }
  return statistics;
}

}  // namespace

std::vector<std::optional<FisherFitTests>> found_fits(const Mixture& mixture,
                                                      std::span<const Vector3> axes,
                                                      std::span<const int> assignment,
                                                      std::uint64_t seed, unsigned threads) {
  const std::size_t count = mixture.components.size();
  const std::size_t step = std::max<std::size_t>(1, (axes.size() + kThinnedTo - 1) / kThinnedTo);
  Groups observed(count);
  std::size_t used = 0;
  for (std::size_t i = 0; i < axes.size(); i += step, ++used) {
    if (assignment[i] > 0) observed[static_cast<std::size_t>(assignment[i]) - 1].push_back(axes[i]);
  }
  const Mixture round = made_round(mixture);
  const std::size_t draws = fit_draws(used);
  std::vector<std::vector<std::optional<FisherFitStatistics>>> drawn(draws);
  for_each_chunk(draws, kReplicatesPerChunk, threads,
                 [&](std::size_t, std::size_t begin, std::size_t end) {
                   for (std::size_t d = begin; d < end; ++d) {
                     drawn[d] = statistics_of(replicate(round, mixture, used, seed, d));
                   }
                 });
  std::vector<std::optional<FisherFitTests>> fits;
  for (std::size_t k = 0; k < count; ++k) {
    std::vector<FisherFitStatistics> replicates;
    for (const auto& one : drawn) {
      if (one[k]) replicates.push_back(*one[k]);
    }
    fits.push_back(fisher_fit(turned_to_principal_axis(observed[k]), replicates));
  }
  return fits;
}

}  // namespace brink::detail
