#include "brink/plot/plan.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <vector>

#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/section.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"
#include "brink/record/cautions.hpp"

namespace brink::plot {

namespace {

constexpr double kOffset_mm = 2.6;  // of a strip's middle from the line
constexpr double kStrip_mm = 2.4;

struct DipClass {
  double below_deg;
  Colour colour;
  const char* words;
};
constexpr std::array kDipClasses = {DipClass{1e-9, {0x20, 0x24, 0x2C}, "no face"},
                                    DipClass{40.0, {0xA3, 0x34, 0x12}, "below 40°"},
                                    DipClass{50.0, {0xDA, 0x83, 0x4C}, "40° to below 50°"},
                                    DipClass{60.0, {0xF1, 0xC4, 0x9B}, "50° to below 60°"},
                                    DipClass{70.0, {0xA9, 0xC3, 0xD8}, "60° to below 70°"},
                                    DipClass{80.0, {0x6B, 0x93, 0xB8}, "70° to below 80°"},
                                    DipClass{1e9, {0x2F, 0x5A, 0x86}, "80° and more"}};

// Metres to the page: north up, the whole line within the box.
struct PlanScale {
  double east_m, north_m;  // in the middle of the box
  Point middle;
  double mm_per_m;

  Point place(const CentrelinePoint& point) const {
    return {middle.x_mm + (point.easting_m - east_m) * mm_per_m,
            middle.y_mm - (point.northing_m - north_m) * mm_per_m};
  }
};

PlanScale fit(const std::vector<CentrelinePoint>& points, Point corner, double width_mm,
              double height_mm) {
  const auto [west, east] = std::ranges::minmax(points, {}, &CentrelinePoint::easting_m);
  const auto [south, north] = std::ranges::minmax(points, {}, &CentrelinePoint::northing_m);
  const double across = std::max(east.easting_m - west.easting_m, 1e-3);
  const double up = std::max(north.northing_m - south.northing_m, 1e-3);
  return {(east.easting_m + west.easting_m) / 2.0,
          (north.northing_m + south.northing_m) / 2.0,
          {corner.x_mm + width_mm / 2.0, corner.y_mm + height_mm / 2.0},
          std::min(width_mm / across, height_mm / up)};
}

// To the right of the way from a to b, as a unit on the page.
Point rightwards(Point a, Point b) {
  const double x = b.x_mm - a.x_mm;
  const double y = b.y_mm - a.y_mm;
  const double length = std::max(std::hypot(x, y), 1e-9);
  return {-y / length, x / length};
}

Point shifted(Point at, Point along, double by_mm) {
  return {at.x_mm + along.x_mm * by_mm, at.y_mm + along.y_mm * by_mm};
}

std::string cut_words(const AlignmentSegment& stretch, const SegmentCut& cut) {
  return fmt::format("Chainage {:.0f} to {:.0f} m, {}: faces {:03.0f}, {}", stretch.from_chainage_m,
                     stretch.to_chainage_m, cut.left ? "left" : "right",
                     cut.face.dip_direction.deg(), degrees(cut.face.steepest_dip));
}

void add_cut(Group& page, const PlanScale& scale, const AlignmentResult& result,
             const AlignmentSegment& stretch, const SegmentCut& cut) {
  const auto& points = result.centreline.points;
  const double side = cut.left ? -1.0 : 1.0;
  Group group{cut_words(stretch, cut), {}, {}};
  for (std::size_t i = stretch.first; i < stretch.last; ++i) {
    const Point a = scale.place(points[i]);
    const Point b = scale.place(points[i + 1]);
    const Point right = rightwards(a, b);
    add(group, segment(shifted(a, right, side * kOffset_mm), shifted(b, right, side * kOffset_mm),
                       Stroke{dip_colour(cut.face.steepest_dip), kStrip_mm, {}, false}));
  }
  add(page, std::move(group));
}

// Labels that stand clear of those before them; the others are left out, the table has them all.
class Labels {
 public:
  void add_to(Group& page, Text text) {
    const TextSize size = measure(text);
    text.at.y_mm += size.ascent_mm / 2.0;
    for (const Point& other : taken_) {
      if (std::abs(other.x_mm - text.at.x_mm) < size.width_mm + 1.0 &&
          std::abs(other.y_mm - text.at.y_mm) < size.height_mm) {
        return;
      }
    }
    taken_.push_back(text.at);
    add(page, std::move(text));
  }

