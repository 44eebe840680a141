// Shear strength of a joint: three published laws, and the straight line that touches each at a
// normal stress.
//
// Stresses are effective (water pressure taken off), in kPa, compression positive.
#pragma once

#include <functional>
#include <variant>

#include "brink/base/angle.hpp"

namespace brink {

// tau = c + s tan(phi). cohesion_kPa >= 0, 0 <= friction < 90 degrees.
struct MohrCoulomb {
  double cohesion_kPa = 0.0;
  Angle friction;
  bool operator==(const MohrCoulomb&) const = default;
};

// tau = s tan(phi_r + JRC log10(JCS/s)), the total angle at most 70 degrees (Barton & Choubey 1977,
// Rock Mechanics 10:1; Barton & Bandis 1982, 23rd US Symp. Rock Mech. 739). Ours: a stress above
// JCS lies outside the law, which would give less than the residual strength; the residual angle
// is used there. 0 <= residual_friction <= 70 degrees, 0 <= jrc <= 20, jcs_kPa > 0.
struct BartonBandis {
  Angle residual_friction;
  double jrc = 0.0;      // joint roughness coefficient
  double jcs_kPa = 0.0;  // compressive strength of the joint wall
  bool operator==(const BartonBandis&) const = default;
};

// tau = s tan(phi + i) up to the transition stress, where the teeth shear off; beyond it the line
// goes on at slope tan(phi) (Patton 1966, 1st Congr. Int. Soc. Rock Mech. 1:509). friction >= 0,
// roughness >= 0, their sum below 90 degrees; transition_kPa >= 0.
struct BilinearPatton {
  Angle friction;
  Angle roughness;  // Patton's i
  double transition_kPa = 0.0;
  bool operator==(const BilinearPatton&) const = default;
};

using Strength = std::variant<MohrCoulomb, BartonBandis, BilinearPatton>;

// The line tau = c + s tan(phi) that touches a law at `normal_stress_kPa`: what an equilibrium with
// cohesion and friction uses in the law's place. shear_strength_kPa is the law's own value there.
struct TangentStrength {
  double normal_stress_kPa = 0.0;
  double shear_strength_kPa = 0.0;
  double cohesion_kPa = 0.0;
  Angle friction;
};

// Throws ErrorKind::argument, naming the quantity, where a parameter is out of the range above.
void check_strength(const Strength& strength);

// A stress of 0 or below gives the line at 0, where shear_strength_kPa is the cohesion there: 0 but
// for Mohr-Coulomb. At the corner of a bilinear law, the line of the lower stresses. Does not
// check the parameters.
TangentStrength tangent_strength(const Strength& strength, double normal_stress_kPa);

// The tangent at a stress that itself depends on the strength in use (a bolt sized with it, say):
// repeats tangent -> stress -> tangent until the stress moves by less than 1e-12 of itself, at most
// 200 times; starts from the stress that no cohesion and no friction give. `normal_stress_kPa` maps
// the line in use to the effective normal stress on the joint. An iteration that doesn't settle
// throws std::logic_error: stresses that depend on strength weakly, as here, always do.
TangentStrength settle_tangent_strength(
    const Strength& strength,
    const std::function<double(const TangentStrength&)>& normal_stress_kPa);

// Roughness and wall strength of a joint `joint_length_m` long, from values found on a sample of
// `sample_length_m` (0.1 m where they were read off profiles): JRC (Ln/L0)^(-0.02 JRC) and
// JCS (Ln/L0)^(-0.03 JRC), Barton & Bandis 1982. A joint shorter than the sample keeps the sample's
// values (ours: the law was fitted to longer ones). Lengths > 0, else ErrorKind::argument.
BartonBandis scaled_to_length(const BartonBandis& sample, double joint_length_m,
                              double sample_length_m = 0.1);

}  // namespace brink
