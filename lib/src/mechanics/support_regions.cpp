#include "support_regions.hpp"

#include <Eigen/Dense>
#include <algorithm>
#include <cmath>
#include <limits>

#include "brink/base/ties.hpp"

namespace brink {

namespace {

// Normal force and shear of r on the cone's plane.
struct OnPlane {
  double normal;
  Vector3 shear;
};

OnPlane split(const FrictionCone& cone, const Vector3& r) {
  const double normal = -cone.into.dot(r);
  return {normal, r + normal * cone.into};
}

double cone_excess(const FrictionCone& cone, const Vector3& r) {
  const OnPlane on = split(cone, r);
  return cone.cohesion_kN + on.normal * cone.tan_friction - cone.target * on.shear.norm();
}

// Point nearest to r on the planes in which the chosen limits are equalities.
std::optional<Vector3> onto(const std::vector<const ForceLimit*>& chosen, const Vector3& r) {
  const auto count = static_cast<Eigen::Index>(chosen.size());
  Eigen::MatrixXd rows(count, 3);
  Eigen::VectorXd miss(count);
  for (Eigen::Index i = 0; i < count; ++i) {
    const ForceLimit& limit = *chosen[static_cast<std::size_t>(i)];
    const double length = limit.normal.norm();
    rows.row(i) = limit.normal.transpose() / length;
    miss[i] = (limit.offset - limit.normal.dot(r)) / length;
  }
  const Eigen::ColPivHouseholderQR<Eigen::MatrixXd> gram(rows * rows.transpose());
  if (gram.rank() < count) return std::nullopt;
  return r + rows.transpose() * gram.solve(miss);
}

// Every combination of up to three limits, met as equalities.
void add_flat_candidates(const SafeRegion& region, const Vector3& r, std::vector<Vector3>& found) {
  const std::size_t subsets = std::size_t{1} << region.limits.size();
  for (std::size_t subset = 1; subset < subsets; ++subset) {
    std::vector<const ForceLimit*> chosen;
    for (std::size_t i = 0; i < region.limits.size(); ++i) {
      if ((subset >> i) & 1U) chosen.push_back(&region.limits[i]);
    }
    if (chosen.size() > 3) continue;
    if (const auto point = onto(chosen, r)) found.push_back(*point);
  }
}

// Points on the cone: nearest to r in a half-plane through its axis, and at the least normal force.
// The half-planes that matter hold r itself or the border to the mode of both planes.
void add_cone_candidates(const FrictionCone& cone, const Vector3& r, std::vector<Vector3>& found) {
  const OnPlane on = split(cone, r);
  std::vector<Vector3> ways{cone.line, -cone.line};
  if (on.shear.norm() > 0.0) ways.push_back(on.shear.normalized());
  const double t = cone.tan_friction;
  const double f = cone.target;
  for (const Vector3& way : ways) {
    const double along = on.shear.dot(way);
    const double step = (f * along - cone.cohesion_kN - on.normal * t) / (f * f + t * t);
    const double normal = on.normal + step * t;
    const double shear = along - step * f;
    if (shear >= 0.0) found.push_back(-normal * cone.into + shear * way);
    const double least = cone.least_normal_kN;
    found.push_back(-least * cone.into + (cone.cohesion_kN + least * t) / f * way);
  }
}

// Values of t at which r + t direction may enter the cone.
void add_cone_crossings(const FrictionCone& cone, const Vector3& r, const Vector3& direction,
                        std::vector<double>& crossings) {
  const OnPlane start = split(cone, r);
  const OnPlane move = split(cone, direction);
  const double rise = move.normal * cone.tan_friction;
  const double base = cone.cohesion_kN + start.normal * cone.tan_friction;
  const double f2 = cone.target * cone.target;
  const double a = rise * rise - f2 * move.shear.squaredNorm();
  const double b = rise * base - f2 * move.shear.dot(start.shear);
  const double c = base * base - f2 * start.shear.squaredNorm();
  const double root = b * b - a * c;
  if (root < 0.0) return;
  // Both roots without cancellation: q and c/q.
  const double q = -(b + std::copysign(std::sqrt(root), b));
  if (a != 0.0) crossings.push_back(q / a);
  if (q != 0.0) crossings.push_back(c / q);
}

}  // namespace

std::array<Vector3, 2> normal_rows(const Vector3& into1, const Vector3& into2) {
  const Vector3 cross = into1.cross(into2);
  const double square = cross.squaredNorm();
  return {cross.cross(into2) / square, into1.cross(cross) / square};
}

bool SafeRegion::holds(const Vector3& r) const {
  for (const ForceLimit& limit : limits) {
    if (limit.normal.dot(r) < limit.offset - slack_kN) return false;
  }
  return !cone || cone_excess(*cone, r) >= -slack_kN;
}

std::array<SafeRegion, 3> safe_regions(const SafeProblem& p) {
  const auto [row1, row2] = normal_rows(p.into1, p.into2);
  const double slack_kN = kTie * p.weight_kN;
  const Vector3 friction = p.tan1 * row1 + p.tan2 * row2;
  const double cohesion_kN = p.cohesion1_kN + p.cohesion2_kN;
  const SafeRegion both{{{row1, 0.0},
                         {row2, 0.0},
                         {friction - p.target * p.line, -cohesion_kN},
                         {friction + p.target * p.line, -cohesion_kN}},
                        std::nullopt,
                        slack_kN};
  // A plane that bears nothing is no contact: the least normal force is a tie above 0.
  const double least_kN = 4.0 * slack_kN;
  const auto one = [&](const Vector3& into, const Vector3& other_row, double c_kN, double tangent) {
    return SafeRegion{{{-into, least_kN}, {-other_row, 0.0}},
                      FrictionCone{into, p.line, c_kN, tangent, p.target, least_kN},
                      slack_kN};
  };
  return {both, one(p.into1, row2, p.cohesion1_kN, p.tan1),
          one(p.into2, row1, p.cohesion2_kN, p.tan2)};
}

std::optional<Vector3> nearest_safe(const SafeRegion& region, const Vector3& r) {
  if (region.holds(r)) return r;
  std::vector<Vector3> candidates;
  add_flat_candidates(region, r, candidates);
  if (region.cone) add_cone_candidates(*region.cone, r, candidates);
  std::optional<Vector3> best;
  for (const Vector3& point : candidates) {
    if (!region.holds(point)) continue;
    if (!best || (point - r).norm() < (*best - r).norm()) best = point;
  }
  return best;
}

std::optional<double> least_along(const SafeRegion& region, const Vector3& r,
                                  const Vector3& direction) {
  if (region.holds(r)) return 0.0;
  std::vector<double> crossings;
  for (const ForceLimit& limit : region.limits) {
    const double rise = limit.normal.dot(direction);
    if (rise != 0.0) crossings.push_back((limit.offset - limit.normal.dot(r)) / rise);
  }
  if (region.cone) add_cone_crossings(*region.cone, r, direction, crossings);
  std::optional<double> best;
  for (const double t : crossings) {
    if (!(t >= 0.0) || (best && t >= *best)) continue;
    if (region.holds(r + t * direction)) best = t;
  }
  return best;
}

}  // namespace brink
