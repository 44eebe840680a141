#include "brink/record/strength_document.hpp"

namespace brink {

namespace {

Value law_value(const MohrCoulomb& law) {
  return Object{{"law", "Mohr-Coulomb"},
                {"cohesion_kPa", law.cohesion_kPa},
                {"friction_deg", law.friction.deg()}};
}

Value law_value(const BartonBandis& law) {
  return Object{{"law", "Barton-Bandis"},
                {"residual_friction_deg", law.residual_friction.deg()},
                {"jrc", law.jrc},
                {"jcs_kPa", law.jcs_kPa}};
}

Value law_value(const BilinearPatton& law) {
  return Object{{"law", "bilinear"},
                {"friction_deg", law.friction.deg()},
                {"roughness_deg", law.roughness.deg()},
                {"transition_kPa", law.transition_kPa}};
}

}  // namespace

Value strength_value(const Strength& strength) {
  return std::visit([](const auto& law) { return law_value(law); }, strength);
}

Value tangent_value(const TangentStrength& tangent) {
  return Object{{"normal_stress_kPa", tangent.normal_stress_kPa},
                {"shear_strength_kPa", tangent.shear_strength_kPa},
                {"cohesion_kPa", tangent.cohesion_kPa},
                {"friction_deg", tangent.friction.deg()}};
}

}  // namespace brink
