#include "section_sheet.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/plot/style.hpp"
#include "brink/record/cautions.hpp"

namespace brink::plot {

namespace {

constexpr double kPageWidth_mm = 297.0;
constexpr double kPageHeight_mm = 210.0;
constexpr double kMargin_mm = 14.0;
constexpr double kBarRoom_mm = 14.0;  // under the drawing, for the scale bar
constexpr double kKeyTop_mm = 40.0;
constexpr double kKeyStep_mm = 5.2;

// Denominator of the smallest round scale at or above `least`: 1, 2, 2.5 or 5 times a power of ten.
double round_scale(double least) {
  const double power = std::pow(10.0, std::floor(std::log10(least)));
  for (const double step : {1.0, 2.0, 2.5, 5.0})
    if (step * power >= least) return step * power;
  return 10.0 * power;
}

Group key(const SheetWords& words) {
  Group group{"Key", words.verdict, {}};
  const double width = kPageWidth_mm - kMargin_mm - kKeyLeft_mm;
  const Colour colour = words.hazard ? style::kHazard : style::kInk;
  add(group, Text{{kKeyLeft_mm, kKeyTop_mm},
                  words.verdict,
                  style::text(style::kShortTitle_mm, colour, true),
                  Anchor::start,
                  width,
                  2});
  double y = kKeyTop_mm + 12.0;
  for (const auto& [name, value] : words.key) {
    add(group, label({kKeyLeft_mm, y}, name, style::kMuted));
    add(group, label({kPageWidth_mm - kMargin_mm, y}, value, Anchor::end));
    y += kKeyStep_mm;
  }
  return group;
}

}  // namespace

void SectionExtent::include(const SectionPoint& p) {
  left_m = std::min(left_m, p.x_m);
  right_m = std::max(right_m, p.x_m);
  low_m = std::min(low_m, p.z_m);
  high_m = std::max(high_m, p.z_m);
}

SectionFrame::SectionFrame(const SectionExtent& extent, const SectionBox& box)
    : extent_(extent), box_(box) {
  const double room_mm = box.height_mm - kBarRoom_mm;
  const double width_m = extent.right_m - extent.left_m;
  const double height_m = extent.high_m - extent.low_m;
  mm_per_m_ = 1000.0 / round_scale(1000.0 * std::max(width_m / box.width_mm, height_m / room_mm));
  const double spare_x_m = metres(box.width_mm) - width_m;
  const double spare_z_m = metres(room_mm) - height_m;
  extent_.left_m -= spare_x_m / 2.0;
  extent_.right_m += spare_x_m / 2.0;
  extent_.low_m -= spare_z_m / 2.0;
  extent_.high_m += spare_z_m / 2.0;
}

Point SectionFrame::at(const SectionPoint& p) const {
  return {box_.top_left.x_mm + mm(p.x_m - extent_.left_m),
          box_.top_left.y_mm + box_.height_mm - kBarRoom_mm - mm(p.z_m - extent_.low_m)};
}

std::string SectionFrame::scale() const {
  return "1:" + shortest(std::round(10000.0 / mm_per_m_) / 10.0);
}

Point moved_by(Point p, Point direction, double length_mm) {
  const double length = std::hypot(direction.x_mm, direction.y_mm);
  if (length == 0.0) return p;
  return {p.x_mm + direction.x_mm * length_mm / length,
          p.y_mm + direction.y_mm * length_mm / length};
}

Point between(Point a, Point b, double share) {
  return {a.x_mm + (b.x_mm - a.x_mm) * share, a.y_mm + (b.y_mm - a.y_mm) * share};
}

Group arrow(Point tail, Point tip, Colour colour, double width_mm) {
  constexpr double kHead_mm = 2.2;
  const Point back{tail.x_mm - tip.x_mm, tail.y_mm - tip.y_mm};
  const Point neck = moved_by(tip, back, kHead_mm);
  const Point side{-back.y_mm, back.x_mm};
  Group group;
  add(group, segment(tail, neck, {colour, width_mm, {}, false}));
  Path head = polygon({tip, moved_by(neck, side, 0.75), moved_by(neck, side, -0.75)});
  head.fill = colour;
  add(group, head);
  return group;
}

Text label(Point at, std::string words, Anchor anchor) {
  return label(at, std::move(words), style::kInk, anchor);
}

Text label(Point at, std::string words, Colour colour, Anchor anchor) {
  return {at, std::move(words), style::text(style::kText_mm, colour), anchor, 0.0, 1};
}

double scale_bar_m(double metres_per_mm) {
  const double least = 15.0 * metres_per_mm;
  const double power = std::pow(10.0, std::floor(std::log10(least)));
  for (const double factor : {1.0, 2.0, 5.0}) {
    if (factor * power >= least) return factor * power;
  }
  return 10.0 * power;
}

Group scale_bar(const SectionFrame& frame) {
  const double length_m = scale_bar_m(frame.metres(1.0));
  const double length_mm = frame.mm(length_m);
  const double left_mm = frame.box().top_left.x_mm;
  const double y = frame.box().top_left.y_mm + frame.box().height_mm - 6.0;
  Group group{"Scale bar", {}, {}};
  for (int i = 0; i < 4; ++i) {
    const double left = left_mm + length_mm * i / 4.0;
    const double right = left_mm + length_mm * (i + 1) / 4.0;
    Path piece = polygon({{left, y}, {right, y}, {right, y + 1.4}, {left, y + 1.4}});
    piece.stroke = Stroke{style::kInk, style::kThin_mm, {}, false};
    piece.fill = i % 2 == 0 ? style::kInk : style::kWhite;
    add(group, piece);
  }
  add(group, label({left_mm, y + 5.0}, "0"));
  add(group, label({left_mm + length_mm, y + 5.0}, shortest(length_m) + " m", Anchor::middle));
  add(group, label({left_mm + length_mm + 8.0, y + 5.0}, "scale " + frame.scale(), style::kMuted));
  return group;
}

double key_foot_mm(const SheetWords& words) {
  return kKeyTop_mm + 12.0 + kKeyStep_mm * static_cast<double>(words.key.size());
}

Picture section_sheet(const SheetWords& words, Group drawing) {
  Picture picture{kPageWidth_mm, kPageHeight_mm, {words.title, words.facts, {}}};
  Group& page = picture.content;
  const double width = kPageWidth_mm - 2.0 * kMargin_mm;
  add(page, Text{{kMargin_mm, kMargin_mm + style::kTitle_mm},
                 words.title,
                 style::text(style::kTitle_mm, style::kInk, true),
                 Anchor::start,
                 width,
                 1});
  add(page, Text{{kMargin_mm, kMargin_mm + style::kTitle_mm + 6.2},
                 words.facts,
                 style::text(style::kText_mm, style::kMuted),
                 Anchor::start,
                 width,
                 1});
  add(page, std::move(drawing));
  add(page, key(words));
  add(page, Text{{kMargin_mm, kPageHeight_mm - 10.0},
                 std::string(rigid_block_caution()) + " " + std::string(practice_caution()),
                 style::text(style::kNote_mm, style::kMuted),
                 Anchor::start,
                 width,
                 2});
  return picture;
}

std::string force_words(double kN_m) {
  return fixed(kN_m, std::abs(kN_m) < 100.0 ? 1 : 0);
}

std::string safety_words(double factor_of_safety) {
  return std::isinf(factor_of_safety) ? "infinite" : fixed(factor_of_safety, 2);
}

}  // namespace brink::plot
