#include "wedge_text.hpp"

#include <fmt/format.h>

#include <cmath>

#include "brink/base/number.hpp"
#include "brink/record/cautions.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

std::string plane_text(Angle dip, Angle dip_direction) {
  return fmt::format("{}/{}", shortest(dip.deg()), shortest(dip_direction.deg()));
}

std::string plane_text(const Plane& plane) {
  return plane_text(plane.dip, plane.dip_direction);
}

std::string kilonewtons(double value) {
  return fixed(value, value < 100.0 ? 1 : 0);
}

std::string safety_text(double value) {
  return std::isinf(value) ? "infinite" : fixed(value, 3);
}

std::string mode_text(const WedgeContact& contact) {
  switch (contact.mode) {
    case WedgeMode::both:
      return contact.upward ? "is pushed up the line of intersection, on both planes"
                            : "slides along the line of intersection, on both planes";
    case WedgeMode::plane1:
      return "slides on plane 1 and leaves plane 2";
    case WedgeMode::plane2:
      return "slides on plane 2 and leaves plane 1";
    case WedgeMode::lifts:
      break;
  }
  return "lifts off both planes";
}

std::string heading(const WedgeCase& w) {
  const WedgeGeometry& g = w.geometry;
  return fmt::format("Wedge of planes {} (1) and {} (2) in face {}, upper ground {}\n",
                     plane_text(g.plane1), plane_text(g.plane2),
                     plane_text(g.face.dip, g.face.dip_direction), plane_text(g.upper));
}

std::string size_text(const WedgeResult& r) {
  const WedgeBlock& b = r.block;
  std::string text = fmt::format(
      "  line of intersection  {}/{} (trend/plunge)\n"
      "  height                {} m at the crest, {} m at the line's upper end\n"
      "  volume                {} m3, weight {} kN\n",
      fixed(r.line->trend.deg(), 1), fixed(r.line->plunge.deg(), 1), fixed(b.height_m, 2),
      fixed(b.total_height_m, 2), fixed(b.volume_m3, b.volume_m3 < 100.0 ? 2 : 0),
      kilonewtons(r.weight_kN));
  if (r.surcharge_kN > 0.0) {
    text += fmt::format("  surcharge             {} kN\n", kilonewtons(r.surcharge_kN));
  }
  if (b.cut) {
    text += fmt::format("  tension crack         {} m2, {} m deep\n", fixed(b.areas.crack_m2, 1),
                        fixed(b.crack_depth_m, 2));
  }
  return text;
}

std::vector<std::string> plane_row(const char* name, double area_m2, double water_kN,
                                   double normal_kN, const std::optional<TangentStrength>& used) {
  return {name,
          fixed(area_m2, 1),
          kilonewtons(water_kN),
          kilonewtons(normal_kN),
          used ? fixed(used->cohesion_kPa, 1) : "opens",
          used ? fixed(used->friction.deg(), 1) : ""};
}

std::string planes_table(const WedgeResult& r) {
  TextTable table({{"", Align::left},
                   {"area, m2"},
                   {"water, kN"},
                   {"normal, kN"},
                   {"cohesion, kPa"},
                   {"friction, deg"}});
  table.add_row(plane_row("plane 1", r.block.areas.plane1_m2, r.water.plane1_kN,
                          r.contact.normal1_kN, r.strength1));
  table.add_row(plane_row("plane 2", r.block.areas.plane2_m2, r.water.plane2_kN,
                          r.contact.normal2_kN, r.strength2));
  if (r.block.cut) {
    table.add_row({"crack", fixed(r.block.areas.crack_m2, 1), kilonewtons(r.water.crack_kN)});
  }
  return table.text();
}

std::string balance_text(const WedgeResult& r) {
  std::string text = fmt::format("The block {}.\n", mode_text(r.contact));
  if (r.contact.mode != WedgeMode::lifts) {
    text += fmt::format("  driving    {} kN\n  resisting  {} kN\n",
                        kilonewtons(r.contact.driving_kN), kilonewtons(r.resisting_kN));
  }
  text += fmt::format("Factor of safety: {}\n", safety_text(r.factor_of_safety));
  return text;
}

std::string directions_text(const WedgeTarget& target) {
  std::string text = "among all directions that point into the face, upward ones too";
  if (target.least_plunge.deg() > -90.0 || target.greatest_plunge.deg() < 90.0) {
    text = fmt::format("among directions that point into the face and plunge {} to {} degrees",
                       shortest(target.least_plunge.deg()), shortest(target.greatest_plunge.deg()));
  }
  return text;
}

std::string least_bolt_text(const WedgeSupport& support) {
  const std::string_view action = to_string(support.action);
  const std::string safety = shortest(support.target.factor_of_safety);
  if (!support.least) {
    return fmt::format("No {} bolt brings the factor of safety to {}, {}.", action, safety,
                       directions_text(support.target));
  }
  if (!support.least->direction) {
    return fmt::format("The factor of safety is {} or more without another bolt.", safety);
  }
  const Line& line = *support.least->direction;
  return fmt::format(
      "Least {} bolt force for a factor of safety of {}: {} kN towards {}/{} "
      "(trend/plunge{}), {}.",
      action, safety, kilonewtons(support.least->force_kN), fixed(line.trend.deg(), 1),
      fixed(line.plunge.deg(), 1), line.plunge.deg() < 0.0 ? ", upward" : "",
      directions_text(support.target));
}

std::string support_text(const WedgeSupport& support) {
  std::string text = '\n' + paragraph(least_bolt_text(support));
  if (!support.target.direction) return text;
  const Line& line = *support.target.direction;
  const std::string way =
      fmt::format("{}/{}", shortest(line.trend.deg()), shortest(line.plunge.deg()));
  text += support.along_direction_kN
              ? paragraph(fmt::format("Towards {}: {} kN.", way,
                                      kilonewtons(*support.along_direction_kN)))
              : paragraph(fmt::format("Towards {}: no force reaches it.", way));
  return text;
}

std::string closing(const WedgeResult& r) {
  std::string text;
  for (const std::string& assumption : r.assumptions) {
    text += '\n' + paragraph(assumption + ".");
  }
  return text + '\n' + paragraph(rigid_block_caution()) + paragraph(practice_caution());
}

}  // namespace

std::string wedge_text(const WedgeCase& wedge, const WedgeResult& result,
                       const std::optional<WedgeSupport>& support, const std::string& more) {
  if (!result.forms) {
    return heading(wedge) + paragraph("No wedge forms: " + result.reason + ".") + more;
  }
  return heading(wedge) + size_text(result) + '\n' + planes_table(result) + '\n' +
         balance_text(result) + (support ? support_text(*support) : "") + more + closing(result);
}

}  // namespace brink::cli
