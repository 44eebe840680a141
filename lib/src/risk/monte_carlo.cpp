#include "brink/risk/monte_carlo.hpp"

#include <algorithm>
#include <bit>
#include <cmath>
#include <limits>
#include <memory>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/parallel.hpp"
#include "risk/draws.hpp"
#include "risk/wedge_kernel.hpp"

namespace brink {

namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();
constexpr std::uint64_t kChunk = 16 * kBlock;   // draws handed to a thread at a time
constexpr std::uint64_t kRound = 16 * kChunk;   // draws between two looks at the stop rule
constexpr std::uint32_t kMarked = 0x80000000U;  // a bucket that holds a quantile
constexpr std::uint64_t kMostDraws = 100'000'000;

void require(bool holds, const char* what, double value, const char* accepted) {
  if (!holds)
    throw Error(ErrorKind::argument, Place{.key = what}, "is out of range",
                std::isfinite(value) ? shortest(value) : "not finite", accepted);
}

void check(const WedgeSimulation& s) {
  const std::pair<const std::optional<Distribution>&, const char*> strengths[] = {
      {s.friction1, "friction of plane 1"}, {s.friction2, "friction of plane 2"}};
  for (const auto& [distribution, name] : strengths) {
    if (distribution) require_within(*distribution, name, 0.0, 90.0, true);
  }
  if (s.cohesion1) require_within(*s.cohesion1, "cohesion of plane 1", 0.0, kInfinity, true);
  if (s.cohesion2) require_within(*s.cohesion2, "cohesion of plane 2", 0.0, kInfinity, true);
  if (s.water_fill) require_within(*s.water_fill, "water fill", 0.0, 1.0, false);
  if (s.seismic) require_within(*s.seismic, "horizontal seismic coefficient", 0.0, kInfinity, true);
  for (const DrawnPlane* plane : {&s.plane1, &s.plane2}) {
    const double k = plane->fisher_k.value_or(1.0);
    require(k > 0.0 && std::isfinite(k), "concentration of a plane", k, "above 0");
  }
  require(std::abs(s.correlation) <= 1.0, "correlation", s.correlation, "-1 to 1");
  require(s.draws >= 1 && s.draws <= kMostDraws, "draws", static_cast<double>(s.draws),
          "1 to 100000000");
  if (s.target) require(*s.target > 0.0, "target factor of safety", *s.target, "above 0");
  if (s.until_error) {
    require(*s.until_error > 0.0, "standard error to stop at", *s.until_error, "above 0");
    require(s.sampling == Sampling::plain, "standard error to stop at", *s.until_error,
            "plain draws: a Latin hypercube has to be drawn whole");
  }
  if (s.water_fill && !std::holds_alternative<WaterFill>(s.wedge.water)) {
    throw Error(ErrorKind::argument, Place{.key = "water fill"},
                "is drawn although water pressures are stated", {}, "one of the two");
  }
  const bool drawn = s.friction1 || s.friction2 || s.cohesion1 || s.cohesion2;
  if (drawn && (!std::holds_alternative<MohrCoulomb>(s.wedge.strength1) ||
                !std::holds_alternative<MohrCoulomb>(s.wedge.strength2))) {
    throw Error(ErrorKind::argument, Place{.key = "strength"},
                "can only be drawn where both planes follow the Mohr-Coulomb law");
  }
  // The rest of the case is checked where it is used: once, on the mean planes.
  analyse_wedge(s.wedge);
}

// One draw by the full analysis.
WedgeCase drawn_case(const WedgeSimulation& s, const KernelBlock& b, std::size_t i) {
  WedgeCase w = s.wedge;
  w.geometry.plane1 = plane_of_normal({b.x1[i], b.y1[i], b.z1[i]});
  w.geometry.plane2 = plane_of_normal({b.x2[i], b.y2[i], b.z2[i]});
  if (s.friction1 || s.cohesion1) {
    w.strength1 = MohrCoulomb{b.cohesion1_kPa[i], atan2(b.tan1[i], 1.0)};
  }
  if (s.friction2 || s.cohesion2) {
    w.strength2 = MohrCoulomb{b.cohesion2_kPa[i], atan2(b.tan2[i], 1.0)};
  }
  if (std::holds_alternative<WaterFill>(w.water)) w.water = WaterFill{b.fill[i]};
  w.seismic.horizontal = b.shaking[i];
  return w;
}

double mode_code(WedgeMode mode) {
  switch (mode) {
    case WedgeMode::both:
      return 1.0;
    case WedgeMode::plane1:
      return 2.0;
    case WedgeMode::plane2:
      return 3.0;
    case WedgeMode::lifts:
      break;
  }
  return 4.0;
}

void run_full(const WedgeSimulation& s, KernelBlock& block, std::size_t count) {
  for (std::size_t i = 0; i < count; ++i) {
    const WedgeResult r = analyse_wedge(drawn_case(s, block, i));
    block.safety[i] = r.forms ? r.factor_of_safety : std::numeric_limits<double>::quiet_NaN();
    block.mode[i] = r.forms ? mode_code(r.contact.mode) : 0.0;
  }
}

struct Counts {
  std::uint64_t mode[5] = {};
  std::uint64_t below_one = 0;
  std::uint64_t below_target = 0;
  double sum = 0.0;  // of the finite factors of safety
  std::uint64_t finite = 0;

