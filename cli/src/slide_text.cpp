#include "slide_text.hpp"

#include <fmt/format.h>

#include <cmath>

#include "brink/base/number.hpp"
#include "brink/record/cautions.hpp"
#include "brink/record/topple_document.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

std::string orientation(Angle dip, Angle dip_direction) {
  return fmt::format("{}/{}", shortest(dip.deg()), shortest(dip_direction.deg()));
}

std::string kilonewtons(double value) {
  return fixed(value, std::abs(value) < 100.0 ? 1 : 0);
}

std::string safety_text(double value) {
  return std::isinf(value) ? "infinite" : fixed(value, 3);
}

std::string line(std::string_view name, const std::string& value) {
  return fmt::format("  {:<22}{}\n", name, value);
}

std::string closing() {
  return '\n' + paragraph(rigid_block_caution()) + paragraph(practice_caution());
}

std::string plane_heading(const PlaneSlideInput& in) {
  return fmt::format(
      "Planar slide on {} in face {}, upper ground {}, {} m high, per metre of face\n",
      orientation(in.plane.dip, in.plane.dip_direction),
      orientation(in.face.dip, in.face.dip_direction),
      orientation(in.upper.dip, in.upper.dip_direction), shortest(in.height_m));
}

std::string crack_text(const PlaneSlideInput& in, const PlaneSlide& s) {
  if (!s.crack_setback_m) return "none";
  if (s.crack_depth_m == 0.0) return "misses the block";
  const double setback_m = *s.crack_setback_m;
  return fmt::format("{} m deep, {} m {} the crest{}", fixed(*s.crack_depth_m, 2),
                     fixed(std::abs(setback_m), 2), setback_m < 0.0 ? "in front of" : "behind",
                     in.crack == CrackChoice::critical ? " (critical)" : "");
}

std::string block_text(const PlaneSlideInput& in, const PlaneSlide& s) {
  const PlaneSection& c = s.section;
  std::string text =
      line("section", fmt::format("towards {}; dips in it: plane {}, face {}, ground {}",
                                  fixed(c.azimuth.deg(), 1), fixed(c.plane_dip.deg(), 1),
                                  fixed(c.face_dip.deg(), 1), fixed(c.upper_dip.deg(), 1)));
  text += line("tension crack", crack_text(in, s));
  text += line("sliding length", fixed(s.sliding_length_m, 2) + " m");
  std::string weight = kilonewtons(s.weight_kN_m) + " kN/m";
  if (s.surcharge_kN_m > 0.0)
    weight += fmt::format(", {} of it surcharge", kilonewtons(s.surcharge_kN_m));
  text += line("weight", weight);
  if (in.water_depth_m > 0.0)
    text += line("water", fmt::format("{} kN/m under the block, {} in the crack",
                                      kilonewtons(s.uplift_kN_m), kilonewtons(s.crack_water_kN_m)));
  return text;
}

std::string strength_text(const PlaneSlide& s) {
  return fmt::format("cohesion {} kPa, friction {} degrees at {} kPa",
                     fixed(s.strength.cohesion_kPa, 1), fixed(s.strength.friction.deg(), 2),
                     fixed(s.strength.normal_stress_kPa, 1));
}

std::string balance_text(const PlaneSlide& s) {
  const bool lifts = s.mode == PlaneSlideMode::lifts;
  std::string text = line("normal, effective", kilonewtons(s.normal_kN_m) + " kN/m");
  if (lifts) return text + "The block lifts off the plane.\nFactor of safety: 0\n";
  text += line("strength used", strength_text(s));
  text += line("driving", kilonewtons(s.driving_kN_m) + " kN/m");
  text += line("resisting", kilonewtons(s.resisting_kN_m) + " kN/m");
  return text + fmt::format("Factor of safety: {}\n", safety_text(s.factor_of_safety));
}

