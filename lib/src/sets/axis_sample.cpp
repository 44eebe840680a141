#include <algorithm>
#include <array>
#include <cassert>
#include <cmath>
#include <cstdint>
#include <numeric>
#include <tuple>

#include "brink/sets/mixture.hpp"
#include "em_kernel.hpp"

namespace brink {

namespace {

// One of the two senses of an axis, without negative zeros: upward, then north, then east.
Vector3 canonical(const Vector3& axis) {
  const auto [x, y, z] = std::tuple(axis.x(), axis.y(), axis.z());
  const bool turn = z < 0.0 || (z == 0.0 && (y < 0.0 || (y == 0.0 && x < 0.0)));
  const Vector3 turned = turn ? Vector3(-axis) : axis;
  return turned + Vector3::Zero();
}

void append(AxisSample& sample, const Vector3& axis, double weight) {
  sample.x.push_back(axis.x());
  sample.y.push_back(axis.y());
  sample.z.push_back(axis.z());
  sample.weight.push_back(weight);
}

// Fills up to whole lanes with axes that weigh nothing.
void pad(AxisSample& sample) {
  sample.size = sample.x.size();
  while (sample.x.size() % detail::kLanes != 0) append(sample, Vector3::UnitZ(), 0.0);
}

// Scale that makes the weights sum to the effective number.
double effective_scale(std::span<const double> weights, std::size_t count, double& effective) {
  effective = static_cast<double>(count);
  if (weights.empty()) return 1.0;
  double sum = 0.0;
  double squares = 0.0;
  for (const double w : weights) {
    sum += w;
    squares += w * w;
  }
  effective = sum * sum / squares;
  return sum / squares;
}

// Sum of axes that fall into one cell, turned to the side of the first.
struct Cell {
  Vector3 sum = Vector3::Zero();
  double weight = 0.0;
};

}  // namespace

AxisSample merge_equal_axes(std::span<const Vector3> axes, std::span<const double> weights) {
  assert(weights.empty() || weights.size() == axes.size());
  std::vector<Vector3> turned;
  turned.reserve(axes.size());
  for (const Vector3& axis : axes) turned.push_back(canonical(axis));
  std::vector<std::size_t> order(axes.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  const auto key = [&](std::size_t i) {
    return std::tuple(turned[i].z(), turned[i].y(), turned[i].x(),
                      weights.empty() ? 1.0 : weights[i]);
  };
  std::sort(order.begin(), order.end(), [&](std::size_t a, std::size_t b) {
    const auto ka = key(a);
    const auto kb = key(b);
    return ka != kb ? ka < kb : a < b;
  });
  AxisSample sample;
  sample.merged.resize(axes.size());
  const double scale = effective_scale(weights, axes.size(), sample.total_weight);
  for (std::size_t k = 0; k < order.size(); ++k) {
    const std::size_t i = order[k];
    if (k == 0 || turned[order[k - 1]] != turned[i]) append(sample, turned[i], 0.0);
    sample.weight.back() += scale * (weights.empty() ? 1.0 : weights[i]);
    sample.merged[i] = sample.weight.size() - 1;
  }
  pad(sample);
  return sample;
}

AxisSample binned(const AxisSample& sample, Angle cell) {
  using Key = std::array<std::int32_t, 3>;
  const double step = cell.rad();
  std::vector<std::pair<Key, std::size_t>> keyed;
  keyed.reserve(sample.size);
  for (std::size_t i = 0; i < sample.size; ++i) {
    const auto part = [&](double v) { return static_cast<std::int32_t>(std::floor(v / step)); };
    keyed.push_back({Key{part(sample.z[i]), part(sample.y[i]), part(sample.x[i])}, i});
  }
  std::sort(keyed.begin(), keyed.end());
  AxisSample result;
  result.total_weight = sample.total_weight;
  result.merged.resize(sample.size);
  Cell current;
  const auto close = [&] {
    if (current.weight > 0.0) append(result, current.sum.normalized(), current.weight);
    current = {};
  };
  for (std::size_t k = 0; k < keyed.size(); ++k) {
    if (k > 0 && keyed[k].first != keyed[k - 1].first) close();
    const std::size_t i = keyed[k].second;
    current.sum += sample.weight[i] * sample.axis(i);
    current.weight += sample.weight[i];
    result.merged[i] = result.weight.size();
  }
  close();
  pad(result);
  return result;
}

}  // namespace brink
