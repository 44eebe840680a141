#include "brink/plot/mode_net.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/hatch.hpp"
#include "brink/plot/stereonet.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"

namespace brink::plot {

namespace {

constexpr double kTitleGap_mm = 1.6;
constexpr double kHatch_mm = 1.15;

const ModeCount& counts_of(const FaceKinematics& face, Mode mode) {
  switch (mode) {
    case Mode::planar_sliding:
      return face.planar_sliding;
    case Mode::wedge_sliding:
      return face.wedge_sliding;
    case Mode::flexural_toppling:
      return face.flexural_toppling;
    default:
      return face.block_toppling;
  }
}

ModeSettings settings_of(const KinematicsOptions& options) {
  return {options.upper, options.friction, options.strike_tolerance, options.toppling_tolerance};
}

Group draw_region(const NetFrame& frame, const Region& region) {
  Group group;
  std::vector<std::vector<Point>> outlines;
  Path edge{{}, Stroke{style::kHazard, 0.22, {}, false}, {}};
  for (const SphereLoop& loop : region.loops) {
    std::vector<Point> outline;
    for (const Vector3& v : loop) outline.push_back(on_page(frame, project(frame.projection, v)));
    for (const Step& step : polygon(outline).steps) edge.steps.push_back(step);
    outlines.push_back(std::move(outline));
  }
  add(group, hatched(outlines, Angle::degrees(45.0), kHatch_mm, {style::kHazard, 0.13, {}, false}));
  add(group, edge);
  return group;
}

void sort_and_thin(std::vector<Point>& places) {
  std::sort(places.begin(), places.end(), [](const Point& a, const Point& b) {
    return a.x_mm != b.x_mm ? a.x_mm < b.x_mm : a.y_mm < b.y_mm;
  });
  places.erase(std::unique(places.begin(), places.end()), places.end());
}

// Every axis as a dot: those that the mode's test passes in the warm colour, on top.
Group draw_axes(const ModeNetContent& content, const NetFrame& frame,
                const std::vector<Vector3>& axes) {
  const FaceLimits limits = prepare_limits(content.face.face, settings_of(content.options));
  std::vector<Point> inside, outside;
  for (const Vector3& v : axes) {
    (in_region(content.mode, limits, v) ? inside : outside).push_back(on_page(frame, v));
  }
  sort_and_thin(inside);
  sort_and_thin(outside);
  const double size = pole_size_mm(frame, axes.size());
  Group group;
  add(group, Symbols{Shape::disc, size, 0.0, style::kPale, std::move(outside)});
  add(group, Symbols{Shape::disc, 1.15 * size, 0.0, style::kHazard, std::move(inside)});
  return group;
}

std::uint64_t pair_total(std::size_t readings) {
  const std::uint64_t n = readings;
  return n < 2 ? 0 : n * (n - 1) / 2;
}

// What else the reader of this net must know.
std::string note_of(const ModeNetContent& content) {
  if (content.mode != Mode::block_toppling) return {};
  const FaceKinematics& face = content.face;
  if (face.bases == 0) return "no reading makes a base to topple on";
  return fmt::format("bases: {} {}, {} of them sliding too", grouped(face.bases),
                     face.bases == 1 ? "reading" : "readings", grouped(face.sliding_bases));
}

void add_caption(Group& group, const NetFrame& frame, const CountInWords& words,
                 const std::string& note) {
  const double left = frame.centre.x_mm - frame.radius_mm;
  const double width = 2.0 * frame.radius_mm + 8.0;
  double y = frame.centre.y_mm + frame.radius_mm + 7.0;
  const Colour colour = words.any ? style::kHazard : style::kMuted;
  add(group, Text{{left, y},
                  words.count,
                  style::text(style::kText_mm + 0.2, colour, true),
                  Anchor::start,
                  width,
                  1});
  y += 4.2;
  const TextStyle small = style::text(style::kNote_mm, style::kMuted);
  for (const std::string& sentence : {words.leading, note}) {
    if (sentence.empty()) continue;
    const Text text{{left, y}, sentence, small, Anchor::start, width, 2};
    add(group, text);
    y += 3.6 * measure(text).lines;
  }
}

// The pair with this number, counting (1,0), (2,0), (2,1), (3,0) ...
std::pair<std::size_t, std::size_t> pair_of(std::uint64_t number) {
  auto high =
      static_cast<std::uint64_t>((1.0 + std::sqrt(1.0 + 8.0 * static_cast<double>(number))) / 2.0);
  while (high * (high - 1) / 2 > number) --high;
  while ((high + 1) * high / 2 <= number) ++high;
  return {high, number - high * (high - 1) / 2};
}

}  // namespace

std::vector<Vector3> lines_for_drawing(const Readings& readings, std::size_t most) {
  const std::uint64_t total = pair_total(readings.size());
  const bool all = total <= most;
  const std::uint64_t wanted = all ? total : most;
  std::vector<Vector3> lines;
  for (std::uint64_t k = 0; k < wanted; ++k) {
    // One pair at random from each of `most` equal stretches of the list of pairs.
    const auto [a, b] = pair_of(
        all ? k
            : std::min(total - 1, static_cast<std::uint64_t>(
                                      (static_cast<double>(k) + random_uniform(1, 0, k)) *
                                      static_cast<double>(total) / static_cast<double>(most))));
    const auto line = intersection_vector(readings.normals[a], readings.normals[b]);
    if (line) lines.push_back(*line);
  }
  return lines;
}

bool lines_are_thinned(const Readings& readings) {
  return pair_total(readings.size()) > kMostLines;
}

double mode_net_above_mm(const NetFrame& frame) {
  return frame.radius_mm + north_height_mm(frame) + kTitleGap_mm + style::kHeading_mm;
}

double mode_net_below_mm(const NetFrame& frame) {
  return frame.radius_mm + 7.0 + 4.2 + 3.7 + 1.0;
}

Group draw_mode_net(const ModeNetContent& content, const NetFrame& frame) {
  const ModeCount& counts = counts_of(content.face, content.mode);
  const Region region =
      admissible_region(content.mode, content.face.face, settings_of(content.options));
  const CountInWords words =
      count_in_words(content.mode, counts, content.sets, region.loops.empty());
  Group group{std::string(mode_name(content.mode)), words.count + "; " + words.leading, {}};
  const double left = frame.centre.x_mm - frame.radius_mm;
  add(group,
      Text{{left, frame.centre.y_mm - frame.radius_mm - north_height_mm(frame) - kTitleGap_mm},
           std::string(mode_name(content.mode)),
           style::text(style::kHeading_mm, style::kInk, true),
           Anchor::start,
           0.0,
           1});
  const std::vector<Vector3> axes =
      region.of_poles ? content.readings.normals : lines_for_drawing(content.readings, kMostLines);
  add(group, grid_lines(frame, 30));
  add(group, draw_region(frame, region));
  add(group, draw_axes(content, frame, axes));
  add(group, face_curve(frame, content.face.face, {style::kInk, 0.6, {}, false}));
  add(group, rim_and_north(frame));
  add_caption(group, frame, words, note_of(content));
  return group;
}

}  // namespace brink::plot
