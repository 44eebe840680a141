#include "risk/wedge_kernel.hpp"

#include <bit>
#include <cmath>
#include <cstdint>
#include <limits>

#include "base/clones.hpp"
#include "brink/base/ties.hpp"
#include "brink/mechanics/dry_wedge.hpp"

namespace brink {

namespace {

// Plain numbers instead of Eigen's vectors, and choices by bit masks (all ones or all zeros)
// instead of branches: the vectoriser sees through these, and no pass turns them into jumps.
using Mask = std::uint64_t;
struct V {
  double x, y, z;
};
#define BRINK_INLINE [[gnu::always_inline]] inline
BRINK_INLINE V cross(V a, V b) {
  return {a.y * b.z - a.z * b.y, a.z * b.x - a.x * b.z, a.x * b.y - a.y * b.x};
}
BRINK_INLINE double dot(V a, V b) {
  return a.x * b.x + a.y * b.y + a.z * b.z;
}
BRINK_INLINE V scaled(V a, double k) {
  return {a.x * k, a.y * k, a.z * k};
}
BRINK_INLINE V sum(V a, V b) {
  return {a.x + b.x, a.y + b.y, a.z + b.z};
}
BRINK_INLINE V minus(V a, V b) {
  return {a.x - b.x, a.y - b.y, a.z - b.z};
}
BRINK_INLINE Mask above(double a, double b) {
  return Mask{0} - static_cast<Mask>(a > b);
}
BRINK_INLINE Mask not_above(double a, double b) {
  return Mask{0} - static_cast<Mask>(a <= b);
}
BRINK_INLINE double pick(Mask which, double a, double b) {
  return std::bit_cast<double>((std::bit_cast<Mask>(a) & which) |
                               (std::bit_cast<Mask>(b) & ~which));
}
BRINK_INLINE V pick(Mask which, V a, V b) {
  return {pick(which, a.x, b.x), pick(which, a.y, b.y), pick(which, a.z, b.z)};
}
BRINK_INLINE double positive(double a) {
  return a > 0.0 ? a : 0.0;
}
BRINK_INLINE double size(double a) {
  return std::fabs(a);
}
BRINK_INLINE double sign(double a) {
  return std::copysign(1.0, a);
}

// The setup in vectors.
struct Constants {
  V face, upper, force, passive;
  double rise, unit_weight, water_factor, pressure1, pressure2, surcharge, weight_share;
  double along_line, shaking_x, shaking_y;
};

struct Draw {
  V a, b;
  double tan1, tan2, cohesion1, cohesion2, fill, shaking;
};

// Block of one draw, as in wedge_geometry.cpp.
struct Shape {
  V cross, line, into1, into2;
  double square, side1, side2, area1, area2, ground, weight, top;
  Mask forms;
};

BRINK_INLINE Shape shape_of(const Constants& k, V a, V b) {
  const V w = cross(a, b);
  const double square = dot(w, w);
  const double length = std::sqrt(square);
  const double out = dot(w, k.face);
  // The line of intersection, down or, where level, out of the face.
  const double turn = sign(out);
  const double down = pick(above(size(w.z), kTie * length), -sign(w.z), turn);
  const V line = scaled(w, down / length);
  const double climb = dot(line, k.upper);
  const V trace1 = cross(a, k.face);
  const V trace2 = cross(b, k.face);
  const double climb1 = dot(trace1, k.upper);
  const double climb2 = dot(trace2, k.upper);
  const V corner1 = scaled(trace1, k.rise / climb1);
  const V corner2 = scaled(trace2, k.rise / climb2);
  const V back = scaled(line, k.rise / climb);
  const V spread1 = cross(corner1, back);
  const V spread2 = cross(corner2, back);
  const V spread3 = cross(minus(corner1, back), minus(corner2, back));
  const double side1 = sign(turn * climb2);
  const double side2 = -sign(turn * climb1);
  const Mask forms = above(length, kParallel) & above(dot(line, k.face), kTie) &
                     above(-kTie, climb) & above(size(climb1), kTie) & above(size(climb2), kTie) &
                     above(k.rise, 0.0);
  return {w,
          line,
          scaled(a, side1),
          scaled(b, side2),
          square,
          side1,
          side2,
          0.5 * size(dot(a, spread1)),
          0.5 * size(dot(b, spread2)),
          0.5 * size(dot(k.upper, spread3)),
          k.unit_weight / 6.0 * size(dot(corner2, spread1)),
          positive(back.z),
          forms};
}

// Everything but reactions and passive bolts.
BRINK_INLINE V resultant_of(const Constants& k, const Draw& d, const Shape& s) {
  const double fill = d.fill * k.water_factor * s.top;
  const double push1 = (fill + k.pressure1) * s.area1;
  const double push2 = (fill + k.pressure2) * s.area2;
  const double level = std::sqrt(s.line.x * s.line.x + s.line.y * s.line.y);
  const double inverse = k.along_line / level;
  const double per_level = pick(above(level, kTie), inverse, 0.0);
  const double shake = d.shaking * s.weight;
  const V body{shake * (s.line.x * per_level + k.shaking_x),
               shake * (s.line.y * per_level + k.shaking_y),
               -s.weight * k.weight_share - k.surcharge * s.ground};
  return sum(sum(scaled(s.into1, push1), scaled(s.into2, push2)), sum(body, k.force));
}

struct Outcome {
  double safety, mode;
};

// As in wedge_equilibrium.cpp: every mode is computed and one is chosen.
BRINK_INLINE Outcome outcome_of(const Constants& k, const Draw& d, const Shape& s, V r) {
  const double tie = kTie * s.weight;
  const double per_square = 1.0 / s.square;
  const double normal1 = s.side1 * dot(s.cross, cross(d.b, r)) * per_square;
  const double normal2 = s.side2 * dot(s.cross, cross(r, d.a)) * per_square;
  const double press1 = -dot(r, s.into1);
  const double press2 = -dot(r, s.into2);
  const Mask both = not_above(-tie, normal1) & not_above(-tie, normal2);
  const Mask on1 = ~both & above(press1, tie) & above(-tie, normal2);
  const Mask on2 = ~both & ~on1 & above(press2, tie) & above(-tie, normal1);
  const V open = pick(on1, s.into1, s.into2);
  const V rest = sum(r, scaled(open, pick(on1, press1, press2)));
  const double rest_size = std::sqrt(dot(rest, rest));
  const double along = dot(r, s.line);
  const double drive = pick(both, size(along), rest_size);
  const double shear1 = d.cohesion1 * s.area1 + pick(both, positive(normal1), press1) * d.tan1;
  const double shear2 = d.cohesion2 * s.area2 + pick(both, positive(normal2), press2) * d.tan2;
  const double raised1 = s.side1 * dot(s.cross, cross(d.b, k.passive)) * per_square;
  const double raised2 = s.side2 * dot(s.cross, cross(k.passive, d.a)) * per_square;
  const double raised_both = raised1 * d.tan1 + raised2 * d.tan2;
  const double raised_one = -dot(k.passive, open) * pick(on1, d.tan1, d.tan2);
  const double against_both = -dot(k.passive, s.line) * sign(along);
  const double against_one = -dot(k.passive, rest) / rest_size;
  const double passive = pick(both, raised_both + against_both, raised_one + against_one);
  const double resist =
      positive(pick(both | on1, shear1, 0.0) + pick(both | on2, shear2, 0.0) + passive);
  const double ratio = resist / drive;
  constexpr double infinite = std::numeric_limits<double>::infinity();
  const double slides = pick(not_above(drive, kNoDrive * s.weight), infinite, ratio);
  const double one_mode = pick(on1, 2.0, pick(on2, 3.0, 4.0));
  return {pick(both | on1 | on2, slides, 0.0), pick(both, 1.0, one_mode)};
}
#undef BRINK_INLINE

V of(const std::array<double, 3>& a) {
  return {a[0], a[1], a[2]};
}

Vector3 sum_of(const std::vector<DirectedForce>& forces) {
  Vector3 total = Vector3::Zero();
  for (const DirectedForce& f : forces) total += force_vector(f);
  return total;
}

std::array<double, 3> parts(const Vector3& v) {
  return {v.x(), v.y(), v.z()};
}

}  // namespace

bool kernel_covers(const WedgeCase& w) {
  const WedgeGeometry& g = w.geometry;
  return !g.crack && !g.persistence1_m && !g.persistence2_m &&
         g.size.measure == WedgeMeasure::height &&
         std::holds_alternative<MohrCoulomb>(w.strength1) &&
         std::holds_alternative<MohrCoulomb>(w.strength2);
}

KernelSetup kernel_setup(const WedgeCase& w) {
  KernelSetup setup;
  const WedgeGeometry& g = w.geometry;
  const Vector3 face = outward_normal(g.face);
  const Vector3 upper = upward_normal(g.upper);
  setup.face = parts(face);
  setup.upper = parts(upper);
  if (rises_to_crest(face, upper)) {
    const Vector3 up_dip = -dip_vector(g.face.dip, g.face.dip_direction);
    setup.rise_m = upper.dot(up_dip) / up_dip.z() * g.size.value;
  }
  setup.unit_weight_kN_m3 = w.unit_weight_kN_m3;
  if (const auto* stated = std::get_if<WaterPressures>(&w.water)) {
    setup.pressure1_kPa = stated->plane1_kPa;
    setup.pressure2_kPa = stated->plane2_kPa;
  } else {
    setup.water_factor = w.water_unit_weight_kN_m3 / 6.0;
  }
  setup.surcharge_kPa = w.surcharge_kPa * upper.z();
  setup.seismic_vertical = w.seismic.vertical;
  if (w.seismic.trend) {
    const Vector3 level = direction({*w.seismic.trend, Angle{}});
    setup.along_line = false;
    setup.shaking = {level.x(), level.y()};
  }
  Vector3 force = sum_of(w.loads);
  const Vector3 bolts = sum_of(w.bolts);
  if (w.bolt_action == BoltAction::active) {
    force += bolts;
  } else {
    setup.passive_kN = parts(bolts);
  }
  setup.force_kN = parts(force);
  return setup;
}

BRINK_CLONES void run_kernel(const KernelSetup& setup, KernelBlock& block, std::size_t count) {
  const Constants k{of(setup.face),
                    of(setup.upper),
                    of(setup.force_kN),
                    of(setup.passive_kN),
                    setup.rise_m,
                    setup.unit_weight_kN_m3,
                    setup.water_factor,
                    setup.pressure1_kPa,
                    setup.pressure2_kPa,
                    setup.surcharge_kPa,
                    1.0 - setup.seismic_vertical,
                    setup.along_line ? 1.0 : 0.0,
                    setup.shaking[0],
                    setup.shaking[1]};
  constexpr double none = std::numeric_limits<double>::quiet_NaN();
  for (std::size_t i = 0; i < count; ++i) {
    const Draw d{{block.x1[i], block.y1[i], block.z1[i]},
                 {block.x2[i], block.y2[i], block.z2[i]},
                 block.tan1[i],
                 block.tan2[i],
                 block.cohesion1_kPa[i],
                 block.cohesion2_kPa[i],
                 block.fill[i],
                 block.shaking[i]};
    const Shape shape = shape_of(k, d.a, d.b);
    const Outcome outcome = outcome_of(k, d, shape, resultant_of(k, d, shape));
    block.safety[i] = pick(shape.forms, outcome.safety, none);
    block.mode[i] = pick(shape.forms, outcome.mode, 0.0);
  }
}

}  // namespace brink
