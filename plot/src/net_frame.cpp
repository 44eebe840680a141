#include "brink/plot/net_frame.hpp"

#include <cmath>

#include "brink/plot/style.hpp"

namespace brink::plot {

namespace {

// Ticks and the north mark grow with the net, but more slowly.
double detail_mm(const NetFrame& frame) {
  return 0.26 * std::sqrt(frame.radius_mm);
}

Group north_mark(const NetFrame& frame) {
  const double d = detail_mm(frame);
  const double top = frame.centre.y_mm - frame.radius_mm;
  const double x = frame.centre.x_mm;
  Group group;
  Path arrow =
      polygon({{x, top - 2.6 * d}, {x - 0.6 * d, top - 1.25 * d}, {x + 0.6 * d, top - 1.25 * d}});
  arrow.fill = style::kInk;
  add(group, arrow);
  const double size = 0.75 * d + 1.5;
  add(group, Text{{x + 0.95 * d, top - 1.3 * d},
                  "N",
                  style::text(size, style::kInk, true),
                  Anchor::start,
                  0.0,
                  1});
  return group;
}

}  // namespace

Point on_page(const NetFrame& frame, const Point2& net) {
  return {frame.centre.x_mm + frame.radius_mm * net.x(),
          frame.centre.y_mm - frame.radius_mm * net.y()};
}

Point on_page(const NetFrame& frame, const Vector3& axis) {
  return on_page(frame, project(frame.projection, lower_end(axis)));
}

Point beyond_rim(const NetFrame& frame, Angle azimuth, double beyond_mm) {
  const SinCos a = sincos(azimuth);
  const double r = frame.radius_mm + beyond_mm;
  return {frame.centre.x_mm + r * a.sin, frame.centre.y_mm - r * a.cos};
}

std::vector<Step> steps_of(const NetFrame& frame, const NetPiece& piece) {
  std::vector<Step> steps;
  if (const auto* arc = std::get_if<NetArc>(&piece)) {
    // The page's y runs down, so angles change their sense.
    const Point start = on_page(frame, ends(piece).first);
    steps.emplace_back(MoveTo{start});
    steps.emplace_back(ArcTo{on_page(frame, arc->centre), arc->radius * frame.radius_mm,
                             -arc->start, -arc->sweep});
    return steps;
  }
  for (const Point2& p : std::get<NetPolyline>(piece).points) {
    if (steps.empty()) {
      steps.emplace_back(MoveTo{on_page(frame, p)});
    } else {
      steps.emplace_back(LineTo{on_page(frame, p)});
    }
  }
  return steps;
}

Path traced(const NetFrame& frame, const std::vector<NetPiece>& pieces, Stroke stroke) {
  Path path{{}, std::move(stroke), {}};
  for (const NetPiece& piece : pieces) {
    for (const Step& step : steps_of(frame, piece)) path.steps.push_back(step);
  }
  return path;
}

Group rim_and_north(const NetFrame& frame) {
  Group group;
  Path rim = circle(frame.centre, frame.radius_mm);
  rim.stroke = Stroke{style::kInk, 0.3, {}, false};
  add(group, rim);
  Path ticks{{}, Stroke{style::kInk, style::kThin_mm, {}, false}, {}};
  const double d = detail_mm(frame);
  for (int azimuth = 0; azimuth < 360; azimuth += 10) {
    const Angle a = Angle::degrees(azimuth);
    ticks.steps.emplace_back(MoveTo{beyond_rim(frame, a, 0.0)});
    ticks.steps.emplace_back(LineTo{beyond_rim(frame, a, azimuth % 30 == 0 ? 0.75 * d : 0.35 * d)});
  }
  add(group, ticks);
  add(group, north_mark(frame));
  return group;
}

Group grid_lines(const NetFrame& frame, int step_deg) {
  std::vector<NetPiece> pieces;
  const Vector3 north = Vector3::UnitY();
  for (int step = step_deg; step < 90; step += step_deg) {
    const Angle angle = Angle::degrees(step);
    pieces.push_back(great_circle_on_net(frame.projection, Plane{angle, Angle::degrees(90.0)}));
    pieces.push_back(great_circle_on_net(frame.projection, Plane{angle, Angle::degrees(270.0)}));
    for (NetPiece& piece : cone_on_net(frame.projection, north, angle)) {
      pieces.push_back(std::move(piece));
    }
  }
  for (const double direction : {0.0, 90.0}) {
    pieces.push_back(great_circle_on_net(frame.projection,
                                         Plane{Angle::degrees(90.0), Angle::degrees(direction)}));
  }
  Group group;
  add(group, traced(frame, pieces, {style::kFaint, style::kHairline_mm, {}, false}));
  return group;
}

double north_height_mm(const NetFrame& frame) {
  return 3.0 * detail_mm(frame);
}

Group face_curve(const NetFrame& frame, const Face& face, Stroke stroke) {
  Group group;
  const Vector3 normal = outward_normal(face);
  Stroke thin{stroke.colour, 0.45 * stroke.width_mm, {}, false};
  Path hachures{{}, thin, {}};
  const double length = 2.6 * stroke.width_mm / frame.radius_mm;
  constexpr int kEvery = 5;
  for (int along = -90 + kEvery; along <= 90 - kEvery; along += kEvery) {
    const Vector3 v = circle_point({normal, 0.0}, Angle::degrees(along));
    const Point2 from = project(frame.projection, v);
    const Point2 towards =
        project(frame.projection, Vector3((v + 0.01 * normal).normalized())) - from;
    hachures.steps.emplace_back(MoveTo{on_page(frame, from)});
    hachures.steps.emplace_back(
        LineTo{on_page(frame, Point2(from + length * towards.normalized()))});
  }
  add(group, hachures);
  add(group, traced(frame, {great_circle_on_net(frame.projection, normal)}, std::move(stroke)));
  return group;
}

std::pair<Angle, Angle> trace_ends(Angle dip_direction) {
  return {wrap_360(dip_direction + Angle::degrees(90.0)),
          wrap_360(dip_direction - Angle::degrees(90.0))};
}

}  // namespace brink::plot
