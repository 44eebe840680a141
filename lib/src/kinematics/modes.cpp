#include "brink/kinematics/modes.hpp"

#include <algorithm>
#include <cmath>

#include "brink/base/ties.hpp"
#include "line_tests.hpp"

namespace brink {

namespace {

using line_tests::make_trial;
using line_tests::Trial;

AzimuthWindow prepare_window(Angle azimuth, Angle tolerance) {
  const SinCos middle = sincos(azimuth);
  const SinCos edge = sincos(std::min(tolerance + angle_tie(), Angle::degrees(180.0)));
  return {middle.sin, middle.cos, edge.sin, edge.cos};
}

// Past vertical nothing is steep enough: the cosine stops at 0.
SlopeLimit prepare_slope(Angle limit) {
  const SinCos at = sincos(limit);
  const double cosine = std::max(at.cos, 0.0);
  return {at.sin * std::abs(at.sin), cosine * cosine};
}

Trial trial(const Vector3& v) {
  return make_trial(v.x(), v.y(), v.z());
}

bool is_vertical_plane(const Vector3& n) {
  return at_most(std::abs(n.z()), 0.0);
}
bool is_horizontal_plane(const Vector3& n) {
  return at_most(std::hypot(n.x(), n.y()), 0.0);
}

// The plane's line of greatest dip, at a length of sin(dip); meaningless for a horizontal plane.
Trial dip_line(const Vector3& n) {
  return make_trial(n.x() * n.z(), n.y() * n.z(), -(n.x() * n.x() + n.y() * n.y()));
}

// The dip direction, either of them for a vertical plane, is in the window.
bool dips_into(const AzimuthWindow& window, const Vector3& n) {
  const double along = n.x() * window.sin_azimuth + n.y() * window.cos_azimuth;
  const double across = n.x() * window.cos_azimuth - n.y() * window.sin_azimuth;
  if (is_vertical_plane(n)) return line_tests::inside(window, std::abs(along), across);
  return line_tests::inside(window, n.z() < 0.0 ? -along : along, across);
}

// One sense of the normal: `n` is taken as upward.
bool bends_over(const FaceLimits& limits, const Vector3& n) {
  const AzimuthWindow& window = limits.toppling_window;
  const double along = n.x() * window.sin_azimuth + n.y() * window.cos_azimuth;
  const double across = n.x() * window.cos_azimuth - n.y() * window.sin_azimuth;
  return at_least(-n.dot(limits.slip_normal), 0.0) && line_tests::inside(window, along, across);
}

}  // namespace

FaceLimits prepare_limits(const Face& face, const ModeSettings& settings) {
  const Angle right = Angle::degrees(90.0);
  return {
      .face_normal = outward_normal(face),
      .upper_normal = upward_normal(settings.upper),
      .slip_normal = normal(face.dip - settings.friction, face.dip_direction),
      .strike_window = prepare_window(face.dip_direction, settings.strike_tolerance),
      .toppling_window =
          prepare_window(face.dip_direction + right + right, settings.toppling_tolerance),
      .friction = prepare_slope(settings.friction - angle_tie()),
      .column = prepare_slope(right - face.dip + angle_tie()),
      .face_above_friction = at_least(face.dip, settings.friction),
  };
}

bool planar_sliding(const FaceLimits& limits, const Vector3& n) {
  return toppling_base(limits, n) && line_tests::at_least_as_steep(limits.friction, dip_line(n));
}

bool toppling_base(const FaceLimits& limits, const Vector3& n) {
  return !is_horizontal_plane(n) && dips_into(limits.strike_window, n) &&
         line_tests::daylights(limits, dip_line(n));
}

bool flexural_toppling(const FaceLimits& limits, const Vector3& n) {
  if (!limits.face_above_friction || is_horizontal_plane(n)) return false;
  const Vector3 up = n.z() < 0.0 ? Vector3(-n) : n;
  return bends_over(limits, up) || (is_vertical_plane(n) && bends_over(limits, -up));
}

bool wedge_sliding(const FaceLimits& limits, const Vector3& v) {
  return line_tests::slides(limits, trial(v));
}

bool block_toppling(const FaceLimits& limits, const Vector3& v) {
  return line_tests::topples(limits, trial(v));
}

bool line_daylights(const FaceLimits& limits, const Vector3& v) {
  return line_tests::daylights(limits, trial(v));
}

}  // namespace brink
