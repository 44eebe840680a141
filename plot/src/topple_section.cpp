#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/plot/hatch.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"
#include "brink/record/topple_document.hpp"
#include "section_sheet.hpp"

namespace brink::plot {

namespace {

constexpr Colour kWater{0x1D, 0x56, 0x93};

using Outline = std::array<SectionPoint, 4>;

std::vector<Point> on_page(const SectionFrame& frame, const Outline& outline) {
  std::vector<Point> points;
  for (const SectionPoint& p : outline) points.push_back(frame.at(p));
  return points;
}

Group mode_fill(const std::vector<Point>& outline, BlockMode mode) {
  Group group;
  const Stroke line{style::kHazard, 0.15, {}, false};
  if (mode != BlockMode::stable) add(group, hatched({outline}, Angle::degrees(45.0), 1.5, line));
  if (mode == BlockMode::slides) add(group, hatched({outline}, Angle::degrees(-45.0), 1.5, line));
  Path edge = polygon(outline);
  edge.stroke = Stroke{style::kInk, style::kLine_mm, {}, false};
  add(group, edge);
  return group;
}

SectionExtent extent_of(const std::vector<Outline>& outlines) {
  SectionExtent box;
  for (const Outline& outline : outlines)
    for (const SectionPoint& p : outline) box.include(p);
  const double room_m = 0.12 * (box.right_m - box.left_m);
  box.left_m -= 1.5 * room_m;
  box.right_m += room_m;
  box.low_m -= room_m;
  box.high_m += room_m;
  return box;
}

// The rock that the columns stand on, down to the foot of the drawing.
Group draw_base(const SectionFrame& frame, const std::vector<Outline>& outlines) {
  Group group{"Base", {}, {}};
  const SectionExtent& box = frame.extent();
  std::vector<Point> line{frame.at({box.left_m, outlines.front()[0].z_m})};
  for (const Outline& outline : outlines) {
    line.push_back(frame.at(outline[0]));
    line.push_back(frame.at(outline[1]));
  }
  // Behind the last column the ground comes down to its base.
  line.push_back(frame.at(outlines.back()[2]));
  line.push_back({frame.at({box.right_m, 0.0}).x_mm, line.back().y_mm});
  const double foot = frame.at({0.0, box.low_m}).y_mm;
  std::vector<Point> rock = line;
  rock.push_back({line.back().x_mm, foot});
  rock.push_back({line.front().x_mm, foot});
  Path fill = polygon(rock);
  fill.fill = style::kTints[0];
  add(group, fill);
  add(group, polyline(line, {style::kInk, style::kFace_mm, {}, false}));
  return group;
}

// Every number where the columns are wide enough on the page, else every 5th or 10th.
std::size_t number_step(double width_mm) {
  if (width_mm >= 5.0) return 1;
  return width_mm >= 1.2 ? 5 : 10;
}

Group draw_columns(const SectionFrame& frame, const std::vector<Outline>& outlines,
                   const ToppleInput& input, const ToppleResult& result) {
  Group group{"Columns", {}, {}};
  const std::size_t step = number_step(frame.mm(input.columns.width_m));
  for (std::size_t i = 0; i < outlines.size(); ++i) {
    const ToppleBlock& block = result.blocks[i];
    const std::vector<Point> points = on_page(frame, outlines[i]);
    Group column = mode_fill(points, block.mode);
    column.title = fmt::format("Block {}: {}", block.number, to_string(block.mode));
    const Point under = between(points[0], points[1], 0.5);
    const Point down = {points[0].x_mm - points[3].x_mm, points[0].y_mm - points[3].y_mm};
    const Point place = moved_by(under, down, 4.0);
    if (block.number == 1 || block.number % step == 0 || step == 1)
      add(column,
          label({place.x_mm, place.y_mm + 1.0}, std::to_string(block.number), Anchor::middle));
    add(group, column);
  }
  return group;
}

// Water behind a block, drawn up the joint from its base.
Group draw_water(const SectionFrame& frame, const std::vector<Outline>& outlines,
                 const ToppleInput& input) {
  Group group{"Water", {}, {}};
  const Stroke wet{kWater, 1.0, {}, false};
  for (const BlockWater& w : block_water(input)) {
    const std::vector<Point> p = on_page(frame, outlines[w.block - 1]);
    if (w.upper_m > 0.0)
      add(group, segment(p[1],
                         moved_by(p[1], {p[2].x_mm - p[1].x_mm, p[2].y_mm - p[1].y_mm},
                                  frame.mm(w.upper_m)),
                         wet));
    if (w.lower_m > 0.0)
      add(group, segment(p[0],
                         moved_by(p[0], {p[3].x_mm - p[0].x_mm, p[3].y_mm - p[0].y_mm},
                                  frame.mm(w.lower_m)),
                         wet));
  }
  return group;
}

Group draw_forces(const SectionFrame& frame, const std::vector<Outline>& outlines,
                  const ToppleInput& input) {
  Group group{"Loads and bolts", {}, {}};
  for (const BlockForce& f : input.loads) {
    const std::vector<Point> p = on_page(frame, outlines[f.block - 1]);
    const double height_m = input.columns.heights_m[f.block - 1];
    const double share = f.height_m.value_or(height_m) / height_m;
    const Point tip = between(between(p[0], p[1], 0.5), between(p[3], p[2], 0.5), share);
    const SinCos plunge = sincos(f.plunge);
    const Point tail = moved_by(tip, SectionFrame::towards(plunge.cos, plunge.sin), 13.0);
    add(group, arrow(tail, tip, style::kInk));
    add(group,
        label({tail.x_mm, tail.y_mm - 1.5}, force_words(f.force_kN_m) + " kN/m", Anchor::middle));
  }
  for (const BlockForce& f : input.bolts) {
    const std::vector<Point> p = on_page(frame, outlines[f.block - 1]);
    const double height_m = input.columns.heights_m[f.block - 1];
    const double share = f.height_m.value_or(height_m / 2.0) / height_m;
    const Point head = between(p[0], p[3], share);
    const SinCos plunge = sincos(f.plunge);
    const Point pull = SectionFrame::towards(plunge.cos, -plunge.sin);
    add(group, segment(moved_by(head, pull, -3.0), moved_by(head, pull, 28.0),
                       {style::kInk, 0.5, {}, false}));
    add(group, Symbols{Shape::square, 2.0, 0.2, style::kInk, {head}});
    add(group, label({head.x_mm - 4.5, head.y_mm + 1.0},
                     "bolt " + force_words(f.force_kN_m) + " kN/m", Anchor::end));
  }
  return group;
}

// "4 to 13", "2", "1 to 3, 9".
std::string numbers_of(const ToppleResult& result, BlockMode mode) {
  std::string words;
  for (std::size_t i = 0; i < result.blocks.size(); ++i) {
    if (result.blocks[i].mode != mode) continue;
    std::size_t last = i;
    while (last + 1 < result.blocks.size() && result.blocks[last + 1].mode == mode) ++last;
    if (!words.empty()) words += ", ";
    words += std::to_string(i + 1);
    if (last > i) words += fmt::format(" to {}", last + 1);
    i = last;
  }
  return words.empty() ? "none" : words;
}

// The word of each mode beside its pattern.
Group mode_key(const ToppleResult& result, double top_mm) {
  Group group{"Modes", {}, {}};
  double y = top_mm;
  for (const BlockMode mode : {BlockMode::topples, BlockMode::slides, BlockMode::stable}) {
    add(group, mode_fill({{kKeyLeft_mm, y},
                          {kKeyLeft_mm + 8.0, y},
                          {kKeyLeft_mm + 8.0, y + 6.0},
                          {kKeyLeft_mm, y + 6.0}},
                         mode));
    add(group, label({kKeyLeft_mm + 11.0, y + 4.0},
                     fmt::format("{}: {}", to_string(mode), numbers_of(result, mode))));
    y += 9.0;
  }
  return group;
}

// Each run of one mode is named once, in the air beside its middle block.
Group name_runs(const SectionFrame& frame, const std::vector<Outline>& outlines, std::size_t crest,
                const ToppleResult& result) {
  Group group{"Modes of the columns", {}, {}};
  for (std::size_t i = 0; i < result.blocks.size();) {
    std::size_t last = i;
    while (last + 1 < result.blocks.size() && result.blocks[last + 1].mode == result.blocks[i].mode)
      ++last;
    const BlockMode mode = result.blocks[i].mode;
    const Outline& middle = outlines[(i + last) / 2];
    const Point top = frame.at(middle[3]);
    const bool before_crest = (i + last) / 2 < crest;
    const Colour colour = mode == BlockMode::stable ? style::kMuted : style::kHazard;
    const std::string word(to_string(mode));
    if (before_crest) {
      add(group, label({top.x_mm - 2.5, top.y_mm - 2.0}, word, colour, Anchor::end));
    } else {
      double above = top.y_mm;
      for (std::size_t k = i; k <= last; ++k)
        above = std::min(above, frame.at(outlines[k][2]).y_mm);
      add(group, label({frame.at(middle[2]).x_mm, above - 3.0}, word, colour, Anchor::middle));
    }
    i = last + 1;
  }
  return group;
}

SheetWords words_of(const ToppleInput& in, const ToppleResult& r, const std::string& title) {
  SheetWords words;
  words.title = title.empty() ? "Block toppling" : title;
  words.facts = fmt::format(
      "{} columns {} m wide on bases dipping {}, friction {}, {} kN/m3, per metre of face. Block 1 "
      "is "
      "at the toe, block {} at the crest.",
      r.blocks.size(), shortest(in.columns.width_m), degrees(in.columns.base_dip),
      degrees(in.friction), shortest(in.unit_weight_kN_m3), in.columns.crest);
  words.verdict = "Factor of safety " + safety_words(r.factor_of_safety);
  words.hazard = !r.stable;
  words.key = {{"force at the toe", force_words(r.toe_force_kN_m) + " kN/m"},
               {"friction for balance",
                r.friction_for_balance ? fixed(r.friction_for_balance->deg(), 2) + "°" : "none"}};
  words.key.emplace_back(
      fmt::format("bolt at {} for balance", degrees(in.balance_bolt_plunge)),
      r.bolt_for_balance_kN_m ? force_words(*r.bolt_for_balance_kN_m) + " kN/m" : "none");
  if (in.water_fill > 0.0)
    words.key.emplace_back("joints full to", fixed(100.0 * in.water_fill, 0) + " %");
  if (in.seismic_horizontal != 0.0)
    words.key.emplace_back("earthquake", shortest(in.seismic_horizontal));
  return words;
}

std::string description(const ToppleResult& r) {
  return fmt::format(
      "{}; factor of safety {}",
      r.stable ? "the toe stands" : "the toe lacks " + force_words(r.toe_force_kN_m) + " kN/m",
      safety_words(r.factor_of_safety));
}

}  // namespace

Group draw_topple_section(const ToppleInput& input, const ToppleResult& result,
                          const SectionBox& box) {
  const std::vector<Outline> outlines = topple_outlines(input.columns);
  const SectionFrame frame(extent_of(outlines), box);
  Group drawing{"Section of the toppling columns", description(result), {}};
  add(drawing, draw_base(frame, outlines));
  add(drawing, draw_columns(frame, outlines, input, result));
  add(drawing, draw_water(frame, outlines, input));
  add(drawing, name_runs(frame, outlines, input.columns.crest, result));
  add(drawing, draw_forces(frame, outlines, input));
  add(drawing, scale_bar(frame));
  return drawing;
}

Picture topple_sheet(const ToppleInput& input, const ToppleResult& result,
                     const std::string& title) {
  const SheetWords words = words_of(input, result, title);
  Group drawing = draw_topple_section(input, result, kSheetBox);
  add(drawing, mode_key(result, key_foot_mm(words) + 3.0));
  return section_sheet(words, std::move(drawing));
}

}  // namespace brink::plot
