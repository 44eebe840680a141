// The only tolerance of the program. Field readings are whole degrees, so values that are equal on
// paper happen often and must compare equal here.
//
// Two kinds of comparison use it: dot products of unit vectors are compared with a slack of kTie;
// angles with a slack of kTie radians. In a loop an angle's limit is shifted by angle_tie() first
// and its sine or cosine taken once: a fixed slack on a cosine near 0 degrees would be a far larger
// angle.
#pragma once

#include "brink/base/angle.hpp"

namespace brink {

inline constexpr double kTie = 1e-9;

// kTie radians as an angle.
constexpr Angle angle_tie() {
  return Angle::radians(kTie);
}

// Properties, for any a and limit: strictly_above(a, b) == !at_most(a, b); a value equal on paper
// is at_least and at_most its limit and neither strictly above nor strictly below it.
constexpr bool at_least(double value, double limit) {
  return value >= limit - kTie;
}
constexpr bool at_most(double value, double limit) {
  return value <= limit + kTie;
}
constexpr bool strictly_above(double value, double limit) {
  return value > limit + kTie;
}
constexpr bool strictly_below(double value, double limit) {
  return value < limit - kTie;
}
constexpr bool at_least(Angle value, Angle limit) {
  return at_least(value.rad(), limit.rad());
}
constexpr bool at_most(Angle value, Angle limit) {
  return at_most(value.rad(), limit.rad());
}
constexpr bool strictly_above(Angle value, Angle limit) {
  return !at_most(value, limit);
}
constexpr bool strictly_below(Angle value, Angle limit) {
  return !at_least(value, limit);
}

// Two planes whose normals, as axes, are this close (radians) are parallel: they have no line.
inline constexpr double kParallel = 1e-6;

}  // namespace brink