  void add(const Counts& other) {
    for (int k = 0; k < 5; ++k) mode[k] += other.mode[k];
    below_one += other.below_one;
    below_target += other.below_target;
    sum += other.sum;
    finite += other.finite;
  }
  std::uint64_t formed() const { return mode[1] + mode[2] + mode[3] + mode[4]; }
};

void count_block(const KernelBlock& block, std::size_t count, double target, Counts& counts) {
  for (std::size_t i = 0; i < count; ++i) {
    const double safety = block.safety[i];
    ++counts.mode[static_cast<std::size_t>(block.mode[i])];
    counts.below_one += safety < 1.0 ? 1U : 0U;
    counts.below_target += safety < target ? 1U : 0U;
    const bool finite = safety < kInfinity;  // false for not-a-number too
    counts.sum += finite ? safety : 0.0;
    counts.finite += finite ? 1U : 0U;
  }
}

// Draws first .. first + count - 1; their factors of safety go to `safeties`.
Counts run_round(const WedgeSimulation& s, const std::optional<KernelSetup>& setup,
                 std::uint64_t first, std::uint64_t count, double* safeties) {
  const double target = s.target.value_or(0.0);
  std::vector<Counts> parts(chunk_total(count, kChunk));
  for_each_chunk(count, kChunk, s.threads,
                 [&](std::size_t chunk, std::size_t begin, std::size_t end) {
                   const auto block = std::make_unique<KernelBlock>();
                   for (std::size_t at = begin; at < end; at += kBlock) {
                     const std::size_t some = std::min(kBlock, end - at);
                     fill_block(s, first + at, some, *block);
                     if (setup) {
                       run_kernel(*setup, *block, some);
                     } else {
                       run_full(s, *block, some);
                     }
                     count_block(*block, some, target, parts[chunk]);
                     std::copy_n(block->safety.begin(), some, safeties + at);
                   }
                 });
  Counts counts;
  for (const Counts& part : parts) counts.add(part);
  return counts;
}

Share share_of(std::uint64_t part, std::uint64_t whole) {
  const double n = static_cast<double>(whole);
  const double p = static_cast<double>(part) / n;
  return {p, std::sqrt(p * (1.0 - p) / n)};
}

// Standard error for the stop rule: as with one more draw on each side, so that a share that has
// not shown itself yet is not taken for certain.
double cautious_error(std::uint64_t part, std::uint64_t whole) {
  return share_of(part + 1, whole + 2).standard_error;
}

// Non-negative doubles order as their bits do: the top bits make a bucket.
std::size_t bucket_of(double safety) {
  constexpr int kept = 18;
  return static_cast<std::size_t>(std::bit_cast<std::uint64_t>(safety) >> (64 - kept));
}

// The values at these ranks (from 0, rising) among `safeties`, all of them >= 0: count the buckets,
// then sort the few buckets that hold a rank.
std::vector<double> values_at_ranks(const std::vector<double>& safeties,
                                    const std::vector<std::size_t>& ranks) {
  std::vector<std::uint32_t> counts(bucket_of(kInfinity) + 1);
  for (const double safety : safeties) ++counts[bucket_of(safety)];
  struct Slot {
    std::size_t bucket;
    std::size_t before;  // values in lower buckets
    std::vector<double> values;
  };
  std::vector<Slot> slots;
  std::size_t before = 0, next = 0;
  for (std::size_t bucket = 0; bucket < counts.size() && next < ranks.size(); ++bucket) {
    if (ranks[next] < before + counts[bucket]) {
      slots.push_back({bucket, before, {}});
      while (next < ranks.size() && ranks[next] < before + counts[bucket]) ++next;
      counts[bucket] |= kMarked;
    }
    before += counts[bucket] & ~kMarked;
  }
  for (const double safety : safeties) {
    if ((counts[bucket_of(safety)] & kMarked) == 0) continue;
    const auto slot =
        std::lower_bound(slots.begin(), slots.end(), bucket_of(safety),
                         [](const Slot& s, std::size_t bucket) { return s.bucket < bucket; });
    slot->values.push_back(safety);
  }
  for (Slot& slot : slots) std::sort(slot.values.begin(), slot.values.end());
  std::vector<double> found;
  for (const std::size_t rank : ranks) {
    const auto slot =
        std::find_if(slots.rbegin(), slots.rend(), [&](const Slot& s) { return s.before <= rank; });
    found.push_back(slot->values[rank - slot->before]);
  }
  return found;
}

std::vector<SafetyQuantile> quantiles_of(const std::vector<double>& safeties) {
  const std::vector<double> shares{0.01, 0.05, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95, 0.99};
  std::vector<std::size_t> ranks;
  for (const double share : shares) {
    const double rank = std::ceil(share * static_cast<double>(safeties.size()) - 1e-9);
    ranks.push_back(static_cast<std::size_t>(std::max(rank, 1.0)) - 1);
  }
  const std::vector<double> values = values_at_ranks(safeties, ranks);
  std::vector<SafetyQuantile> result;
  for (std::size_t i = 0; i < shares.size(); ++i) result.push_back({shares[i], values[i]});
  return result;
}

// A round width of 1, 2 or 5 times a power of ten that covers `reach` in at most 40 bins.
double bin_width(double reach) {
  constexpr double bins = 40.0;
  const double least = std::max(reach, 1e-3) / bins;
  const double power = std::pow(10.0, std::floor(std::log10(least)));
  for (const double step : {1.0, 2.0, 5.0}) {
    if (step * power >= least * (1.0 - 1e-12)) return step * power;
  }
  return 10.0 * power;
}

// Bins from 0 that reach the 99th percentile (at least 2), and one for all above.
std::vector<SafetyBin> histogram_of(const std::vector<double>& safeties, double percentile) {
  const double reach = std::clamp(percentile, 2.0, 20.0);
  const double width = bin_width(reach);
  const auto bins = static_cast<std::size_t>(std::ceil(reach / width - 1e-9));
  std::vector<SafetyBin> histogram(bins + 1);
  for (std::size_t k = 0; k <= bins; ++k) {
    histogram[k].from = static_cast<double>(k) * width;
    histogram[k].to = k == bins ? kInfinity : static_cast<double>(k + 1) * width;
  }
  for (const double safety : safeties) {
    const double place = safety / width;
    ++histogram[place < static_cast<double>(bins) ? static_cast<std::size_t>(place) : bins].count;
  }
  std::uint64_t below = 0;
  for (SafetyBin& bin : histogram) {
    below += bin.count;
    bin.cumulative = static_cast<double>(below) / static_cast<double>(safeties.size());
  }
  return histogram;
}

SimulationResult summed_up(const WedgeSimulation& s, const Counts& counts,
                           std::vector<double> safeties) {
  SimulationResult r;
  r.draws = safeties.size();
  r.formed = counts.formed();
  r.forms = share_of(r.formed, r.draws);
  r.fails = share_of(counts.below_one, r.draws);
  r.misses_target = share_of(counts.below_target, r.draws);
  r.both = counts.mode[1];
  r.plane1 = counts.mode[2];
  r.plane2 = counts.mode[3];
  r.lifts = counts.mode[4];
  if (r.formed == 0) {
    r.warnings.push_back("no wedge forms in any of the draws");
    return r;
  }
  r.below_one = share_of(counts.below_one, r.formed);
  if (s.target) r.below_target = share_of(counts.below_target, r.formed);
  if (counts.finite > 0) r.mean = counts.sum / static_cast<double>(counts.finite);
  std::erase_if(safeties, [](double safety) { return std::isnan(safety); });
  r.quantiles = quantiles_of(safeties);
  r.histogram = histogram_of(safeties, r.quantiles.back().factor_of_safety);
  return r;
}

}  // namespace

SimulationResult simulate_wedge(const WedgeSimulation& s) {
  check(s);
  std::optional<KernelSetup> setup;
  if (kernel_covers(s.wedge)) setup = kernel_setup(s.wedge);
  std::vector<double> safeties;
  if (!s.until_error) safeties.reserve(s.draws);
  Counts counts;
  bool early = false;
  while (safeties.size() < s.draws && !early) {
    const std::uint64_t first = safeties.size();
    const std::uint64_t count = std::min(kRound, s.draws - first);
    safeties.resize(first + count);
    counts.add(run_round(s, setup, first, count, safeties.data() + first));
    const std::uint64_t done = safeties.size();
    early =
        s.until_error && done < s.draws && cautious_error(counts.below_one, done) <= *s.until_error;
    if (s.progress) s.progress(static_cast<double>(done) / static_cast<double>(s.draws));
  }
  SimulationResult result = summed_up(s, counts, std::move(safeties));
  result.stopped_early = early;
  return result;
}

}  // namespace brink
