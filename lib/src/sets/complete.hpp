// What every result carries beside the statistics of each set by itself.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "brink/sets/sets.hpp"

namespace brink::detail {

// "J1", "J2", ...
std::vector<std::string> default_names(std::size_t count);

// The readings of set k (from 0) of the result.
struct Members {
  std::vector<Vector3> axes;
  std::vector<double> weights;
};
Members members_of(const Readings& readings, const SetsResult& result, std::size_t k);

// Adds the tests of fit, one entry a set, and where one fails the pattern and the bootstrap cone.
void add_fits(SetsResult& result, const Readings& readings,
              const std::vector<std::optional<FisherFitTests>>& fits);
// The tests of fit of sets that are whole samples.
std::vector<std::optional<FisherFitTests>> whole_fits(const SetsResult& result,
                                                      const Readings& readings,
                                                      const FindSetsOptions& options);

// Adds uniformity of all readings, comparisons of means, and warnings of small sets.
void complete(SetsResult& result, const Readings& readings);

}  // namespace brink::detail
