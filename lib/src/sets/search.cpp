#include "search.hpp"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <utility>

#include "brink/base/parallel.hpp"
#include "starts.hpp"

namespace brink::detail {

namespace {

// More distinct axes than this are binned for the search; the fits chosen are refined on all.
// Cells of 2 degrees move a reading by at most half that, which is nothing beside a set's spread.
constexpr std::size_t kSearchAll = 2500;
constexpr double kSearchCell_deg = 2.0;
// Steps that rank starts, and steps that finish the best of them.
constexpr FitLimits kScreen{25, 1e-6};
constexpr FitLimits kFinish{300, 1e-8};
constexpr FitLimits kRefine{2000, 1e-11};
// After a search on bins little is left to gain, and a step costs a pass over all readings.
constexpr FitLimits kRefineBinned{60, 1e-8};
constexpr FitLimits kResample{100, 1e-5};
constexpr std::size_t kFinished = 4;      // starts of each count that are finished
constexpr std::size_t kSpreadStarts = 4;  // of each shape
constexpr std::size_t kPeaks = 4;
constexpr std::size_t kBeyondBest = 2;  // counts tried past the best one
// Greatest number of sets looked for unasked. With 10^5 and more readings every small departure
// from the shapes of the components would buy another one, and nobody designs for more than a
// dozen.
constexpr std::size_t kGreatestCount = 12;
constexpr std::size_t kMergesPerComponent = 2;  // pairs tried, nearest means first

class Search {
 public:
  Search(const AxisSample& sample, const SearchOptions& options)
      : sample_(sample), options_(options) {}

  SearchResult run();
  SearchResult run_from_centres();

 private:
  bool fits(const Mixture& mixture) const;
  std::vector<Candidate> fitted(const std::vector<Mixture>& starts, const FitLimits& limits) const;
  void consider(const Candidate& candidate);
  std::vector<Mixture> starts_for(std::size_t count) const;
  void finish(std::vector<Candidate> candidates);
  bool improve_shapes(std::size_t count);
  bool improve_by_moves(std::size_t count);
  std::size_t best_count() const;
  void explore(std::size_t count);

