// Level lines of a density on the lower hemisphere, closed across the rim.
//
// The density is taken as linear along the sides of the mesh's triangles; a line is exact to that.
#pragma once

#include <vector>

#include "brink/sphere/density.hpp"

namespace brink {

// One closed curve of axes. Most lie within the net: one piece whose last point is its first. A
// curve that crosses the rim leaves it at one place and comes back at the opposite one, so it shows
// as several pieces: each ends at the point opposite to where the next begins (the last to where
// the first begins), all on the rim.
struct LevelLine {
  double level = 0.0;
  std::vector<std::vector<Vector3>> pieces;
};

// All curves at `level`, none where nothing reaches it.
std::vector<LevelLine> level_lines(const DensityGrid& grid, double level);

// Outlines of the part of the lower hemisphere with a density of at least `level`; each is closed
// (the last point joins the first) and runs along the rim where the part does. Fill by the even-odd
// rule.
std::vector<std::vector<Vector3>> level_area(const DensityGrid& grid, double level);

// Levels fit for a drawing, at most five: 2, 3, 4, 6, 8, 12 ... times uniform below the peak, or
// every second, fourth ... of these; 1.5 for a peak between 1.5 and 2; none for a flatter density,
// whose contours would mean nothing.
std::vector<double> usual_levels(double peak);

}  // namespace brink
