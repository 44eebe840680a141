#include "intervals.hpp"

#include <algorithm>
#include <cstddef>

#include "brink/base/parallel.hpp"
#include "brink/base/random.hpp"

namespace brink {

namespace {

constexpr std::size_t kResamples = 999;
constexpr std::size_t kLow = 24;  // the 25th and the 975th of 999
constexpr std::size_t kHigh = 974;
constexpr std::size_t kGroups = 10000;
constexpr std::uint64_t kGroupStream = kResamples;  // streams 0 .. 998 are the resamples

using Counts = std::vector<std::uint64_t>;

// Sums over groups of readings that are resampled whole; one reading each while they are few.
struct Sums {
  Counts admissible;
  Counts tested;
  std::uint64_t admissible_total = 0;
  std::uint64_t tested_total = 0;
  int order = 1;
};

Counts grouped(std::span<const std::uint64_t> values, std::uint64_t seed) {
  if (values.size() <= kGroups) return {values.begin(), values.end()};
  Counts sums(kGroups);
  for (std::size_t i = 0; i < values.size(); ++i) {
    sums[random_index(seed, kGroupStream, i, kGroups)] += values[i];
  }
  return sums;
}

std::uint64_t total(const Counts& values) {
  std::uint64_t sum = 0;
  for (const std::uint64_t value : values) sum += value;
  return sum;
}

// How often each group is drawn in one resample.
std::vector<std::uint32_t> multiplicities(std::size_t size, std::uint64_t seed,
                                          std::uint64_t stream) {
  std::vector<std::uint32_t> times(size);
  for (std::size_t draw = 0; draw < size; ++draw) ++times[random_index(seed, stream, draw, size)];
  return times;
}

std::uint64_t drawn(const Counts& values, const std::vector<std::uint32_t>& times) {
  std::uint64_t sum = 0;
  for (std::size_t i = 0; i < values.size(); ++i) sum += values[i] * times[i];
  return sum;
}

// The share in one resample; nothing where it tests nothing.
std::optional<double> resampled_share(const Sums& sums, const std::vector<std::uint32_t>& times) {
  const auto tested = static_cast<double>(drawn(sums.tested, times));
  if (tested == 0.0) return std::nullopt;
  const auto admissible = static_cast<double>(drawn(sums.admissible, times));
  const double share = admissible / tested;
  if (sums.order == 1) return share;
  // (1 + d)^2 of the admissible pairs over the same of the tested ones.
  const double whole =
      static_cast<double>(sums.admissible_total) / static_cast<double>(sums.tested_total);
  return std::min(share * share / whole, 1.0);
}

std::optional<ShareInterval> percentiles(std::vector<double> shares) {
  if (shares.empty()) return std::nullopt;
  std::sort(shares.begin(), shares.end());
  // All 999 but where resamples that tested nothing are missing.
  const std::size_t last = shares.size() - 1;
  return ShareInterval{shares[kLow * last / (kResamples - 1)],
                       shares[kHigh * last / (kResamples - 1)]};
}

}  // namespace

std::vector<std::optional<ShareInterval>> share_intervals(const std::vector<ShareSample>& samples,
                                                          std::uint64_t seed, unsigned threads) {
  std::vector<std::optional<ShareInterval>> intervals(samples.size());
  if (samples.empty() || samples.front().tested.size() < 2) return intervals;
  std::vector<Sums> sums;
  for (const ShareSample& sample : samples) {
    Sums s{grouped(sample.admissible, seed), grouped(sample.tested, seed), 0, 0, sample.order};
    s.admissible_total = total(s.admissible);
    s.tested_total = total(s.tested);
    sums.push_back(std::move(s));
  }
  const std::size_t size = sums.front().tested.size();
  std::vector<std::vector<std::optional<double>>> shares(
      samples.size(), std::vector<std::optional<double>>(kResamples));
  for_each_chunk(kResamples, 16, threads, [&](std::size_t, std::size_t begin, std::size_t end) {
    for (std::size_t b = begin; b < end; ++b) {
      const auto times = multiplicities(size, seed, b);
      for (std::size_t s = 0; s < sums.size(); ++s) {
        if (sums[s].admissible_total > 0) shares[s][b] = resampled_share(sums[s], times);
      }
    }
  });
  for (std::size_t s = 0; s < sums.size(); ++s) {
    if (sums[s].tested_total > 0 && sums[s].admissible_total == 0) intervals[s] = ShareInterval{};
    if (sums[s].admissible_total == 0) continue;
    std::vector<double> known;
    for (const auto& share : shares[s]) {
      if (share) known.push_back(*share);
    }
    intervals[s] = percentiles(std::move(known));
  }
  return intervals;
}

}  // namespace brink
