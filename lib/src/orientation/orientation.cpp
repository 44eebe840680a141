#include "brink/orientation/orientation.hpp"

#include <cmath>

namespace brink {

namespace {

// Below this share of its length a horizontal part is rounding, and its azimuth means nothing.
constexpr double kNoAzimuth = 1e-12;

Angle azimuth_of(const Vector3& v) {
  return std::hypot(v.x(), v.y()) <= kNoAzimuth * v.norm() ? Angle{}
                                                           : wrap_360(atan2(v.x(), v.y()));
}

}  // namespace

Vector3 normal(Angle dip, Angle dip_direction) {
  const SinCos d = sincos(dip);
  const SinCos a = sincos(dip_direction);
  return {d.sin * a.sin, d.sin * a.cos, d.cos};
}

Vector3 upward_normal(const Plane& plane) {
  return normal(plane.dip, plane.dip_direction);
}

Vector3 dip_vector(Angle dip, Angle dip_direction) {
  const SinCos d = sincos(dip);
  const SinCos a = sincos(dip_direction);
  return {d.cos * a.sin, d.cos * a.cos, -d.sin};
}

Vector3 direction(const Line& line) {
  return dip_vector(line.plunge, line.trend);
}

Line pole(const Plane& plane) {
  const Angle plunge = Angle::degrees(90.0) - plane.dip;
  const bool vertical = plane.dip.deg() == 0.0;
  return {vertical ? Angle{} : wrap_360(plane.dip_direction + Angle::degrees(180.0)), plunge};
}

Plane plane_of_pole(const Line& pole) {
  const bool upward = pole.plunge.deg() < 0.0;
  const Angle plunge = upward ? -pole.plunge : pole.plunge;
  const Angle dip = Angle::degrees(90.0) - plunge;
  if (dip.deg() == 0.0) return {};
  return {dip, wrap_360(upward ? pole.trend : pole.trend + Angle::degrees(180.0))};
}

Plane plane_of_normal(const Vector3& given) {
  const Vector3 up = given.z() < 0.0 ? Vector3(-given) : given;
  const double across = std::hypot(up.x(), up.y());
  if (across <= kNoAzimuth * up.norm()) return {};
  return {atan2(across, up.z()), azimuth_of(up)};
}

Line line_of_vector(const Vector3& vector) {
  return line_with_sense(vector.z() > 0.0 ? Vector3(-vector) : vector);
}

Line line_with_sense(const Vector3& vector) {
  const double across = std::hypot(vector.x(), vector.y());
  return {azimuth_of(vector), atan2(0.0 - vector.z(), across)};
}

}  // namespace brink
