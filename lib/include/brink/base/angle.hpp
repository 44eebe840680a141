// Angles that say their unit, and trigonometry that is exact at the cardinal directions.
#pragma once

#include <compare>
#include <numbers>

namespace brink {

// An angle, kept in degrees so that what was typed is what is echoed. Built by name only: no bare
// double becomes an angle.
class Angle {
 public:
  constexpr Angle() = default;
  static constexpr Angle degrees(double value) { return Angle(value); }
  static constexpr Angle radians(double value) { return Angle(value * (180.0 / std::numbers::pi)); }

  constexpr double deg() const { return degrees_; }
  constexpr double rad() const { return degrees_ * (std::numbers::pi / 180.0); }

  constexpr auto operator<=>(const Angle&) const = default;
  constexpr Angle operator-() const { return Angle(-degrees_); }
  constexpr Angle operator+(Angle other) const { return Angle(degrees_ + other.degrees_); }
  constexpr Angle operator-(Angle other) const { return Angle(degrees_ - other.degrees_); }
  constexpr Angle operator*(double factor) const { return Angle(degrees_ * factor); }

 private:
  explicit constexpr Angle(double value) : degrees_(value) {}
  double degrees_ = 0.0;
};

inline namespace literals {
constexpr Angle operator""_deg(long double value) {
  return Angle::degrees(static_cast<double>(value));
}
constexpr Angle operator""_deg(unsigned long long value) {
  return Angle::degrees(static_cast<double>(value));
}
}  // namespace literals

struct SinCos {
  double sin;
  double cos;
};

// Sine and cosine, exact (0, 1/2, 1 and their negatives, no signed zero) at multiples of 90 degrees
// and, for the sine, of 30 degrees off them; any finite angle.
SinCos sincos(Angle angle);
double sin(Angle angle);
double cos(Angle angle);
// Finite but huge at odd multiples of 90 degrees would be a trap: there the result is infinite.
double tan(Angle angle);

// Inverse functions; arguments of asin and acos are clamped to [-1, 1], for dot products of unit
// vectors.
Angle asin(double sine);
Angle acos(double cosine);
Angle atan2(double y, double x);

// The same direction in 0 <= a < 360; -0 becomes 0.
Angle wrap_360(Angle azimuth);
// Angle between two azimuths, 0 to 180 degrees, whatever turns they carry.
Angle azimuth_difference(Angle a, Angle b);

}  // namespace brink
