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
#include "require.hpp"

namespace brink {

namespace {

void check(const WedgeWater& water) {
  if (const auto* fill = std::get_if<WaterFill>(&water)) {
    require_between("water fill", fill->fill, 0.0, 1.0);
    return;
  }
  const auto& u = std::get<WaterPressures>(water);
  require_not_negative("water pressure on plane 1", u.plane1_kPa);
  require_not_negative("water pressure on plane 2", u.plane2_kPa);
  require_not_negative("water pressure in the crack", u.crack_kPa);
}

void check(const WedgeCase& w) {
  require_positive("unit weight", w.unit_weight_kN_m3);
  require_positive("unit weight of water", w.water_unit_weight_kN_m3);
  check_strength(w.strength1);
  check_strength(w.strength2);
  check(w.water);
  require_not_negative("horizontal seismic coefficient", w.seismic.horizontal);
  require_not_negative("surcharge", w.surcharge_kPa);
  require_finite("vertical seismic coefficient", w.seismic.vertical);
  for (const DirectedForce& load : w.loads) require_not_negative("load", load.force_kN);
  for (const DirectedForce& bolt : w.bolts) require_not_negative("bolt force", bolt.force_kN);
}

// Nothing without a horizontal load.
std::optional<Angle> seismic_trend(const WedgeCase& w, const WedgeBlock& block) {
  if (w.seismic.horizontal == 0.0) return std::nullopt;
  if (w.seismic.trend) return w.seismic.trend;
  const Vector3& v = *block.line;
  if (at_most(std::hypot(v.x(), v.y()), 0.0)) {
    throw Error(ErrorKind::argument, Place{.key = "seismic trend"},
                "the line of intersection is vertical, so it gives the horizontal seismic load no "
                "trend",
                {}, "the trend along which the block is shaken");
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
    return "Water: the stated mean pressures act over the whole areas of the planes and the crack";
  }
  const double fill = std::get<WaterFill>(w.water).fill;
  if (fill == 0.0) return "Water: none (dry)";
  const char* shape = block.cut ? "on both planes and in the crack, a third of the pressure at the "
                                  "crack's lowest corner when the crack is full"
                                : "on both planes, a sixth of the pressure under a column of water "
                                  "as high as the wedge";
  return fmt::format(
      "Water: a mean pressure of {:.4g} kPa {}, times the fill {}; the fill scales the pressure "
      "over the whole of the planes, it does not lower a water level",
      pressure_kPa, shape, shortest(fill));
}

// The line that stands for a plane's strength at the stress it bears.
TangentStrength strength_at(const Strength& strength, double normal_kN, double area_m2) {
  return tangent_strength(strength, normal_kN / area_m2);
}

double shear_strength_kN(const WedgeResult& r) {
  const WedgeAreas& a = r.block.areas;
  double sum = 0.0;
  if (r.strength1) {
    sum +=
        r.strength1->cohesion_kPa * a.plane1_m2 + r.contact.normal1_kN * tan(r.strength1->friction);
  }
  if (r.strength2) {
    sum +=
        r.strength2->cohesion_kPa * a.plane2_m2 + r.contact.normal2_kN * tan(r.strength2->friction);
  }
  return sum;
}

// What passive bolts of sum `pull` add to the resistance: their part against the movement, and the
// friction of the normals they raise.
double passive_kN(const Vector3& pull, const WedgeResult& r) {
  const WedgeBlock& block = r.block;
  double sum = -pull.dot(r.contact.slide);
  if (r.strength1 && r.strength2) {
    const auto [raised1, raised2] = normals_on_both(pull, block.into1, block.into2);
    sum += raised1 * tan(r.strength1->friction) + raised2 * tan(r.strength2->friction);
  } else if (r.strength1) {
    sum -= pull.dot(block.into1) * tan(r.strength1->friction);
  } else if (r.strength2) {
    sum -= pull.dot(block.into2) * tan(r.strength2->friction);
  }
  return sum;
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
  result.seismic_trend = seismic_trend(w, block);
  result.surcharge_kN = w.surcharge_kPa * block.areas.upper_m2 * cos(w.geometry.upper.dip);
  return Vector3(0.0, 0.0, -result.weight_kN - result.surcharge_kN) +
         seismic_vector(w.seismic, result.seismic_trend.value_or(Angle{}), result.weight_kN) +
         result.water.plane1_kN * block.into1 + result.water.plane2_kN * block.into2 +
         result.water.crack_kN * block.into_from_crack + sum_of(w.loads);
}

// Tangent strengths of the planes in contact.
void take_strength(const WedgeCase& w, WedgeResult& r) {
  const WedgeMode mode = r.contact.mode;
  if (mode == WedgeMode::both || mode == WedgeMode::plane1) {
    r.strength1 = strength_at(w.strength1, r.contact.normal1_kN, r.block.areas.plane1_m2);
  }
  if (mode == WedgeMode::both || mode == WedgeMode::plane2) {
    r.strength2 = strength_at(w.strength2, r.contact.normal2_kN, r.block.areas.plane2_m2);
  }
}

void add_passive_bolts(const Vector3& pull, WedgeResult& r) {
  if (r.contact.mode == WedgeMode::lifts) return;
  r.resisting_kN += passive_kN(pull, r);
  if (r.resisting_kN >= 0.0) return;
  r.resisting_kN = 0.0;
  r.warnings.push_back("the passive bolts pull the block the way it moves: no resistance is left");
}

double safety(const WedgeResult& r) {
  if (r.contact.mode == WedgeMode::lifts) return 0.0;
  if (r.contact.driving_kN <= kNoDrive * r.weight_kN) {
    return std::numeric_limits<double>::infinity();
  }
  return r.resisting_kN / r.contact.driving_kN;
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

  result.resultant_kN = acting_forces(w, result);
  const Vector3 bolts = sum_of(w.bolts);
  const bool active = w.bolt_action == BoltAction::active;
  if (active) result.resultant_kN += bolts;
  result.contact =
      wedge_contact(result.resultant_kN, block.into1, block.into2, *block.line, result.weight_kN);
  take_strength(w, result);
  result.resisting_kN = shear_strength_kN(result);
  if (!active) add_passive_bolts(bolts, result);
  result.factor_of_safety = safety(result);
  warn_of_mode(result);
  return result;
}

}  // namespace brink
