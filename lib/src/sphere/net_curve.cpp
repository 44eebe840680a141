#include "brink/sphere/net_curve.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace brink {

namespace {

// A circle's own frame: `low` points from its centre to its lowest point.
struct CircleFrame {
  Vector3 centre;
  Vector3 low;    // both of the circle's radius
  Vector3 along;  // a quarter turn further, anticlockwise about the axis

  Vector3 at(Angle t) const {
    const SinCos s = sincos(t);
    return centre + s.cos * low + s.sin * along;
  }
};

double circle_radius(const SphereCircle& circle) {
  return std::sqrt(std::max(0.0, (1.0 - circle.cosine) * (1.0 + circle.cosine)));
}

CircleFrame frame_of(const SphereCircle& circle) {
  const Vector3& a = circle.axis;
  const double across = std::hypot(a.x(), a.y());
  // Downhill at right angles to the axis; east where the axis is vertical.
  const Vector3 low = across > 0.0
                          ? Vector3(a.x() * a.z() / across, a.y() * a.z() / across, -across)
                          : Vector3::UnitX();
  const double radius = circle_radius(circle);
  return {circle.cosine * a, radius * low, radius * a.cross(low)};
}

NetPiece straight(const Point2& from, const Point2& to) {
  return NetPolyline{{from, to}};
}

// The angle by which `to` is turned against `from`, -180..180 degrees.
Angle turn(const Point2& from, const Point2& to) {
  return atan2(from.x() * to.y() - from.y() * to.x(), from.dot(to));
}

NetPiece equal_angle_arc(const SphereCircle& circle, const CircleFrame& frame, Angle from,
                         Angle to) {
  const auto projected = [&](Angle t) { return project(Projection::equal_angle, frame.at(t)); };
  const double d = circle.cosine - circle.axis.z();
  const double radius = circle_radius(circle);
  if (radius >= kStraightRadius * std::abs(d)) return straight(projected(from), projected(to));
  NetArc arc{Point2(circle.axis.x(), circle.axis.y()) / d, radius / std::abs(d), {}, {}};
  const Point2 first = projected(from) - arc.centre;
  arc.start = atan2(first.y(), first.x());
  if (to - from >= Angle::degrees(360.0)) {
    arc.sweep = Angle::degrees(360.0);
    return arc;
  }
  // A third of a circle on the sphere may be more than half of its image, so the sweep is added up
  // from short steps, none of which can reach 180 degrees on the net.
  constexpr int kSteps = 16;
  Point2 before = first;
  for (int i = 1; i <= kSteps; ++i) {
    const Point2 next =
        projected(from + (to - from) * (static_cast<double>(i) / kSteps)) - arc.centre;
    arc.sweep = arc.sweep + turn(before, next);
    before = next;
  }
  return arc;
}

// Adds the points between `from` and `to`, `to` included, halving until the middle of each step is
// within the tolerance of its chord.
void refine(Projection projection, const CircleFrame& frame, Angle from, Angle to, int depth,
            std::vector<Point2>& points) {
  const Point2 first = points.back();
  const Point2 last = project(projection, frame.at(to));
  const Angle middle = (from + to) * 0.5;
  const Point2 between = project(projection, frame.at(middle));
  const Point2 chord = last - first;
  const double length = chord.norm();
  const Point2 offset = between - first;
  const double off = length > 0.0
                         ? std::abs(chord.x() * offset.y() - chord.y() * offset.x()) / length
                         : offset.norm();
  if (off <= kCurveTolerance || depth == 0) {
    points.push_back(last);
    return;
  }
  refine(projection, frame, from, middle, depth - 1, points);
  refine(projection, frame, middle, to, depth - 1, points);
}

NetPiece equal_area_polyline(const CircleFrame& frame, Angle from, Angle to) {
  NetPolyline line;
  line.points.push_back(project(Projection::equal_area, frame.at(from)));
  // Eight steps to begin with: no bend can hide between them.
  constexpr int kSteps = 8;
  constexpr int kDeepest = 12;
  for (int i = 0; i < kSteps; ++i) {
    const Angle step = (to - from) * (1.0 / kSteps);
    refine(Projection::equal_area, frame, from + step * i,
           i + 1 == kSteps ? to : from + step * (i + 1), kDeepest, line.points);
  }
  return line;
}

Point2 arc_point(const NetArc& arc, Angle at) {
  const SinCos s = sincos(at);
  return arc.centre + arc.radius * Point2(s.cos, s.sin);
}

}  // namespace

std::pair<Point2, Point2> ends(const NetPiece& piece) {
  if (const auto* line = std::get_if<NetPolyline>(&piece)) {
    return {line->points.front(), line->points.back()};
  }
  const auto& arc = std::get<NetArc>(piece);
  return {arc_point(arc, arc.start), arc_point(arc, arc.start + arc.sweep)};
}

std::vector<Point2> sampled(const NetPiece& piece, double tolerance) {
  if (const auto* line = std::get_if<NetPolyline>(&piece)) return line->points;
  const auto& arc = std::get<NetArc>(piece);
  // A step of angle a leaves its chord by r (1 - cos(a/2)), about r a^2/8.
  const double step = std::sqrt(8.0 * tolerance / arc.radius);
  const int count = std::max(1, static_cast<int>(std::ceil(std::abs(arc.sweep.rad()) / step)));
  std::vector<Point2> points;
  for (int i = 0; i <= count; ++i) {
    points.push_back(arc_point(arc, arc.start + arc.sweep * (static_cast<double>(i) / count)));
  }
  return points;
}

Vector3 circle_point(const SphereCircle& circle, Angle t) {
  return frame_of(circle).at(t);
}

Angle lower_half_opening(const SphereCircle& circle) {
  // Height of the point at t: cosine z - radius across cos t; it is 0 where cos t is:
  const double level = circle.cosine * circle.axis.z();
  const double reach = circle_radius(circle) * std::hypot(circle.axis.x(), circle.axis.y());
  if (level <= -reach) return Angle::degrees(180.0);
  if (level >= reach) return {};
  return acos(level / reach);
}

NetPiece arc_on_net(Projection projection, const SphereCircle& circle, Angle from, Angle to) {
  const CircleFrame frame = frame_of(circle);
  return projection == Projection::equal_angle ? equal_angle_arc(circle, frame, from, to)
                                               : equal_area_polyline(frame, from, to);
}

std::vector<NetPiece> circle_on_net(Projection projection, const SphereCircle& circle) {
  const Angle half = lower_half_opening(circle);
  if (half <= Angle{}) return {};
  return {arc_on_net(projection, circle, -half, half)};
}

NetPiece great_circle_on_net(Projection projection, const Vector3& normal) {
  if (normal.x() == 0.0 && normal.y() == 0.0) {
    return NetArc{{0.0, 0.0}, 1.0, {}, Angle::degrees(360.0)};
  }
  // Half of any other great circle lies in the lower hemisphere.
  return arc_on_net(projection, {normal, 0.0}, Angle::degrees(-90.0), Angle::degrees(90.0));
}

NetPiece great_circle_on_net(Projection projection, const Plane& plane) {
  return great_circle_on_net(projection, upward_normal(plane));
}

std::vector<NetPiece> cone_on_net(Projection projection, const Vector3& axis, Angle half_angle) {
  const Vector3 end = lower_end(axis);
  const double cosine = cos(half_angle);
  std::vector<NetPiece> pieces = circle_on_net(projection, {end, cosine});
  for (auto& piece : circle_on_net(projection, {-end, cosine})) pieces.push_back(std::move(piece));
  return pieces;
}

}  // namespace brink
