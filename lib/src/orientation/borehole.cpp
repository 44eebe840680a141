#include "brink/orientation/borehole.hpp"

#include <Eigen/Geometry>

namespace brink {

namespace {

struct CoreFrame {
  Vector3 along;  // down the hole
  Vector3 line;   // across, to the reference line
  Vector3 right;  // clockwise from the line, looking down the hole
};

CoreFrame frame_of(const Hole& hole) {
  const SinCos plunge = sincos(hole.axis.plunge);
  const SinCos trend = sincos(hole.axis.trend);
  const Vector3 along = direction(hole.axis);
  const Vector3 top(plunge.sin * trend.sin, plunge.sin * trend.cos, plunge.cos);
  const Vector3 line = hole.reference == ReferenceLine::top ? top : Vector3(-top);
  return {along, line, along.cross(line)};
}

// Below this the across-the-core part of a unit normal is rounding: the plane is square to the
// core.
constexpr double kNoFarEnd = 1e-12;

}  // namespace

Plane plane_of_core(const CoreAngles& angles, const Hole& hole) {
  const CoreFrame frame = frame_of(hole);
  const SinCos alpha = sincos(angles.alpha);
  const SinCos beta = sincos(angles.beta);
  const Vector3 far_end = beta.cos * frame.line + beta.sin * frame.right;
  return plane_of_normal(alpha.sin * frame.along - alpha.cos * far_end);
}

CoreAngles core_of_plane(const Plane& plane, const Hole& hole) {
  const CoreFrame frame = frame_of(hole);
  Vector3 n = upward_normal(plane);
  if (n.dot(frame.along) < 0.0) n = -n;
  const double towards_line = -n.dot(frame.line);
  const double towards_right = -n.dot(frame.right);
  const double across = std::hypot(towards_line, towards_right);
  if (across <= kNoFarEnd) return {Angle::degrees(90.0), Angle{}};
  return {atan2(n.dot(frame.along), across), wrap_360(atan2(towards_right, towards_line))};
}

}  // namespace brink
