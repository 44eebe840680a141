// Planar slide: a block on one plane, per metre of face.
//
// Everything happens in the vertical section along the plane's dip direction; lengths are in that
// section, and "per metre" is along the plane's strike. Section coordinates: the origin is where
// the plane leaves the face, x runs horizontally into the slope, z up. Face and upper ground enter
// with their apparent dips in the section.
//
// Sources: Hoek & Bray, Rock Slope Engineering, 3rd ed. 1981, ch. 7; Wyllie & Mah, Rock Slope
// Engineering, 4th ed. 2004, ch. 6. Beyond them: sloping upper ground, surcharge, vertical shaking,
// and forces of any direction, all by the same two equations of equilibrium.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/mechanics/loads.hpp"
#include "brink/mechanics/section_point.hpp"
#include "brink/mechanics/strength.hpp"
#include "brink/orientation/face.hpp"

namespace brink {

enum class CrackChoice {
  none,
  at_setback,  // vertical, at crack_setback_m
  critical,    // vertical, where the factor of safety is least
};

struct PlaneSlideInput {
  Plane plane;
  Face face;
  Plane upper = kLevelGround;
  double height_m = 0.0;           // from where the plane leaves the face up to the crest; > 0
  double unit_weight_kN_m3 = 0.0;  // > 0
  Strength strength = MohrCoulomb{};

  CrackChoice crack = CrackChoice::none;
  double crack_setback_m = 0.0;  // horizontal, behind the crest; below 0: in front, on the face
  // In the crack, whose water also presses on the plane, falling to zero at the toe. Without a
  // crack: height above the toe to which the plane is wet, the pressure zero at both ends and half
  // that head half-way.
  double water_depth_m = 0.0;
  double water_unit_weight_kN_m3 = 9.81;

  double surcharge_kPa = 0.0;        // vertical, on the upper ground, per horizontal area
  double seismic_horizontal = 0.0;   // share of the weight, out of the slope; may be negative
  double seismic_vertical = 0.0;     // share of the weight, upward positive
  std::vector<DirectedForce> loads;  // kN per metre; the direction in which each pushes
  std::vector<DirectedForce> bolts;
  BoltAction bolt_action = BoltAction::active;
  std::optional<double> target;  // factor of safety to reach with one more bolt

  Angle strike_tolerance = Angle::degrees(20.0);  // beyond it a warning, no more
};

// Apparent dips, positive towards the side the plane dips to; the face's may pass 90.
struct PlaneSection {
  Angle azimuth;  // the way the block slides
  Angle plane_dip;
  Angle face_dip;
  Angle upper_dip;
  // Corners of the block in order: toe, crest (unless the crack cuts the face), back corner at the
  // ground, foot of the crack (if there is one).
  std::vector<SectionPoint> outline;
};

enum class PlaneSlideMode {
  slides,  // the block presses on the plane
  lifts,   // the effective normal force is negative: no contact, factor of safety 0
};

// The least pull that reaches the target, over every direction in the section that points into the
// face, and that direction.
struct BoltForTarget {
  double force_kN_m = 0.0;
  BoltAction action = BoltAction::active;
  Line direction;
};

struct PlaneSlide {
  bool forms = false;
  std::string reason;  // why no block forms; empty where one does
  PlaneSection section;

  // All that follows means something only where a block forms.
  PlaneSlideMode mode = PlaneSlideMode::slides;
  double weight_kN_m = 0.0;     // the surcharge included
  double surcharge_kN_m = 0.0;  // of which surcharge
  double sliding_length_m = 0.0;
  std::optional<double> crack_depth_m;    // absent without a crack; 0 where it misses the block
  std::optional<double> crack_setback_m;  // as given or as found
  // With a critical crack found on the face: the least factor of safety of cracks behind the crest.
  std::optional<double> least_behind_crest;
  double normal_kN_m = 0.0;  // effective: water's uplift taken off
  double uplift_kN_m = 0.0;
  double crack_water_kN_m = 0.0;
  double driving_kN_m = 0.0;  // down the plane; below 0 where the forces push the block up it
  double resisting_kN_m = 0.0;
  double factor_of_safety = 0.0;  // infinite where nothing drives the block
  TangentStrength strength;       // the line used, and the effective normal stress it was taken at
  std::optional<BoltForTarget> bolt_for_target;  // force 0 where the target is met already
  std::vector<std::string> warnings;
};

// Whether a block forms, and how safe it is. A block that does not form or lifts is a result. The
// factor of safety is resisting / |driving|; where the forces push the block up the plane, a
// warning says so. A horizontal plane is taken along the face's dip direction, a vertical one on
// the side to which the face looks. Throws ErrorKind::argument for a value out of its range, for
// water deeper than the crack, and for a critical crack that no position allows.
//
// Properties: scaling all lengths leaves the factor of safety of a dry, cohesionless block; turning
// every direction about the vertical changes nothing.
PlaneSlide analyse_plane_slide(const PlaneSlideInput& input);

// The deepest water that the input's block takes: the depth of its crack, for a critical one that
// of a crack at the crest, without one the height at which the plane comes out. 0 where no block
// forms or the crack misses it. The input's own water is not looked at.
double greatest_water_depth_m(const PlaneSlideInput& input);

// The dry block without crack or loads: the first thing to know of a flagged plane.
PlaneSlide dry_plane_slide(const Plane& plane, const Face& face, double height_m,
                           double unit_weight_kN_m3, Angle friction, double cohesion_kPa);

// Setback of the crack that leaves the dry block on level ground least safe, and its depth, as
// shares of the height: b/H = sqrt(cot f cot p) - cot f, z/H = 1 - sqrt(cot f tan p). Hoek & Bray
// 1981, ch. 7. For 0 < plane dip < face dip < 90 degrees.
struct CriticalCrack {
  double setback_share = 0.0;
  double depth_share = 0.0;
};
CriticalCrack dry_critical_crack(Angle plane_dip, Angle face_dip);

}  // namespace brink
