#include "brink/sphere/projection.hpp"

#include <cmath>

namespace brink {

Vector3 lower_end(const Vector3& v) {
  return v.z() > 0.0 ? Vector3(-v) : v;
}

Point2 project(Projection projection, const Vector3& v) {
  // 1 - z is twice the squared cosine of half the angle from straight down: no cancellation in the
  // lower hemisphere.
  const double from_top = 1.0 - v.z();
  const double divisor = projection == Projection::equal_angle ? from_top : std::sqrt(from_top);
  return {v.x() / divisor, v.y() / divisor};
}

Point2 project(Projection projection, const Line& line) {
  return project(projection, direction(line));
}

Vector3 unproject(Projection projection, const Point2& point) {
  const double squared = point.squaredNorm();
  if (projection == Projection::equal_angle) {
    const double scale = 2.0 / (1.0 + squared);
    return {point.x() * scale, point.y() * scale, -(1.0 - squared) / (1.0 + squared)};
  }
  const double scale = std::sqrt(2.0 - squared);
  return {point.x() * scale, point.y() * scale, squared - 1.0};
}

}  // namespace brink
