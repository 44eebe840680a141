// Forces on the block of a planar slide and the two equations of equilibrium: along the plane and
// across it.
#pragma once

#include "plane_section.hpp"

namespace brink {

// What does not change with the crack's position, worked out once.
struct SectionLoads {
  Vector2 pushed = Vector2::Zero();   // loads and active bolts, kN per metre
  Vector2 passive = Vector2::Zero();  // passive bolts
};
SectionLoads section_loads(const PlaneSlideInput& input, Angle azimuth);

struct SlideForces {
  double weight_kN_m = 0.0;  // surcharge included
  double surcharge_kN_m = 0.0;
  double uplift_kN_m = 0.0;
  double crack_water_kN_m = 0.0;
  double normal_kN_m = 0.0;  // effective
  double driving_kN_m = 0.0;
  double passive_kN_m = 0.0;  // pull of the passive bolts up the plane
};
// `cracked` says whether the water stands in a crack or on the plane alone.
SlideForces slide_forces(const PlaneSlideInput& input, const SectionShape& shape,
                         const SectionLoads& loads, const CutBlock& block, bool cracked);

struct SlideBalance {
  PlaneSlideMode mode = PlaneSlideMode::slides;
  TangentStrength strength;
  double resisting_kN_m = 0.0;
  double factor_of_safety = 0.0;
};
SlideBalance slide_balance(const Strength& strength, const SlideForces& forces,
                           double sliding_length_m);

// The position (x of the section) of the crack that gives the least factor of safety.
struct CrackSearch {
  double x_m = 0.0;
  bool flat = false;                         // the same factor of safety everywhere
  bool at_edge = false;                      // still falling at the end of the positions possible
  std::optional<double> least_behind_crest;  // where x_m lies in front of it
};
CrackSearch search_critical_crack(const PlaneSlideInput& input, const SectionShape& shape);

// Nothing where no bolt reaches the target.
std::optional<BoltForTarget> least_bolt(const PlaneSlideInput& input, const SectionShape& shape,
                                        const SlideForces& forces, double sliding_length_m);

}  // namespace brink
