#include "brink/mechanics/half_spaces.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <limits>
#include <optional>

#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();

struct Edge {
  Vector3 from;
  Vector3 to;
  bool bounded = true;
};

// Point common to both planes that lies nearest the origin.
Vector3 point_on_both(const HalfSpace& a, const HalfSpace& b, const Vector3& cross) {
  return (a.offset_m * b.outward.cross(cross) + b.offset_m * cross.cross(a.outward)) /
         cross.squaredNorm();
}

// Whether plane i, which is parallel to plane j, has surface of the solid on it as far as j is
// concerned.
bool parallel_leaves_face(const HalfSpace& i, const HalfSpace& j, bool i_comes_first) {
  if (i.outward.dot(j.outward) < 0.0) return i.offset_m > -j.offset_m;
  return i.offset_m < j.offset_m || (i.offset_m == j.offset_m && i_comes_first);
}

// The part of the line of planes i and j that lies in all other half-spaces, directed
// counter-clockwise round face i.
std::optional<Edge> edge_between(std::span<const HalfSpace> spaces, std::size_t i, std::size_t j) {
  const Vector3 cross = spaces[i].outward.cross(spaces[j].outward);
  const Vector3 along = cross.normalized();
  const Vector3 start = point_on_both(spaces[i], spaces[j], cross);
  double from = -kInfinity;
  double to = kInfinity;
  for (std::size_t k = 0; k < spaces.size(); ++k) {
    if (k == i || k == j) continue;
    const double slope = spaces[k].outward.dot(along);
    const double room = spaces[k].offset_m - spaces[k].outward.dot(start);
    if (strictly_above(slope, 0.0)) {
      to = std::min(to, room / slope);
    } else if (strictly_below(slope, 0.0)) {
      from = std::max(from, room / slope);
    } else if (strictly_below(room, 0.0)) {
      return std::nullopt;
    }
  }
  if (!(from < to)) return std::nullopt;
  if (from == -kInfinity || to == kInfinity) return Edge{start, start, false};
  return Edge{start + from * along, start + to * along};
}

// Edges of face i in any order; none where a parallel plane hides it.
std::vector<Edge> edges_of_face(std::span<const HalfSpace> spaces, std::size_t i) {
  std::vector<Edge> edges;
  for (std::size_t j = 0; j < spaces.size(); ++j) {
    if (j == i) continue;
    if (spaces[i].outward.cross(spaces[j].outward).norm() <= kParallel) {
      if (!parallel_leaves_face(spaces[i], spaces[j], i < j)) return {};
      continue;
    }
    if (const auto edge = edge_between(spaces, i, j)) edges.push_back(*edge);
  }
  return edges;
}

// Starts of the edges in the order in which they follow one another; edges that rounding made out
// of a corner are left out.
std::vector<Vector3> chain(const std::vector<Edge>& edges) {
  std::vector<Edge> left;
  for (const Edge& e : edges) {
    if (strictly_above((e.to - e.from).norm(), 0.0)) left.push_back(e);
  }
  std::vector<Vector3> corners;
  while (!left.empty()) {
    const Edge current = left.back();
    corners.push_back(current.from);
    left.pop_back();
    const auto next = std::min_element(left.begin(), left.end(), [&](const Edge& a, const Edge& b) {
      return (a.from - current.to).squaredNorm() < (b.from - current.to).squaredNorm();
    });
    if (next != left.end()) std::swap(*next, left.back());
  }
  return corners;
}

SolidFace measure(std::vector<Vector3> corners, const Vector3& outward) {
  SolidFace face;
  face.corners = std::move(corners);
  if (face.corners.size() < 3) return {};
  const Vector3& hub = face.corners.front();
  for (std::size_t k = 1; k + 1 < face.corners.size(); ++k) {
    const Vector3 a = face.corners[k] - hub;
    const Vector3 b = face.corners[k + 1] - hub;
    const double triangle = 0.5 * outward.dot(a.cross(b));
    face.area_m2 += triangle;
    face.centroid += triangle * (a + b) / 3.0;
  }
  face.centroid = hub + face.centroid / face.area_m2;
  return face;
}

// Pyramids from one point inside to every face.
void measure(Solid& solid, std::span<const HalfSpace> spaces) {
  Vector3 hub = Vector3::Zero();
  double corners = 0.0;
  for (const SolidFace& face : solid.faces) {
    for (const Vector3& corner : face.corners) hub += corner;
    corners += static_cast<double>(face.corners.size());
  }
  hub /= corners;
  Vector3 moment = Vector3::Zero();
  for (std::size_t i = 0; i < spaces.size(); ++i) {
    const SolidFace& face = solid.faces[i];
    const double pyramid = face.area_m2 * (spaces[i].offset_m - spaces[i].outward.dot(hub)) / 3.0;
    solid.volume_m3 += pyramid;
    moment += pyramid * 0.75 * (face.centroid - hub);
  }
  solid.centroid = hub + moment / solid.volume_m3;
}

// `half_spaces` with lengths divided so that ties compare numbers near 1.
Solid common_solid_scaled(std::span<const HalfSpace> half_spaces) {
  Solid solid;
  solid.faces.resize(half_spaces.size());
  std::size_t bearing = 0;
  for (std::size_t i = 0; i < half_spaces.size(); ++i) {
    const std::vector<Edge> edges = edges_of_face(half_spaces, i);
    if (std::any_of(edges.begin(), edges.end(), [](const Edge& e) { return !e.bounded; })) {
      return {SolidState::unbounded, 0.0, Vector3::Zero(),
              std::vector<SolidFace>(half_spaces.size())};
    }
    solid.faces[i] = measure(chain(edges), half_spaces[i].outward);
    if (!solid.faces[i].corners.empty()) ++bearing;
  }
  if (bearing < 4) {
    solid.faces.assign(half_spaces.size(), {});
    return solid;
  }
  measure(solid, half_spaces);
  solid.state = SolidState::solid;
  return solid;
}

void stretch(Solid& solid, double scale_m) {
  for (SolidFace& face : solid.faces) {
    for (Vector3& corner : face.corners) corner *= scale_m;
    face.area_m2 *= scale_m * scale_m;
    face.centroid *= scale_m;
  }
  solid.volume_m3 *= scale_m * scale_m * scale_m;
  solid.centroid *= scale_m;
}

}  // namespace

Solid common_solid(std::span<const HalfSpace> half_spaces) {
  double scale_m = 0.0;
  for (const HalfSpace& h : half_spaces) scale_m = std::max(scale_m, std::abs(h.offset_m));
  if (scale_m == 0.0) scale_m = 1.0;
  std::vector<HalfSpace> scaled(half_spaces.begin(), half_spaces.end());
  for (HalfSpace& h : scaled) h.offset_m /= scale_m;
  Solid solid = common_solid_scaled(scaled);
  stretch(solid, scale_m);
  return solid;
}

}  // namespace brink
