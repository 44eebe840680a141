#include "brink/orientation/intersection.hpp"

#include <Eigen/Geometry>
#include <cmath>

#include "brink/base/ties.hpp"

namespace brink {

Angle axis_angle(const Vector3& a, const Vector3& b) {
  return atan2(a.cross(b).norm(), std::abs(a.dot(b)));
}

std::optional<Vector3> intersection_vector(const Vector3& normal1, const Vector3& normal2) {
  const Vector3 cross = normal1.cross(normal2);
  const double length = cross.norm();
  // For unit normals the length is the sine of the angle between the axes, equal to the angle when
  // this small.
  if (length <= kParallel) return std::nullopt;
  const Vector3 unit = cross / length;
  return unit.z() > 0.0 ? Vector3(-unit) : unit;
}

std::optional<Line> intersection(const Plane& plane1, const Plane& plane2) {
  const auto along = intersection_vector(upward_normal(plane1), upward_normal(plane2));
  if (!along) return std::nullopt;
  return line_of_vector(*along);
}

Angle apparent_dip(const Plane& plane, Angle azimuth) {
  const SinCos dip = sincos(plane.dip);
  const double along = cos(azimuth - plane.dip_direction);
  if (along == 0.0) return {};
  return along > 0.0 ? atan2(dip.sin * along, dip.cos) : -atan2(-dip.sin * along, dip.cos);
}

std::optional<Plane> plane_of_lines(const Line& a, const Line& b) {
  const Vector3 cross = direction(a).cross(direction(b));
  if (cross.norm() <= kParallel) return std::nullopt;
  return plane_of_normal(cross);
}

}  // namespace brink
