// Finding the mixture with the least criterion: how many components, of which shape, where.
#pragma once

#include <cstdint>
#include <optional>
#include <vector>

#include "brink/sets/mixture.hpp"

namespace brink::detail {

struct SearchOptions {
  std::optional<std::size_t> count;  // fixed number of components
  double least_weight = 3.0;         // least expected weight of a component
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

}  // namespace brink::detail
