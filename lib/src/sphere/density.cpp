#include "brink/sphere/density.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <numeric>
#include <span>

#include "base/fast_math.hpp"
#include "brink/base/error.hpp"
#include "brink/base/parallel.hpp"

namespace brink {

namespace {

constexpr double kGreatestConcentration = 10000.0;

// From here on the kernel's far half adds at most k exp(-k), 2e-16 of uniform, and is left out.
constexpr double kOneSided = 40.0;

// Places handled together: their sums stay in the first-level cache while all axes pass by.
constexpr std::size_t kBlock = 256;

struct Block {
  std::array<double, kBlock> x, y, z, sum;
};

struct Kernel {
  double exponent;  // k / ln 2
  double far;       // exp(-2k), or 0
  double scale;     // k / (1 - exp(-2k))
};

Kernel kernel_of(double k) {
  const double far = std::exp(-2.0 * k);
  return {k * std::numbers::log2e, k < kOneSided ? far : 0.0, k / (1.0 - far)};
}

// Adds the kernel of every axis at every place of the block; k cosh(kt)/sinh(k) is scale times
// (near + far / near), near = exp(k(|t| - 1)).
BRINK_CLONES void add_axes(std::span<const double> x, std::span<const double> y,
                           std::span<const double> z, std::span<const double> weight,
                           const Kernel& kernel, Block& block) {
  const double exponent = kernel.exponent;
  for (std::size_t i = 0; i < x.size(); ++i) {
    const double ax = x[i], ay = y[i], az = z[i], w = weight[i];
    for (std::size_t j = 0; j < kBlock; ++j) {
      const double t = std::abs(ax * block.x[j] + ay * block.y[j] + az * block.z[j]);
      block.sum[j] += w * fast_exp2(exponent * t - exponent);
    }
  }
}

BRINK_CLONES void add_axes_two_sided(std::span<const double> x, std::span<const double> y,
                                     std::span<const double> z, std::span<const double> weight,
                                     const Kernel& kernel, Block& block) {
  const double exponent = kernel.exponent;
  const double far = kernel.far;
  for (std::size_t i = 0; i < x.size(); ++i) {
    const double ax = x[i], ay = y[i], az = z[i], w = weight[i];
    for (std::size_t j = 0; j < kBlock; ++j) {
      const double t = std::abs(ax * block.x[j] + ay * block.y[j] + az * block.z[j]);
      const double near = fast_exp2(exponent * t - exponent);
      block.sum[j] += w * (near + far / near);
    }
  }
}

struct WeightedAxis {
  double x, y, z, weight;
  bool before(const WeightedAxis& other) const {
    if (x != other.x) return x < other.x;
    return y != other.y ? y < other.y : z < other.z;
  }
  bool same(const WeightedAxis& other) const {
    return x == other.x && y == other.y && z == other.z;
  }
};

// Whole-degree readings repeat; equal ones become one with their summed weight.
std::vector<WeightedAxis> merged(const std::vector<Vector3>& axes,
                                 const std::vector<double>& weights) {
  std::vector<WeightedAxis> all(axes.size());
  for (std::size_t i = 0; i < axes.size(); ++i) {
    const Vector3 v = axes[i].z() > 0.0 ? Vector3(-axes[i]) : axes[i];
    all[i] = {v.x(), v.y(), v.z(), weights.empty() ? 1.0 : weights[i]};
  }
  std::stable_sort(all.begin(), all.end(),
                   [](const auto& a, const auto& b) { return a.before(b); });
  std::size_t kept = 0;
  for (std::size_t i = 1; i < all.size(); ++i) {
    if (all[i].same(all[kept])) {
      all[kept].weight += all[i].weight;
    } else {
      all[++kept] = all[i];
    }
  }
  all.resize(kept + 1);
  return all;
}

double effective_number(const std::vector<double>& weights, std::size_t count) {
  if (weights.empty()) return static_cast<double>(count);
  double sum = 0.0, squares = 0.0;
  for (const double w : weights) {
    sum += w;
    squares += w * w;
  }
  return sum * sum / squares;
}

// Quarter turns of (x, y), exact.
Vector3 turned(const Vector3& v, int quarters) {
  switch (quarters) {
    case 0:
      return v;
    case 1:
      return {-v.y(), v.x(), v.z()};
    case 2:
      return {-v.x(), -v.y(), v.z()};
    default:
      return {v.y(), -v.x(), v.z()};
  }
}

// Index of node `step` of quarter `quarter` of a ring; step may be the next quarter's first.
std::uint32_t node_index(int ring, int quarter, int step) {
  if (ring == 0) return 0;
  const int before = 1 + 2 * ring * (ring - 1);
  return static_cast<std::uint32_t>(before + (quarter * ring + step) % (4 * ring));
}

}  // namespace

double kernel_concentration(double number) {
  constexpr double kSquaredSpread = 9.0;
  return std::min(kFinestKernel, 2.0 * (1.0 + number / kSquaredSpread));
}

AxialDensity::AxialDensity(const std::vector<Vector3>& axes, const std::vector<double>& weights,
                           std::optional<double> concentration) {
  if (axes.empty()) throw Error(ErrorKind::argument, {}, "a density needs at least one reading");
  concentration_ =
      concentration.value_or(kernel_concentration(effective_number(weights, axes.size())));
  if (!(concentration_ > 0.0 && concentration_ <= kGreatestConcentration)) {
    throw Error(ErrorKind::argument, {}, "the kernel's concentration is out of range",
                fmt::format("{}", concentration_), "above 0, at most 10000");
  }
  const auto distinct = merged(axes, weights);
  double total = 0.0;
  for (const auto& axis : distinct) total += axis.weight;
  for (const auto& axis : distinct) {
    x_.push_back(axis.x);
    y_.push_back(axis.y);
    z_.push_back(axis.z);
    weight_.push_back(axis.weight / total);
  }
}

double AxialDensity::at(const Vector3& x) const {
  return at(std::vector<Vector3>{x}, 1).front();
}

std::vector<double> AxialDensity::at(const std::vector<Vector3>& places, unsigned threads) const {
  std::vector<double> values(places.size());
  const Kernel kernel = kernel_of(concentration_);
  const auto add = kernel.far > 0.0 ? add_axes_two_sided : add_axes;
  for_each_chunk(places.size(), kBlock, threads,
                 [&](std::size_t, std::size_t begin, std::size_t end) {
                   Block block{};
                   for (std::size_t i = begin; i < end; ++i) {
                     block.x[i - begin] = places[i].x();
                     block.y[i - begin] = places[i].y();
                     block.z[i - begin] = places[i].z();
                   }
                   add(x_, y_, z_, weight_, kernel, block);
                   for (std::size_t i = begin; i < end; ++i) {
                     values[i] = kernel.scale * block.sum[i - begin];
                   }
                 });
  return values;
}

Vector3 AxialDensity::peak_near(const Vector3& start) const {
  constexpr int kMostSteps = 200;
  constexpr double kStill = 1e-10;
  const double exponent = concentration_ * std::numbers::log2e;
  Vector3 x = start;
  for (int step = 0; step < kMostSteps; ++step) {
    Vector3 sum = Vector3::Zero();
    for (std::size_t i = 0; i < x_.size(); ++i) {
      const Vector3 axis(x_[i], y_[i], z_[i]);
      const double t = axis.dot(x);
      // exp(-k) sinh(kt), twice.
      const double pull = fast_exp2(exponent * (t - 1.0)) - fast_exp2(exponent * (-t - 1.0));
      sum += weight_[i] * pull * axis;
    }
    if (sum.norm() == 0.0) return x;
    const Vector3 next = sum.normalized();
    const double moved = (next - x).norm();
    x = next;
    if (moved < kStill) break;
  }
  return x;
}

HemisphereMesh hemisphere_mesh(int rings) {
  HemisphereMesh mesh;
  mesh.nodes.emplace_back(0.0, 0.0, -1.0);
  for (int ring = 1; ring <= rings; ++ring) {
    const SinCos from_down = sincos(Angle::degrees(90.0 * ring / rings));
    for (int quarter = 0; quarter < 4; ++quarter) {
      for (int step = 0; step < ring; ++step) {
        const SinCos azimuth = sincos(Angle::degrees(90.0 * step / ring));
        mesh.nodes.push_back(
            turned({from_down.sin * azimuth.cos, from_down.sin * azimuth.sin, 0.0 - from_down.cos},
                   quarter));
      }
    }
  }
  for (int ring = 0; ring < rings; ++ring) {
    for (int quarter = 0; quarter < 4; ++quarter) {
      for (int step = 0; step <= ring; ++step) {
        const std::uint32_t inner = node_index(ring, quarter, step);
        const std::uint32_t outer = node_index(ring + 1, quarter, step);
        const std::uint32_t next = node_index(ring + 1, quarter, step + 1);
        mesh.triangles.push_back({inner, outer, next});
        if (step < ring) {
          mesh.triangles.push_back({inner, next, node_index(ring, quarter, step + 1)});
        }
      }
    }
  }
  mesh.first_on_rim = node_index(rings, 0, 0);
  return mesh;
}

DensityGrid density_grid(const AxialDensity& density, int rings, unsigned threads) {
  DensityGrid grid;
  grid.mesh = hemisphere_mesh(rings);
  grid.values = density.at(grid.mesh.nodes, threads);
  grid.concentration = density.concentration();
  const auto highest = std::max_element(grid.values.begin(), grid.values.end());
  const Vector3 peak =
      density.peak_near(grid.mesh.nodes[static_cast<std::size_t>(highest - grid.values.begin())]);
  grid.peak = std::max(density.at(peak), *highest);
  grid.peak_line = line_of_vector(peak);
  return grid;
}

}  // namespace brink