 private:
  std::vector<Point> taken_;
};

void add_labels(Group& page, const PlanScale& scale, const AlignmentResult& result) {
  Labels labels;
  const auto& points = result.centreline.points;
  for (const AlignmentSegment& stretch : result.segments) {
    const Point a = scale.place(points[stretch.first]);
    const Point b = scale.place(points[stretch.last]);
    const Point right = rightwards(a, b);
    const Point inner = scale.place(points[(stretch.first + stretch.last) / 2]);
    const Point middle = stretch.last - stretch.first > 1
                             ? inner
                             : Point{(a.x_mm + b.x_mm) / 2.0, (a.y_mm + b.y_mm) / 2.0};
    for (const SegmentCut& cut : stretch.cuts) {
      const Point at = shifted(middle, right, (cut.left ? -1.0 : 1.0) * 8.5);
      labels.add_to(page,
                    Text{at, degrees(cut.face.steepest_dip),
                         style::text(style::kText_mm, style::kInk, true), Anchor::middle, 0.0, 1});
    }
  }
  for (const AlignmentSegment& stretch : result.segments) {
    const Point a = scale.place(points[stretch.first]);
    const Point right = rightwards(a, scale.place(points[stretch.last]));
    add(page, segment(shifted(a, right, -4.6), shifted(a, right, 4.6),
                      Stroke{style::kInk, style::kThin_mm, {}, false}));
    labels.add_to(page,
                  Text{shifted(a, right, 13.0), fmt::format("{:.0f}", stretch.from_chainage_m),
                       style::text(style::kNote_mm, style::kMuted), Anchor::middle, 0.0, 1});
  }
}

void add_key(Group& page, const PlanScale& scale) {
  Point at{14.0, 186.0};
  for (const DipClass& dips : kDipClasses) {
    Path box = polygon({{at.x_mm, at.y_mm - 2.6},
                        {at.x_mm + 6.0, at.y_mm - 2.6},
                        {at.x_mm + 6.0, at.y_mm},
                        {at.x_mm, at.y_mm}});
    box.fill = dips.colour;
    add(page, box);
    add(page, Text{{at.x_mm + 7.5, at.y_mm - 0.3},
                   dips.words,
                   style::text(style::kNote_mm, style::kMuted),
                   Anchor::start,
                   0.0,
                   1});
    at.x_mm += 34.0;
  }
  const double bar_m = scale_bar_m(1.0 / scale.mm_per_m);
  const double bar_mm = bar_m * scale.mm_per_m;
  add(page, segment({283.0 - bar_mm, 176.0}, {283.0, 176.0},
                    Stroke{style::kInk, style::kFace_mm, {}, false}));
  add(page, Text{{283.0 - bar_mm / 2.0, 174.2},
                 fmt::format("{:g} m", bar_m),
                 style::text(style::kNote_mm),
                 Anchor::middle,
                 0.0,
                 1});
  Path north = polygon({{280.0, 24.0}, {282.2, 30.0}, {277.8, 30.0}});
  north.fill = style::kInk;
  add(page, north);
  add(page, Text{{280.0, 34.0},
                 "N",
                 style::text(style::kText_mm, style::kInk, true),
                 Anchor::middle,
                 0.0,
                 1});
}

std::string caption() {
  return "A strip beside the line is a cut on that side, coloured by the steepest dip of its face; "
         "grey numbers are chainage in m. " +
         std::string(kinematic_caution()) + " " + std::string(practice_caution());
}

}  // namespace

Colour dip_colour(Angle dip) {
  return std::ranges::find_if(kDipClasses,
                              [&](const DipClass& c) { return dip.deg() < c.below_deg; })
      ->colour;
}

Picture plan_sheet(const AlignmentResult& result, const SheetText& text) {
  SheetText named = text;
  if (named.title.empty()) named.title = "How steep along the line";
  Picture picture{297.0, 210.0, {named.title, {}, {}}};
  Group& page = picture.content;
  const auto& points = result.centreline.points;
  const std::string facts = fmt::format(
      "{} {} of one direction, chainage {:.0f} to {:.0f} m, friction {}.", result.segments.size(),
      result.segments.size() == 1 ? "segment" : "segments", points.front().chainage_m,
      points.back().chainage_m, degrees(result.options.search.settings.friction));
  add_sheet_heading(page, named, facts, picture.width_mm - 28.0);
  const PlanScale scale = fit(points, {34.0, 48.0}, 222.0, 114.0);
  for (const AlignmentSegment& stretch : result.segments) {
    for (const SegmentCut& cut : stretch.cuts) add_cut(page, scale, result, stretch, cut);
  }
  std::vector<Point> line;
  for (const CentrelinePoint& point : points) line.push_back(scale.place(point));
  add(page, polyline(line, Stroke{style::kInk, style::kLine_mm, {}, true}));
  add_labels(page, scale, result);
  add_key(page, scale);
  add(page, Text{{14.0, 194.0},
                 caption(),
                 style::text(style::kNote_mm, style::kMuted),
                 Anchor::start,
                 picture.width_mm - 28.0,
                 3});
  return picture;
}

}  // namespace brink::plot
