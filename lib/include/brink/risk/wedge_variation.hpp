// The inputs of a wedge that can be varied or solved for.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "brink/mechanics/wedge_equilibrium.hpp"
#include "brink/risk/sensitivity.hpp"

namespace brink {

struct WedgeVariable {
  std::string name;  // "friction", "face-dip"
  std::string unit;
  double low = 0.0;  // values it may take
  double high = 0.0;
  double solve_low = 0.0;  // where a solution is looked for
  double solve_high = 0.0;
  bool by_ratio = false;
  WedgeCase (*apply)(WedgeCase wedge, double value);
};

// friction, friction1, friction2 (Mohr-Coulomb planes), cohesion, cohesion1, cohesion2, water-fill,
// height, seismic (horizontal), face-dip, bolt-force (of all bolts together, each keeping its
// share), surcharge.
const std::vector<WedgeVariable>& wedge_variables();

// Throws ErrorKind::argument where there is none of that name, with the names there are.
const WedgeVariable& wedge_variable(std::string_view name);

// The case with one input changed, ready for the curves. Throws ErrorKind::argument where the case
// has no such input (bolt-force without a bolt, friction of a plane that follows another law).
VariedInput varied_wedge(const WedgeCase& wedge, const WedgeVariable& variable);

}  // namespace brink
