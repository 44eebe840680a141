// Hatching worked out as lines, so that it needs no clipping in the file.
#pragma once

#include <vector>

#include "brink/plot/picture.hpp"

namespace brink::plot {

// Parallel lines inside the closed outlines (even-odd rule), `spacing_mm` apart, at `angle` from
// the x axis, clockwise on the page. Neighbouring areas hatched alike line up. Empty outlines give
// no lines.
std::vector<std::pair<Point, Point>> hatch(const std::vector<std::vector<Point>>& outlines,
                                           Angle angle, double spacing_mm);
Path hatched(const std::vector<std::vector<Point>>& outlines, Angle angle, double spacing_mm,
             Stroke stroke);

}  // namespace brink::plot
