#include "brink/mechanics/wedge_support.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <functional>
#include <limits>
#include <numbers>
#include <vector>

#include "brink/base/error.hpp"
#include "brink/base/ties.hpp"
#include "require.hpp"
#include "support_regions.hpp"

namespace brink {

namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();

// Unit vectors in which a bolt may pull.
struct Allowed {
  Vector3 face;  // outward normal
  double least_fall;
  double greatest_fall;  // sines of the plunge limits

  bool holds(const Vector3& b) const {
    return at_most(b.dot(face), 0.0) && at_least(-b.z(), least_fall) &&
           at_most(-b.z(), greatest_fall);
  }
};

// Unit vectors centre + radius (cos(a) first + sin(a) second).
struct Circle {
  Vector3 centre;
  double radius;
  Vector3 first;
  Vector3 second;

  Vector3 at(double a) const {
    return centre + radius * (std::cos(a) * first + std::sin(a) * second);
  }
};

Circle plunge_circle(double fall) {
  return {{0.0, 0.0, -fall}, std::sqrt(std::max(1.0 - fall * fall, 0.0)), {1, 0, 0}, {0, 1, 0}};
}

std::vector<Circle> borders(const Allowed& allowed) {
  std::vector<Circle> circles;
  const Vector3 strike = allowed.face.cross(Vector3(0.0, 0.0, 1.0)).normalized();
  circles.push_back({Vector3::Zero(), 1.0, strike, allowed.face.cross(strike)});
  if (allowed.least_fall > -1.0) circles.push_back(plunge_circle(allowed.least_fall));
  if (allowed.greatest_fall < 1.0) circles.push_back(plunge_circle(allowed.greatest_fall));
  return circles;
}

// Where the plunge limits meet the face: b . face = 0 at this fall.
std::vector<Vector3> border_corners(const Allowed& allowed) {
  std::vector<Vector3> corners;
  const double level = std::hypot(allowed.face.x(), allowed.face.y());
  const Vector3 ahead(allowed.face.x() / level, allowed.face.y() / level, 0.0);
  const Vector3 across(-ahead.y(), ahead.x(), 0.0);
  for (const double fall : {allowed.least_fall, allowed.greatest_fall}) {
    const double along = fall * allowed.face.z() / level;
    const double rest = 1.0 - fall * fall - along * along;
    if (rest < 0.0) continue;
    for (const double side : {-1.0, 1.0}) {
      corners.push_back(along * ahead + side * std::sqrt(rest) * across - Vector3(0.0, 0.0, fall));
    }
  }
  return corners;
}

struct Pull {
  double force_kN = kInfinity;
  Vector3 direction = Vector3::Zero();

