// Factor of safety of a wedge from directions alone: friction only, dry, under its own weight.
//
// Without cohesion and water the size cancels (every force grows with the weight), so the answer
// depends on four normals and two friction angles. This is the fast twin of wedge_equilibrium.hpp,
// for millions of pairs: no trigonometry, no allocation, no exception.
#pragma once

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <limits>

#include "brink/base/ties.hpp"
#include "brink/orientation/orientation.hpp"

namespace brink {

// Whether the face rises to a crest with this ground above it: going up the face's dip line leads
// out of the rock through the upper ground. Where not (ground steeper than the face, in its
// direction) no wedge forms on that face.
inline bool rises_to_crest(const Vector3& face_normal, const Vector3& upper_normal) {
  // The line up the dip is the part of "up" that lies in the face, here with its length.
  const double rise = upper_normal.z() - face_normal.z() * upper_normal.dot(face_normal);
  const double length =
      std::sqrt(face_normal.x() * face_normal.x() + face_normal.y() * face_normal.y());
  return rise > kTie * length;
}

// Which side of its plane the block lies on: +1 on the side of the normal given, -1 on the other;
// 0 for both where a plane's trace on the face never reaches the upper ground and so bounds no
// block.
struct WedgeSides {
  double plane1 = 0.0;
  double plane2 = 0.0;
};

// The block lies on the side of plane 1 that holds the corner (plane 2, face, upper ground), and so
// for plane 2: a plane may overhang it. `cross` is normal1 x normal2, of any length above 0; the
// line of intersection must daylight (face.hpp) and the face rise to a crest. Turning a normal
// about turns its sign.
inline WedgeSides wedge_sides(const Vector3& normal1, const Vector3& normal2, const Vector3& cross,
                              const Vector3& face_normal, const Vector3& upper_normal) {
  // Traces of the planes on the face; the corner lies along each in the sense that climbs to the
  // upper ground.
  const double climb1 = normal1.cross(face_normal).dot(upper_normal);
  const double climb2 = normal2.cross(face_normal).dot(upper_normal);
  if (std::abs(climb1) <= kTie || std::abs(climb2) <= kTie) return {};
  // normal1 . (normal2 x face) = cross . face = -normal2 . (normal1 x face).
  const double turn = std::copysign(1.0, cross.dot(face_normal));
  return {std::copysign(turn, turn * climb2), -std::copysign(turn, turn * climb1)};
}

// Factor of safety, dry and without cohesion, of the wedge between two planes with unit normals
// `normal1`, `normal2` (either sense) and tangents of friction `tan_friction1`, `tan_friction2` >=
// 0. Preconditions: the planes are not parallel, their line daylights, the face rises to a crest.
// Mode by equilibrium: both planes, one plane, or no plane (lifts: 0, a block hanging under both).
// Infinite where nothing drives the block; not-a-number where a plane's trace on the face runs
// parallel to the upper ground, so that the planes bound no block.
// Compare with strictly_below(.., 1.0): false for not-a-number. About 40 multiplications, two
// square roots at most.
inline double dry_factor_of_safety(const Vector3& normal1, const Vector3& normal2,
                                   double tan_friction1, double tan_friction2,
                                   const Vector3& face_normal, const Vector3& upper_normal) {
  constexpr double infinite = std::numeric_limits<double>::infinity();
  const Vector3 cross = normal1.cross(normal2);
  const WedgeSides side = wedge_sides(normal1, normal2, cross, face_normal, upper_normal);
  if (side.plane1 == 0.0) return std::numeric_limits<double>::quiet_NaN();
  // Unit weight downwards, borne by both planes: its components along the inward normals, times
  // |cross|^2.
  const double square = cross.squaredNorm();
  const double press1 = side.plane1 * (cross.y() * normal2.x() - cross.x() * normal2.y());
  const double press2 = side.plane2 * (cross.x() * normal1.y() - cross.y() * normal1.x());
  if (press1 >= -kTie * square && press2 >= -kTie * square) {
    const double drive = std::abs(cross.z()) * std::sqrt(square);
    if (drive <= 1e-12 * square) return infinite;
    return (std::max(press1, 0.0) * tan_friction1 + std::max(press2, 0.0) * tan_friction2) / drive;
  }
  // One plane, the other opening. At most one of the two can hold: Cauchy-Schwarz.
  const bool on1 = press2 < -kTie * square && side.plane1 * normal1.z() > 0.0;
  const bool on2 = press1 < -kTie * square && side.plane2 * normal2.z() > 0.0;
  if (!on1 && !on2) return 0.0;
  const Vector3& n = on1 ? normal1 : normal2;
  const double drive = std::sqrt(n.x() * n.x() + n.y() * n.y());
  if (drive <= 1e-12) return infinite;
  return std::abs(n.z()) * (on1 ? tan_friction1 : tan_friction2) / drive;
}

}  // namespace brink
