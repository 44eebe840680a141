// The least bolt force that brings a wedge to a target factor of safety.
//
// For each contact mode the resultants that reach the target form a convex set: half-spaces where
// both planes bear, a friction cone cut by half-spaces where one does. The least active pull is the
// distance from the resultant at hand to the nearest of the three sets, found in closed form by
// trying every combination of limits that can be active; so no search can stop in a wrong mode,
// though the block changes mode as the force grows. Where that pull points out of the allowed
// directions, the optimum of its set lies on their border (a convex function has no other local
// minimum), which is scanned, each direction in closed form. A passive bolt leaves the mode alone
// and adds to the resistance in proportion to one dot product.
#pragma once

#include <optional>

#include "brink/mechanics/wedge_equilibrium.hpp"

namespace brink {

// What the designer asks for. Directions allowed: all that point into the face, upward ones too,
// with a plunge in least_plunge..greatest_plunge (-90..90 degrees, positive down).
struct WedgeTarget {
  double factor_of_safety = 0.0;  // > 0
  Angle least_plunge = Angle::degrees(-90.0);
  Angle greatest_plunge = Angle::degrees(90.0);
  std::optional<Line> direction = {};  // sizes a bolt in this direction too, whatever the limits
};

// A bolt more than the case has, pulling the block along `direction`. Force 0, without a direction,
// where the target is reached already.
struct WedgeBolt {
  double force_kN = 0.0;
  std::optional<Line> direction;
};

struct WedgeSupport {
  WedgeTarget target;
  BoltAction action = BoltAction::active;  // the case's
  // Absent where no force reaches the target: a passive bolt on a block that lifts, say.
  std::optional<WedgeBolt> least;
  std::optional<double> along_direction_kN;
};

// `result` is analyse_wedge(wedge) and has to form. Accurate to 1e-9 of the weight for cohesion and
// friction; for a curved strength law the tangents are repeated until the force settles.
// Throws ErrorKind::argument for a target or limits out of their range.
WedgeSupport support_wedge(const WedgeCase& wedge, const WedgeResult& result,
                           const WedgeTarget& target);

}  // namespace brink
