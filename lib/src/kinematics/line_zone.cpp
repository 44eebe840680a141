#include "line_zone.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>
#include <utility>

#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr double kTurn = 2.0 * std::numbers::pi;

const Vector3 kDown{0.0, 0.0, -1.0};

// Down to the rim, and horizontal lines: a great circle tilted by the tie about `middle`, the
// horizontal direction amid those that count, so that rounding does not lose them.
Cap down_to_rim(const Vector3& middle) {
  return {(kDown + kTie * middle).normalized(), 0.0};
}

Vector3 horizontal_part(const Vector3& v) {
  const Vector3 flat(v.x(), v.y(), 0.0);
  const double length = flat.norm();
  return length > kTie ? Vector3(flat / length) : Vector3::Zero();
}

// The two sides of a window of trends; `half` is its half width as (sin, cos), below 90 degrees.
void add_sector(LineZone& zone, const Vector3& middle, double sin_half, double cos_half) {
  const Vector3 left(-middle.y(), middle.x(), 0.0);
  zone.caps.push_back({sin_half * middle + cos_half * left, 0.0});
  zone.caps.push_back({sin_half * middle - cos_half * left, 0.0});
  zone.sector = true;
}

// Position on a circle, growing with the angle from 0 to 4, without trigonometry.
double turn_of(double x, double y) {
  if (y >= 0.0) return x >= 0.0 ? (x + y > 0.0 ? y / (x + y) : 0.0) : 1.0 - x / (y - x);
  return x < 0.0 ? 2.0 + y / (x + y) : 3.0 + x / (x - y);
}

// Whether every plunge is beyond a limit; its sine otherwise.
bool below_horizontal(const SlopeLimit& limit) {
  return limit.signed_sin_squared < 0.0;
}
double sine(const SlopeLimit& limit) {
  return std::sqrt(limit.signed_sin_squared);
}

double slack(const Cap& cap, const Vector3& v) {
  return v.dot(cap.axis) - cap.least;
}

// Of caps about one axis only the smallest counts.
std::vector<Cap> without_duplicates(const std::vector<Cap>& caps) {
  std::vector<Cap> kept;
  for (const Cap& cap : caps) {
    const auto same = std::ranges::find_if(
        kept, [&](const Cap& other) { return (other.axis - cap.axis).norm() <= kTie * kTie; });
    if (same == kept.end()) {
      kept.push_back(cap);
    } else {
      same->least = std::max(same->least, cap.least);
    }
  }
  return kept;
}

// Angles on the circle of `caps[k]`, in the frame (e1, e2), at which it crosses another cap's.
std::vector<double> crossings(std::size_t k, const std::vector<Cap>& caps, const Vector3& e1,
                              const Vector3& e2) {
  std::vector<double> angles;
  const double radius = std::sqrt(1.0 - caps[k].least * caps[k].least);
  for (std::size_t j = 0; j < caps.size(); ++j) {
    if (j == k) continue;
    const double x = radius * e1.dot(caps[j].axis);
    const double y = radius * e2.dot(caps[j].axis);
    const double reach = std::hypot(x, y);
    const double need = caps[j].least - caps[k].least * caps[k].axis.dot(caps[j].axis);
    if (reach <= std::abs(need)) continue;
    const double middle = std::atan2(y, x);
    const double half = std::acos(need / reach);
    for (const double angle : {middle - half, middle + half}) {
      angles.push_back(angle - kTurn * std::floor(angle / kTurn));
    }
  }
  std::ranges::sort(angles);
  return angles;
}

}  // namespace

LineZone sliding_zone(const FaceLimits& limits) {
  LineZone zone;
  zone.caps = {{limits.face_normal, kTie}, {-limits.upper_normal, kTie}};
  if (!below_horizontal(limits.friction)) {
    zone.caps.push_back({kDown, sine(limits.friction)});
    return zone;
  }
  // Below ground that is not level a horizontal line may daylight.
  const Vector3 outwards = horizontal_part(limits.face_normal);
  const Vector3 uphill = -horizontal_part(limits.upper_normal);
  if (outwards.norm() > 0.0 && uphill.norm() > 0.0) {
    zone.caps.push_back(down_to_rim(horizontal_part(outwards + uphill)));
  }
  return zone;
}

