// The solid that a handful of half-spaces have in common: corners, areas, volume, centroid.
#pragma once

#include <span>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

// All points x with outward . x <= offset_m; `outward` is a unit vector.
struct HalfSpace {
  Vector3 outward;
  double offset_m = 0.0;
};

// The part of one bounding plane that is surface of the solid. Corners run counter-clockwise seen
// from outside; a plane that only touches the solid has none and area 0.
struct SolidFace {
  std::vector<Vector3> corners;
  double area_m2 = 0.0;
  Vector3 centroid = Vector3::Zero();
};

enum class SolidState {
  solid,      // bounded, with a volume
  empty,      // the half-spaces have no volume in common (or no corner)
  unbounded,  // they have, but it has no end
};

// `faces` has one entry a half-space, in their order. Volume, areas and centroid are 0 unless the
// state is `solid`.
struct Solid {
  SolidState state = SolidState::empty;
  double volume_m3 = 0.0;
  Vector3 centroid = Vector3::Zero();
  std::vector<SolidFace> faces;
};

// Intersection of the half-spaces. Each edge is the line of two planes, cut by all others, so no
// corner is ever looked for among nearly equal candidates; planes within kParallel radians of each
// other share no edge, and of two coincident ones the first bears the face. Accurate to rounding
// for well-conditioned solids (against Qhull 1e-9 of the volume in the tests); cost grows with the
// cube of the number of half-spaces, meant for up to ten.
Solid common_solid(std::span<const HalfSpace> half_spaces);

}  // namespace brink
