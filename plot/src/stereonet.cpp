#include "brink/plot/stereonet.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/labels.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"

namespace brink::plot {

namespace {

// From so many readings up contour lines go over the poles, which would hide them, and strays
// become dots: circles that small can't be told from dots and fill the file.
constexpr std::size_t kCrowd = 3000;
constexpr double kGrain_mm = 0.05;

bool is_crowd(const Readings& readings) {
  return readings.size() > kCrowd;
}

// Of readings in no set.
style::SetStyle stray_style(const Readings& readings) {
  return is_crowd(readings) ? style::SetStyle{style::kPale, Shape::disc}
                            : style::SetStyle{style::kMuted, Shape::ring};
}

Colour tint(std::size_t level, std::size_t levels) {
  // Up to as many levels as tints take them in order; more share them evenly.
  const std::size_t tints = style::kTints.size();
  return style::kTints[levels <= tints ? level : level * tints / levels];
}

std::vector<Step> outline(const NetFrame& frame, const std::vector<Vector3>& loop) {
  std::vector<Point> points;
  for (const Vector3& v : loop) points.push_back(on_page(frame, v));
  return polygon(points).steps;
}

Group draw_density(const NetContent& content, const NetFrame& frame) {
  Group group{"Density of poles", {}, {}};
  for (std::size_t i = 0; i < content.levels.size(); ++i) {
    Path area{{}, {}, tint(i, content.levels.size())};
    for (const auto& loop : level_area(*content.density, content.levels[i])) {
      for (const Step& step : outline(frame, loop)) area.steps.push_back(step);
    }
    add(group, std::move(area));
  }
  return group;
}

Group draw_contours(const NetContent& content, const NetFrame& frame) {
  const bool crowded = is_crowd(content.readings);
  Path lines{{},
             Stroke{crowded ? style::kInk : style::kTintEdge,
                    crowded ? style::kThin_mm : style::kHairline_mm,
                    {},
                    false},
             {}};
  for (const double level : content.levels) {
    for (const LevelLine& line : level_lines(*content.density, level)) {
      for (const auto& piece : line.pieces) {
        std::vector<Point> points;
        for (const Vector3& v : piece) points.push_back(on_page(frame, v));
        for (const Step& step : polyline(points, {}).steps) lines.steps.push_back(step);
      }
    }
  }
  Group group;
  add(group, std::move(lines));
  return group;
}

Group draw_mean_planes(const NetContent& content, const NetFrame& frame) {
  Group group{"Mean planes of the sets", {}, {}};
  for (std::size_t i = 0; i < content.sets.sets.size(); ++i) {
    const auto& set = content.sets.sets[i];
    add(group, traced(frame, {great_circle_on_net(frame.projection, set.mean)},
                      {style::set_style(i + 1).colour, style::kLine_mm, {}, false}));
  }
  return group;
}

Stroke face_stroke(const NetContent& content, std::size_t face) {
  const bool marked = !content.marked_face || *content.marked_face == face;
  return {marked ? style::kInk : style::kMuted,
          marked ? style::kFace_mm : 0.5 * style::kFace_mm,
          {},
          false};
}

Group draw_faces(const NetContent& content, const NetFrame& frame) {
  Group group{"Faces, hachured on the free side", {}, {}};
  for (std::size_t i = 0; i < content.faces.size(); ++i) {
    add(group, face_curve(frame, content.faces[i], face_stroke(content, i)));
  }
  return group;
}

Group draw_poles(const NetContent& content, const NetFrame& frame) {
  Group group{"Poles", {}, {}};
  const double size = pole_size_mm(frame, content.readings.size());
  const auto stray = stray_style(content.readings);
  const auto poles = [&](int set) {
    return pole_places(frame, content.readings, content.sets.assignment, set);
  };
  add(group, Symbols{stray.shape, size, 0.16 * size, stray.colour, poles(0)});
  // The smallest set last, so that it isn't buried.
  for (std::size_t i = 0; i < content.sets.sets.size(); ++i) {
    const auto look = style::set_style(i + 1);
    add(group, Symbols{look.shape, size, 0.3 * size, look.colour, poles(static_cast<int>(i) + 1)});
  }
  return group;
}

// Great circles of the sets and the faces, and the rim.
Group draw_planes(const NetContent& content, const NetFrame& frame) {
  Group group;
  add(group, draw_mean_planes(content, frame));
  add(group, draw_faces(content, frame));
  add(group, rim_and_north(frame));
  return group;
}

Vector3 mean_pole(const SetStatistics& set) {
  return direction(pole(set.mean));
}

void add_cone(Group& group, const NetFrame& frame, const SetStatistics& set,
              const std::optional<Angle>& cone, const Stroke& stroke) {
  if (!cone || cone->deg() <= 0.0 || cone->deg() >= 90.0) return;
  add(group, traced(frame, cone_on_net(frame.projection, mean_pole(set), *cone), stroke));
}

Group draw_means(const NetContent& content, const NetFrame& frame) {
  Group group{"Means of the sets with their cones", {}, {}};
  std::vector<Point> means;
  for (std::size_t i = 0; i < content.sets.sets.size(); ++i) {
    const SetStatistics& set = content.sets.sets[i];
    const Colour colour = is_crowd(content.readings) ? style::kInk : style::set_style(i + 1).colour;
    add_cone(group, frame, set, set.variability_cone, {colour, 0.3, {1.4, 0.9}, false});
    add_cone(group, frame, set, set.confidence_cone, {style::kWhite, 0.75, {}, false});
    add_cone(group, frame, set, set.confidence_cone, {style::kInk, 0.25, {}, false});
    means.push_back(on_page(frame, mean_pole(set)));
  }
  add(group, Symbols{Shape::cross, 3.8, 1.1, style::kWhite, means});
  add(group, Symbols{Shape::cross, 3.4, 0.45, style::kInk, means});
  return group;
}

std::vector<RimLabel> rim_labels(const NetContent& content) {
  std::vector<RimLabel> labels;
  for (std::size_t i = 0; i < content.faces.size(); ++i) {
    const Face& face = content.faces[i];
    const auto [end, other] = trace_ends(face.dip_direction);
    const Colour colour = face_stroke(content, i).colour;
    labels.push_back({"face",
                      dip_and_direction(face.dip, face.dip_direction),
                      style::text(style::kLabel_mm, colour, true),
                      end,
                      other,
                      {}});
  }
  for (std::size_t i = 0; i < content.sets.sets.size(); ++i) {
    const SetStatistics& set = content.sets.sets[i];
    const auto look = style::set_style(i + 1);
    const auto [end, other] = trace_ends(set.mean.dip_direction);
    labels.push_back({set.name, dip_and_direction(set.mean.dip, set.mean.dip_direction),
                      style::text(style::kLabel_mm, look.colour, true), end, other, look.shape});
  }
  return labels;
}

bool has_cone(const SetsResult& sets, std::optional<Angle> SetStatistics::*cone) {
  return std::any_of(sets.sets.begin(), sets.sets.end(),
                     [&](const SetStatistics& set) { return (set.*cone).has_value(); });
}

// Entries of the key are set one after the other; each returns its width.
class KeyWriter {
 public:
  KeyWriter(Point at, double width_mm) : at_(at), left_(at.x_mm), right_(at.x_mm + width_mm) {}

