// Goodness of fit of sets that were cut out of a mixture.
#pragma once

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

#include "brink/sets/mixture.hpp"
#include "brink/sphere/goodness.hpp"

namespace brink::detail {

// One entry a component: the fit of a Fisher distribution to the axes that `assignment` gives it
// (0 none, k component k). Replicates are drawn from the mixture with every component made a Fisher
// one, and divided by `mixture` as the readings were. At most 2000 evenly spaced axes are used.
std::vector<std::optional<FisherFitTests>> found_fits(const Mixture& mixture,
                                                      std::span<const Vector3> axes,
                                                      std::span<const int> assignment,
                                                      std::uint64_t seed, unsigned threads);

}  // namespace brink::detail
