#include "brink/sphere/density.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "density_bins.hpp"

namespace brink {

namespace {

constexpr double kGreatestConcentration = 10000.0;

// From here on the kernel's far half adds at most k exp(-k), 2e-16 of uniform, and is left out.
constexpr double kOneSided = 40.0;

// From so many axes up the cells are fewer than the axes and save more than they cost.
constexpr std::size_t kMany = 20000;

// Cells this many times 1/sqrt(k) across: the cumulants left out, from the third on, then add less
// than 1e-5 of the peak (measured on clusters, girdles and uniform scatters).
constexpr double kCellWidth = 0.18;

bool worth_binning(DensityMethod method, std::size_t count, double k) {
  // The far half of a cell isn't summed, so wide kernels go axis by axis.
  if (method == DensityMethod::direct || k < kOneSided) return false;
  return method == DensityMethod::binned || count >= kMany;
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

// Gradient of the sum at x, without its factor k: w sinh(k t) exp(-k) a for each axis, and for a
// cell exp(k(|t| - 1) + k^2/2 x^T S x) (m + k S x), turned to the side of x.
Vector3 pull_at(const DensitySum& sum, double k, const Vector3& x) {
  Vector3 pull = Vector3::Zero();
  for (std::size_t i = 0; i < sum.axes.size(); ++i) {
    const Vector3 axis(sum.axes.x[i], sum.axes.y[i], sum.axes.z[i]);
    const double t = axis.dot(x);
    pull += sum.axes.weight[i] * (std::exp(k * (t - 1.0)) - std::exp(k * (-t - 1.0))) * axis;
  }
  const DensityMoments& m = sum.moments;
  for (std::size_t i = 0; i < sum.cells.size(); ++i) {
    const Vector3 mean(sum.cells.x[i], sum.cells.y[i], sum.cells.z[i]);
    const double t = mean.dot(x);
    const Vector3 spread(m.xx[i] * x.x() + m.xy[i] * x.y() + m.xz[i] * x.z(),
                         m.xy[i] * x.x() + m.yy[i] * x.y() + m.yz[i] * x.z(),
                         m.xz[i] * x.x() + m.yz[i] * x.y() + m.zz[i] * x.z());
    const double value = std::exp(k * (std::abs(t) - 1.0) + 0.5 * k * k * spread.dot(x));
    pull += sum.cells.weight[i] * value *
            (t < 0.0 ? Vector3(k * spread - mean) : Vector3(k * spread + mean));
  }
  return pull;
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
                           std::optional<double> concentration, DensityMethod method) {
  if (axes.empty()) throw Error(ErrorKind::argument, {}, "a density needs at least one reading");
  concentration_ =
      concentration.value_or(kernel_concentration(effective_number(weights, axes.size())));
  if (!(concentration_ > 0.0 && concentration_ <= kGreatestConcentration)) {
    throw Error(ErrorKind::argument, {}, "the kernel's concentration is out of range",
                fmt::format("{}", concentration_), "above 0, at most 10000");
  }
  sum_ = std::make_unique<DensitySum>(
      worth_binning(method, axes.size(), concentration_)
          ? binned_axes(axes, weights, kCellWidth / std::sqrt(concentration_))
          : distinct_axes(axes, weights));
  double total = 0.0;
  for (const auto* terms : {&sum_->axes, &sum_->cells}) {
    for (const double w : terms->weight) total += w;
  }
  for (auto* terms : {&sum_->axes, &sum_->cells}) {
    for (double& w : terms->weight) w /= total;
  }
}

AxialDensity::AxialDensity(AxialDensity&&) noexcept = default;
AxialDensity& AxialDensity::operator=(AxialDensity&&) noexcept = default;
AxialDensity::~AxialDensity() = default;

double AxialDensity::at(const Vector3& x) const {
  return at(std::vector<Vector3>{x}, 1).front();
}

std::vector<double> AxialDensity::at(const std::vector<Vector3>& places, unsigned threads) const {
  const double k = concentration_;
  std::vector<double> values = sum_at(*sum_, k, k < kOneSided, places, threads);
  // k / (1 - exp(-2k)) makes the mean over the sphere 1.
  const double scale = k / -std::expm1(-2.0 * k);
  for (double& value : values) value *= scale;
  return values;
}

Vector3 AxialDensity::peak_near(const Vector3& start) const {
  constexpr int kMostSteps = 200;
  constexpr double kStill = 1e-10;
  Vector3 x = start;
  for (int step = 0; step < kMostSteps; ++step) {
    const Vector3 pull = pull_at(*sum_, concentration_, x);
    if (pull.norm() == 0.0) return x;
    const Vector3 next = pull.normalized();
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
  // Both ends of an axis on the rim have one density, to the last bit: level lines are joined
  // there.
  const std::size_t half = (grid.mesh.nodes.size() - grid.mesh.first_on_rim) / 2;
  const auto rim = grid.values.begin() + static_cast<std::ptrdiff_t>(grid.mesh.first_on_rim);
  std::copy_n(rim, half, rim + static_cast<std::ptrdiff_t>(half));
  grid.concentration = density.concentration();
  const auto highest = std::max_element(grid.values.begin(), grid.values.end());
  const Vector3 peak =
      density.peak_near(grid.mesh.nodes[static_cast<std::size_t>(highest - grid.values.begin())]);
  grid.peak = std::max(density.at(peak), *highest);
  grid.peak_line = line_of_vector(peak);
  return grid;
}

}  // namespace brink
