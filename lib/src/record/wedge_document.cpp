#include "brink/record/wedge_document.hpp"

#include "brink/record/strength_document.hpp"

namespace brink {

namespace {

const char* size_key(WedgeMeasure measure) {
  switch (measure) {
    case WedgeMeasure::height_on_plane1:
      return "height_on_plane1_m";
    case WedgeMeasure::volume:
      return "volume_m3";
    case WedgeMeasure::trace_length1:
      return "trace_length1_m";
    case WedgeMeasure::trace_length2:
      return "trace_length2_m";
    case WedgeMeasure::height:
    case WedgeMeasure::persistence:
      break;
  }
  return "height_m";
}

Value size_value(const WedgeSize& size) {
  return size.measure == WedgeMeasure::persistence ? Value() : Value(size.value);
}

Value target_value(const std::optional<WedgeTarget>& target) {
  if (!target) return nullptr;
  return Object{{"factor_of_safety", target->factor_of_safety},
                {"least_plunge_deg", target->least_plunge.deg()},
                {"greatest_plunge_deg", target->greatest_plunge.deg()},
                {"direction", target->direction ? line_value(*target->direction) : Value()}};
}

Value bolt_value(const std::optional<WedgeSupport>& support) {
  if (!support || !support->least) return nullptr;
  const std::optional<Line>& direction = support->least->direction;
  return Object{{"action", to_string(support->action)},
                {"trend_deg", direction ? Value(direction->trend.deg()) : Value()},
                {"plunge_deg", direction ? Value(direction->plunge.deg()) : Value()}};
}

Value crack_value(const std::optional<TensionCrack>& crack) {
  if (!crack) return nullptr;
  return Object{{"dip_deg", crack->plane.dip.deg()},
                {"dip_direction_deg", crack->plane.dip_direction.deg()},
                {"distance_m", crack->distance_m}};
}

Value water_value(const WedgeWater& water) {
  if (const auto* fill = std::get_if<WaterFill>(&water)) return Object{{"fill", fill->fill}};
  const auto& u = std::get<WaterPressures>(water);
  return Object{{"pressure_plane1_kPa", u.plane1_kPa},
                {"pressure_plane2_kPa", u.plane2_kPa},
                {"pressure_crack_kPa", u.crack_kPa}};
}

Value forces_value(const std::vector<DirectedForce>& forces) {
  Array list;
  for (const DirectedForce& f : forces) {
    list.push_back(Object{{"force_kN", f.force_kN},
                          {"trend_deg", f.towards.trend.deg()},
                          {"plunge_deg", f.towards.plunge.deg()}});
  }
  return list;
}

Value seismic_value(const Seismic& seismic, const std::optional<Angle>& trend) {
  return Object{{"horizontal", seismic.horizontal},
                {"trend_deg", trend ? Value(trend->deg()) : Value()},
                {"vertical", seismic.vertical}};
}

Value areas_value(const WedgeAreas& a) {
  return Object{{"plane1", a.plane1_m2},
                {"plane2", a.plane2_m2},
                {"face", a.face_m2},
                {"upper", a.upper_m2},
                {"crack", a.crack_m2}};
}

Value strength_used(const std::optional<TangentStrength>& tangent) {
  return tangent ? tangent_value(*tangent) : Value();
}

// What a wedge that forms has.
Object block_object(const WedgeResult& r) {
  const bool lifts = r.contact.mode == WedgeMode::lifts;
  const WedgeContact& c = r.contact;
  return Object{{"volume_m3", r.block.volume_m3},
                {"weight_kN", r.weight_kN},
                {"surcharge_kN", r.surcharge_kN},
                {"areas_m2", areas_value(r.block.areas)},
                {"height_m", r.block.height_m},
                {"total_height_m", r.block.total_height_m},
                {"crack_depth_m", r.block.cut ? Value(r.block.crack_depth_m) : Value()},
                {"mode", to_string(c.mode)},
                {"normal_kN", Object{{"plane1", c.normal1_kN}, {"plane2", c.normal2_kN}}},
                {"water_kN", Object{{"plane1", r.water.plane1_kN},
                                    {"plane2", r.water.plane2_kN},
                                    {"crack", r.water.crack_kN}}},
                {"strength_used", Object{{"plane1", strength_used(r.strength1)},
                                         {"plane2", strength_used(r.strength2)}}},
                {"driving_kN", lifts ? Value() : Value(c.driving_kN)},
                {"slides_upward", c.upward},
                {"resisting_kN", r.resisting_kN},
                {"factor_of_safety", number_or_word(r.factor_of_safety)}};
}

}  // namespace

Object wedge_inputs(const WedgeCase& w, const WedgeResult& result,
                    const std::optional<WedgeTarget>& target) {
  const WedgeGeometry& g = w.geometry;
  return Object{{"plane1", plane_value(g.plane1)},
                {"plane2", plane_value(g.plane2)},
                {"face", face_value(g.face)},
                {"upper", plane_value(g.upper)},
                {size_key(g.size.measure), size_value(g.size)},
                {"persistence1_m", g.persistence1_m},
                {"persistence2_m", g.persistence2_m},
                {"crack", crack_value(g.crack)},
                {"unit_weight_kN_m3", w.unit_weight_kN_m3},
                {"strength1", strength_value(w.strength1)},
                {"strength2", strength_value(w.strength2)},
                {"water", water_value(w.water)},
                {"water_unit_weight_kN_m3", w.water_unit_weight_kN_m3},
                {"surcharge_kPa", w.surcharge_kPa},
                {"seismic", seismic_value(w.seismic, result.seismic_trend)},
                {"loads", forces_value(w.loads)},
                {"bolts", forces_value(w.bolts)},
                {"bolt_action", to_string(w.bolt_action)},
                {"target", target_value(target)}};
}

Object wedge_value(const WedgeResult& r, const std::optional<WedgeSupport>& support) {
  Object object{{"forms", r.forms},
                {"reason", r.forms ? Value() : Value(r.reason)},
                {"line", r.line ? line_value(*r.line) : Value()}};
  const Object block = block_object(r);
  for (const auto& [key, value] : block.members()) object.add(key, r.forms ? value : Value());
  const bool sized = support && support->least;
  object.add("bolt_for_target_kN", sized ? Value(support->least->force_kN) : Value());
  object.add("bolt_for_target", bolt_value(support));
  object.add("bolt_in_direction_kN", support ? Value(support->along_direction_kN) : Value());
  object.add("assumptions", Array(r.assumptions.begin(), r.assumptions.end()));
  return object;
}

}  // namespace brink
