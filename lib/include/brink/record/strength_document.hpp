// Joint strengths as values of a record.
#pragma once

#include "brink/mechanics/strength.hpp"
#include "brink/record/document.hpp"

namespace brink {

// {law, ...its parameters with their units}.
Value strength_value(const Strength& strength);

// The straight line used: {normal_stress_kPa, shear_strength_kPa, cohesion_kPa, friction_deg}.
Value tangent_value(const TangentStrength& tangent);

}  // namespace brink
