// Finding the mixture with the least criterion: how many components, of which shape, where.
#pragma once

#include <cstdint>
#include <optional>
#include <vector>

#include "brink/sets/mixture.hpp"

namespace brink::detail {

struct SearchOptions {
  std::optional<std::size_t> count;  // fixed number of components
  // Least expected weight of a component. Whatever it is, a component needs one reading more than
  // it has parameters, 5 round or 7 elliptical, unless `any_size`.
  double least_weight = 0.0;
  bool any_size = false;
  std::vector<Vector3> centres;  // where given: one component at each, no search for others
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

struct Candidate {
  MixtureFit fit;
  double criterion = 0.0;
};

// The best candidate found of each number of components: by_count[k] has k of them, or is absent
// where none fits (too few readings). Without a fixed count the search goes on until three more
// components than the best have not helped.
struct SearchResult {
  std::vector<std::optional<Candidate>> by_count;
  // The candidate with the least criterion, of the fixed count where there is one (or of the
  // nearest lower count that fits).
  const Candidate& best(std::optional<std::size_t> count) const;
};

SearchResult search_mixture(const AxisSample& sample, const SearchOptions& options);

// Whether a search runs on bins of the sample, and these bins.
bool needs_bins(const AxisSample& sample);
AxisSample bins_for_search(const AxisSample& sample);

// The candidate reached from `start` on another sample (a resample): no other places are tried.
Candidate refit(const Mixture& start, const AxisSample& sample);

}  // namespace brink::detail
