#include "brink/sets/stability.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

#include "brink/base/parallel.hpp"
#include "brink/sphere/bootstrap.hpp"
#include "search.hpp"

namespace brink {

namespace {

constexpr double kSmallestSet = 5.0;

// The readings as a sample whose weights can be drawn anew: `place` is where each reading stands.
struct Resampler {
  AxisSample sample;
  std::vector<std::size_t> place;
  std::vector<double> weight;  // of one drawing of each reading

  AxisSample draw(std::uint64_t seed, std::uint64_t index) const {
    AxisSample drawn = sample;
    std::fill(drawn.weight.begin(), drawn.weight.end(), 0.0);
    drawn.total_weight = 0.0;
    const auto counts = resample_counts(place.size(), seed, index);
    for (std::size_t i = 0; i < place.size(); ++i) {
      const double w = counts[i] * weight[i];
      drawn.weight[place[i]] += w;
      drawn.total_weight += w;
    }
    return drawn;
  }
};

Resampler make_resampler(const Readings& readings) {
  Resampler r;
  r.sample = merge_equal_axes(readings.normals, readings.weights);
  r.place = r.sample.merged;
  double sum = 0.0;
  double squares = 0.0;
  for (const double w : readings.weights) {
    sum += w;
    squares += w * w;
  }
  for (const double w : readings.weights) r.weight.push_back(w * sum / squares);
  if (!detail::needs_bins(r.sample)) return r;
  const AxisSample bins = detail::bins_for_search(r.sample);
  for (std::size_t& at : r.place) at = bins.merged[at];
  r.sample = bins;
  return r;
}

// For each component of `found` whether the resample has it again.
std::vector<char> returned(const Mixture& found, std::span<const Angle> cones,
                           std::span<const Mixture> candidates, const AxisSample& drawn) {
  std::optional<detail::Candidate> best;
  for (const Mixture& start : candidates) {
    detail::Candidate candidate = detail::refit(start, drawn);
    if (!best || candidate.criterion < best->criterion) best = std::move(candidate);
  }
  std::vector<char> back(found.components.size(), 0);
  for (std::size_t k = 0; best && k < back.size(); ++k) {
    const double limit = cos(cones[k]);
    for (const Component& c : best->fit.mixture.components) {
      const bool large = c.weight * drawn.total_weight >= kSmallestSet;
      if (large && std::abs(c.mean.dot(found.components[k].mean)) >= limit) back[k] = 1;
    }
  }
  return back;
}

}  // namespace

std::vector<double> set_stability(const Readings& readings, const Mixture& found,
                                  std::span<const Angle> cones, std::span<const Mixture> candidates,
                                  std::size_t resamples, std::uint64_t seed, unsigned threads) {
  const Resampler resampler = make_resampler(readings);
  std::vector<std::vector<char>> back(resamples);
  for_each_chunk(resamples, 1, threads, [&](std::size_t d, std::size_t, std::size_t) {
    back[d] = returned(found, cones, candidates, resampler.draw(seed, d));
  });
  std::vector<double> shares(found.components.size(), 0.0);
  for (const auto& one : back) {
    for (std::size_t k = 0; k < shares.size(); ++k) {
      shares[k] += one[k] / static_cast<double>(resamples);
    }
  }
  return shares;
}

}  // namespace brink
