// Circles of the sphere as they show on a net: exact arcs on the equal-angle net, polylines of
// stated accuracy on the equal-area net. Net coordinates as in projection.hpp (unit radius, y
// north).
#pragma once

#include <utility>
#include <variant>
#include <vector>

#include "brink/sphere/projection.hpp"

namespace brink {

// Part of a circle. Angles are mathematical: from east, positive towards north. |sweep| <= 360
// degrees.
struct NetArc {
  Point2 centre;
  double radius = 0.0;
  Angle start;
  Angle sweep;
};

// Two points (a straight line) or more.
struct NetPolyline {
  std::vector<Point2> points;
};

using NetPiece = std::variant<NetArc, NetPolyline>;

// Where a piece begins and ends, and its points no further from the true curve than `tolerance`
// (net radii) where it is an arc; a polyline's own points otherwise.
std::pair<Point2, Point2> ends(const NetPiece& piece);
std::vector<Point2> sampled(const NetPiece& piece, double tolerance);

// A polyline on the equal-area net leaves its curve by at most this, in net radii (0.01 mm on a net
// of 100 mm radius).
inline constexpr double kCurveTolerance = 1e-4;

// An arc flatter than this, in net radii, is drawn as its chord, from which it departs by less than
// 1e-6.
inline constexpr double kStraightRadius = 1e6;

// The circle {v : v . axis = cosine} of the unit sphere, -1 < cosine < 1. `axis` is a unit vector.
struct SphereCircle {
  Vector3 axis;
  double cosine = 0.0;
};

// A point of the circle, at `t` from its lowest point, anticlockwise seen from the axis' tip. About
// a vertical axis, where every point is as low as any other, t counts from east.
Vector3 circle_point(const SphereCircle& circle, Angle t);

// Half the opening, seen from the axis, of the part of the circle that lies in the lower
// hemisphere; this part is -t..t from the lowest point. 180 degrees: all of it; 0: none (or a touch
// at one point).
Angle lower_half_opening(const SphereCircle& circle);

// The part of the circle from `from` to `to` (as circle_point counts; from <= to <= from + 360) as
// one piece on the net, whichever hemisphere it lies in. On the equal-angle net, with
// D = cosine - axis.z: centre (axis.x, axis.y)/D, radius sqrt(1 - cosine^2)/|D|, and a straight
// line for D = 0.
NetPiece arc_on_net(Projection projection, const SphereCircle& circle, Angle from, Angle to);

// What shows of the circle in the lower hemisphere: one piece or none.
std::vector<NetPiece> circle_on_net(Projection projection, const SphereCircle& circle);

// The trace of a plane, from rim to rim. A horizontal plane gives the rim itself.
NetPiece great_circle_on_net(Projection projection, const Plane& plane);
// The same for the plane with this normal, in either sense.
NetPiece great_circle_on_net(Projection projection, const Vector3& normal);

// The cone about an axis with this half angle, 0 < half_angle < 90 degrees. The axis has two ends;
// where the cone crosses the rim, the part about the other end comes in on the opposite side: one
// or two pieces.
std::vector<NetPiece> cone_on_net(Projection projection, const Vector3& axis, Angle half_angle);

}  // namespace brink
