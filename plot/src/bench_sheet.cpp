#include "brink/plot/bench_sheet.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <string>
#include <vector>

#include "brink/plot/chart.hpp"
#include "brink/plot/section.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"
#include "brink/record/cautions.hpp"

namespace brink::plot {

namespace {

constexpr Colour kPlanes = style::kHazard;
constexpr Colour kWedges{0x1D, 0x56, 0x93};

// The section in metres: x to the right into the rock from the lower bench's toe, y up.
struct SectionScale {
  Point origin;
  double mm_per_m;
  Point at(double x_m, double y_m) const {
    return {origin.x_mm + x_m * mm_per_m, origin.y_mm - y_m * mm_per_m};
  }
};

struct Bench {
  double height_m, batter_m, berm_m;  // batter: horizontal run of the face
  double step_m() const { return batter_m + berm_m; }
};

Bench bench_of(const BenchResult& result) {
  const BenchOptions& o = result.options;
  // The run of the face is the berm of an inter-ramp angle equal to it below a vertical face.
  return {o.height_m, berm_width_m(o.height_m, o.face.dip, Angle::degrees(90.0)), o.berm_m};
}

SectionScale fit(const Bench& b, Point top_left, double width_mm, double height_mm) {
  const double across = 2.0 * b.step_m() + 0.7 * b.berm_m;
  const double up = 2.25 * b.height_m;
  const double mm_per_m = std::min(width_mm / across, height_mm / up);
  return {{top_left.x_mm + 0.35 * b.berm_m * mm_per_m, top_left.y_mm + 2.1 * b.height_m * mm_per_m},
          mm_per_m};
}

void add_rock(Group& group, const SectionScale& s, const Bench& b) {
  const double end = 2.0 * b.step_m() + 0.35 * b.berm_m;
  const std::vector<Point> surface{s.at(-0.35 * b.berm_m, 0.0),
                                   s.at(0.0, 0.0),
                                   s.at(b.batter_m, b.height_m),
                                   s.at(b.step_m(), b.height_m),
                                   s.at(b.step_m() + b.batter_m, 2.0 * b.height_m),
                                   s.at(end, 2.0 * b.height_m)};
  std::vector<Point> outline = surface;
  outline.push_back(s.at(end, -0.12 * b.height_m));
  outline.push_back(s.at(-0.35 * b.berm_m, -0.12 * b.height_m));
  Path rock = polygon(outline);
  rock.fill = style::kTints[0];
  add(group, rock);
  add(group, polyline(surface, Stroke{style::kInk, style::kFace_mm, {}, false}));
}

// The broken face of one percentile on the lower bench, with its number on the berm.
void add_break(Group& group, const SectionScale& s, const Bench& b, const BackBreak& p,
               std::size_t row) {
  const double crest = b.batter_m + p.back_break_m;
  const Point top = s.at(crest, b.height_m);
  add(group,
      segment(s.at(0.0, 0.0), top, Stroke{style::kHazard, style::kLine_mm, {1.6, 1.0}, false}));
  const Point label{top.x_mm, top.y_mm - 2.2 - 3.4 * static_cast<double>(row)};
  add(group, segment(top, {top.x_mm, label.y_mm + 0.8},
                     Stroke{style::kHazard, style::kHairline_mm, {}, false}));
  add(group, Text{{label.x_mm + 0.8, label.y_mm},
                  fmt::format("{:g} %: {:.1f} m", p.percentile, p.back_break_m),
                  style::text(style::kNote_mm, style::kHazard),
                  Anchor::start,
                  0.0,
                  1});
}

void add_sizes(Group& group, const SectionScale& s, const Bench& b, const BenchResult& result) {
  const Point face = s.at(b.batter_m * 0.4, b.height_m * 0.42);
  add(group, Text{{face.x_mm - 2.5, face.y_mm},
                  fmt::format("{}, {:g} m", degrees(result.options.face.dip), b.height_m),
                  style::text(style::kText_mm, style::kInk, true),
                  Anchor::end,
                  0.0,
                  1});
  const Point berm = s.at(b.batter_m + b.berm_m / 2.0, b.height_m);
  add(group, Text{{berm.x_mm, berm.y_mm + 4.2},
                  fmt::format("berm {:.1f} m", b.berm_m),
                  style::text(style::kNote_mm),
                  Anchor::middle,
                  0.0,
                  1});
  // What the berm should keep, measured from the upper bench's toe.
  const double keep_from = b.step_m() - result.ritchie_width_m;
  const double y = b.height_m - 7.5 / s.mm_per_m;
  add(group, segment(s.at(keep_from, y), s.at(b.step_m(), y),
                     Stroke{style::kMuted, style::kFace_mm, {}, false}));
  const Point words = s.at(b.step_m(), y);
  add(group, Text{{words.x_mm, words.y_mm + 3.6},
                  fmt::format("0.2 H + 4.5 m = {:.1f} m to keep", result.ritchie_width_m),
                  style::text(style::kNote_mm, style::kMuted),
                  Anchor::end,
                  0.0,
                  1});
}

void add_curve(Group& group, const ChartFrame& frame, const BreakingJoints& joints, Colour colour,
               const char* name, double key_y_mm) {
  std::vector<XY> values;
  for (const BreakingJoints::Step& step : joints.distribution) {
    values.push_back({step.back_break_m, step.share * 100.0});
  }
  const double right = frame.top_left.x_mm + frame.width_mm;
  add(group,
      Text{{right, key_y_mm},
           values.empty() ? fmt::format("{}: none of {:.0f} breaks back", name, joints.tested)
                          : fmt::format("{}: {:.3g} % of {:.0f} break back", name,
                                        joints.share * 100.0, joints.tested),
           style::text(style::kNote_mm, colour, true),
           Anchor::end,
           0.0,
           1});
  if (values.size() < 2) return;
  add(group, curve(frame, values, Stroke{colour, style::kLine_mm, {}, false}));
}

double longest(const BenchResult& result) {
  double most = result.options.berm_m;
  for (const BreakingJoints* joints : {&result.planes, &result.wedges}) {
    if (!joints->distribution.empty()) {
      most = std::max(
          most, std::min(joints->distribution.back().back_break_m, 3.0 * result.options.berm_m));
    }
  }
  return most;
}

void add_chart(Group& page, const BenchResult& result) {
  const ChartFrame frame{{178.0, 62.0},
                         104.0,
                         76.0,
                         axis_for("back-break at the crest, m", 0.0, longest(result), 6),
                         axis_for("share of what breaks back, %", 0.0, 100.0, 5)};
  Group chart{"Distribution of back-break", {}, {}};
  add(chart, draw_axes(frame));
  add(chart, vertical_line(frame, result.options.berm_m, "berm",
                           Stroke{style::kMuted, style::kThin_mm, {1.2, 0.8}, false}));
  add_curve(chart, frame, result.planes, kPlanes, "planes", 44.0);
  add_curve(chart, frame, result.wedges, kWedges, "wedges", 48.5);
  add(page, std::move(chart));
}

std::string answer(const BenchResult& result) {
  if (result.governing.empty()) return "Nothing breaks back from this bench. ";
  std::string words;
  for (const BackBreak& p : result.governing) {
    words += fmt::format(
        "{:g} % of what breaks back takes at most {:.1f} m: an effective face of {:.0f}°, {:.1f} m "
        "of "
        "berm left, {}. ",
        p.percentile, p.back_break_m, p.effective_face.deg(), std::max(p.berm_left_m, 0.0),
        p.keeps_ritchie
            ? "enough"
            : fmt::format("too little (an inter-ramp angle of {:.0f}° would keep enough)",
                          p.inter_ramp_to_keep.deg()));
  }
  return words;
}

}  // namespace

Group draw_bench_section(const BenchResult& result, Point top_left, double width_mm,
                         double height_mm) {
  const Bench b = bench_of(result);
  const SectionScale s = fit(b, top_left, width_mm, height_mm);
  Group group{"Bench in section", answer(result), {}};
  add_rock(group, s, b);
  for (std::size_t i = 0; i < result.governing.size(); ++i) {
    if (result.governing[i].back_break_m > b.berm_m) continue;  // past the berm: told in words
    add_break(group, s, b, result.governing[i], i);
  }
  add_sizes(group, s, b, result);
  return group;
}

Picture bench_sheet(const BenchResult& result, const SheetText& text) {
  SheetText named = text;
  if (named.title.empty()) named.title = "What the bench keeps";
  Picture picture{297.0, 210.0, {named.title, {}, {}}};
  Group& page = picture.content;
  const BenchOptions& o = result.options;
  add_sheet_heading(
      page, named,
      fmt::format("Bench face {}, {:g} m high, berm {:.3g} m, inter-ramp {:.1f}°, friction {}.",
                  dip_and_direction(o.face.dip, o.face.dip_direction), o.height_m, o.berm_m,
                  result.inter_ramp.deg(), degrees(o.settings.friction)),
      picture.width_mm - 28.0);
  add(page, draw_bench_section(result, {14.0, 44.0}, 136.0, 112.0));
  add_chart(page, result);
  add(page,
      Text{{14.0, 176.0},
           answer(result) +
               "A break is taken to run from the toe to the full height of the bench; how far "
               "joints reach is not known here. " +
               std::string(kinematic_caution()) + " " + std::string(practice_caution()),
           style::text(style::kNote_mm, style::kMuted),
           Anchor::start,
           picture.width_mm - 28.0,
           7});
  return picture;
}

}  // namespace brink::plot
