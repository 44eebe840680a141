// Planes in borehole core: from the two angles logged against a reference line to the ground, and
// back.
#pragma once

#include "brink/orientation/orientation.hpp"

namespace brink {

// Which side of the core the reference line was drawn on. `top` is the uppermost side of an
// inclined hole; for a vertical hole, where no side is uppermost, the hole's trend is the azimuth
// of the line itself.
enum class ReferenceLine { top, bottom };

// How a hole runs: trend as any azimuth, plunge -90..90, positive downwards (an up-hole is
// negative).
struct Hole {
  Line axis;
  ReferenceLine reference = ReferenceLine::top;
  bool operator==(const Hole&) const = default;
};

// alpha: acute angle between the core's axis and the plane, 0..90 (90: square to the core, where
// beta means nothing and is taken as 0). beta: clockwise as seen looking down the hole, from the
// reference line to the far, deepest end of the ellipse that the plane cuts, 0 <= beta < 360.
struct CoreAngles {
  Angle alpha;
  Angle beta;
  bool operator==(const CoreAngles&) const = default;
};

// The plane seen in the core. With u along the hole, t the top of the core and r = u x t, the
// ellipse's long axis leans along e = cos(beta) t + sin(beta) r, and the normal is
// sin(alpha) u - cos(alpha) e, turned up. The geometry is the cylinder's; it is derived and checked
// against a cylinder cut by a plane in the tests.
Plane plane_of_core(const CoreAngles& angles, const Hole& hole);

// The angles under which `plane` would be logged in `hole`: inverse of plane_of_core(). A plane
// that contains the hole's axis (alpha 0) has two far ends; either beta may be returned, and both
// give the plane back. A plane square to the hole gives beta 0.
CoreAngles core_of_plane(const Plane& plane, const Hole& hole);

}  // namespace brink
