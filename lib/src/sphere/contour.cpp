#include "brink/sphere/contour.hpp"

#include <algorithm>
#include <cstdint>
#include <map>
#include <unordered_map>

namespace brink {

namespace {

using Loop = std::vector<Vector3>;

// A run of the level line through the mesh, higher ground on its left as seen on the net.
// `begin` and `end` number the sides of the rim that it crosses; none for a closed run.
struct Run {
  Loop points;
  bool closed = false;
  std::size_t begin = 0;
  std::size_t end = 0;
};

// A side of a triangle, its lower node first.
using Side = std::uint64_t;

Side side_of(std::uint32_t a, std::uint32_t b) {
  return (static_cast<Side>(std::min(a, b)) << 32) | std::max(a, b);
}

class Tracer {
 public:
  Tracer(const DensityGrid& grid, double level) : grid_(grid), level_(level) { link(); }

  std::vector<Run> runs() {
    std::vector<Run> all;
    for (const Side start : starts()) all.push_back(trace(start));
    for (const Side side : order_) {
      if (next_.contains(side)) all.push_back(trace(side));
    }
    return all;
  }

  bool above(std::uint32_t node) const { return grid_.values[node] >= level_; }
  std::size_t rim_count() const { return grid_.mesh.nodes.size() - grid_.mesh.first_on_rim; }
  std::uint32_t rim_node(std::size_t i) const {
    return static_cast<std::uint32_t>(grid_.mesh.first_on_rim + i % rim_count());
  }

 private:
  // In each triangle the line enters through one side and leaves through another.
  void link() {
    for (const auto& t : grid_.mesh.triangles) {
      Side falling = 0, rising = 0;
      bool crossed = false;
      for (std::size_t i = 0; i < 3; ++i) {
        const std::uint32_t from = t[i], to = t[(i + 1) % 3];
        if (above(from) == above(to)) continue;
        crossed = true;
        (above(from) ? falling : rising) = side_of(from, to);
      }
      if (!crossed) continue;
      next_.emplace(falling, rising);
      order_.push_back(falling);
    }
  }

  // Sides of the rim where a run comes in: those that fall, going anticlockwise.
  std::vector<Side> starts() const {
    std::vector<Side> sides;
    for (std::size_t i = 0; i < rim_count(); ++i) {
      if (above(rim_node(i)) && !above(rim_node(i + 1))) {
        sides.push_back(side_of(rim_node(i), rim_node(i + 1)));
      }
    }
    return sides;
  }

  Run trace(Side side) {
    Run run;
    run.begin = rim_index(side);
    const Side first = side;
    run.points.push_back(crossing(side));
    for (auto found = next_.find(side); found != next_.end(); found = next_.find(side)) {
      side = found->second;
      next_.erase(found);
      run.points.push_back(crossing(side));
    }
    run.closed = side == first;
    run.end = rim_index(side);
    return run;
  }

  Vector3 crossing(Side side) const {
    const auto a = static_cast<std::uint32_t>(side >> 32);
    const auto b = static_cast<std::uint32_t>(side);
    const double from = grid_.values[a], to = grid_.values[b];
    const double share = (level_ - from) / (to - from);
    const Vector3 between =
        grid_.mesh.nodes[a] + share * (grid_.mesh.nodes[b] - grid_.mesh.nodes[a]);
    return between.normalized();
  }

  // The number of a side among the sides of the rim, counted by its first node anticlockwise.
  std::size_t rim_index(Side side) const {
    const std::size_t a = static_cast<std::uint32_t>(side >> 32);
    const std::size_t b = static_cast<std::uint32_t>(side);
    if (a < grid_.mesh.first_on_rim) return 0;
    const std::size_t low = a - grid_.mesh.first_on_rim;
    return b - a == 1 ? low : rim_count() - 1;
  }

  const DensityGrid& grid_;
  double level_;
  std::unordered_map<Side, Side> next_;
  std::vector<Side> order_;
};

// Open runs joined end to end across the rim. At both of two opposite places on the rim the higher
// ground lies anticlockwise, so where one run ends the run opposite ends too: every second run is
// taken backwards.
class RimJoiner {
 public:
  RimJoiner(std::vector<Run> runs, std::size_t rim_count)
      : runs_(std::move(runs)), half_(rim_count / 2), rim_count_(rim_count) {
    for (std::size_t i = 0; i < runs_.size(); ++i) {
      beginning_at_[runs_[i].begin] = i;
      ending_at_[runs_[i].end] = i;
    }
  }

