// Planes and lines in the ground, and their unit vectors.
//
// Frame of every vector in the program: x east, y north, z up, right-handed. Azimuths run clockwise
// from grid north. A plane and its opposite normal are the same plane.
#pragma once

#include <Eigen/Core>

#include "brink/base/angle.hpp"

namespace brink {

using Vector3 = Eigen::Vector3d;

// A discontinuity or the ground. 0 <= dip <= 90; 0 <= dip_direction < 360, which a horizontal plane
// writes as 0.
struct Plane {
  Angle dip;
  Angle dip_direction;
  bool operator==(const Plane&) const = default;
};

// A line. Trend 0 <= t < 360, plunge -90..90, positive downwards. A vertical line's trend is
// written 0.
struct Line {
  Angle trend;
  Angle plunge;
  bool operator==(const Line&) const = default;
};

// Unit normal (sin dip sin dir, sin dip cos dir, cos dip): upward for a plane. Also a face's
// outward normal, for any dip in 0..180.
Vector3 normal(Angle dip, Angle dip_direction);
Vector3 upward_normal(const Plane& plane);
// Unit vector down the dip, (cos dip sin dir, cos dip cos dir, -sin dip).
Vector3 dip_vector(Angle dip, Angle dip_direction);
// Unit vector along the line, pointing down for a positive plunge.
Vector3 direction(const Line& line);
// The pole as a line: trend = dip direction + 180, plunge = 90 - dip.
Line pole(const Plane& plane);
// The plane whose pole is the line (or the line turned about): inverse of pole().
Plane plane_of_pole(const Line& pole);

// The plane with this normal, in either sense and of any length above 0. A normal within 1e-12 of
// vertical gives 0/000.
Plane plane_of_normal(const Vector3& normal);
// The line along this vector of any length above 0, turned to plunge downwards; a horizontal vector
// keeps its sense, a vertical one gets trend 0.
Line line_of_vector(const Vector3& vector);
// The same without turning: plunge is negative where the vector points up.
Line line_with_sense(const Vector3& vector);

}  // namespace brink
