// A net on the page: where directions fall, and what every net has (rim, ticks, grid, north).
#pragma once

#include <vector>

#include "brink/orientation/face.hpp"
#include "brink/plot/picture.hpp"
#include "brink/sphere/net_curve.hpp"

namespace brink::plot {

struct NetFrame {
  Point centre;
  double radius_mm = 0.0;
  Projection projection = Projection::equal_angle;
};

Point on_page(const NetFrame& frame, const Point2& net);
// Of the axis' lower end.
Point on_page(const NetFrame& frame, const Vector3& axis);
// The point at `azimuth`, `beyond_mm` outside the rim.
Point beyond_rim(const NetFrame& frame, Angle azimuth, double beyond_mm);

// Curves of the net as steps of an outline.
std::vector<Step> steps_of(const NetFrame& frame, const NetPiece& piece);
Path traced(const NetFrame& frame, const std::vector<NetPiece>& pieces, Stroke stroke);

// Rim, ticks every 10 degrees (longer every 30) and the north mark.
Group rim_and_north(const NetFrame& frame);
// Great circles through north and south, and small circles about them, every `step` degrees.
Group grid_lines(const NetFrame& frame, int step_deg);

// Room that the north mark takes above the rim.
double north_height_mm(const NetFrame& frame);

// The face's great circle, with short strokes on its free side: towards lines that daylight.
Group face_curve(const NetFrame& frame, const Face& face, Stroke stroke);

// Azimuths of the two ends of a plane's trace; for a horizontal plane, east and west.
std::pair<Angle, Angle> trace_ends(Angle dip_direction);

}  // namespace brink::plot
