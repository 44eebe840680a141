// What the checks of readings share: groups of readings, and a density to compare with.
#pragma once

#include <map>
#include <string>
#include <string_view>
#include <vector>

#include "brink/readings/readings.hpp"

namespace brink {

// The checks that look at single readings stop here: larger files come from instruments.
inline constexpr std::size_t kMostByHand = 20'000;

// The readings of each value of a column, in the order of the values; empty cells are left out.
std::map<std::string, std::vector<std::size_t>> readings_by(const Readings& readings,
                                                            const ExtraColumn& column);

// An axial Fisher kernel density over readings rounded to cells of a few degrees, kept apart by
// group. Values are multiples of the uniform density, so that one reading in the open counts as
// one.
class GroupedDensity {
 public:
  // `group_of` has one group number below `groups` for each reading.
  GroupedDensity(const Readings& readings, const std::vector<std::size_t>& group_of,
                 std::size_t groups);

  // Sum of the kernels of all readings of each group at a plane.
  std::vector<double> sums_at(const Plane& plane) const;
  // The kernel of the cell that holds `reading`, at `at`: what leaving the reading out takes away.
  double own_kernel(const Plane& reading, const Plane& at) const;

  std::size_t size(std::size_t group) const { return sizes_[group]; }

 private:
  struct Cell {
    Vector3 normal;
    std::vector<std::pair<std::size_t, double>> weights;  // (group, readings)
  };
  Plane cell_plane(const Plane& plane) const;

  double cell_deg_;
  std::vector<Cell> cells_;
  std::vector<std::size_t> sizes_;
};

}  // namespace brink
