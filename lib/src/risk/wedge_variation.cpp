#include "brink/risk/wedge_variation.hpp"

#include <algorithm>

#include "brink/base/error.hpp"

namespace brink {

namespace {

MohrCoulomb& straight(Strength& strength) {
  if (auto* law = std::get_if<MohrCoulomb>(&strength)) return *law;
  throw Error(ErrorKind::argument, {},
              "friction and cohesion vary only on planes with Mohr-Coulomb strength");
}

WedgeCase with_friction1(WedgeCase w, double value) {
  straight(w.strength1).friction = Angle::degrees(value);
  return w;
}
WedgeCase with_friction2(WedgeCase w, double value) {
  straight(w.strength2).friction = Angle::degrees(value);
  return w;
}
WedgeCase with_friction(WedgeCase w, double value) {
  return with_friction2(with_friction1(std::move(w), value), value);
}
WedgeCase with_cohesion1(WedgeCase w, double value) {
  straight(w.strength1).cohesion_kPa = value;
  return w;
}
WedgeCase with_cohesion2(WedgeCase w, double value) {
  straight(w.strength2).cohesion_kPa = value;
  return w;
}
WedgeCase with_cohesion(WedgeCase w, double value) {
  return with_cohesion2(with_cohesion1(std::move(w), value), value);
}
WedgeCase with_water_fill(WedgeCase w, double value) {
  w.water = WaterFill{value};
  return w;
}
WedgeCase with_height(WedgeCase w, double value) {
  w.geometry.size = {WedgeMeasure::height, value};
  return w;
}
WedgeCase with_seismic(WedgeCase w, double value) {
  w.seismic.horizontal = value;
  return w;
}
WedgeCase with_face_dip(WedgeCase w, double value) {
  w.geometry.face.dip = Angle::degrees(value);
  return w;
}
WedgeCase with_surcharge(WedgeCase w, double value) {
  w.surcharge_kPa = value;
  return w;
}

WedgeCase with_bolt_force(WedgeCase w, double value) {
  double sum_kN = 0.0;
  for (const DirectedForce& bolt : w.bolts) sum_kN += bolt.force_kN;
  if (sum_kN == 0.0) {
    throw Error(ErrorKind::argument, Place{.key = "bolt-force"},
                "cannot vary: there is no bolt, so no direction either", {},
                "a bolt with a force above 0");
  }
  for (DirectedForce& bolt : w.bolts) bolt.force_kN *= value / sum_kN;
  return w;
}

}  // namespace

const std::vector<WedgeVariable>& wedge_variables() {
  constexpr double steep = 89.9;
  constexpr double huge = 1e9;
  static const std::vector<WedgeVariable> variables{
      {"friction", "deg", 0, steep, 0, steep, false, with_friction},
      {"friction1", "deg", 0, steep, 0, steep, false, with_friction1},
      {"friction2", "deg", 0, steep, 0, steep, false, with_friction2},
      {"cohesion", "kPa", 0, huge, 0, 10000, false, with_cohesion},
      {"cohesion1", "kPa", 0, huge, 0, 10000, false, with_cohesion1},
      {"cohesion2", "kPa", 0, huge, 0, 10000, false, with_cohesion2},
      {"water-fill", "", 0, 1, 0, 1, false, with_water_fill},
      {"height", "m", 1e-3, huge, 0.1, 2000, true, with_height},
      {"seismic", "", 0, huge, 0, 2, false, with_seismic},
      {"face-dip", "deg", 0.1, 179.9, 1, 179, false, with_face_dip},
      {"bolt-force", "kN", 0, huge, 0, 1e6, false, with_bolt_force},
      {"surcharge", "kPa", 0, huge, 0, 10000, false, with_surcharge}};
  return variables;
}

const WedgeVariable& wedge_variable(std::string_view name) {
  std::string names;
  for (const WedgeVariable& variable : wedge_variables()) {
    if (variable.name == name) return variable;
    names += (names.empty() ? "" : ", ") + variable.name;
  }
  throw Error(ErrorKind::argument, {}, "no input of that name can vary", name, names);
}

VariedInput varied_wedge(const WedgeCase& wedge, const WedgeVariable& variable) {
  variable.apply(wedge, variable.low);  // says now what the case lacks
  return {variable.name, variable.unit,
          [wedge, apply = variable.apply](double value) -> std::optional<double> {
            const WedgeResult result = analyse_wedge(apply(wedge, value));
            if (!result.forms) return std::nullopt;
            return result.factor_of_safety;
          }};
}

}  // namespace brink
