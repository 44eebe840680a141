// The inputs of a planar slide that can be varied or solved for.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "brink/mechanics/plane_slide.hpp"
#include "brink/risk/sensitivity.hpp"

namespace brink {

struct PlaneVariable {
  std::string name;  // "friction", "face-dip"
  std::string unit;
  double low = 0.0;  // values it may take
  double high = 0.0;
  double solve_low = 0.0;  // where a solution is looked for
  double solve_high = 0.0;
  bool by_ratio = false;
  PlaneSlideInput (*apply)(PlaneSlideInput input, double value);
};

// friction, cohesion (Mohr-Coulomb strength), water-fill (share of the crack's depth, or of the
// height at which the plane comes out; not with a critical crack), water-depth, height, seismic
// (horizontal), face-dip, plane-dip, crack-setback, bolt-force (of all bolts together, each keeping
// its share), surcharge.
const std::vector<PlaneVariable>& plane_variables();

// Throws ErrorKind::argument where there is none of that name, with the names there are.
const PlaneVariable& plane_variable(std::string_view name);

// The slide with one input changed, ready for the curves. Where the changed block is too small for
// the stated depth of water, the water stands as deep as it can. Throws ErrorKind::argument where
// the slide has no such input (bolt-force without a bolt, friction of another law).
VariedInput varied_plane(const PlaneSlideInput& input, const PlaneVariable& variable);

}  // namespace brink
