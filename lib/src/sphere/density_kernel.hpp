// The sums behind a kernel density: axes one by one, and cells of many axes by their moments.
#pragma once

#include <array>
#include <cstddef>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

// Terms of the sum, in columns: an axis with its weight, or a cell's mean vector (shorter than 1)
// with the weight of all its axes.
struct DensityTerms {
  std::vector<double> x, y, z, weight;  // z <= 0
  std::size_t size() const { return x.size(); }
  void add(const Vector3& v, double w) {
    x.push_back(v.x());
    y.push_back(v.y());
    z.push_back(v.z());
    weight.push_back(w);
  }
};

// Second moments about the means of cells: the weighted mean of d d^T, d = axis - mean.
struct DensityMoments {
  std::vector<double> xx, yy, zz, xy, xz, yz;
};

// A sum over axes, for any place x: sum of w exp(k(|x . a| - 1)). A cell of mean m and moments S
// stands for its axes with exp(k(|x . m| - 1) + k^2/2 x^T S x), the first two cumulants of x . a.
struct DensitySum {
  DensityTerms axes;
  DensityTerms cells;
  DensityMoments moments;
};

// Values of the sum at each place (unit vectors, either sense) for concentration k, plus the far
// half exp(-k(|t| + 1)) of each axis' kernel where `both_sides`, which takes no cells. Relative
// error 3e-9; terms below 2^-40 of their peak may be left out. The same bits for any number of
// threads.
std::vector<double> sum_at(const DensitySum& sum, double k, bool both_sides,
                           const std::vector<Vector3>& places, unsigned threads);

}  // namespace brink
