#include "brink/base/angle.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace brink {

namespace {

constexpr double kRadians = std::numbers::pi / 180.0;

// Sine of 0 <= degrees <= 45, with the one value in it that is rational.
double small_sine(double degrees) {
  return degrees == 30.0 ? 0.5 : std::sin(degrees * kRadians);
}

double first_octants_sine(double degrees) {  // 0 <= degrees <= 90
  return degrees <= 45.0   ? small_sine(degrees)
         : degrees == 60.0 ? std::cos(30.0 * kRadians)
                           : std::cos((90.0 - degrees) * kRadians);
}

}  // namespace

SinCos sincos(Angle angle) {
  // Reduced exactly: fmod of doubles has no rounding error.
  double degrees = std::fmod(angle.deg(), 360.0);
  if (degrees < 0.0) degrees += 360.0;
  const int quadrant = static_cast<int>(degrees / 90.0) % 4;
  const double rest = degrees - 90.0 * std::floor(degrees / 90.0);
  const double s = first_octants_sine(rest);
  const double c = rest == 60.0 ? 0.5 : first_octants_sine(90.0 - rest);
  switch (quadrant) {
    case 0:
      return {s, c};
    case 1:
      return {c, 0.0 - s};
    case 2:
      return {0.0 - s, 0.0 - c};
    default:
      return {0.0 - c, s};
  }
}

double sin(Angle angle) {
  return sincos(angle).sin;
}
double cos(Angle angle) {
  return sincos(angle).cos;
}

double tan(Angle angle) {
  const SinCos at = sincos(angle);
  if (at.cos == 0.0) return std::copysign(std::numeric_limits<double>::infinity(), at.sin);
  return at.sin / at.cos;
}

Angle asin(double sine) {
  return Angle::radians(std::asin(std::clamp(sine, -1.0, 1.0)));
}
Angle acos(double cosine) {
  return Angle::radians(std::acos(std::clamp(cosine, -1.0, 1.0)));
}
Angle atan2(double y, double x) {
  return Angle::radians(std::atan2(y, x));
}

Angle wrap_360(Angle azimuth) {
  double degrees = std::fmod(azimuth.deg(), 360.0);
  if (degrees < 0.0) degrees += 360.0;
  // A tiny negative angle rounds to 360 in the sum.
  return Angle::degrees(degrees >= 360.0 ? 0.0 : degrees + 0.0);
}

Angle azimuth_difference(Angle a, Angle b) {
  const double difference = std::abs(std::fmod(a.deg() - b.deg(), 360.0));
  return Angle::degrees(difference > 180.0 ? 360.0 - difference : difference);
}

}  // namespace brink
