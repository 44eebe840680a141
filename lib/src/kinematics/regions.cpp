#include "brink/kinematics/regions.hpp"

#include <algorithm>
#include <cmath>
#include <functional>
#include <optional>

#include "brink/base/ties.hpp"

namespace brink {

namespace {

// Along one azimuth every condition leaves one stretch of plunges, and so does their intersection.
struct Stretch {
  Angle low;
  Angle high;
  bool empty() const { return !(low < high); }
};

constexpr Angle kRight = Angle::degrees(90.0);
constexpr Angle kHalfTurn = Angle::degrees(180.0);
constexpr Stretch kNothing{kRight, Angle{}};

Stretch intersect(const Stretch& a, const Stretch& b) {
  return {std::max(a.low, b.low), std::min(a.high, b.high)};
}

// Plunges p for which the line of that azimuth has a positive product with `normal`: with h the
// horizontal direction, (normal . h) cos p - normal_z sin p = r sin(q - p) > 0.
Stretch in_front_of(const Vector3& normal, Angle azimuth) {
  const SinCos at = sincos(azimuth);
  const Angle q = atan2(normal.x() * at.sin + normal.y() * at.cos, normal.z());
  if (q > Angle{}) return {Angle{}, std::min(q, kRight)};
  return {std::clamp(q + kHalfTurn, Angle{}, kRight), kRight};
}

// The whole of one mode: azimuths within `half_width` of `middle`, and the plunges along each.
struct Shape {
  Angle middle;
  Angle half_width = kHalfTurn;
  std::function<Stretch(Angle azimuth)> plunges;