  void take(double force, const Vector3& towards) {
    if (force < force_kN) *this = {force, towards};
  }
};

using ForceAt = std::function<double(const Vector3& direction)>;  // infinite where none will do

// Golden-section search on an arc of the circle that brackets a minimum.
double refine(const Circle& circle, const ForceAt& force, double low, double high) {
  const double ratio = (std::sqrt(5.0) - 1.0) / 2.0;
  for (int i = 0; i < 60; ++i) {
    const double a = high - ratio * (high - low);
    const double b = low + ratio * (high - low);
    if (force(circle.at(a)) <= force(circle.at(b))) {
      high = b;
    } else {
      low = a;
    }
  }
  return (low + high) / 2.0;
}

// Least force on a border circle: a scan in quarter degrees, each local minimum refined.
void scan(const Circle& circle, const ForceAt& force, Pull& best) {
  constexpr int steps = 1440;
  const double step = 2.0 * std::numbers::pi / steps;
  std::vector<double> forces(steps);
  for (int i = 0; i < steps; ++i) {
    forces[static_cast<std::size_t>(i)] = force(circle.at(i * step));
  }
  for (int i = 0; i < steps; ++i) {
    const auto value = [&](int k) { return forces[static_cast<std::size_t>((k + steps) % steps)]; };
    if (!std::isfinite(value(i)) || value(i) > value(i - 1) || value(i) > value(i + 1)) continue;
    best.take(value(i), circle.at(i * step));
    const double at = refine(circle, force, (i - 1) * step, (i + 1) * step);
    best.take(force(circle.at(at)), circle.at(at));
  }
}

// Least active pull into one region.
void search_region(const SafeRegion& region, const Vector3& resultant, const Allowed& allowed,
                   Pull& best) {
  const auto nearest = nearest_safe(region, resultant);
  if (!nearest) return;
  const Vector3 pull = *nearest - resultant;
  if (pull.norm() >= best.force_kN) return;
  if (allowed.holds(pull.normalized())) {
    best.take(pull.norm(), pull.normalized());
    return;
  }
  const ForceAt force = [&](const Vector3& b) {
    if (!allowed.holds(b)) return kInfinity;
    return least_along(region, resultant, b).value_or(kInfinity);
  };
  for (const Circle& circle : borders(allowed)) scan(circle, force, best);
  for (const Vector3& corner : border_corners(allowed)) best.take(force(corner), corner);
}

Pull least_active(const std::array<SafeRegion, 3>& regions, const Vector3& resultant,
                  const Allowed& allowed) {
  Pull best;
  for (const SafeRegion& region : regions) search_region(region, resultant, allowed, best);
  return best;
}

double active_along(const std::array<SafeRegion, 3>& regions, const Vector3& resultant,
                    const Vector3& direction) {
  double best = kInfinity;
  for (const SafeRegion& region : regions) {
    best = std::min(best, least_along(region, resultant, direction).value_or(kInfinity));
  }
  return best;
}

TangentStrength tangent_or_start(const std::optional<TangentStrength>& used,
                                 const Strength& strength) {
  return used ? *used : tangent_strength(strength, 0.0);
}

// With the tangents at the stresses of `at`, the analysis of the supported block.
SafeProblem problem_at(const WedgeCase& w, const WedgeResult& at, double target) {
  const WedgeBlock& block = at.block;
  const TangentStrength one = tangent_or_start(at.strength1, w.strength1);
  const TangentStrength two = tangent_or_start(at.strength2, w.strength2);
  return {block.into1,
          block.into2,
          *block.line,
          one.cohesion_kPa * block.areas.plane1_m2,
          two.cohesion_kPa * block.areas.plane2_m2,
          tan(one.friction),
          tan(two.friction),
          at.weight_kN,
          target};
}

bool straight(const WedgeCase& w) {
  return std::holds_alternative<MohrCoulomb>(w.strength1) &&
         std::holds_alternative<MohrCoulomb>(w.strength2);
}

// Repeats `size` with the tangents of the block as sized, until the force settles.
Pull settle(const WedgeCase& w, const WedgeResult& result, double target,
            const std::function<Pull(const std::array<SafeRegion, 3>&)>& size) {
  constexpr int most_rounds = 100;
  WedgeResult at = result;
  Pull pull;
  for (int round = 0; round < most_rounds; ++round) {
    const Pull next = size(safe_regions(problem_at(w, at, target)));
    const bool settled = std::abs(next.force_kN - pull.force_kN) <= kNoDrive * result.weight_kN;
    pull = next;
    if (settled || straight(w) || !std::isfinite(pull.force_kN)) break;
    WedgeCase bolted = w;
    bolted.bolts.push_back({pull.force_kN, line_with_sense(pull.direction)});
    at = analyse_wedge(bolted);
  }
  return pull;
}

// What one kN of a passive bolt along b adds to the resistance is this vector times b.
Vector3 passive_gain(const WedgeResult& r) {
  const WedgeBlock& block = r.block;
  Vector3 gain = -r.contact.slide;
  if (r.strength1 && r.strength2) {
    const auto [row1, row2] = normal_rows(block.into1, block.into2);
    return gain + tan(r.strength1->friction) * row1 + tan(r.strength2->friction) * row2;
  }
  if (r.strength1) gain -= tan(r.strength1->friction) * block.into1;
  if (r.strength2) gain -= tan(r.strength2->friction) * block.into2;
  return gain;
}

// The allowed direction in which a passive bolt gains most: along the gain itself, or the nearest
// on a border of the allowed ones, or one of their corners.
Pull least_passive(const Vector3& gain, double need_kN, const Allowed& allowed) {
  std::vector<Vector3> ways = border_corners(allowed);
  ways.push_back(gain.normalized());
  for (const Circle& circle : borders(allowed)) {
    const double a = std::atan2(gain.dot(circle.second), gain.dot(circle.first));
    ways.push_back(circle.at(a));
  }
  Pull best;
  for (const Vector3& way : ways) {
    const double each = gain.dot(way);
    if (allowed.holds(way) && each > 0.0) best.take(need_kN / each, way);
  }
  return best;
}

void check(const WedgeTarget& target) {
  require_positive("target factor of safety", target.factor_of_safety);
  require_between("least bolt plunge", target.least_plunge.deg(), -90.0, 90.0);
  require_between("greatest bolt plunge", target.greatest_plunge.deg(), target.least_plunge.deg(),
                  90.0);
}

std::optional<WedgeBolt> bolt_of(const Pull& pull) {
  if (!std::isfinite(pull.force_kN)) return std::nullopt;
  if (pull.force_kN <= 0.0) return WedgeBolt{};
  return WedgeBolt{pull.force_kN, line_with_sense(pull.direction)};
}

void size_active(const WedgeCase& w, const WedgeResult& r, const Allowed& allowed,
                 WedgeSupport& support) {
  const WedgeTarget& target = support.target;
  const Pull least = settle(w, r, target.factor_of_safety, [&](const auto& regions) {
    return least_active(regions, r.resultant_kN, allowed);
  });
  support.least = bolt_of(least);
  if (!target.direction) return;
  const Vector3 way = direction(*target.direction);
  const Pull along = settle(w, r, target.factor_of_safety, [&](const auto& regions) {
    return Pull{active_along(regions, r.resultant_kN, way), way};
  });
  if (std::isfinite(along.force_kN)) support.along_direction_kN = along.force_kN;
}

void size_passive(const WedgeResult& r, const Allowed& allowed, WedgeSupport& support) {
  if (r.contact.mode == WedgeMode::lifts) return;
  const WedgeTarget& target = support.target;
  const Vector3 gain = passive_gain(r);
  const double need_kN = target.factor_of_safety * r.contact.driving_kN - r.resisting_kN;
  const Pull least = least_passive(gain, need_kN, allowed);
  support.least = bolt_of(least);
  if (!target.direction) return;
  const double each = gain.dot(direction(*target.direction));
  if (each > 0.0) support.along_direction_kN = need_kN / each;
}

}  // namespace

WedgeSupport support_wedge(const WedgeCase& wedge, const WedgeResult& result,
                           const WedgeTarget& target) {
  check(target);
  WedgeSupport support{target, wedge.bolt_action, std::nullopt, std::nullopt};
  if (at_least(result.factor_of_safety, target.factor_of_safety)) {
    support.least = WedgeBolt{};
    if (target.direction) support.along_direction_kN = 0.0;
    return support;
  }
  const Allowed allowed{outward_normal(wedge.geometry.face), sin(target.least_plunge),
                        sin(target.greatest_plunge)};
  if (wedge.bolt_action == BoltAction::active) {
    size_active(wedge, result, allowed, support);
  } else {
    size_passive(result, allowed, support);
  }
  return support;
}

}  // namespace brink