  void entry(double mark_width, const std::string& words, const auto& draw) {
    Text text{{}, words, style::text(style::kNote_mm, style::kMuted), Anchor::start, 0.0, 1};
    const double width = mark_width + 1.2 + measure(text).width_mm;
    if (at_.x_mm > left_ && at_.x_mm + width > right_) at_ = {left_, at_.y_mm + 4.4};
    draw(Point{at_.x_mm, at_.y_mm - 0.36 * style::kNote_mm});
    text.at = {at_.x_mm + mark_width + 1.2, at_.y_mm};
    add(group_, std::move(text));
    at_.x_mm += width + 5.0;
  }
  Group& group() { return group_; }

 private:
  Group group_;
  Point at_;
  double left_, right_;
};

void add_swatches(Group& group, const std::vector<double>& levels, Point at) {
  for (std::size_t i = 0; i < levels.size(); ++i) {
    const double x = at.x_mm + 4.0 * static_cast<double>(i);
    Path box = polygon({{x, at.y_mm - 1.3},
                        {x + 4.0, at.y_mm - 1.3},
                        {x + 4.0, at.y_mm + 1.3},
                        {x, at.y_mm + 1.3}});
    box.fill = tint(i, levels.size());
    box.stroke = Stroke{style::kTintEdge, style::kHairline_mm, {}, false};
    add(group, std::move(box));
  }
}

std::string level_words(const std::vector<double>& levels) {
  std::string list;
  for (const double level : levels) list += (list.empty() ? "" : ", ") + shortest(level);
  return fmt::format("{} times uniform", list);
}

}  // namespace

std::vector<Point> pole_places(const NetFrame& frame, const Readings& readings,
                               const std::vector<int>& assignment, int set) {
  std::vector<Point> places;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (assignment[i] != set) continue;
    Point place = on_page(frame, readings.normals[i]);
    if (is_crowd(readings)) {
      // Symbols closer than the eye can tell become one.
      place = {std::round(place.x_mm / kGrain_mm) * kGrain_mm,
               std::round(place.y_mm / kGrain_mm) * kGrain_mm};
    }
    places.push_back(place);
  }
  std::sort(places.begin(), places.end(), [](const Point& a, const Point& b) {
    return a.x_mm != b.x_mm ? a.x_mm < b.x_mm : a.y_mm < b.y_mm;
  });
  places.erase(std::unique(places.begin(), places.end()), places.end());
  return places;
}

