// The sets of resultants under which a wedge reaches a factor of safety, one a contact mode.
#pragma once

#include <array>
#include <optional>
#include <vector>

#include "brink/mechanics/wedge_equilibrium.hpp"

namespace brink {

// normal . r >= offset.
struct ForceLimit {
  Vector3 normal;
  double offset = 0.0;
};

// cohesion + N tan_friction >= target |s|, where r = -N into + s and s lies in the plane.
struct FrictionCone {
  Vector3 into;
  Vector3 line;  // direction in the plane in which the mode changes to both planes
  double cohesion_kN = 0.0;
  double tan_friction = 0.0;
  double target = 0.0;
  double least_normal_kN = 0.0;
};

// Convex: every limit holds, and the cone where there is one.
struct SafeRegion {
  std::vector<ForceLimit> limits;
  std::optional<FrictionCone> cone;
  double slack_kN = 0.0;  // for comparing forces that are equal on paper

  bool holds(const Vector3& r) const;
};

struct SafeProblem {
  Vector3 into1;
  Vector3 into2;
  Vector3 line;
  double cohesion1_kN = 0.0;
  double cohesion2_kN = 0.0;
  double tan1 = 0.0;
  double tan2 = 0.0;
  double weight_kN = 0.0;
  double target = 0.0;
};

// Both planes, plane 1, plane 2.
std::array<SafeRegion, 3> safe_regions(const SafeProblem& problem);

// The point of the region nearest to `r`; nothing where the region has none.
std::optional<Vector3> nearest_safe(const SafeRegion& region, const Vector3& r);

// The least t >= 0 with r + t direction in the region.
std::optional<double> least_along(const SafeRegion& region, const Vector3& r,
                                  const Vector3& direction);

// Rows of the normals on both planes: N1 = first . r, N2 = second . r.
std::array<Vector3, 2> normal_rows(const Vector3& into1, const Vector3& into2);

}  // namespace brink
