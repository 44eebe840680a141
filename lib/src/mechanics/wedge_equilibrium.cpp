#include "brink/mechanics/wedge_equilibrium.hpp"

#include <fmt/format.h>

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"

namespace brink {

namespace {

// A driving force below this part of the weight is rounding: nothing drives the block.
constexpr double kNoDrive = 1e-12;

void require(bool holds, const char* what, double value, const char* accepted) {
  if (holds) return;
  throw Error(ErrorKind::argument, {}, fmt::format("{} is out of range", what),
              std::isfinite(value) ? shortest(value) : "not a number", accepted);
}

void check(const MohrCoulomb& strength, const char* friction, const char* cohesion) {
  const double phi = strength.friction.deg();
  require(phi >= 0.0 && phi < 90.0, friction, phi, "0 or more and below 90 degrees");
  const double c = strength.cohesion_kPa;
  require(c >= 0.0 && std::isfinite(c), cohesion, c, "0 kPa or more");
}

void check(const WedgeWater& water) {
  if (const auto* fill = std::get_if<WaterFill>(&water)) {
    require(fill->fill >= 0.0 && fill->fill <= 1.0, "the water fill", fill->fill,
            "0 (dry) to 1 (full)");
    return;
  }
  const auto& u = std::get<WaterPressures>(water);
  for (const double pressure : {u.plane1_kPa, u.plane2_kPa, u.crack_kPa}) {
    require(pressure >= 0.0 && std::isfinite(pressure), "a water pressure", pressure,
            "0 kPa or more");
  }
}

void check(const WedgeCase& w) {
  require(w.unit_weight_kN_m3 > 0.0 && std::isfinite(w.unit_weight_kN_m3), "the unit weight",
          w.unit_weight_kN_m3, "above 0 kN/m3");
  require(w.water_unit_weight_kN_m3 > 0.0 && std::isfinite(w.water_unit_weight_kN_m3),
          "the water's unit weight", w.water_unit_weight_kN_m3, "above 0 kN/m3");
  check(w.strength1, "the friction angle of plane 1", "the cohesion of plane 1");
  check(w.strength2, "the friction angle of plane 2", "the cohesion of plane 2");
  check(w.water);
  require(w.seismic.horizontal >= 0.0 && std::isfinite(w.seismic.horizontal),
          "the horizontal seismic coefficient", w.seismic.horizontal, "0 or more");
  require(std::isfinite(w.seismic.vertical), "the vertical seismic coefficient", w.seismic.vertical,
          "a number, up positive");
  for (const auto* forces : {&w.loads, &w.bolts}) {
    for (const DirectedForce& f : *forces) {
      require(f.force_kN >= 0.0 && std::isfinite(f.force_kN), "a load or bolt force", f.force_kN,
              "0 kN or more; turn its direction about instead");
    }
  }
}

Angle seismic_trend(const WedgeCase& w, const WedgeBlock& block) {
  if (w.seismic.trend) return *w.seismic.trend;
  const Vector3& v = *block.line;
  if (w.seismic.horizontal > 0.0 && at_most(std::hypot(v.x(), v.y()), 0.0)) {
    throw Error(ErrorKind::argument, {},
                "the line of intersection is vertical, so it gives the horizontal seismic load no "
                "trend",
                {}, "a seismic trend");
  }
  return line_with_sense(v).trend;
}

WaterPressures pressures(const WedgeCase& w, const WedgeBlock& block) {
  if (const auto* stated = std::get_if<WaterPressures>(&w.water)) return *stated;
  const double fill = std::get<WaterFill>(w.water).fill;
  const double gw = w.water_unit_weight_kN_m3;
  const double u = block.cut ? fill * gw * block.crack_depth_m / 3.0
                             : fill * gw * std::max(block.total_height_m, 0.0) / 6.0;
  return {u, u, block.cut ? u : 0.0};
}

std::string water_assumption(const WedgeCase& w, const WedgeBlock& block, double pressure_kPa) {
  if (std::holds_alternative<WaterPressures>(w.water)) {
    return "water: the stated mean pressures act over the whole areas of the planes and the crack";
  }
  const double fill = std::get<WaterFill>(w.water).fill;
  if (fill == 0.0) return "water: none (dry)";
  const char* shape = block.cut ? "on both planes and in the crack, a third of the pressure at the "
                                  "crack's lowest corner when the crack is full"
                                : "on both planes, a sixth of the pressure under a column of water "
                                  "as high as the wedge";
  return fmt::format(
      "water: a mean pressure of {:.4g} kPa {}, times the fill {}; the fill scales the pressure "
      "over the whole of the planes, it does not lower a water level",
      pressure_kPa, shape, shortest(fill));
}

// Tangents of friction and the cohesive forces of the planes that are in contact.
double shear_strength_kN(const WedgeCase& w, const WedgeAreas& a, const WedgeContact& c) {
  const bool on1 = c.mode == WedgeMode::both || c.mode == WedgeMode::plane1;
  const bool on2 = c.mode == WedgeMode::both || c.mode == WedgeMode::plane2;
  double sum = 0.0;
  if (on1) sum += w.strength1.cohesion_kPa * a.plane1_m2 + c.normal1_kN * tan(w.strength1.friction);
  if (on2) sum += w.strength2.cohesion_kPa * a.plane2_m2 + c.normal2_kN * tan(w.strength2.friction);
  return sum;
}

// What passive bolts of sum `pull` add to the resistance against the movement of `contact`.
double passive_kN(const Vector3& pull, const WedgeCase& w, const WedgeBlock& block,
                  const WedgeContact& contact) {
  const double tan1 = tan(w.strength1.friction);
  const double tan2 = tan(w.strength2.friction);
  const double against = -pull.dot(contact.slide);
  switch (contact.mode) {
    case WedgeMode::both: {
      const auto [raised1, raised2] = normals_on_both(pull, block.into1, block.into2);
      return against + raised1 * tan1 + raised2 * tan2;
    }
    case WedgeMode::plane1:
      return against - pull.dot(block.into1) * tan1;
    case WedgeMode::plane2:
      return against - pull.dot(block.into2) * tan2;
    case WedgeMode::lifts:
      break;
  }
  return 0.0;
}

Vector3 sum_of(const std::vector<DirectedForce>& forces) {
  Vector3 sum = Vector3::Zero();
  for (const DirectedForce& f : forces) sum += force_vector(f);
  return sum;
}

// Everything that acts on the block but bolts and reactions; fills in weight and water.
Vector3 acting_forces(const WedgeCase& w, WedgeResult& result) {
  const WedgeBlock& block = result.block;
  result.weight_kN = w.unit_weight_kN_m3 * block.volume_m3;
  const WaterPressures u = pressures(w, block);
  result.water = {u.plane1_kPa * block.areas.plane1_m2, u.plane2_kPa * block.areas.plane2_m2,
                  u.crack_kPa * block.areas.crack_m2};
  result.assumptions.push_back(water_assumption(w, block, u.plane1_kPa));
  if (!block.cut && u.crack_kPa > 0.0) {
    result.warnings.push_back(
        "no crack cuts the wedge: the water pressure in the crack acts on nothing");
  }
  return Vector3(0.0, 0.0, -result.weight_kN) +
         seismic_vector(w.seismic, seismic_trend(w, block), result.weight_kN) +
         result.water.plane1_kN * block.into1 + result.water.plane2_kN * block.into2 +
         result.water.crack_kN * block.into_from_crack + sum_of(w.loads);
}

void warn_of_mode(WedgeResult& result) {
  const WedgeContact& contact = result.contact;
  if (contact.mode == WedgeMode::lifts) {
    result.warnings.push_back("the block lifts off both planes: no friction or cohesion holds it");
  }
  if (contact.upward && std::isfinite(result.factor_of_safety)) {
    result.warnings.push_back(
        "the forces push the block up the line of intersection: it would leave upward, and the "
        "factor of safety is the one against that");
  }
}

}  // namespace

std::string_view to_string(WedgeMode mode) {
  switch (mode) {
    case WedgeMode::both:
      return "both";
    case WedgeMode::plane1:
      return "plane1";
    case WedgeMode::plane2:
      return "plane2";
    case WedgeMode::lifts:
      break;
  }
  return "lifts";
}

std::pair<double, double> normals_on_both(const Vector3& force, const Vector3& into1,
                                          const Vector3& into2) {
  const Vector3 cross = into1.cross(into2);
  const double square = cross.squaredNorm();
  return {cross.dot(into2.cross(force)) / square, cross.dot(force.cross(into1)) / square};
}

WedgeContact wedge_contact(const Vector3& resultant, const Vector3& into1, const Vector3& into2,
                           const Vector3& line, double weight_kN) {
  const auto [n1, n2] = normals_on_both(resultant, into1, into2);
  const double tie = kTie * weight_kN;
  if (n1 >= -tie && n2 >= -tie) {
    const double along = resultant.dot(line);
    const bool upward = along < 0.0;
    return {WedgeMode::both,
            std::max(n1, 0.0),
            std::max(n2, 0.0),
            std::abs(along),
            upward ? Vector3(-line) : line,
            upward};
  }
  const auto on_one = [&](const Vector3& into, double other_normal) -> std::optional<WedgeContact> {
    const double press = -resultant.dot(into);
    // The rest leads away from the other plane exactly where that would have to pull.
    if (press <= tie || other_normal >= -tie) return std::nullopt;
    const Vector3 rest = resultant + press * into;
    return WedgeContact{WedgeMode::both, press, 0.0, rest.norm(), rest.normalized(), false};
  };
  if (auto contact = on_one(into1, n2)) {
    contact->mode = WedgeMode::plane1;
    return *contact;
  }
  if (auto contact = on_one(into2, n1)) {
    contact->mode = WedgeMode::plane2;
    std::swap(contact->normal1_kN, contact->normal2_kN);
    return *contact;
  }
  return {};
}

WedgeResult analyse_wedge(const WedgeCase& w) {
  check(w);
  WedgeResult result;
  result.block = wedge_block(w.geometry);
  const WedgeBlock& block = result.block;
  result.warnings = block.warnings;
  if (block.line) result.line = line_with_sense(*block.line);
  result.forms = block.forms;
  result.reason = block.reason;
  if (!block.forms) return result;

  Vector3 resultant = acting_forces(w, result);
  const Vector3 bolts = sum_of(w.bolts);
  const bool active = w.bolt_action == BoltAction::active;
  if (active) resultant += bolts;
  result.contact =
      wedge_contact(resultant, block.into1, block.into2, *block.line, result.weight_kN);
  result.resisting_kN = shear_strength_kN(w, block.areas, result.contact);
  if (!active) result.resisting_kN += passive_kN(bolts, w, block, result.contact);
  if (result.resisting_kN < 0.0) {
    result.warnings.push_back(
        "the passive bolts pull the block along with its movement: no resistance is left");
    result.resisting_kN = 0.0;
  }
  const double drive = result.contact.driving_kN;
  if (result.contact.mode == WedgeMode::lifts) {
    result.factor_of_safety = 0.0;
  } else if (drive <= kNoDrive * result.weight_kN) {
    result.factor_of_safety = std::numeric_limits<double>::infinity();
  } else {
    result.factor_of_safety = result.resisting_kN / drive;
  }
  warn_of_mode(result);
  return result;
}

}  // namespace brink
