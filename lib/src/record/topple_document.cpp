#include "brink/record/topple_document.hpp"

namespace brink {

namespace {

Value geometry_value(const std::optional<ToppleGeometry>& g) {
  if (!g) return nullptr;
  return Object{{"face_dip_deg", g->face_dip.deg()},
                {"height_m", g->height_m},
                {"upper_dip_deg", g->upper_dip.deg()},
                {"base_dip_deg", g->base_dip.deg()},
                {"width_m", g->width_m},
                {"step_m", g->step_m}};
}

Value columns_value(const ToppleColumns& c) {
  return Object{{"heights_m", Array(c.heights_m.begin(), c.heights_m.end())},
                {"crest", static_cast<std::uint64_t>(c.crest)},
                {"width_m", c.width_m},
                {"base_dip_deg", c.base_dip.deg()},
                {"a1_m", c.a1_m},
                {"a2_m", c.a2_m}};
}

Value forces_value(const std::vector<BlockForce>& forces) {
  Array list;
  for (const BlockForce& f : forces) {
    list.push_back(Object{{"block", static_cast<std::uint64_t>(f.block)},
                          {"force_kN_m", f.force_kN_m},
                          {"plunge_deg", f.plunge.deg()},
                          {"height_m", f.height_m}});
  }
  return list;
}

Value water_value(const ToppleInput& input) {
  Array blocks;
  for (const BlockWater& w : input.water) {
    blocks.push_back(Object{{"block", static_cast<std::uint64_t>(w.block)},
                            {"upper_m", w.upper_m},
                            {"lower_m", w.lower_m}});
  }
  return Object{{"unit_weight_kN_m3", input.water_unit_weight_kN_m3},
                {"fill", input.water_fill},
                {"blocks", blocks}};
}

Value block_value(const ToppleBlock& b) {
  return Object{
      {"number", static_cast<std::uint64_t>(b.number)},
      {"height_m", b.height_m},
      {"weight_kN_m", b.weight_kN_m},
      {"mode", to_string(b.mode)},
      {"force_to_stop_toppling_kN_m",
       b.can_topple ? Value(b.force_to_stop_toppling_kN_m) : Value()},
      {"force_to_stop_sliding_kN_m", b.can_slide ? Value(b.force_to_stop_sliding_kN_m) : Value()},
      {"force_on_next_kN_m", b.force_on_next_kN_m},
      {"normal_kN_m", b.normal_kN_m},
      {"shear_kN_m", b.shear_kN_m}};
}

}  // namespace

std::string_view to_string(BlockMode mode) {
  switch (mode) {
    case BlockMode::stable:
      return "stable";
    case BlockMode::topples:
      return "topples";
    case BlockMode::slides:
      break;
  }
  return "slides";
}

Object topple_inputs(const ToppleInput& input, const std::optional<ToppleGeometry>& geometry) {
  return Object{{"geometry", geometry_value(geometry)},
                {"columns", columns_value(input.columns)},
                {"unit_weight_kN_m3", input.unit_weight_kN_m3},
                {"friction_deg", input.friction.deg()},
                {"water", water_value(input)},
                {"seismic_horizontal", input.seismic_horizontal},
                {"loads", forces_value(input.loads)},
                {"bolts", forces_value(input.bolts)},
                {"bolt_plunge_deg", input.balance_bolt_plunge.deg()},
                {"bolt_height_m", input.balance_bolt_height_m}};
}

Value topple_value(const ToppleResult& result) {
  Array blocks;
  for (const ToppleBlock& b : result.blocks) blocks.push_back(block_value(b));
  return Object{{"blocks", blocks},
                {"stable", result.stable},
                {"toe_force_kN_m", result.toe_force_kN_m},
                {"friction_for_balance_deg",
                 result.friction_for_balance ? Value(result.friction_for_balance->deg()) : Value()},
                {"factor_of_safety", number_or_word(result.factor_of_safety)},
                {"bolt_for_balance_kN_m", result.bolt_for_balance_kN_m}};
}

}  // namespace brink
