#include "plane_equilibrium.hpp"

#include <cmath>
#include <limits>

#include "brink/base/ties.hpp"

namespace brink {
namespace {

Vector2 sum_in_section(const std::vector<DirectedForce>& forces, Angle azimuth) {
  Vector2 sum = Vector2::Zero();
  for (const DirectedForce& f : forces)
    sum += f.force_kN * in_section(direction(f.towards), azimuth);
  return sum;
}

// Triangle of pressure on the wet part of the plane: its peak at the crack's foot, or half-way
// where there is no crack (Hoek & Bray 1981, ch. 7).
double uplift_kN_m(const PlaneSlideInput& input, const SectionShape& shape, const CutBlock& block,
                   bool cracked) {
  const double depth_m = input.water_depth_m;
  if (depth_m == 0.0) return 0.0;
  const double peak_kPa = input.water_unit_weight_kN_m3 * depth_m * (cracked ? 1.0 : 0.5);
  const double wet_m = cracked ? block.sliding_length_m : depth_m / shape.up_plane.y();
  return peak_kPa * wet_m / 2.0;
}

}  // namespace

SectionLoads section_loads(const PlaneSlideInput& input, Angle azimuth) {
  SectionLoads loads;
  loads.pushed = sum_in_section(input.loads, azimuth);
  const Vector2 bolts = sum_in_section(input.bolts, azimuth);
  (input.bolt_action == BoltAction::active ? loads.pushed : loads.passive) += bolts;
  return loads;
}

SlideForces slide_forces(const PlaneSlideInput& input, const SectionShape& shape,
                         const SectionLoads& loads, const CutBlock& block, bool cracked) {
  SlideForces out;
  out.surcharge_kN_m = input.surcharge_kPa * block.ground_m;
  out.weight_kN_m = input.unit_weight_kN_m3 * block.area_m2 + out.surcharge_kN_m;
  out.uplift_kN_m = uplift_kN_m(input, shape, block, cracked);
  if (cracked)
    out.crack_water_kN_m =
        input.water_unit_weight_kN_m3 * input.water_depth_m * input.water_depth_m / 2.0;
  const Vector2 body =
      out.weight_kN_m * Vector2(-input.seismic_horizontal, input.seismic_vertical - 1.0);
  const Vector2 sum = body + loads.pushed - Vector2(out.crack_water_kN_m, 0.0);
  out.driving_kN_m = -sum.dot(shape.up_plane);
  out.normal_kN_m = -(sum + loads.passive).dot(shape.up_normal) - out.uplift_kN_m;
  out.passive_kN_m = loads.passive.dot(shape.up_plane);
  return out;
}

SlideBalance slide_balance(const Strength& strength, const SlideForces& forces,
                           double sliding_length_m) {
  SlideBalance out;
  const double scale_kN_m = std::abs(forces.weight_kN_m) + forces.uplift_kN_m;
  out.strength = tangent_strength(strength, forces.normal_kN_m / sliding_length_m);
  if (strictly_below(forces.normal_kN_m / scale_kN_m, 0.0)) {
    out.mode = PlaneSlideMode::lifts;
    return out;
  }
  out.resisting_kN_m = out.strength.shear_strength_kPa * sliding_length_m;
  // Passive bolts hang slack on a block that is pushed up the plane.
  if (forces.driving_kN_m > 0.0) out.resisting_kN_m += forces.passive_kN_m;
  constexpr double kNoDrive = 1e-12;  // of the weight: rounding, not a force
  const bool driven = std::abs(forces.driving_kN_m) > kNoDrive * scale_kN_m;
  out.factor_of_safety = driven ? out.resisting_kN_m / std::abs(forces.driving_kN_m)
                                : std::numeric_limits<double>::infinity();
  return out;
}

}  // namespace brink
