// Axes gathered into what a density sums over.
#pragma once

#include <vector>

#include "density_kernel.hpp"

namespace brink {

// Every distinct axis by itself, with the summed weight of its copies. O(N log N).
DensitySum distinct_axes(const std::vector<Vector3>& axes, const std::vector<double>& weights);

// Axes in cells about `width` radians across; a cell of few distinct axes keeps them by themselves.
// O(N).
DensitySum binned_axes(const std::vector<Vector3>& axes, const std::vector<double>& weights,
                       double width);

}  // namespace brink
