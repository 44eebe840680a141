#include "brink/plot/section.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/plot/hatch.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"

namespace brink::plot {

namespace {

constexpr double kWordsBelow_mm = 13.0;  // scale bar and words under the drawing
constexpr Colour kRock{0xEF, 0xEC, 0xE7};
constexpr Colour kWater{0x5B, 0x92, 0xC9};

// Section coordinates (x into the slope, z up) to the page.
struct Scale {
  Point origin;  // of x = 0, z = 0
  double mm_per_m = 1.0;
  Point at(double x_m, double z_m) const {
    return {origin.x_mm + x_m * mm_per_m, origin.y_mm - z_m * mm_per_m};
  }
  Point at(const SectionPoint& p) const { return at(p.x_m, p.z_m); }
};

struct Extent {
  double left = 0.0, right = 0.0, low = 0.0, high = 0.0;
  void hold(const SectionPoint& p) {
    left = std::min(left, p.x_m);
    right = std::max(right, p.x_m);
    low = std::min(low, p.z_m);
    high = std::max(high, p.z_m);
  }
};

Scale scale_for(const Extent& e, const SectionBox& box) {
  const double width = std::max(e.right - e.left, 1e-6);
  const double height = std::max(e.high - e.low, 1e-6);
  const double room = box.height_mm - kWordsBelow_mm;
  const double mm_per_m = std::min(box.width_mm / width, room / height);
  const double spare = box.width_mm - width * mm_per_m;
  return {{box.top_left.x_mm + spare / 2.0 - e.left * mm_per_m,
           box.top_left.y_mm + room + e.low * mm_per_m},
          mm_per_m};
}

void add_scale_bar(Group& group, const SectionBox& box, const Scale& scale) {
  const double metres = scale_bar_m(1.0 / scale.mm_per_m);
  const double y = box.top_left.y_mm + box.height_mm - 6.0;
  const double left = box.top_left.x_mm, right = left + metres * scale.mm_per_m;
  const Stroke stroke{style::kInk, 0.3, {}, false};
  add(group, polyline({{left, y - 1.0}, {left, y}, {right, y}, {right, y - 1.0}}, stroke));
  add(group, Text{{right + 1.5, y},
                  shortest(metres) + " m",
                  style::text(style::kNote_mm, style::kMuted),
                  Anchor::start,
                  0.0,
                  1});
}

void add_words(Group& group, const SectionBox& box, const std::string& words, bool warm) {
  add(group, Text{{box.top_left.x_mm, box.top_left.y_mm + box.height_mm},
                  words,
                  style::text(style::kText_mm, warm ? style::kHazard : style::kInk, true),
                  Anchor::start,
                  box.width_mm,
                  2});
}

// Horizontal run per rise; a vertical face has none.
double run_per_rise(Angle dip) {
  const SinCos d = sincos(dip);
  return d.cos / d.sin;
}

struct Slope {
  SectionPoint toe_left, toe, crest, ground_right, bottom_right, bottom_left;
};

Slope slope_of(const PlaneSlideInput& input, const PlaneSlide& slide) {
  const double h = input.height_m;
  const SectionPoint crest{h * run_per_rise(slide.section.face_dip), h};
  double back = crest.x_m + 0.6 * h;
  for (const SectionPoint& p : slide.section.outline) back = std::max(back, p.x_m + 0.25 * h);
  const double ground = crest.z_m + (back - crest.x_m) * std::tan(slide.section.upper_dip.rad());
  const double floor = -0.15 * h, front = std::min(0.0, crest.x_m) - 0.3 * h;
  return {{front, 0.0}, {0.0, 0.0}, crest, {back, ground}, {back, floor}, {front, floor}};
}

std::string slide_words(const PlaneSlide& slide) {
  if (!slide.forms) return "no block forms: " + slide.reason;
  const std::string safety = slide.mode == PlaneSlideMode::lifts ? "the water lifts the block"
                             : std::isinf(slide.factor_of_safety)
                                 ? "nothing drives the block"
                                 : "factor of safety " + fixed(slide.factor_of_safety, 2);
  return fmt::format("{}; the block weighs {} kN/m", safety, fixed(slide.weight_kN_m, 0));
}

void add_crack_water(Group& group, const PlaneSlideInput& input, const PlaneSlide& slide,
                     const Scale& scale) {
  const bool cracked = slide.crack_depth_m && *slide.crack_depth_m > 0.0;
  if (!cracked || input.water_depth_m <= 0.0) return;
  const SectionPoint foot = slide.section.outline.back();
  add(group, segment(scale.at(foot), scale.at(foot.x_m, foot.z_m + input.water_depth_m),
                     {kWater, 1.4, {}, false}));
}

std::vector<Point> block_outline(const ToppleColumns& columns, std::size_t index,
                                 const Scale& scale, double step_m) {
  // Along the bases block i begins at i widths; across them its base lies i steps up.
  const SinCos d = sincos(columns.base_dip);
  const double i = static_cast<double>(index);
  const auto place = [&](double along, double across) {
    return scale.at(along * d.cos - across * d.sin, along * d.sin + across * d.cos);
  };
  const double left = i * columns.width_m, right = left + columns.width_m;
  const double base = i * step_m, top = base + columns.heights_m[index];
  return {place(left, base), place(right, base), place(right, top), place(left, top)};
}

// How far each base lies above the one below, from the way the tops step: below the crest a block
// is a1 - step higher than the one before, above it a2 + step lower.
double step_of(const ToppleColumns& c) {
  if (c.heights_m.size() < 2) return 0.0;
  return c.crest >= 2 ? c.a1_m - (c.heights_m[1] - c.heights_m[0])
                      : c.heights_m[0] - c.heights_m[1] - c.a2_m;
}

Extent topple_extent(const ToppleColumns& columns, double step_m) {
  Extent extent;
  const Scale unit{{0.0, 0.0}, 1.0};
  for (std::size_t i = 0; i < columns.heights_m.size(); ++i) {
    for (const Point& p : block_outline(columns, i, unit, step_m)) extent.hold({p.x_mm, -p.y_mm});
  }
  return extent;
}

void add_block(Group& group, const std::vector<Point>& outline, BlockMode mode) {
  Path block = polygon(outline);
  block.fill = mode == BlockMode::slides ? style::kPale : style::kWhite;
  block.stroke = Stroke{style::kInk, style::kThin_mm, {}, false};
  add(group, std::move(block));
  if (mode != BlockMode::topples) return;
  add(group, hatched({outline}, Angle::degrees(45.0), 1.1, {style::kHazard, 0.13, {}, false}));
}

void add_topple_key(Group& group, const SectionBox& box) {
  const std::pair<BlockMode, const char*> entries[] = {{BlockMode::stable, "stable"},
                                                       {BlockMode::topples, "topples"},
                                                       {BlockMode::slides, "slides"}};
  double x = box.top_left.x_mm + box.width_mm - 66.0;
  const double y = box.top_left.y_mm + box.height_mm - 6.0;
  for (const auto& [mode, word] : entries) {
    add_block(group, {{x, y - 3.0}, {x + 4.0, y - 3.0}, {x + 4.0, y}, {x, y}}, mode);
    add(group, Text{{x + 5.2, y},
                    word,
                    style::text(style::kNote_mm, style::kMuted),
                    Anchor::start,
                    0.0,
                    1});
    x += 22.0;
  }
}

std::string topple_words(const ToppleResult& result) {
  if (result.stable) {
    return std::isinf(result.factor_of_safety)
               ? "stable"
               : "stable, factor of safety " + fixed(result.factor_of_safety, 2);
  }
  return fmt::format("not stable: the toe needs {} kN/m; factor of safety {}",
                     fixed(result.toe_force_kN_m, 0), fixed(result.factor_of_safety, 2));
}

}  // namespace

double scale_bar_m(double metres_per_mm) {
  const double least = 15.0 * metres_per_mm;
  const double power = std::pow(10.0, std::floor(std::log10(least)));
  for (const double factor : {1.0, 2.0, 5.0}) {
    if (factor * power >= least) return factor * power;
  }
  return 10.0 * power;
}

Group draw_plane_section(const PlaneSlideInput& input, const PlaneSlide& slide,
                         const SectionBox& box) {
  Group group{"Section along the sliding direction", slide_words(slide), {}};
  const Slope slope = slope_of(input, slide);
  const std::vector<SectionPoint> corners{slope.toe_left,     slope.toe,
                                          slope.crest,        slope.ground_right,
                                          slope.bottom_right, slope.bottom_left};
  Extent extent;
  for (const SectionPoint& p : corners) extent.hold(p);
  const Scale scale = scale_for(extent, box);
  std::vector<Point> rock, surface, block;
  for (const SectionPoint& p : corners) rock.push_back(scale.at(p));
  for (std::size_t i = 0; i < 4; ++i) surface.push_back(scale.at(corners[i]));
  Path mass = polygon(rock);
  mass.fill = kRock;
  add(group, std::move(mass));
  for (const SectionPoint& p : slide.section.outline) block.push_back(scale.at(p));
  if (slide.forms && block.size() >= 3) {
    Path area = polygon(block);
    area.fill = style::kWhite;
    add(group, std::move(area));
    add(group, hatched({block}, Angle::degrees(45.0), 1.6, {style::kHazard, 0.13, {}, false}));
    Path edge = polygon(block);
    edge.stroke = Stroke{style::kHazard, style::kLine_mm, {}, false};
    add(group, std::move(edge));
    add_crack_water(group, input, slide, scale);
  }
  add(group, polyline(surface, {style::kInk, style::kLine_mm, {}, false}));
  add_scale_bar(group, box, scale);
  add_words(group, box, slide_words(slide), slide.forms);
  return group;
}

Group draw_topple_section(const ToppleColumns& columns, const ToppleResult& result,
                          const SectionBox& box) {
  Group group{"Section of the toppling blocks", topple_words(result), {}};
  const double step = step_of(columns);
  const Scale scale = scale_for(topple_extent(columns, step), box);
  const double width_mm = columns.width_m * scale.mm_per_m;
  const double size = std::min(style::kNote_mm, 0.55 * width_mm);
  for (std::size_t i = 0; i < columns.heights_m.size() && i < result.blocks.size(); ++i) {
    const auto outline = block_outline(columns, i, scale, step);
    add_block(group, outline, result.blocks[i].mode);
    if (size < 1.2) continue;
    // Above the top's middle, clear of the hatching.
    const Point a = outline[2], b = outline[3];
    add(group, Text{{(a.x_mm + b.x_mm) / 2.0, std::min(a.y_mm, b.y_mm) - 0.6},
                    std::to_string(result.blocks[i].number),
                    style::text(size, style::kMuted),
                    Anchor::middle,
                    0.0,
                    1});
  }
  add_scale_bar(group, box, scale);
  add_topple_key(group, box);
  add_words(group, box, topple_words(result), !result.stable);
  return group;
}

}  // namespace brink::plot
