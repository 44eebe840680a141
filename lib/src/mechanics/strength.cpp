#include "brink/mechanics/strength.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include "brink/base/error.hpp"
#include "require.hpp"

namespace brink {
namespace {

constexpr Angle kGreatestTotal = Angle::degrees(70.0);

TangentStrength line_through(double stress_kPa, double shear_kPa, double slope) {
  return {stress_kPa, shear_kPa, shear_kPa - stress_kPa * slope, atan2(slope, 1.0)};
}

TangentStrength tangent(const MohrCoulomb& law, double stress_kPa) {
  return {stress_kPa, law.cohesion_kPa + stress_kPa * tan(law.friction), law.cohesion_kPa,
          law.friction};
}

TangentStrength tangent(const BartonBandis& law, double stress_kPa) {
  if (stress_kPa == 0.0)
    return {0.0, 0.0, 0.0, law.jrc > 0.0 ? kGreatestTotal : law.residual_friction};
  const double decades = std::log10(law.jcs_kPa / stress_kPa);
  const Angle total = law.residual_friction + Angle::degrees(law.jrc * std::max(decades, 0.0));
  if (total >= kGreatestTotal)
    return {stress_kPa, stress_kPa * tan(kGreatestTotal), 0.0, kGreatestTotal};
  const double slope_of_total = tan(total);
  const double shear_kPa = stress_kPa * slope_of_total;
  if (decades <= 0.0) return {stress_kPa, shear_kPa, 0.0, law.residual_friction};
  // d(total)/d(ln s) = -JRC / ln 10, in degrees.
  const double turn = law.jrc * std::numbers::pi / (180.0 * std::numbers::ln10);
  const double slope = slope_of_total - turn * (1.0 + slope_of_total * slope_of_total);
  return line_through(stress_kPa, shear_kPa, slope);
}

TangentStrength tangent(const BilinearPatton& law, double stress_kPa) {
  const Angle steep = law.friction + law.roughness;
  if (stress_kPa <= law.transition_kPa) return {stress_kPa, stress_kPa * tan(steep), 0.0, steep};
  const double cohesion_kPa = law.transition_kPa * (tan(steep) - tan(law.friction));
  return {stress_kPa, cohesion_kPa + stress_kPa * tan(law.friction), cohesion_kPa, law.friction};
}

void check(const MohrCoulomb& law) {
  require_not_negative("cohesion", law.cohesion_kPa);
  require_friction("friction", law.friction);
}

void check(const BartonBandis& law) {
  require_between("residual friction", law.residual_friction.deg(), 0.0, kGreatestTotal.deg());
  require_between("JRC", law.jrc, 0.0, 20.0);
  require_positive("JCS", law.jcs_kPa);
}

void check(const BilinearPatton& law) {
  require_friction("friction", law.friction);
  require_not_negative("roughness", law.roughness.deg());
  require_friction("friction + roughness", law.friction + law.roughness);
  require_not_negative("transition stress", law.transition_kPa);
}

}  // namespace

void check_strength(const Strength& strength) {
  std::visit([](const auto& law) { check(law); }, strength);
}

TangentStrength tangent_strength(const Strength& strength, double normal_stress_kPa) {
  const double stress_kPa = std::max(normal_stress_kPa, 0.0);
  return std::visit([=](const auto& law) { return tangent(law, stress_kPa); }, strength);
}

TangentStrength settle_tangent_strength(
    const Strength& strength,
    const std::function<double(const TangentStrength&)>& normal_stress_kPa) {
  constexpr int kMostRounds = 200;
  constexpr double kSettled = 1e-12;
  double stress_kPa = normal_stress_kPa(TangentStrength{});
  for (int round = 0; round < kMostRounds; ++round) {
    const TangentStrength line = tangent_strength(strength, stress_kPa);
    const double next_kPa = normal_stress_kPa(line);
    if (std::abs(next_kPa - stress_kPa) <= kSettled * std::abs(next_kPa)) return line;
    stress_kPa = next_kPa;
  }
  throw std::logic_error("the stress on a joint did not settle with its tangent strength");
}

BartonBandis scaled_to_length(const BartonBandis& sample, double joint_length_m,
                              double sample_length_m) {
  require_positive("joint length", joint_length_m);
  require_positive("sample length", sample_length_m);
  const double ratio = std::max(joint_length_m / sample_length_m, 1.0);
  return {sample.residual_friction, sample.jrc * std::pow(ratio, -0.02 * sample.jrc),
          sample.jcs_kPa * std::pow(ratio, -0.03 * sample.jrc)};
}

}  // namespace brink
