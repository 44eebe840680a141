// Factor of safety of a wedge by rigid-block equilibrium: both planes in contact, one plane, or
// none.
//
// Sources: Hoek & Bray, Rock Slope Engineering, 3rd ed. 1981, ch. 8 and appendix (forces, water);
// Goodman & Shi 1985, Block Theory (modes); every formula in lib/doc/methods.md.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "brink/mechanics/loads.hpp"
#include "brink/mechanics/strength.hpp"
#include "brink/mechanics/wedge_geometry.hpp"

namespace brink {

enum class WedgeMode {
  both,    // slides along the line of intersection, on both planes
  plane1,  // slides on plane 1, leaving plane 2
  plane2,
  lifts,  // leaves both
};

std::string_view to_string(WedgeMode mode);  // "both", "plane1", "plane2", "lifts"

// A driving force of at most this part of the weight is rounding: nothing drives the block.
inline constexpr double kNoDrive = 1e-12;

// Normal forces N1, N2 (either sign) with force + N1 into1 + N2 into2 along the planes' line.
std::pair<double, double> normals_on_both(const Vector3& force, const Vector3& into1,
                                          const Vector3& into2);

// What the planes bear and what drives the block, from the resultant of every other force.
struct WedgeContact {
  WedgeMode mode = WedgeMode::lifts;
  double normal1_kN = 0.0;  // >= 0; 0 on a plane that opens
  double normal2_kN = 0.0;
  double driving_kN = 0.0;          // along `slide`, >= 0; 0 where it lifts
  Vector3 slide = Vector3::Zero();  // unit vector of the movement; zero where it lifts
  bool upward = false;              // mode both, pushed up the line
};

// Contact mode of a block with inward unit normals `into1`, `into2` on planes that meet along unit
// vector `line` (down), under `resultant` (kN, without reactions). `weight_kN` > 0 scales ties.
// Both planes: resultant + N1 into1 + N2 into2 = S line with N1, N2 >= 0. Otherwise one plane: N =
// -resultant . into > 0 and the rest leads away from the other plane (at most one of the two can
// hold). Otherwise the block lifts.
WedgeContact wedge_contact(const Vector3& resultant, const Vector3& into1, const Vector3& into2,
                           const Vector3& line, double weight_kN);

struct WedgeCase {
  WedgeGeometry geometry;
  double unit_weight_kN_m3 = 0.0;  // > 0
  Strength strength1 = MohrCoulomb{};
  Strength strength2 = MohrCoulomb{};
  WedgeWater water = WaterFill{};
  double water_unit_weight_kN_m3 = 9.81;
  double surcharge_kPa = 0.0;  // on the upper ground, vertical, per horizontal area; >= 0
  Seismic seismic;  // shares of the block's weight; trend: of the line of intersection where it is
                    // not given
  std::vector<DirectedForce> loads;
  std::vector<DirectedForce> bolts;  // the direction in which each pulls the block
  BoltAction bolt_action = BoltAction::active;
};

struct WedgeWaterForces {
  double plane1_kN = 0.0;
  double plane2_kN = 0.0;
  double crack_kN = 0.0;
};

// Where the block does not form only `forms`, `reason`, `line` and `warnings` mean anything.
struct WedgeResult {
  bool forms = false;
  std::string reason;
  std::optional<Line> line;
  WedgeBlock block;
  double weight_kN = 0.0;
  double surcharge_kN = 0.0;
  Vector3 resultant_kN = Vector3::Zero();  // of all but reactions and passive bolts
  WedgeContact contact;                    // under the resultant
  WedgeWaterForces water;
  std::optional<Angle> seismic_trend;  // used; absent without a horizontal seismic load
  // The straight lines used for the planes in contact, at the stress that each bears.
  std::optional<TangentStrength> strength1;
  std::optional<TangentStrength> strength2;
  double resisting_kN = 0.0;      // passive bolts included
  double factor_of_safety = 0.0;  // infinite where nothing drives the block; 0 where it lifts
  std::vector<std::string> assumptions;  // what the water was taken to be
  std::vector<std::string> warnings;
};

// All of it for one wedge. Water fill f in 0..1: without a crack the mean pressure on planes 1 and
// 2 is f gw H/6, H the wedge's total height; with one, on both planes and the crack, f gw Hc/3, Hc
// the depth of the crack's lowest corner (Hoek & Bray, appendix). It pushes along the planes'
// inward normals, also on a plane that opens, and from the crack towards the face.
// Factor of safety = resisting / driving. Pushed up the line, it is taken against that movement,
// with a warning; a driving force of at most kNoDrive of the weight is none. Passive bolts add
// their part against the movement, and tan(friction) times the normals they raise. Properties:
// unchanged by turning everything about the vertical, by swapping the planes and, without cohesion
// and outside forces, by scaling. Throws ErrorKind::argument for a value out of its range, and for
// a horizontal seismic load without a trend where the line of intersection is vertical.
WedgeResult analyse_wedge(const WedgeCase& wedge);

}  // namespace brink
