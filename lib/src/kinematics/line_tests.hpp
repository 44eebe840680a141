// The tests on a line in products and comparisons only, for vectors of any length: the pair loop
// feeds them cross products that were never divided by their length. No branches, so that the loop
// works on several pairs at once. Private to kinematics.
#pragma once

#include "brink/base/ties.hpp"
#include "brink/kinematics/modes.hpp"

namespace brink::line_tests {

#if defined(__GNUC__)
#define BRINK_ALWAYS_INLINE [[gnu::always_inline]] inline
#else
#define BRINK_ALWAYS_INLINE inline
#endif

constexpr double kTieSquared = kTie * kTie;

// A line along (x, y, z), either sense, and the squares that every test needs.
struct Trial {
  double x, y, z;
  double across_squared;  // x^2 + y^2
  double tie_squared;     // (kTie |v|)^2
};

BRINK_ALWAYS_INLINE Trial make_trial(double x, double y, double z) {
  const double across_squared = x * x + y * y;
  return {x, y, z, across_squared, kTieSquared * (across_squared + z * z)};
}

// The line of two planes with unit normals, unless they are parallel.
BRINK_ALWAYS_INLINE Trial line_of(const Vector3& n, double x, double y, double z) {
  return make_trial(n.y() * z - n.z() * y, n.z() * x - n.x() * z, n.x() * y - n.y() * x);
}

BRINK_ALWAYS_INLINE double squared_length(const Trial& v) {
  return v.across_squared + v.z * v.z;
}

// For unit normals the cross product's length is the sine of the angle between the axes, equal to
// the angle when this small.
BRINK_ALWAYS_INLINE bool is_line(const Trial& v) {
  return squared_length(v) > kParallel * kParallel;
}

BRINK_ALWAYS_INLINE double dot(const Trial& v, const Vector3& n) {
  return v.x * n.x() + v.y * n.y() + v.z * n.z();
}

BRINK_ALWAYS_INLINE bool horizontal(const Trial& v) {
  return v.z * v.z <= v.tie_squared;
}
BRINK_ALWAYS_INLINE bool vertical(const Trial& v) {
  return v.across_squared <= v.tie_squared;
}

// With the sense that points down, v . F > 0 and v . U < 0 beyond the tie; signs of products stand
// for that sense, and a horizontal line has both.
BRINK_ALWAYS_INLINE bool daylights(const FaceLimits& limits, const Trial& v) {
  const double f = dot(v, limits.face_normal);
  const double u = dot(v, limits.upper_normal);
  const bool opposite = (f * u < 0.0) & (f * f > v.tie_squared) & (u * u > v.tie_squared);
  return opposite & ((f * v.z < 0.0) | horizontal(v));
}

// tan(plunge) against tan(limit), cleared of the division and squared: exact at both ends of the
// scale, where a sine or a cosine alone would be blunt.
BRINK_ALWAYS_INLINE bool at_least_as_steep(const SlopeLimit& limit, const Trial& v) {
  return v.z * v.z * limit.cos_squared >= v.across_squared * limit.signed_sin_squared;
}
BRINK_ALWAYS_INLINE bool steeper(const SlopeLimit& limit, const Trial& v) {
  return v.z * v.z * limit.cos_squared > v.across_squared * limit.signed_sin_squared;
}

// A direction of any length above 0 in the window: sin(difference - half width) <= 0, the
// difference from its parts along the middle and across it.
BRINK_ALWAYS_INLINE bool inside(const AzimuthWindow& window, double along, double across) {
  return (across < 0.0 ? -across : across) * window.cos_half <= along * window.sin_half;
}

// The trend of the line, pointing down; of either end for a horizontal line.
BRINK_ALWAYS_INLINE bool trends_into(const AzimuthWindow& window, const Trial& v) {
  const double along = v.x * window.sin_azimuth + v.y * window.cos_azimuth;
  const double across = v.x * window.cos_azimuth - v.y * window.sin_azimuth;
  const double downward = v.z > 0.0 ? -along : along;
  const double best = horizontal(v) ? (along < 0.0 ? -along : along) : downward;
  return inside(window, best, across) & !vertical(v);
}

BRINK_ALWAYS_INLINE bool slides(const FaceLimits& limits, const Trial& v) {
  return daylights(limits, v) & at_least_as_steep(limits.friction, v);
}

BRINK_ALWAYS_INLINE bool topples(const FaceLimits& limits, const Trial& v) {
  return trends_into(limits.toppling_window, v) & steeper(limits.column, v);
}

}  // namespace brink::line_tests