TopplingZones toppling_zones(const FaceLimits& limits) {
  const AzimuthWindow& window = limits.toppling_window;
  const Vector3 middle(window.sin_azimuth, window.cos_azimuth, 0.0);
  const bool any_plunge = below_horizontal(limits.column);
  TopplingZones zones;
  zones.none = !any_plunge && limits.column.cos_squared <= 0.0;
  if (zones.none) return zones;
  if (window.cos_half > 0.0) {
    zones.inside.caps.push_back(any_plunge ? down_to_rim(middle) : Cap{kDown, sine(limits.column)});
    add_sector(zones.inside, middle, window.sin_half, window.cos_half);
    return zones;
  }
  if (!any_plunge) zones.inside.caps.push_back({kDown, sine(limits.column)});
  zones.vertical_too = true;
  if (window.sin_half > 0.0) {
    zones.outside.emplace();
    zones.outside->caps.push_back({kDown, any_plunge ? kTie : sine(limits.column)});
    add_sector(*zones.outside, -middle, window.sin_half, -window.cos_half);
  }
  return zones;
}

// The part of a great circle inside the caps, as bounds on the tangent of the angle from the point
// nearest to the centre.
struct ZoneBorder::Bounds {
  static constexpr std::size_t kNone = static_cast<std::size_t>(-1);
  static constexpr std::size_t kApex = static_cast<std::size_t>(-2);

  Vector3 a, b;  // nearest to the centre; a quarter turn on
  double low = -std::numeric_limits<double>::infinity();
  double high = std::numeric_limits<double>::infinity();
  std::size_t low_edge = kNone;
  std::size_t high_edge = kNone;

  Vector3 at(double tangent) const { return a + tangent * b; }

  // Keeps what lies inside the cap; false where nothing can be left.
  bool keep(const Vector3& axis, double least, std::size_t edge) {
    const double along = axis.dot(a);
    const double across = axis.dot(b);
    const double square = along * along + across * across;
    const double rest = square - least * least;
    if (rest < 0.0) return false;
    const double root = std::sqrt(rest);
    // The arc runs from `enter` to `leave`, at most half a turn, with its middle on (along,
    // across).
    const double enter_a = least * along + root * across;
    const double leave_a = least * along - root * across;
    if (enter_a <= 0.0 && leave_a <= 0.0) return along > least;
    if (enter_a > 0.0) {
      const double tangent = (least * across - root * along) / enter_a;
      if (tangent > low) low = tangent, low_edge = edge;
    }
    if (leave_a > 0.0) {
      const double tangent = (least * across + root * along) / leave_a;
      if (tangent < high) high = tangent, high_edge = edge;
    }
    return low < high;
  }
};

ZoneBorder::ZoneBorder(const LineZone& zone) : sector_(zone.sector) {
  const std::vector<Cap> caps = without_duplicates(zone.caps);
  for (std::size_t k = 0; k < caps.size(); ++k) edges_.push_back(make_edge(k, caps));
  const double length = centre_.norm();
  if (length > 0.0) centre_ /= length;
  const bool inside = length > 0.0 && std::ranges::all_of(caps, [&](const Cap& cap) {
                        return slack(cap, centre_) > 0.0;
                      });
  if (!inside) {
    edges_.clear();
    return;
  }
  number_pieces();
  if (sector_) place_apex();
}

// Finds the stretches of one cap's circle that border the zone, and adds to the centre the integral
// of the border's points over its length: a direction well inside a convex zone, and less than a
// quarter turn from all of it.
ZoneBorder::Edge ZoneBorder::make_edge(std::size_t k, const std::vector<Cap>& caps) {
  const Cap& cap = caps[k];
  const Vector3 e1 = cap.axis.unitOrthogonal();
  const Vector3 e2 = cap.axis.cross(e1);
  const double radius = std::sqrt(1.0 - cap.least * cap.least);
  const auto on_circle = [&](double angle) -> Vector3 {
    return cap.least * cap.axis + radius * (std::cos(angle) * e1 + std::sin(angle) * e2);
  };
  const auto inside = [&](double angle) {
    for (std::size_t j = 0; j < caps.size(); ++j) {
      if (j != k && slack(caps[j], on_circle(angle)) < 0.0) return false;
    }
    return true;
  };
  std::vector<double> angles = crossings(k, caps, e1, e2);
  const bool whole = angles.empty();
  if (whole) angles.push_back(0.0);
  double start = angles.front();  // where turns are counted from: outside the zone, if possible
  std::vector<Stretch> stretches;
  for (std::size_t i = 0; i < angles.size(); ++i) {
    const double end = i + 1 < angles.size() ? angles[i + 1] : angles.front() + kTurn;
    const double middle = (angles[i] + end) / 2.0;
    if (inside(middle)) {
      stretches.push_back({angles[i], end, on_circle(angles[i]), on_circle(middle)});
    } else {
      start = middle;
    }
  }
  Edge edge{cap.axis,
            cap.least,
            std::cos(start) * e1 + std::sin(start) * e2,
            std::cos(start) * e2 - std::sin(start) * e1,
            {}};
  for (const Stretch& s : stretches) {
    centre_ += radius * cap.least * (s.end - s.begin) * cap.axis;
    if (!whole) {
      centre_ +=
          radius * radius *
          ((std::sin(s.end) - std::sin(s.begin)) * e1 - (std::cos(s.end) - std::cos(s.begin)) * e2);
    }
    const double from = s.begin - start - kTurn * std::floor((s.begin - start) / kTurn);
    const double to = from + (s.end - s.begin);
    const double begin = turn_of(std::cos(from), std::sin(from));
    const double end = to < kTurn ? turn_of(std::cos(to), std::sin(to)) : 4.0;
    edge.pieces.push_back({begin, end - begin, 4.0, 0.0, s.first, s.middle});
  }
  std::ranges::sort(edge.pieces, {}, &Piece::begin);
  for (std::size_t i = 0; i + 1 < edge.pieces.size(); ++i) {
    Piece& piece = edge.pieces[i];
    piece.split = (piece.begin + piece.length + edge.pieces[i + 1].begin) / 2.0;
  }
  return edge;
}

