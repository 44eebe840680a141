// Cones for the mean that assume no Fisher distribution.
#pragma once

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

// How often each of `count` readings was drawn, with replacement, in resample `draw`.
std::vector<std::uint32_t> resample_counts(std::size_t count, std::uint64_t seed,
                                           std::uint64_t draw);

// Half angle of the cone about the axial mean that held the share `level` of the means of resamples
// (Efron 1979, Ann. Statist. 7; Fisher & Hall 1989, Austral. J. Statist. 31, for directions).
// Above 2000 axes the large-sample form stands in for the resamples: asin(sqrt(-ln(1 - level)
// d/(N Rbar^2))), d = 1 - mean (x.m)^2 (Fisher, Lewis & Embleton 1987, 5.3.1). Absent for fewer
// than 5 axes, where resamples repeat too few values, and where the large-sample form exceeds 1.
std::optional<Angle> bootstrap_cone(std::span<const Vector3> axes,
                                    std::span<const double> weights = {}, double level = 0.95,
                                    std::uint64_t seed = 1, std::size_t draws = 999);

}  // namespace brink
