// Where on the lower hemisphere a pole or a line must fall to be admissible: outlines for drawing.
#pragma once

#include <vector>

#include "brink/kinematics/modes.hpp"

namespace brink {

// Vertices of a closed curve: downward unit vectors (z <= 0), the last joins the first, neighbours
// at most 1 degree apart. It may run along the rim (z = 0) or through the straight-down point.
using SphereLoop = std::vector<Vector3>;

// The admissible region of one mode. Planar sliding and flexural toppling are regions of poles,
// wedge sliding and block toppling regions of lines.
struct Region {
  Mode mode = Mode::planar_sliding;
  bool of_poles = true;
  std::vector<SphereLoop> loops;  // empty where nothing is admissible; fill by the even-odd rule
};

// The outline of a mode's region on a face. Vertices lie on the boundary to rounding: limits are
// drawn where they are stated, without the tie. Where the region holds the whole rim, the rim is
// one of the loops.
Region admissible_region(Mode mode, const Face& face, const ModeSettings& settings);

// Whether a pole or line of unit vector `v` (either sense) passes the mode's test: the same
// functions that are counted with. `of_poles` modes take the pole.
bool in_region(Mode mode, const FaceLimits& limits, const Vector3& v);

}  // namespace brink
