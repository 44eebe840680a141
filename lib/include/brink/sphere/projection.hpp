// Lower-hemisphere projections of directions onto a net of unit radius.
//
// On the net x is east and y north; the rim (radius 1) holds the horizontal directions, the centre
// the one straight down. Equal-angle (Wulff's net; stereographic): radius tan((90 - plunge)/2);
// circles on the sphere are circles on the net. Equal-area (Schmidt's net; Lambert's azimuthal
// projection): radius sqrt(2) sin((90 - plunge)/2); areas keep their size.
// Snyder 1987, Map Projections: A Working Manual, USGS Professional Paper 1395, ch. 21 and 24.
#pragma once

#include <Eigen/Core>

#include "brink/orientation/orientation.hpp"

namespace brink {

using Point2 = Eigen::Vector2d;

enum class Projection { equal_angle, equal_area };

// The end of the axis through `v` that points down; a horizontal one keeps its sense, so a reading
// on the rim shows at one end only.
Vector3 lower_end(const Vector3& v);

// Where the unit vector `v` falls. Directions that point up fall outside the rim; straight up is at
// infinity on the equal-angle net and, having no azimuth, is not a number on the equal-area one.
Point2 project(Projection projection, const Vector3& v);
// Trend and plunge of any sign; project(direction(line)).
Point2 project(Projection projection, const Line& line);

// The unit vector that falls on `point`: the inverse of project(), for any finite point on the
// equal-angle net and any within radius sqrt(2) on the equal-area one (further out there is
// nothing: not a number).
Vector3 unproject(Projection projection, const Point2& point);

}  // namespace brink
