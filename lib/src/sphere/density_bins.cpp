#include "density_bins.hpp"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <span>

#include "brink/sphere/projection.hpp"

namespace brink {

namespace {

// A cell of up to this many distinct axes costs no more one by one.
constexpr std::size_t kFew = 3;

struct WeightedAxis {
  Vector3 axis;
  double weight;
};

bool before(const WeightedAxis& a, const WeightedAxis& b) {
  if (a.axis.x() != b.axis.x()) return a.axis.x() < b.axis.x();
  return a.axis.y() != b.axis.y() ? a.axis.y() < b.axis.y() : a.axis.z() < b.axis.z();
}

double weight_of(const std::vector<double>& weights, std::size_t i) {
  return weights.empty() ? 1.0 : weights[i];
}

// Square cells of an equal-area net: no cell is more than twice as long as it is wide.
class Grid {
 public:
  explicit Grid(double width)
      : side_(std::max(1.0, std::ceil(2.0 / (kCellsPerRadian * width)))),
        columns_(static_cast<std::size_t>(side_)) {}

  std::size_t cells() const { return columns_ * columns_; }
  std::uint32_t cell_of(const Vector3& lower) const {
    const Point2 p = project(Projection::equal_area, lower);
    return static_cast<std::uint32_t>(place(p.y()) * columns_ + place(p.x()));
  }

 private:
  // A radian is 0.5 to 1 of the net's radius, by place and direction.
  static constexpr double kCellsPerRadian = 0.6;
  std::size_t place(double v) const {
    const double at = std::clamp((v + 1.0) * 0.5 * side_, 0.0, side_ - 1.0);
    return static_cast<std::size_t>(at);
  }
  double side_;
  std::size_t columns_;
};

// The cell's axes where they are few enough, with summed weights; nothing otherwise.
std::vector<WeightedAxis> few_distinct(std::span<const WeightedAxis> cell) {
  std::vector<WeightedAxis> distinct;
  for (const WeightedAxis& a : cell) {
    const auto found = std::find_if(distinct.begin(), distinct.end(),
                                    [&](const WeightedAxis& d) { return d.axis == a.axis; });
    if (found != distinct.end()) {
      found->weight += a.weight;
    } else if (distinct.size() == kFew) {
      return {};
    } else {
      distinct.push_back(a);
    }
  }
  return distinct;
}

void add_moments(std::span<const WeightedAxis> cell, DensitySum& sum) {
  double weight = 0.0;
  Vector3 mean = Vector3::Zero();
  for (const WeightedAxis& a : cell) {
    weight += a.weight;
    mean += a.weight * a.axis;
  }
  mean /= weight;
  Eigen::Matrix3d spread = Eigen::Matrix3d::Zero();
  for (const WeightedAxis& a : cell) {
    const Vector3 d = a.axis - mean;
    spread += a.weight * d * d.transpose();
  }
  spread /= weight;
  sum.cells.add(mean, weight);
  DensityMoments& m = sum.moments;
  m.xx.push_back(spread(0, 0));
  m.yy.push_back(spread(1, 1));
  m.zz.push_back(spread(2, 2));
  m.xy.push_back(spread(0, 1));
  m.xz.push_back(spread(0, 2));
  m.yz.push_back(spread(1, 2));
}

}  // namespace

DensitySum distinct_axes(const std::vector<Vector3>& axes, const std::vector<double>& weights) {
  std::vector<WeightedAxis> all;
  all.reserve(axes.size());
  for (std::size_t i = 0; i < axes.size(); ++i) {
    all.push_back({lower_end(axes[i]), weight_of(weights, i)});
  }
  std::stable_sort(all.begin(), all.end(), before);
  DensitySum sum;
  for (std::size_t i = 0; i < all.size(); ++i) {
    if (i > 0 && all[i].axis == all[i - 1].axis) {
      sum.axes.weight.back() += all[i].weight;
    } else {
      sum.axes.add(all[i].axis, all[i].weight);
    }
  }
  return sum;
}

DensitySum binned_axes(const std::vector<Vector3>& axes, const std::vector<double>& weights,
                       double width) {
  const Grid grid(width);
  std::vector<std::uint32_t> cell_of(axes.size());
  std::vector<std::size_t> begin(grid.cells() + 1, 0);
  for (std::size_t i = 0; i < axes.size(); ++i) {
    cell_of[i] = grid.cell_of(lower_end(axes[i]));
    ++begin[cell_of[i] + 1];
  }
  for (std::size_t c = 1; c < begin.size(); ++c) begin[c] += begin[c - 1];
  std::vector<WeightedAxis> by_cell(axes.size());
  std::vector<std::size_t> next(begin.begin(), begin.end() - 1);
  for (std::size_t i = 0; i < axes.size(); ++i) {
    by_cell[next[cell_of[i]]++] = {lower_end(axes[i]), weight_of(weights, i)};
  }
  DensitySum sum;
  for (std::size_t c = 0; c + 1 < begin.size(); ++c) {
    const std::span<const WeightedAxis> cell(by_cell.data() + begin[c], begin[c + 1] - begin[c]);
    if (cell.empty()) continue;
    const auto few = few_distinct(cell);
    for (const WeightedAxis& a : few) sum.axes.add(a.axis, a.weight);
    if (few.empty()) add_moments(cell, sum);
  }
  return sum;
}

}  // namespace brink
