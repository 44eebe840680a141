// The least bolt that brings a planar slide to its target.
#include <array>
#include <cmath>

#include "brink/base/ties.hpp"
#include "plane_equilibrium.hpp"

namespace brink {
namespace {

// What a pull must satisfy: along . pull >= least. A pull is (up the plane, into the plane), kN per
// metre.
struct Demand {
  Vector2 along;
  double least_kN_m = 0.0;
};

using Demands = std::array<Demand, 3>;

bool satisfies(const Vector2& pull, const Demands& demands) {
  for (const Demand& d : demands) {
    const double scale = d.along.norm() * pull.norm() + std::abs(d.least_kN_m);
    if (scale > 0.0 && strictly_below((d.along.dot(pull) - d.least_kN_m) / scale, 0.0))
      return false;
  }
  return true;
}

// The point of the demands' common region nearest the origin lies at the foot of a perpendicular on
// one border or where two borders cross: all of them are tried.
std::optional<Vector2> least_pull(const Demands& demands) {
  std::optional<Vector2> best;
  const auto consider = [&](const Vector2& pull) {
    if (!satisfies(pull, demands)) return;
    if (!best || pull.norm() < best->norm()) best = pull;
  };
  for (std::size_t i = 0; i < demands.size(); ++i) {
    const Demand& a = demands[i];
    consider(a.along * (a.least_kN_m / a.along.squaredNorm()));
    for (std::size_t k = i + 1; k < demands.size(); ++k) {
      const Demand& b = demands[k];
      const double det = a.along.x() * b.along.y() - a.along.y() * b.along.x();
      if (at_most(std::abs(det), 0.0)) continue;
      consider(Vector2(a.least_kN_m * b.along.y() - b.least_kN_m * a.along.y(),
                       b.least_kN_m * a.along.x() - a.least_kN_m * b.along.x()) /
               det);
    }
  }
  return best;
}

Demands demands(const PlaneSlideInput& input, const SectionShape& shape, const SlideForces& forces,
                const TangentStrength& line, double length_m) {
  const double target = *input.target;
  const double slope = tan(line.friction);
  const double short_kN_m = target * forces.driving_kN_m - line.cohesion_kPa * length_m -
                            forces.normal_kN_m * slope - forces.passive_kN_m;
  const bool active = input.bolt_action == BoltAction::active;
  const SinCos wide = sincos(shape.face_dip - shape.plane_dip);
  return {Demand{{active ? target : 1.0, slope}, short_kN_m},
          Demand{{0.0, 1.0}, -forces.normal_kN_m},  // keeps contact
          Demand{{wide.sin, wide.cos}, 0.0}};       // points into the face
}

Line line_of_pull(const Vector2& pull, const SectionShape& shape) {
  const Vector2 v = pull.x() * shape.up_plane - pull.y() * shape.up_normal;
  // x runs into the slope, against the azimuth of sliding.
  const SinCos a = sincos(shape.azimuth);
  return line_with_sense({-v.x() * a.sin, -v.x() * a.cos, v.y()});
}

}  // namespace

std::optional<BoltForTarget> least_bolt(const PlaneSlideInput& input, const SectionShape& shape,
                                        const SlideForces& forces, double length_m) {
  const SlideBalance now = slide_balance(input.strength, forces, length_m);
  const bool contact = now.mode == PlaneSlideMode::slides;
  if (contact && forces.driving_kN_m <= 0.0 && now.factor_of_safety < *input.target) return {};
  const bool met = contact && now.factor_of_safety >= *input.target;
  std::optional<Vector2> pull;
  const auto stress_with_bolt = [&](const TangentStrength& line) {
    pull = least_pull(demands(input, shape, forces, line, length_m));
    return (forces.normal_kN_m + (pull ? pull->y() : 0.0)) / length_m;
  };
  if (met) return BoltForTarget{0.0, input.bolt_action, {}};
  settle_tangent_strength(input.strength, stress_with_bolt);
  if (!pull) return {};
  return BoltForTarget{pull->norm(), input.bolt_action, line_of_pull(*pull, shape)};
}

}  // namespace brink
