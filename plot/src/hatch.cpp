#include "brink/plot/hatch.hpp"

#include <algorithm>
#include <cmath>

namespace brink::plot {

namespace {

// Page and hatch frames: in the latter lines run along x.
struct Turn {
  SinCos angle;
  Point in(const Point& p) const {
    return {p.x_mm * angle.cos + p.y_mm * angle.sin, p.y_mm * angle.cos - p.x_mm * angle.sin};
  }
  Point out(const Point& p) const {
    return {p.x_mm * angle.cos - p.y_mm * angle.sin, p.x_mm * angle.sin + p.y_mm * angle.cos};
  }
};

struct Edge {
  Point low, high;  // by y
};

std::vector<Edge> edges_of(const std::vector<std::vector<Point>>& outlines, const Turn& turn) {
  std::vector<Edge> edges;
  for (const auto& outline : outlines) {
    for (std::size_t i = 0; i < outline.size(); ++i) {
      Point a = turn.in(outline[i]);
      Point b = turn.in(outline[(i + 1) % outline.size()]);
      if (a.y_mm > b.y_mm) std::swap(a, b);
      if (a.y_mm < b.y_mm) edges.push_back({a, b});
    }
  }
  return edges;
}

// A vertex belongs to the edge above it only, so that a line through it is counted once.
std::vector<double> crossings(const std::vector<Edge>& edges, double y) {
  std::vector<double> xs;
  for (const Edge& e : edges) {
    if (y < e.low.y_mm || y >= e.high.y_mm) continue;
    const double share = (y - e.low.y_mm) / (e.high.y_mm - e.low.y_mm);
    xs.push_back(e.low.x_mm + share * (e.high.x_mm - e.low.x_mm));
  }
  std::sort(xs.begin(), xs.end());
  return xs;
}

}  // namespace

std::vector<std::pair<Point, Point>> hatch(const std::vector<std::vector<Point>>& outlines,
                                           Angle angle, double spacing_mm) {
  const Turn turn{sincos(angle)};
  const auto edges = edges_of(outlines, turn);
  std::vector<std::pair<Point, Point>> lines;
  if (edges.empty()) return lines;
  double top = edges[0].low.y_mm, bottom = edges[0].high.y_mm;
  for (const Edge& e : edges) {
    top = std::min(top, e.low.y_mm);
    bottom = std::max(bottom, e.high.y_mm);
  }
  for (double k = std::ceil(top / spacing_mm); k * spacing_mm < bottom; k += 1.0) {
    const double y = k * spacing_mm;
    const auto xs = crossings(edges, y);
    for (std::size_t i = 0; i + 1 < xs.size(); i += 2) {
      lines.emplace_back(turn.out({xs[i], y}), turn.out({xs[i + 1], y}));
    }
  }
  return lines;
}

Path hatched(const std::vector<std::vector<Point>>& outlines, Angle angle, double spacing_mm,
             Stroke stroke) {
  Path path{{}, std::move(stroke), {}};
  for (const auto& [from, to] : hatch(outlines, angle, spacing_mm)) {
    path.steps.emplace_back(MoveTo{from});
    path.steps.emplace_back(LineTo{to});
  }
  return path;
}

}  // namespace brink::plot
