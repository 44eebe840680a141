// The main net: readings by set, means, planes, faces and density.
#pragma once

#include <cstddef>
#include <optional>
#include <vector>

#include "brink/plot/net_frame.hpp"
#include "brink/sets/sets.hpp"
#include "brink/sphere/contour.hpp"

namespace brink::plot {

// What a net shows. Everything was worked out before; the net only draws.
struct NetContent {
  const Readings& readings;
  const SetsResult& sets;
  const DensityGrid* density = nullptr;  // with `levels`, ascending multiples of uniform
  std::vector<double> levels;
  std::vector<Face> faces;
  std::optional<std::size_t> marked_face;  // the face that the sheet is about; absent: all alike
};

// Room for labels around the rim, in millimetres from the rim (left, right) and on the page.
struct LabelRoom {
  double left_mm = 20.0;
  double right_mm = 20.0;
  double top_mm = 0.0;
  double bottom_mm = 0.0;
};

// From back to front: density, grid, planes, faces, poles, means, labels.
Group draw_stereonet(const NetContent& content, const NetFrame& frame, const LabelRoom& room);

// What the net's marks mean, one line from `at` (its left end, on the baseline); only what the
// content has.
Group draw_key(const NetContent& content, Point at, double width_mm);

// Poles of the readings with this assignment (0: no set), on the page; each place once, in a fixed
// order. Of more than 3000 readings, places are told apart to 0.05 mm.
std::vector<Point> pole_places(const NetFrame& frame, const Readings& readings,
                               const std::vector<int>& assignment, int set);

// Diameter of a pole's symbol on a net with this many readings: smaller the more there are.
double pole_size_mm(const NetFrame& frame, std::size_t readings);

}  // namespace brink::plot