double pole_size_mm(const NetFrame& frame, std::size_t readings) {
  const double crowd = static_cast<double>(std::max<std::size_t>(readings, 60)) / 60.0;
  const double full = 0.55 + 0.017 * frame.radius_mm;
  return std::max(0.35, full * std::pow(crowd, -0.17));
}

Group draw_stereonet(const NetContent& content, const NetFrame& frame, const LabelRoom& room) {
  Group group{"Stereonet", {}, {}};
  group.description = fmt::format("{} projection, lower hemisphere, {} poles",
                                  projection_name(frame.projection), content.readings.size());
  for (const SetStatistics& set : content.sets.sets) {
    group.description +=
        fmt::format("; {} {} with {} readings", set.name,
                    dip_and_direction(set.mean.dip, set.mean.dip_direction), set.count);
  }
  if (content.density != nullptr) add(group, draw_density(content, frame));
  add(group, grid_lines(frame, 10));
  if (is_crowd(content.readings)) {
    add(group, draw_poles(content, frame));
    if (content.density != nullptr) add(group, draw_contours(content, frame));
    add(group, draw_planes(content, frame));
  } else {
    if (content.density != nullptr) add(group, draw_contours(content, frame));
    add(group, draw_planes(content, frame));
    add(group, draw_poles(content, frame));
  }
  add(group, draw_means(content, frame));
  const auto labels = rim_labels(content);
  add(group, draw_rim_labels(frame, labels,
                             place_rim_labels(frame, labels, room.left_mm, room.right_mm,
                                              room.top_mm, room.bottom_mm)));
  return group;
}

Group draw_key(const NetContent& content, Point at, double width_mm) {
  KeyWriter key(at, width_mm);
  Group& group = key.group();
  if (content.sets.unassigned > 0) {
    const bool any_set = !content.sets.sets.empty();
    key.entry(1.8, any_set ? "pole of a reading in no set" : "pole of a reading", [&](Point p) {
      const auto stray = stray_style(content.readings);
      add(group, Symbols{stray.shape, 1.7, 0.27, stray.colour, {{p.x_mm + 0.9, p.y_mm}}});
    });
  }
  if (!content.sets.sets.empty()) {
    key.entry(3.0, "mean pole of a set", [&](Point p) {
      add(group, Symbols{Shape::cross, 2.8, 0.4, style::kInk, {{p.x_mm + 1.5, p.y_mm}}});
    });
  }
  if (has_cone(content.sets, &SetStatistics::confidence_cone)) {
    key.entry(5.0, "95 % cone on the mean", [&](Point p) {
      add(group, segment(p, {p.x_mm + 5.0, p.y_mm}, {style::kInk, 0.25, {}, false}));
    });
  }
  if (has_cone(content.sets, &SetStatistics::variability_cone)) {
    key.entry(5.0, "cone that holds 68 % of the set", [&](Point p) {
      add(group, segment(p, {p.x_mm + 5.0, p.y_mm}, {style::kInk, 0.25, {1.4, 0.9}, false}));
    });
  }
  if (content.density != nullptr && !content.levels.empty()) {
    key.entry(4.0 * static_cast<double>(content.levels.size()),
              "density of poles from " + level_words(content.levels),
              [&](Point p) { add_swatches(group, content.levels, p); });
  }
  return std::move(key.group());
}

}  // namespace brink::plot
