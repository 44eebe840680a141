#include "check_support.hpp"

#include <algorithm>
#include <cmath>

namespace brink {

namespace {

// About the scatter of single readings within a joint set, 9 degrees. Only the power of the checks
// depends on it, not their false alarms.
constexpr double kConcentration = 40.0;
// Beyond this many units of the exponent a kernel adds nothing.
constexpr double kFarAway = 30.0;
// Cells are much smaller than the kernel either way.
constexpr std::size_t kFineCells = 3000;

double kernel(const Vector3& a, const Vector3& b) {
  const double exponent = kConcentration * (1.0 - std::abs(a.dot(b)));
  return exponent > kFarAway ? 0.0 : kConcentration * std::exp(-exponent);
}

}  // namespace

std::map<std::string, std::vector<std::size_t>> readings_by(const Readings& readings,
                                                            const ExtraColumn& column) {
  std::map<std::string, std::vector<std::size_t>> groups;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (!is_missing(column.cells[i])) groups[std::string(column.cells[i])].push_back(i);
  }
  return groups;
}

GroupedDensity::GroupedDensity(const Readings& readings, const std::vector<std::size_t>& group_of,
                               std::size_t groups)
    : cell_deg_(readings.size() <= kFineCells ? 1.0 : 3.0), sizes_(groups, 0) {
  std::map<std::pair<double, double>, std::map<std::size_t, double>> counts;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const Plane cell = cell_plane(readings.planes[i]);
    counts[{cell.dip.deg(), cell.dip_direction.deg()}][group_of[i]] += 1.0;
    ++sizes_[group_of[i]];
  }
  for (const auto& [plane, weights] : counts) {
    const Vector3 n = normal(Angle::degrees(plane.first), Angle::degrees(plane.second));
    cells_.push_back({n, {weights.begin(), weights.end()}});
  }
}

Plane GroupedDensity::cell_plane(const Plane& plane) const {
  const auto rounded = [&](Angle a) {
    return Angle::degrees(std::round(a.deg() / cell_deg_) * cell_deg_);
  };
  return {rounded(plane.dip), wrap_360(rounded(plane.dip_direction))};
}

std::vector<double> GroupedDensity::sums_at(const Plane& plane) const {
  std::vector<double> sums(sizes_.size(), 0.0);
  const Vector3 at = upward_normal(plane);
  for (const Cell& cell : cells_) {
    const double k = kernel(at, cell.normal);
    if (k == 0.0) continue;
    for (const auto& [group, weight] : cell.weights) sums[group] += k * weight;
  }
  return sums;
}

double GroupedDensity::own_kernel(const Plane& reading, const Plane& at) const {
  return kernel(upward_normal(cell_plane(reading)), upward_normal(at));
}

}  // namespace brink