  const AxisSample& sample_;
  const SearchOptions& options_;
  SearchResult result_;
  // The best with one shape throughout: parents for the next count, whatever is best overall.
  std::vector<std::optional<Candidate>> best_fisher_;
  std::vector<std::optional<Candidate>> best_elliptical_;
};

// One reading more than the component has parameters.
double least_weight_of(Shape shape) {
  return 1.0 + static_cast<double>(parameter_count(shape));
}

bool better(const Candidate& a, const std::optional<Candidate>& b) {
  return !b || a.criterion < b->criterion;
}

bool same(const std::optional<Candidate>& a, const std::optional<Candidate>& b) {
  return a && b && a->criterion == b->criterion;
}

bool all_of_shape(const Mixture& mixture, Shape shape) {
  return std::all_of(mixture.components.begin(), mixture.components.end(),
                     [&](const Component& c) { return c.shape == shape; });
}

bool Search::fits(const Mixture& mixture) const {
  return std::all_of(mixture.components.begin(), mixture.components.end(), [&](const Component& c) {
    const double own = options_.any_size ? 1.0 : least_weight_of(c.shape);
    return c.weight * sample_.total_weight >= std::max(own, options_.least_weight);
  });
}

// Candidates in the order of their starts; those with too small a component are left out.
std::vector<Candidate> Search::fitted(const std::vector<Mixture>& starts,
                                      const FitLimits& limits) const {
  std::vector<Candidate> all(starts.size());
  for_each_chunk(starts.size(), 1, options_.threads, [&](std::size_t i, std::size_t, std::size_t) {
    all[i].fit = fit_mixture(starts[i], sample_, limits);
    all[i].criterion = bic(all[i].fit.mixture, all[i].fit.log_likelihood, sample_.total_weight);
  });
  std::erase_if(all, [&](const Candidate& c) { return !fits(c.fit.mixture); });
  std::stable_sort(all.begin(), all.end(), [](const Candidate& a, const Candidate& b) {
    return a.criterion < b.criterion;
  });
  return all;
}

void Search::consider(const Candidate& candidate) {
  const std::size_t count = candidate.fit.mixture.components.size();
  for (auto* list : {&result_.by_count, &best_fisher_, &best_elliptical_}) {
    if (list->size() <= count) list->resize(count + 1);
  }
  if (better(candidate, result_.by_count[count])) result_.by_count[count] = candidate;
  if (all_of_shape(candidate.fit.mixture, Shape::fisher) &&
      better(candidate, best_fisher_[count])) {
    best_fisher_[count] = candidate;
  }
  if (all_of_shape(candidate.fit.mixture, Shape::elliptical) &&
      better(candidate, best_elliptical_[count])) {
    best_elliptical_[count] = candidate;
  }
}

std::vector<Mixture> Search::starts_for(std::size_t count) const {
  std::vector<Mixture> starts;
  const auto grow = [&](const std::optional<Candidate>& parent, Shape shape) {
    if (!parent) return;
    const Mixture& mixture = parent->fit.mixture;
    for (const Peak& p : peaks(mixture, sample_, kPeaks, Angle::degrees(15))) {
      starts.push_back(with_added(mixture, p.axis, p.kappa, shape));
    }
    for (std::size_t i = 0; i < mixture.components.size(); ++i) {
      starts.push_back(with_split(mixture, i, sample_));
    }
  };
  const auto& best = result_.by_count[count - 1];
  grow(best, Shape::fisher);
  // The best overall is often all of one shape: then its own list holds the same candidate.
  if (!same(best_fisher_[count - 1], best)) grow(best_fisher_[count - 1], Shape::fisher);
  if (count == 1 || !same(best_elliptical_[count - 1], best)) {
    grow(best_elliptical_[count - 1], Shape::elliptical);
  }
  for (std::size_t i = 0; i < kSpreadStarts; ++i) {
    for (const Shape shape : {Shape::fisher, Shape::elliptical}) {
      starts.push_back(spread_start(sample_, count, shape, options_.seed, 1000 * count + i));
    }
  }
  return starts;
}

// Runs the best few of each shape to the end.
void Search::finish(std::vector<Candidate> candidates) {
  std::vector<Mixture> starts;
  for (const Shape shape : {Shape::fisher, Shape::elliptical}) {
    std::size_t taken = 0;
    for (const Candidate& c : candidates) {
      if (taken == kFinished) break;
      if ((c.fit.mixture.components.back().shape == shape)) {
        starts.push_back(c.fit.mixture);
        ++taken;
      }
    }
  }
  for (const Candidate& c : fitted(starts, kFinish)) consider(c);
}

// Changes one component's shape at a time as long as the criterion falls. True if it did.
bool Search::improve_shapes(std::size_t count) {
  bool improved = false;
  for (bool again = true; again;) {
    again = false;
    std::vector<Mixture> starts;
    for (const auto* from : {&result_.by_count, &best_fisher_, &best_elliptical_}) {
      if (!(*from)[count]) continue;
      const Mixture& mixture = (*from)[count]->fit.mixture;
      if (from != &result_.by_count && improved) continue;
      for (std::size_t i = 0; i < count; ++i) {
        starts.push_back(mixture);
        Component& c = starts.back().components[i];
        c = with_shape(c, c.shape == Shape::fisher ? Shape::elliptical : Shape::fisher);
      }
    }
    std::vector<Candidate> screened = fitted(starts, kScreen);
    if (screened.size() > 2) screened.resize(2);
    std::vector<Mixture> finalists;
    for (const Candidate& c : screened) finalists.push_back(c.fit.mixture);
    for (const Candidate& c : fitted(finalists, kFinish)) {
      again = again || c.criterion < result_.by_count[count]->criterion - 1e-6;
      consider(c);
    }
    improved = improved || again;
  }
  return improved;
}

std::size_t Search::best_count() const {
  std::size_t best = 0;
  for (std::size_t k = 1; k < result_.by_count.size(); ++k) {
    const auto& candidate = result_.by_count[k];
    if (candidate && better(*candidate, result_.by_count[best])) best = k;
  }
  return best;
}

void Search::explore(std::size_t count) {
  finish(fitted(starts_for(count), kScreen));
  if (result_.by_count.size() > count && result_.by_count[count]) improve_shapes(count);
}

// Pairs of components, nearest means first: far ones have nothing to gain by merging.
std::vector<std::pair<std::size_t, std::size_t>> nearest_pairs(const Mixture& mixture) {
  struct Pair {
    double cosine;
    std::size_t i;
    std::size_t j;
  };
  const std::size_t count = mixture.components.size();
  std::vector<Pair> all;
  for (std::size_t i = 0; i < count; ++i) {
    for (std::size_t j = i + 1; j < count; ++j) {
      all.push_back({std::abs(mixture.components[i].mean.dot(mixture.components[j].mean)), i, j});
    }
  }
  std::stable_sort(all.begin(), all.end(),
                   [](const Pair& a, const Pair& b) { return a.cosine > b.cosine; });
  std::vector<std::pair<std::size_t, std::size_t>> pairs;
  for (const Pair& p : all) {
    if (pairs.size() == kMergesPerComponent * count) break;
    pairs.emplace_back(p.i, p.j);
  }
  return pairs;
}

// Merges pairs of the best mixture of `count` into one component of either shape.
bool Search::improve_by_moves(std::size_t count) {
  if (count < 2 || !result_.by_count[count]) return false;
  const Mixture mixture = result_.by_count[count]->fit.mixture;
  std::vector<Mixture> starts;
  for (const auto& [i, j] : nearest_pairs(mixture)) {
    for (const Shape shape : {Shape::fisher, Shape::elliptical}) {
      starts.push_back(with_merged(mixture, i, j, shape));
    }
  }
  const auto before = result_.by_count[count - 1];
  finish(fitted(starts, kScreen));
  const auto& after = result_.by_count[count - 1];
  const bool improved = after && (!before || after->criterion < before->criterion - 1e-6);
  if (improved) improve_shapes(count - 1);
  return improved;
}

SearchResult Search::run() {
  for (auto* list : {&result_.by_count, &best_fisher_, &best_elliptical_}) list->resize(1);
  consider(fitted({Mixture{}}, kScreen).front());
  const std::size_t last = options_.count.value_or(kGreatestCount);
  for (std::size_t k = 1; k <= last; ++k) {
    if (static_cast<double>(k) > sample_.total_weight || result_.by_count.size() < k ||
        !result_.by_count[k - 1])
      break;
    explore(k);
    if (!options_.count && k >= best_count() + kBeyondBest) break;
  }
  for (std::size_t k = result_.by_count.size() - 1; k >= 2; --k) improve_by_moves(k);
  return std::move(result_);
}

// One component at each centre; only their shapes are tried.
SearchResult Search::run_from_centres() {
  const std::size_t count = options_.centres.size();
  for (auto* list : {&result_.by_count, &best_fisher_, &best_elliptical_}) list->resize(count + 1);
  consider(fitted({centred_start(options_.centres)}, kFinish).front());
  improve_shapes(count);
  return std::move(result_);
}

// The candidates on all of the sample: every one is weighed there, so that they stay comparable,
// and those within `close` of the best are fitted to the end.
void refine(SearchResult& result, const AxisSample& sample, const FitLimits& limits,
            const SearchOptions& options) {
  constexpr double close = 20.0;
  const auto fit = [&](Candidate& candidate, const FitLimits& steps) {
    candidate.fit = fit_mixture(candidate.fit.mixture, sample, steps, options.threads);
    candidate.criterion =
        bic(candidate.fit.mixture, candidate.fit.log_likelihood, sample.total_weight);
  };
  for (auto& candidate : result.by_count) {
    if (candidate) fit(*candidate, {1, 0.0});
  }
  const auto count =
      options.centres.empty() ? options.count : std::optional(options.centres.size());
  const double limit = result.best(count).criterion + close;
  for (auto& candidate : result.by_count) {
    if (candidate && candidate->criterion <= limit) fit(*candidate, limits);
  }
}

}  // namespace

const Candidate& SearchResult::best(std::optional<std::size_t> count) const {
  if (count) {
    std::size_t k = std::min(*count, by_count.size() - 1);
    while (!by_count[k]) --k;
    return *by_count[k];
  }
  const std::optional<Candidate>* best = &by_count.front();
  for (const auto& candidate : by_count) {
    if (candidate && candidate->criterion < (*best)->criterion) best = &candidate;
  }
  return **best;
}

bool needs_bins(const AxisSample& sample) {
  return sample.size > kSearchAll;
}

AxisSample bins_for_search(const AxisSample& sample) {
  return binned(sample, Angle::degrees(kSearchCell_deg));
}

Candidate refit(const Mixture& start, const AxisSample& sample) {
  Candidate candidate;
  candidate.fit = fit_mixture(start, sample, kResample);
  candidate.criterion =
      bic(candidate.fit.mixture, candidate.fit.log_likelihood, sample.total_weight);
  return candidate;
}

SearchResult search_mixture(const AxisSample& sample, const SearchOptions& options) {
  assert(sample.size > 0);
  const bool bin = needs_bins(sample);
  const AxisSample fewer = bin ? bins_for_search(sample) : AxisSample{};
  Search search(bin ? fewer : sample, options);
  SearchResult result = options.centres.empty() ? search.run() : search.run_from_centres();
  refine(result, sample, bin ? kRefineBinned : kRefine, options);
  return result;
}

}  // namespace brink::detail