// Numbers the pieces counter-clockwise about the centre, as turns grow on each edge.
void ZoneBorder::number_pieces() {
  const Vector3 u1 = centre_.unitOrthogonal();
  const Vector3 u2 = centre_.cross(u1);
  std::vector<std::pair<double, Piece*>> order;
  for (Edge& edge : edges_) {
    for (Piece& piece : edge.pieces) {
      order.emplace_back(std::atan2(piece.middle.dot(u2), piece.middle.dot(u1)), &piece);
    }
  }
  std::ranges::sort(order, {}, &std::pair<double, Piece*>::first);
  for (std::size_t i = 0; i < order.size(); ++i) order[i].second->index = static_cast<double>(i);
}

// The apex of the sector lies before the piece of a side that begins there.
void ZoneBorder::place_apex() {
  double nearest = std::numeric_limits<double>::infinity();
  for (std::size_t k = edges_.size() - 2; k < edges_.size(); ++k) {
    for (const Piece& piece : edges_[k].pieces) {
      const double away = std::hypot(piece.first.x(), piece.first.y());
      if (away < nearest) nearest = away, apex_ = piece.index;
    }
  }
}

double ZoneBorder::position(std::size_t edge, const Vector3& point) const {
  if (edge == Bounds::kApex) return apex_;
  const Edge& e = edges_[edge];
  const double turn = turn_of(point.dot(e.e1), point.dot(e.e2));
  for (const Piece& piece : e.pieces) {
    // Room at both ends for rounding: a position at a corner stays beside its neighbours.
    if (turn <= piece.split) {
      return piece.index + 0.25 + 0.5 * (turn - piece.begin) / piece.length;
    }
  }
  return 0.0;  // a border piece too small to be found, and so missed by any reading
}

// A vertical plane runs through the apex; it is inside the sector along one of its two directions.
bool ZoneBorder::bound_by_apex(const Vector3& n, Bounds& bounds) const {
  Vector3 along(-n.y(), n.x(), 0.0);
  const auto inside = [&](const Vector3& v) {
    return v.dot(edges_[edges_.size() - 2].axis) >= 0.0 && v.dot(edges_.back().axis) >= 0.0;
  };
  if (!inside(along)) along = -along;
  return inside(along) && bounds.keep(along, 0.0, Bounds::kApex);
}

std::optional<Chord> ZoneBorder::cut(const Vector3& n) const {
  if (empty()) return std::nullopt;
  Bounds bounds;
  bounds.a = centre_ - n.dot(centre_) * n;
  const double length = bounds.a.norm();
  if (length <= kTie) return std::nullopt;  // a quarter turn from the centre all round
  bounds.a /= length;
  bounds.b = n.cross(bounds.a);
  const bool through_apex = sector_ && at_most(std::abs(n.z()), 0.0);
  const std::size_t plain = edges_.size() - (through_apex ? 2 : 0);
  for (std::size_t k = 0; k < plain; ++k) {
    if (!bounds.keep(edges_[k].axis, edges_[k].least, k)) return std::nullopt;
  }
  if (through_apex && !bound_by_apex(n, bounds)) return std::nullopt;
  if (bounds.low_edge == Bounds::kNone || bounds.high_edge == Bounds::kNone) return std::nullopt;
  return Chord{position(bounds.low_edge, bounds.at(bounds.low)),
               position(bounds.high_edge, bounds.at(bounds.high))};
}

}  // namespace brink