  std::vector<LevelLine> lines(double level) {
    std::vector<LevelLine> all;
    std::vector<bool> used(runs_.size(), false);
    for (std::size_t first = 0; first < runs_.size(); ++first) {
      if (used[first]) continue;
      LevelLine line{level, {}};
      bool forward = true;
      for (std::size_t i = first; !used[i];) {
        used[i] = true;
        line.pieces.push_back(piece(runs_[i], forward));
        const std::size_t left_at = forward ? runs_[i].end : runs_[i].begin;
        const std::size_t opposite = (left_at + half_) % rim_count_;
        // Entered at its end, the next run is taken backwards, and the other way round.
        i = forward ? ending_at_.at(opposite) : beginning_at_.at(opposite);
        forward = !forward;
      }
      all.push_back(std::move(line));
    }
    return all;
  }

 private:
  static Loop piece(const Run& run, bool forward) {
    return forward ? run.points : Loop(run.points.rbegin(), run.points.rend());
  }

  std::vector<Run> runs_;
  std::map<std::size_t, std::size_t> beginning_at_, ending_at_;
  std::size_t half_, rim_count_;
};

}  // namespace

std::vector<LevelLine> level_lines(const DensityGrid& grid, double level) {
  Tracer tracer(grid, level);
  std::vector<LevelLine> lines;
  std::vector<Run> open;
  for (Run& run : tracer.runs()) {
    if (run.closed) {
      lines.push_back({level, {std::move(run.points)}});
    } else {
      open.push_back(std::move(run));
    }
  }
  for (LevelLine& line : RimJoiner(std::move(open), tracer.rim_count()).lines(level)) {
    lines.push_back(std::move(line));
  }
  return lines;
}

std::vector<std::vector<Vector3>> level_area(const DensityGrid& grid, double level) {
  Tracer tracer(grid, level);
  std::vector<Loop> loops;
  std::map<std::size_t, Run> open;  // by the side of the rim where each begins
  for (Run& run : tracer.runs()) {
    if (run.closed) {
      loops.push_back(std::move(run.points));
    } else {
      open.emplace(run.begin, std::move(run));
    }
  }
  const auto on_rim = [&](std::size_t i) { return grid.mesh.nodes[tracer.rim_node(i)]; };
  if (open.empty() && tracer.above(tracer.rim_node(0))) {
    Loop& rim = loops.emplace_back();
    for (std::size_t i = 0; i < tracer.rim_count(); ++i) rim.push_back(on_rim(i));
  }
  while (!open.empty()) {
    Loop loop;
    // Along a run to the rim, then anticlockwise on high ground to where the next run comes in.
    for (auto run = open.begin(); run != open.end();) {
      loop.insert(loop.end(), run->second.points.begin(), run->second.points.end());
      std::size_t i = run->second.end + 1;
      open.erase(run);
      loop.push_back(on_rim(i));
      for (; tracer.above(tracer.rim_node(i + 1)); ++i) loop.push_back(on_rim(i + 1));
      run = open.find(i % tracer.rim_count());
    }
    loops.push_back(std::move(loop));
  }
  return loops;
}

std::vector<double> usual_levels(double peak) {
  if (peak <= 2.0) return peak > 1.5 ? std::vector<double>{1.5} : std::vector<double>{};
  constexpr std::size_t kMost = 5;
  std::vector<double> levels;
  for (double level = 2.0; level < peak; level *= 2.0) {
    levels.push_back(level);
    if (1.5 * level < peak) levels.push_back(1.5 * level);
  }
  // Every second, fourth ... where there are too many.
  std::size_t step = 1;
  while ((levels.size() + step - 1) / step > kMost) step *= 2;
  std::vector<double> chosen;
  for (std::size_t i = 0; i < levels.size(); i += step) chosen.push_back(levels[i]);
  return chosen;
}

}  // namespace brink