std::string behind_text(const PlaneSlide& s) {
  if (!s.least_behind_crest) return {};
  return fmt::format("  with the crack behind the crest: {} at the least\n",
                     safety_text(*s.least_behind_crest));
}

std::string bolt_text(const PlaneSlideInput& in, const PlaneSlide& s) {
  if (!in.target) return {};
  const std::string target = shortest(*in.target);
  if (!s.bolt_for_target) return fmt::format("No bolt reaches the target of {}.\n", target);
  const BoltForTarget& bolt = *s.bolt_for_target;
  if (bolt.force_kN_m == 0.0)
    return fmt::format("The target of {} is met without more bolts.\n", target);
  return fmt::format(
      "Least bolt for a target of {}: {} kN/m {}, pulling towards {}/{} (trend/plunge)\n", target,
      kilonewtons(bolt.force_kN_m), to_string(bolt.action), fixed(bolt.direction.trend.deg(), 1),
      fixed(bolt.direction.plunge.deg(), 1));
}

std::string columns_heading(const ToppleInput& in) {
  const ToppleColumns& c = in.columns;
  return fmt::format(
      "Block toppling: {} columns {} m wide on bases dipping {}, crest at block {}, per metre of "
      "face\n",
      c.heights_m.size(), shortest(c.width_m), shortest(c.base_dip.deg()), c.crest);
}

std::string blocks_table(const ToppleResult& result) {
  TextTable table({{"block"},
                   {"height, m"},
                   {"mode", Align::left},
                   {"to stop toppling,\nkN/m"},
                   {"to stop sliding,\nkN/m"},
                   {"force on next,\nkN/m"},
                   {"normal,\nkN/m"},
                   {"shear,\nkN/m"}});
  for (auto b = result.blocks.rbegin(); b != result.blocks.rend(); ++b) {
    table.add_row(
        {std::to_string(b->number), fixed(b->height_m, 2), std::string(to_string(b->mode)),
         b->can_topple ? fixed(b->force_to_stop_toppling_kN_m, 1) : "cannot",
         b->can_slide ? fixed(b->force_to_stop_sliding_kN_m, 1) : "locked",
         fixed(b->force_on_next_kN_m, 1), fixed(b->normal_kN_m, 1), fixed(b->shear_kN_m, 1)});
  }
  return table.text();
}

std::string toe_text(const ToppleInput& in, const ToppleResult& r) {
  std::string text = r.stable ? "The toe stands without help.\n"
                              : fmt::format("The toe does not stand: it lacks {} kN/m.\n",
                                            fixed(r.toe_force_kN_m, 1));
  if (r.friction_for_balance)
    text += line("friction for balance", fixed(r.friction_for_balance->deg(), 2) + " degrees");
  else
    text += line("friction for balance", "none below 90 degrees");
  const std::string plunge = shortest(in.balance_bolt_plunge.deg());
  text += line("bolt for balance", r.bolt_for_balance_kN_m
                                       ? fmt::format("{} kN/m on block 1, plunging {} degrees",
                                                     fixed(*r.bolt_for_balance_kN_m, 1), plunge)
                                       : fmt::format("none that plunges {} degrees", plunge));
  return text + fmt::format("Factor of safety (tan {} / tan needed): {}\n",
                            shortest(in.friction.deg()), safety_text(r.factor_of_safety));
}

}  // namespace

std::string plane_slide_text(const PlaneSlideInput& input, const PlaneSlide& slide,
                             const std::string& more) {
  if (!slide.forms) {
    const std::string none =
        plane_heading(input) + paragraph("No block forms: " + slide.reason + ".");
    return more.empty() ? none : none + more + closing();
  }
  return plane_heading(input) + block_text(input, slide) + balance_text(slide) +
         behind_text(slide) + bolt_text(input, slide) + more + closing();
}

std::string topple_text(const ToppleInput& input, const ToppleResult& result) {
  return columns_heading(input) + '\n' + blocks_table(result) + '\n' + toe_text(input, result) +
         closing();
}

}  // namespace brink::cli