  bool round() const { return half_width >= kHalfTurn; }
};

Stretch daylighting(const FaceLimits& limits, Angle azimuth) {
  return intersect(in_front_of(limits.face_normal, azimuth),
                   in_front_of(-limits.upper_normal, azimuth));
}

Shape wedge_shape(const FaceLimits& limits, Angle friction, Angle middle) {
  return {middle, kHalfTurn, [=](Angle azimuth) {
            return intersect(daylighting(limits, azimuth), {friction, kRight});
          }};
}

// Of poles: the dip vector of the same plane points the other way, 90 degrees from it.
Shape planar_shape(const FaceLimits& limits, const ModeSettings& settings, const Face& face) {
  return {face.dip_direction + kHalfTurn, settings.strike_tolerance, [=](Angle azimuth) {
            const Stretch dips =
                intersect(daylighting(limits, azimuth + kHalfTurn), {settings.friction, kRight});
            return Stretch{kRight - dips.high, kRight - dips.low};
          }};
}

Shape flexural_shape(const FaceLimits& limits, const ModeSettings& settings, const Face& face) {
  return {face.dip_direction, settings.toppling_tolerance, [=](Angle azimuth) {
            return limits.face_above_friction ? in_front_of(limits.slip_normal, azimuth) : kNothing;
          }};
}

Shape block_shape(const ModeSettings& settings, const Face& face) {
  const Stretch steep{std::max(kRight - face.dip, Angle{}), kRight};
  return {face.dip_direction + kHalfTurn, settings.toppling_tolerance,
          [=](Angle) { return steep; }};
}

Shape shape_of(Mode mode, const Face& face, const ModeSettings& settings) {
  const FaceLimits limits = prepare_limits(face, settings);
  switch (mode) {
    case Mode::planar_sliding:
      return planar_shape(limits, settings, face);
    case Mode::wedge_sliding:
      return wedge_shape(limits, settings.friction, face.dip_direction);
    case Mode::flexural_toppling:
      return flexural_shape(limits, settings, face);
    case Mode::block_toppling:
      break;
  }
  return block_shape(settings, face);
}

// Azimuths between two ends; both ends belong to the outline.
struct Run {
  Angle from;
  Angle to;
};

// The azimuth between one inside and one outside where the region ends, on the inside.
Angle edge(const Shape& shape, Angle inside, Angle outside) {
  for (int halving = 0; halving < 60; ++halving) {
    const Angle middle = (inside + outside) * 0.5;
    (shape.plunges(middle).empty() ? outside : inside) = middle;
  }
  return inside;
}

// A sample of azimuths at most half a degree apart, the middle and both ends among them.
std::vector<Angle> azimuths(const Shape& shape) {
  const Angle half = std::min(shape.half_width, kHalfTurn);
  const int steps = std::max(2, static_cast<int>(std::ceil(half.deg() * 2.0)));
  std::vector<Angle> at;
  for (int i = -steps; i <= steps; ++i) {
    at.push_back(shape.middle + half * (static_cast<double>(i) / steps));
  }
  return at;
}

// A region that lies across the azimuth where the search began is one run.
std::vector<Run> joined(const Shape& shape, std::vector<Run> found) {
  if (!shape.round() || found.size() < 2) return found;
  const Angle turn = kHalfTurn * 2.0;
  if (found.back().to - found.front().from < turn) return found;
  found.front().from = found.back().from - turn;
  found.pop_back();
  return found;
}

std::vector<Run> runs(const Shape& shape) {
  const std::vector<Angle> at = azimuths(shape);
  std::vector<Run> found;
  std::optional<Angle> start;
  for (std::size_t i = 0; i < at.size(); ++i) {
    const bool inside = !shape.plunges(at[i]).empty();
    if (inside && !start) start = i == 0 ? at[i] : edge(shape, at[i], at[i - 1]);
    if (!inside && start) {
      found.push_back({*start, edge(shape, at[i - 1], at[i])});
      start.reset();
    }
  }
  if (start) found.push_back({*start, at.back()});
  return joined(shape, std::move(found));
}

void append(SphereLoop& loop, const Vector3& v) {
  if (loop.empty() || strictly_above((loop.back() - v).norm(), 0.0)) loop.push_back(v);
}

using Curve = std::function<Vector3(double t)>;  // t from 0 to 1

// Appends the curve from t1 (already there) to t2, halved until neighbours are near enough.
void follow(SphereLoop& loop, const Curve& curve, double t1, double t2, int halvings) {
  constexpr double chord = 0.0170;  // of an arc just below 1 degree
  if (halvings > 0 && (curve(t1) - curve(t2)).norm() > chord) {
    const double middle = 0.5 * (t1 + t2);
    follow(loop, curve, t1, middle, halvings - 1);
    follow(loop, curve, middle, t2, halvings - 1);
    return;
  }
  append(loop, curve(t2));
}

void append_curve(SphereLoop& loop, const Curve& curve) {
  constexpr int pieces = 16;
  append(loop, curve(0.0));
  for (int i = 0; i < pieces; ++i) {
    follow(loop, curve, static_cast<double>(i) / pieces, static_cast<double>(i + 1) / pieces, 24);
  }
}

// Exact at both ends: a step beyond may be outside.
Angle between(Angle from, Angle to, double t) {
  return t < 1.0 ? from + (to - from) * t : to;
}

Curve along(const Shape& shape, Angle from, Angle to, Angle Stretch::*end) {
  return [=, &shape](double t) {
    const Angle azimuth = between(from, to, t);
    return direction(Line{azimuth, shape.plunges(azimuth).*end});
  };
}

// Down the azimuth where a run begins or ends.
Curve down(Angle azimuth, Angle from, Angle to) {
  return [=](double t) { return direction(Line{azimuth, between(from, to, t)}); };
}

SphereLoop closed(SphereLoop loop) {
  while (loop.size() > 1 && at_most((loop.front() - loop.back()).norm(), 0.0)) loop.pop_back();
  return loop;
}

SphereLoop outline(const Shape& shape, const Run& run) {
  const Stretch first = shape.plunges(run.from);
  const Stretch last = shape.plunges(run.to);
  SphereLoop loop;
  append_curve(loop, along(shape, run.from, run.to, &Stretch::high));
  append_curve(loop, down(run.to, last.high, last.low));
  append_curve(loop, along(shape, run.to, run.from, &Stretch::low));
  append_curve(loop, down(run.from, first.low, first.high));
  return closed(std::move(loop));
}

// All the way round: a ring, whose inner edge may have shrunk to the straight-down point.
std::vector<SphereLoop> ring(const Shape& shape, const Run& run) {
  std::vector<SphereLoop> loops;
  for (Angle Stretch::*end : {&Stretch::low, &Stretch::high}) {
    SphereLoop loop;
    append_curve(loop, along(shape, run.from, run.to, end));
    loop = closed(std::move(loop));
    if (loop.size() > 2) loops.push_back(std::move(loop));
  }
  return loops;
}

}  // namespace

Region admissible_region(Mode mode, const Face& face, const ModeSettings& settings) {
  Region region{mode, mode == Mode::planar_sliding || mode == Mode::flexural_toppling, {}};
  const Shape shape = shape_of(mode, face, settings);
  for (const Run& run : runs(shape)) {
    if (shape.round() && run.to - run.from >= kHalfTurn * 2.0) {
      region.loops = ring(shape, run);
    } else {
      region.loops.push_back(outline(shape, run));
    }
  }
  return region;
}

bool in_region(Mode mode, const FaceLimits& limits, const Vector3& v) {
  switch (mode) {
    case Mode::planar_sliding:
      return planar_sliding(limits, v);
    case Mode::wedge_sliding:
      return wedge_sliding(limits, v);
    case Mode::flexural_toppling:
      return flexural_toppling(limits, v);
    case Mode::block_toppling:
      break;
  }
  return block_toppling(limits, v);
}

}  // namespace brink
