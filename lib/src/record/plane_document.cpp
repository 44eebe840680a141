#include "brink/record/plane_document.hpp"

#include "brink/record/strength_document.hpp"

namespace brink {

namespace {

Value forces_value(const std::vector<DirectedForce>& forces) {
  Array list;
  for (const DirectedForce& f : forces) {
    list.push_back(Object{{"force_kN_m", f.force_kN},
                          {"trend_deg", f.towards.trend.deg()},
                          {"plunge_deg", f.towards.plunge.deg()}});
  }
  return list;
}

Value crack_value(const PlaneSlideInput& input) {
  switch (input.crack) {
    case CrackChoice::none:
      return nullptr;
    case CrackChoice::at_setback:
      return Object{{"choice", "at setback"}, {"setback_m", input.crack_setback_m}};
    case CrackChoice::critical:
      break;
  }
  return Object{{"choice", "critical"}};
}

Value section_value(const PlaneSection& section) {
  Array outline;
  for (const SectionPoint& p : section.outline)
    outline.push_back(Object{{"x_m", p.x_m}, {"z_m", p.z_m}});
  return Object{{"azimuth_deg", section.azimuth.deg()},
                {"plane_dip_deg", section.plane_dip.deg()},
                {"face_dip_deg", section.face_dip.deg()},
                {"upper_dip_deg", section.upper_dip.deg()},
                {"outline", outline}};
}

Value bolt_direction(const std::optional<BoltForTarget>& bolt) {
  if (!bolt) return nullptr;
  const bool any = bolt->force_kN_m == 0.0;
  return Object{{"action", to_string(bolt->action)},
                {"trend_deg", any ? Value() : Value(bolt->direction.trend.deg())},
                {"plunge_deg", any ? Value() : Value(bolt->direction.plunge.deg())}};
}

Object block_object(const PlaneSlide& s) {
  return Object{
      {"mode", to_string(s.mode)},
      {"weight_kN_m", s.weight_kN_m},
      {"surcharge_kN_m", s.surcharge_kN_m},
      {"sliding_length_m", s.sliding_length_m},
      {"crack_depth_m", s.crack_depth_m},
      {"crack_setback_m", s.crack_setback_m},
      {"least_behind_crest",
       s.least_behind_crest ? number_or_word(*s.least_behind_crest) : Value()},
      {"bolt_for_target_kN_m", s.bolt_for_target ? Value(s.bolt_for_target->force_kN_m) : Value()},
      {"bolt_for_target", bolt_direction(s.bolt_for_target)},
      {"normal_kN_m", s.normal_kN_m},
      {"uplift_kN_m", s.uplift_kN_m},
      {"crack_water_kN_m", s.crack_water_kN_m},
      {"driving_kN_m", s.driving_kN_m},
      {"resisting_kN_m", s.resisting_kN_m},
      {"factor_of_safety", number_or_word(s.factor_of_safety)},
      {"strength_used", tangent_value(s.strength)}};
}

}  // namespace

std::string_view to_string(PlaneSlideMode mode) {
  return mode == PlaneSlideMode::slides ? "slides" : "lifts";
}

Value plane_slide_inputs(const PlaneSlideInput& in) {
  return Object{{"plane", plane_value(in.plane)},
                {"face", face_value(in.face)},
                {"upper", plane_value(in.upper)},
                {"height_m", in.height_m},
                {"unit_weight_kN_m3", in.unit_weight_kN_m3},
                {"strength", strength_value(in.strength)},
                {"crack", crack_value(in)},
                {"water_depth_m", in.water_depth_m},
                {"water_unit_weight_kN_m3", in.water_unit_weight_kN_m3},
                {"surcharge_kPa", in.surcharge_kPa},
                {"seismic_horizontal", in.seismic_horizontal},
                {"seismic_vertical", in.seismic_vertical},
                {"loads", forces_value(in.loads)},
                {"bolts", forces_value(in.bolts)},
                {"bolt_action", to_string(in.bolt_action)},
                {"target", in.target},
                {"strike_tolerance_deg", in.strike_tolerance.deg()}};
}

Object plane_slide_value(const PlaneSlide& slide) {
  Object object{{"forms", slide.forms},
                {"reason", slide.forms ? Value() : Value(slide.reason)},
                {"section", section_value(slide.section)}};
  const Object block = block_object(slide);
  for (const auto& [key, value] : block.members()) object.add(key, slide.forms ? value : Value());
  return object;
}

}  // namespace brink
