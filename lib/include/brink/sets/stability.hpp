// Would the sets come back had other joints been logged?
#pragma once

#include <cstdint>
#include <span>
#include <vector>

#include "brink/readings/readings.hpp"
#include "brink/sets/mixture.hpp"

namespace brink {

// A set that came back in fewer resamples than this is doubtful. A steady set's mean stays in its
// 95 % cone in about 95 of 100 resamples; 3 in 4 leaves room for the fit of other sets.
inline constexpr double kDoubtfulBelow = 0.75;

// For each component of `found` the share of resamples of the readings (with replacement) in which
// a component of what is found has its mean within `cones[k]` of the k-th one's. In each resample
// the mixtures in question (`candidates`, `found` among them) are fitted again from where they are;
// the one with the least criterion counts, components of fewer than 5 readings left out. Same
// numbers for any thread count. Cost: a few tens of EM steps a candidate and resample; above 2500
// distinct readings they run on bins of 2 degrees.
std::vector<double> set_stability(const Readings& readings, const Mixture& found,
                                  std::span<const Angle> cones, std::span<const Mixture> candidates,
                                  std::size_t resamples, std::uint64_t seed, unsigned threads);

}  // namespace brink
