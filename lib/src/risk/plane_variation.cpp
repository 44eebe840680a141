#include "brink/risk/plane_variation.hpp"

#include <algorithm>
#include <utility>

#include "brink/base/error.hpp"

namespace brink {

namespace {

Error cannot_vary(const char* name, const char* why, const char* needed) {
  return Error(ErrorKind::argument, Place{.key = name}, why, {}, needed);
}

MohrCoulomb& straight(PlaneSlideInput& input, const char* name) {
  if (auto* law = std::get_if<MohrCoulomb>(&input.strength)) return *law;
  throw cannot_vary(name, "cannot vary: the plane follows another strength law",
                    "Mohr-Coulomb strength");
}

PlaneSlideInput with_friction(PlaneSlideInput in, double value) {
  straight(in, "friction").friction = Angle::degrees(value);
  return in;
}
PlaneSlideInput with_cohesion(PlaneSlideInput in, double value) {
  straight(in, "cohesion").cohesion_kPa = value;
  return in;
}
PlaneSlideInput with_water_fill(PlaneSlideInput in, double value) {
  if (in.crack == CrackChoice::critical)
    throw cannot_vary("water-fill", "cannot vary: a critical crack moves with the water",
                      "a crack at a setback, or none");
  in.water_depth_m = value * greatest_water_depth_m(in);
  return in;
}
PlaneSlideInput with_water_depth(PlaneSlideInput in, double value) {
  in.water_depth_m = value;
  return in;
}
PlaneSlideInput with_height(PlaneSlideInput in, double value) {
  in.height_m = value;
  return in;
}
PlaneSlideInput with_seismic(PlaneSlideInput in, double value) {
  in.seismic_horizontal = value;
  return in;
}
PlaneSlideInput with_face_dip(PlaneSlideInput in, double value) {
  in.face.dip = Angle::degrees(value);
  return in;
}
PlaneSlideInput with_plane_dip(PlaneSlideInput in, double value) {
  in.plane.dip = Angle::degrees(value);
  return in;
}
PlaneSlideInput with_surcharge(PlaneSlideInput in, double value) {
  in.surcharge_kPa = value;
  return in;
}
PlaneSlideInput with_crack_setback(PlaneSlideInput in, double value) {
  if (in.crack != CrackChoice::at_setback)
    throw cannot_vary("crack-setback", "cannot vary: there is no crack at a setback",
                      "a crack at a setback");
  in.crack_setback_m = value;
  return in;
}
PlaneSlideInput with_bolt_force(PlaneSlideInput in, double value) {
  double sum_kN = 0.0;
  for (const DirectedForce& bolt : in.bolts) sum_kN += bolt.force_kN;
  if (sum_kN == 0.0)
    throw cannot_vary("bolt-force", "cannot vary: there is no bolt, so no direction either",
                      "a bolt with a force above 0");
  for (DirectedForce& bolt : in.bolts) bolt.force_kN *= value / sum_kN;
  return in;
}

}  // namespace

const std::vector<PlaneVariable>& plane_variables() {
  constexpr double steep = 89.9;
  constexpr double huge = 1e9;
  static const std::vector<PlaneVariable> variables{
      {"friction", "deg", 0, steep, 0, steep, false, with_friction},
      {"cohesion", "kPa", 0, huge, 0, 10000, false, with_cohesion},
      {"water-fill", "", 0, 1, 0, 1, false, with_water_fill},
      {"water-depth", "m", 0, huge, 0, 1000, false, with_water_depth},
      {"height", "m", 1e-3, huge, 0.1, 2000, true, with_height},
      {"seismic", "", -huge, huge, 0, 2, false, with_seismic},
      {"face-dip", "deg", 0.1, 179.9, 1, 179, false, with_face_dip},
      {"plane-dip", "deg", 0, 90, 0, 90, false, with_plane_dip},
      {"crack-setback", "m", -huge, huge, -1000, 1000, false, with_crack_setback},
      {"bolt-force", "kN/m", 0, huge, 0, 1e5, false, with_bolt_force},
      {"surcharge", "kPa", 0, huge, 0, 10000, false, with_surcharge}};
  return variables;
}

const PlaneVariable& plane_variable(std::string_view name) {
  std::string names;
  for (const PlaneVariable& variable : plane_variables()) {
    if (variable.name == name) return variable;
    names += (names.empty() ? "" : ", ") + variable.name;
  }
  throw Error(ErrorKind::argument, {}, "no input of that name can vary", name, names);
}

VariedInput varied_plane(const PlaneSlideInput& input, const PlaneVariable& variable) {
  PlaneSlideInput base = input;
  base.target.reset();                       // of no use to a curve
  variable.apply(base, variable.solve_low);  // says now what the slide lacks
  return {variable.name, variable.unit,
          [base, apply = variable.apply](double value) -> std::optional<double> {
            PlaneSlideInput changed = apply(base, value);
            if (changed.water_depth_m > 0.0)
              changed.water_depth_m =
                  std::min(changed.water_depth_m, greatest_water_depth_m(changed));
            const PlaneSlide slide = analyse_plane_slide(changed);
            if (!slide.forms) return std::nullopt;
            return slide.factor_of_safety;
          }};
}

}  // namespace brink
