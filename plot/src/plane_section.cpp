#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/plot/hatch.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"
#include "section_sheet.hpp"

namespace brink::plot {

namespace {

constexpr Colour kWater{0x1D, 0x56, 0x93};
constexpr Colour kWaterFill{0xD8, 0xE6, 0xF3};
constexpr double kPressure_mm = 15.0;  // of the greatest pressure

// The slope's lines, which reach past the block.
struct Slope {
  SectionPoint crest;
  SinCos plane, face, upper;
  double height_m;
};

Slope slope_of(const PlaneSlideInput& in, const PlaneSection& section) {
  const SinCos f = sincos(section.face_dip);
  return {{f.sin > 0.0 ? in.height_m * f.cos / f.sin : 0.0, in.height_m},
          sincos(section.plane_dip),
          f,
          sincos(section.upper_dip),
          in.height_m};
}

SectionExtent extent_of(const Slope& slope, const PlaneSlide& slide) {
  SectionExtent box;
  box.include(slope.crest);
  for (const SectionPoint& p : slide.section.outline) box.include(p);
  const double room_m = 0.3 * slope.height_m;
  box.left_m -= room_m;
  box.right_m += room_m;
  box.low_m -= 0.2 * slope.height_m;
  box.high_m += 0.15 * slope.height_m;
  return box;
}

// The ground from the left edge over toe and crest to the right edge of the drawing.
std::vector<Point> ground_line(const SectionFrame& frame, const Slope& slope) {
  const SectionExtent& box = frame.extent();
  SectionPoint end{box.right_m, slope.crest.z_m};
  if (slope.upper.cos > 0.0)
    end.z_m += (box.right_m - slope.crest.x_m) * slope.upper.sin / slope.upper.cos;
  if (end.z_m > box.high_m || end.z_m < box.low_m) {
    const double z_m = std::clamp(end.z_m, box.low_m, box.high_m);
    end = {slope.crest.x_m + (z_m - slope.crest.z_m) * slope.upper.cos / slope.upper.sin, z_m};
  }
  return {frame.at({box.left_m, 0.0}), frame.at({0.0, 0.0}), frame.at(slope.crest), frame.at(end)};
}

Group draw_rock(const SectionFrame& frame, const std::vector<Point>& ground) {
  Group group{"Ground", {}, {}};
  std::vector<Point> rock = ground;
  const double foot = frame.at({0.0, frame.extent().low_m}).y_mm;
  rock.push_back({ground.back().x_mm, foot});
  rock.push_back({ground.front().x_mm, foot});
  Path fill = polygon(rock);
  fill.fill = style::kTints[0];
  add(group, fill);
  return group;
}

Group draw_block(const SectionFrame& frame, const PlaneSlide& slide) {
  Group group{"Block", {}, {}};
  std::vector<Point> outline;
  for (const SectionPoint& p : slide.section.outline) outline.push_back(frame.at(p));
  if (outline.empty()) return group;
  Path fill = polygon(outline);
  fill.fill = style::kTints[2];
  add(group, fill);
  if (slide.factor_of_safety < 1.0)
    add(group, hatched({outline}, Angle::degrees(45.0), 1.6, {style::kHazard, 0.13, {}, false}));
  return group;
}

// How far up the plane the drawing goes: to the upper ground, or to the drawing's edge.
double plane_length_m(const SectionExtent& box, const Slope& slope) {
  double length_m = std::min(slope.plane.cos > 0.0 ? box.right_m / slope.plane.cos : box.high_m,
                             slope.plane.sin > 0.0 ? box.high_m / slope.plane.sin : box.right_m);
  // Along the plane, rise over the upper ground's line.
  const double rise = slope.plane.sin * slope.upper.cos - slope.plane.cos * slope.upper.sin;
  const double crest_rise_m = slope.crest.z_m * slope.upper.cos - slope.crest.x_m * slope.upper.sin;
  if (rise > 0.0) length_m = std::min(length_m, crest_rise_m / rise);
  return std::max(length_m, 0.0);
}

// Solid under the block, broken behind it and where there is none.
Group draw_plane(const SectionFrame& frame, const Slope& slope, const PlaneSlide& slide) {
  Group group{"Plane", {}, {}};
  const auto at = [&](double s_m) {
    return frame.at({s_m * slope.plane.cos, s_m * slope.plane.sin});
  };
  const double solid_m = slide.forms ? slide.sliding_length_m : 0.0;
  const double end_m = plane_length_m(frame.extent(), slope);
  if (slide.forms) add(group, segment(at(0.0), at(solid_m), {style::kHazard, 0.6, {}, false}));
  if (end_m > solid_m)
    add(group, segment(at(solid_m), at(end_m), {style::kMuted, 0.3, {2.0, 1.4}, false}));
  return group;
}

bool has_crack(const PlaneSlide& slide) {
  return slide.crack_depth_m && *slide.crack_depth_m > 0.0;
}

// Diagrams of pressure: on the crack's back wall and under the plane, on the rock's side.
Group draw_water(const SectionFrame& frame, const Slope& slope, const PlaneSlideInput& in,
                 const PlaneSlide& slide) {
  Group group{"Water pressure", {}, {}};
  if (in.water_depth_m == 0.0) return group;
  const auto on_plane = [&](double s_m) {
    return frame.at({s_m * slope.plane.cos, s_m * slope.plane.sin});
  };
  const Point under = SectionFrame::towards(slope.plane.sin, -slope.plane.cos);
  const Stroke edge{kWater, style::kThin_mm, {}, false};
  const bool cracked = has_crack(slide);
  const double wet_m = cracked ? slide.sliding_length_m : in.water_depth_m / slope.plane.sin;
  const Point peak = moved_by(on_plane(cracked ? wet_m : wet_m / 2.0), under, kPressure_mm);
  Path uplift = polygon({on_plane(0.0), on_plane(wet_m), peak});
  uplift.fill = kWaterFill;
  uplift.stroke = edge;
  add(group, uplift);
  const Point middle = between(on_plane(wet_m / 2.0), peak, 0.5);
  add(group, label({middle.x_mm, middle.y_mm + 1.0}, "U " + force_words(slide.uplift_kN_m), kWater,
                   Anchor::middle));
  if (!cracked) return group;
  const Point foot = on_plane(slide.sliding_length_m);
  const Point level{foot.x_mm, foot.y_mm - frame.mm(in.water_depth_m)};
  Path thrust = polygon({foot, level, {foot.x_mm + kPressure_mm, foot.y_mm}});
  thrust.fill = kWaterFill;
  thrust.stroke = edge;
  add(group, thrust);
  add(group, label({foot.x_mm + kPressure_mm + 1.5, foot.y_mm + 1.0},
                   "V " + force_words(slide.crack_water_kN_m), kWater));
  add(group, segment(foot, level, {kWater, 1.1, {}, false}));
  return group;
}

Group draw_crack(const SectionFrame& frame, const Slope& slope, const PlaneSlideInput& in,
                 const PlaneSlide& slide) {
  Group group{"Tension crack", {}, {}};
  if (!has_crack(slide)) return group;
  const double x_m = slope.crest.x_m + *slide.crack_setback_m;
  const double foot_m = slide.sliding_length_m * slope.plane.sin;
  const Point foot = frame.at({x_m, foot_m});
  const Point top = frame.at({x_m, foot_m + *slide.crack_depth_m});
  add(group, segment(foot, top, {style::kInk, 0.45, {}, false}));
  // In the air in front, above what stands on the ground.
  const Point above{top.x_mm, top.y_mm - (in.loads.empty() ? 14.0 : 27.0)};
  add(group,
      segment({top.x_mm, top.y_mm - 1.0}, above, {style::kMuted, style::kThin_mm, {}, false}));
  add(group, label({above.x_mm - 1.5, above.y_mm + 1.0},
                   fmt::format("crack {} m deep, {} m {} the crest", fixed(*slide.crack_depth_m, 2),
                               fixed(std::abs(*slide.crack_setback_m), 2),
                               *slide.crack_setback_m < 0.0 ? "in front of" : "behind"),
                   Anchor::end));
  if (in.water_depth_m > 0.0) {
    const Point level{foot.x_mm, foot.y_mm - frame.mm(in.water_depth_m)};
    add(group, Symbols{Shape::wedge, 2.4, 0.2, kWater, {{level.x_mm - 2.0, level.y_mm - 1.0}}});
  }
  return group;
}

Point centroid(const std::vector<Point>& corners) {
  double area = 0.0, x = 0.0, y = 0.0;
  for (std::size_t i = 0; i < corners.size(); ++i) {
    const Point& a = corners[i];
    const Point& b = corners[(i + 1) % corners.size()];
    const double cross = a.x_mm * b.y_mm - b.x_mm * a.y_mm;
    area += cross / 2.0;
    x += (a.x_mm + b.x_mm) * cross / 6.0;
    y += (a.y_mm + b.y_mm) * cross / 6.0;
  }
  return {x / area, y / area};
}

// A direction of space as a direction on the page; its part along strike is dropped.
Point on_section(const Line& line, Angle azimuth) {
  const Vector3 v = direction(line);
  const SinCos a = sincos(azimuth);
  return SectionFrame::towards(-(v.x() * a.sin + v.y() * a.cos), v.z());
}

// How long a bolt is drawn: 10 mm past the plane, or 32 mm where it never meets it on the page.
double bolt_length_mm(Point head, Point pull, Point toe, Point up_plane) {
  constexpr double kPast_mm = 10.0, kLone_mm = 32.0, kMost_mm = 150.0;
  const double size = std::hypot(pull.x_mm, pull.y_mm);
  const double det = pull.x_mm * up_plane.y_mm - pull.y_mm * up_plane.x_mm;
  if (size == 0.0 || det == 0.0) return kLone_mm;
  const Point gap{toe.x_mm - head.x_mm, toe.y_mm - head.y_mm};
  const double length = (gap.x_mm * up_plane.y_mm - gap.y_mm * up_plane.x_mm) / det * size;
  return length > 0.0 && length < kMost_mm ? length + kPast_mm : kLone_mm;
}

// Bolts spread up the face.
Group draw_bolts(const SectionFrame& frame, const PlaneSlideInput& in, const PlaneSlide& slide) {
  Group group{"Bolts", {}, {}};
  if (slide.section.outline.size() < 3) return group;
  const Point toe = frame.at(slide.section.outline[0]);
  const Point crest = frame.at(slide.section.outline[1]);
  const SinCos p = sincos(slide.section.plane_dip);
  const Point up_plane = SectionFrame::towards(p.cos, p.sin);
  std::vector<std::pair<Point, std::string>> pulls;
  for (const DirectedForce& bolt : in.bolts)
    pulls.emplace_back(on_section(bolt.towards, slide.section.azimuth),
                       "bolt " + force_words(bolt.force_kN) + " kN/m");
  const std::size_t given = pulls.size();
  if (slide.bolt_for_target && slide.bolt_for_target->force_kN_m > 0.0)
    pulls.emplace_back(on_section(slide.bolt_for_target->direction, slide.section.azimuth),
                       fmt::format("bolt for {}: {} kN/m", shortest(*in.target),
                                   force_words(slide.bolt_for_target->force_kN_m)));
  for (std::size_t i = 0; i < pulls.size(); ++i) {
    const double share = (static_cast<double>(i) + 1.0) / (static_cast<double>(pulls.size()) + 1.0);
    const Point head = between(toe, crest, 0.15 + 0.7 * share);
    const Point tip =
        moved_by(head, pulls[i].first, bolt_length_mm(head, pulls[i].first, toe, up_plane));
    const bool needed = i >= given;
    Stroke stroke{style::kInk, 0.5, {}, false};
    if (needed) stroke.dash_mm = {1.6, 1.0};
    add(group, segment(moved_by(head, pulls[i].first, -3.0), tip, stroke));
    add(group, Symbols{Shape::square, 2.0, 0.2, style::kInk, {head}});
    add(group, label({head.x_mm - 4.5, head.y_mm + 1.0}, pulls[i].second, Anchor::end));
  }
  return group;
}

Group draw_forces(const SectionFrame& frame, const PlaneSlideInput& in, const PlaneSlide& slide) {
  Group group{"Forces", {}, {}};
  std::vector<Point> outline;
  for (const SectionPoint& p : slide.section.outline) outline.push_back(frame.at(p));
  if (outline.empty()) return group;
  const Point centre = centroid(outline);
  const Point tip{centre.x_mm, centre.y_mm + 13.0};
  add(group, arrow(centre, tip, style::kInk));
  add(group, label({centre.x_mm + 1.8, centre.y_mm + 3.0}, "W " + force_words(slide.weight_kN_m)));
  for (const DirectedForce& load : in.loads) {
    const Point pull = on_section(load.towards, slide.section.azimuth);
    const Point tail = moved_by(outline[1], pull, -16.0);
    add(group, arrow(tail, outline[1], style::kInk));
    add(group, label({tail.x_mm, tail.y_mm - 1.5}, "load " + force_words(load.force_kN) + " kN/m",
                     Anchor::middle));
  }
  if (slide.surcharge_kN_m > 0.0 && outline.size() > 2) {
    for (int i = 1; i < 8; ++i) {
      const Point p = between(outline[1], outline[2], i / 8.0);
      add(group, arrow({p.x_mm, p.y_mm - 6.0}, p, style::kMuted, 0.2));
    }
  }
  return group;
}

Group draw_dips(const SectionFrame& frame, const Slope& slope, const PlaneSection& section,
                double length_m, bool low_end) {
  Group group{"Dips", {}, {}};
  const Point toe = frame.at({0.0, 0.0});
  const Point crest = frame.at(slope.crest);
  const double left = std::min(toe.x_mm, crest.x_mm) - 28.0;
  const Stroke thin{style::kMuted, style::kThin_mm, {}, false};
  add(group, segment({left, toe.y_mm}, {left, crest.y_mm}, thin));
  for (const double y : {toe.y_mm, crest.y_mm})
    add(group, segment({left - 1.2, y}, {left + 1.2, y}, thin));
  add(group, segment({left, crest.y_mm}, {crest.x_mm - 2.0, crest.y_mm},
                     {style::kFaint, style::kThin_mm, {}, false}));
  add(group, label({left - 2.0, (toe.y_mm + crest.y_mm) / 2.0 + 1.0},
                   shortest(slope.height_m) + " m", Anchor::end));
  const Point low = between(toe, crest, 0.1);
  add(group, label({low.x_mm - 3.0, low.y_mm}, "face " + degrees(section.face_dip), Anchor::end));
  // Where the diagram of uplift leaves room.
  const SectionPoint end{length_m * slope.plane.cos, length_m * slope.plane.sin};
  const Point place = low_end ? Point{toe.x_mm + 9.0, toe.y_mm + 1.0}
                              : moved_by(between(toe, frame.at(end), 0.72), {0.6, 1.0}, 6.0);
  add(group, label(place, "plane " + degrees(section.plane_dip)));
  return group;
}

std::string facts(const PlaneSlideInput& in, const PlaneSlide& slide) {
  return fmt::format(
      "Plane {}, face {}, per metre of face. Section towards {}, where the plane dips {}, the face "
      "{} "
      "and the ground {}.",
      dip_and_direction(in.plane.dip, in.plane.dip_direction),
      dip_and_direction(in.face.dip, in.face.dip_direction), fixed(slide.section.azimuth.deg(), 0),
      degrees(slide.section.plane_dip), degrees(slide.section.face_dip),
      degrees(slide.section.upper_dip));
}

SheetWords words_of(const PlaneSlideInput& in, const PlaneSlide& s, const std::string& title) {
  SheetWords words{title.empty() ? "Planar slide" : title, facts(in, s), {}, false, {}};
  if (!s.forms) {
    words.verdict = "No block forms";
    words.facts = "No block forms: " + s.reason + ".";
    return words;
  }
  const bool lifts = s.mode == PlaneSlideMode::lifts;
  words.verdict =
      lifts ? "The block lifts" : "Factor of safety " + safety_words(s.factor_of_safety);
  words.hazard = s.factor_of_safety < 1.0;
  words.key = {{"weight W", force_words(s.weight_kN_m) + " kN/m"},
               {"sliding length", fixed(s.sliding_length_m, 2) + " m"},
               {"uplift U", force_words(s.uplift_kN_m) + " kN/m"},
               {"crack water V", force_words(s.crack_water_kN_m) + " kN/m"},
               {"normal, effective", force_words(s.normal_kN_m) + " kN/m"},
               {"driving", force_words(s.driving_kN_m) + " kN/m"},
               {"resisting", force_words(s.resisting_kN_m) + " kN/m"},
               {"cohesion used", fixed(s.strength.cohesion_kPa, 1) + " kPa"},
               {"friction used", fixed(s.strength.friction.deg(), 1) + "°"},
               {"at normal stress", fixed(s.strength.normal_stress_kPa, 1) + " kPa"}};
  if (in.seismic_horizontal != 0.0 || in.seismic_vertical != 0.0)
    words.key.emplace_back("earthquake, across / up",
                           shortest(in.seismic_horizontal) + " / " + shortest(in.seismic_vertical));
  if (s.bolt_for_target)
    words.key.emplace_back("bolt for " + shortest(*in.target),
                           force_words(s.bolt_for_target->force_kN_m) + " kN/m");
  return words;
}

std::string description(const PlaneSlide& s) {
  if (!s.forms) return "no block forms: " + s.reason;
  if (s.mode == PlaneSlideMode::lifts) return "the block lifts off its plane";
  return fmt::format("factor of safety {}; the block weighs {} kN/m",
                     safety_words(s.factor_of_safety), force_words(s.weight_kN_m));
}

}  // namespace

Group draw_plane_section(const PlaneSlideInput& input, const PlaneSlide& slide,
                         const SectionBox& box) {
  const Slope slope = slope_of(input, slide.section);
  const SectionFrame frame(extent_of(slope, slide), box);
  const std::vector<Point> ground = ground_line(frame, slope);
  Group drawing{"Section along the way of sliding", description(slide), {}};
  add(drawing, draw_rock(frame, ground));
  add(drawing, draw_block(frame, slide));
  if (slide.forms) add(drawing, draw_water(frame, slope, input, slide));
  add(drawing, draw_plane(frame, slope, slide));
  if (slide.forms) add(drawing, draw_crack(frame, slope, input, slide));
  add(drawing, polyline(ground, {style::kInk, style::kFace_mm, {}, false}));
  const double shown_m =
      slide.forms ? slide.sliding_length_m : plane_length_m(frame.extent(), slope);
  add(drawing, draw_dips(frame, slope, slide.section, shown_m,
                         has_crack(slide) && input.water_depth_m > 0.0));
  add(drawing, draw_forces(frame, input, slide));
  add(drawing, draw_bolts(frame, input, slide));
  add(drawing, scale_bar(frame));
  return drawing;
}

Picture plane_sheet(const PlaneSlideInput& input, const PlaneSlide& slide,
                    const std::string& title) {
  return section_sheet(words_of(input, slide, title), draw_plane_section(input, slide, kSheetBox));
}

}  // namespace brink::plot
