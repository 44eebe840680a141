// Where planes meet, and angles between them.
#pragma once

#include <optional>

#include "brink/orientation/orientation.hpp"

namespace brink {

// Angle between two axes (unit vectors whose sign carries no meaning), 0..90 degrees, accurate near
// 0 too.
Angle axis_angle(const Vector3& a, const Vector3& b);

// Unit vector along the line in which two planes meet, pointing down (a horizontal one in either
// sense); nothing where the unit normals are within kParallel radians as axes.
std::optional<Vector3> intersection_vector(const Vector3& normal1, const Vector3& normal2);
std::optional<Line> intersection(const Plane& plane1, const Plane& plane2);

// Dip of the plane as it shows in a vertical section along `azimuth`, positive where it falls
// towards that azimuth: tan(apparent) = tan(dip) cos(azimuth - dip direction). In -90..90; a
// vertical plane gives +-90, and 0 where the section runs along its strike.
Angle apparent_dip(const Plane& plane, Angle azimuth);

// The plane that holds two lines (a strike line and an apparent dip, say); nothing where the two
// coincide. Brady & Brown, Rock Mechanics for Underground Mining, 3rd ed., app. A.
std::optional<Plane> plane_of_lines(const Line& a, const Line& b);

}  // namespace brink
