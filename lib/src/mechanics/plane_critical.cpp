// Where a vertical crack leaves the block least safe, found by search.
#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <limits>
#include <numbers>
#include <vector>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "plane_equilibrium.hpp"

namespace brink {
namespace {

constexpr int kSteps = 400;       // on each side of the crest
constexpr double kSliver = 1e-6;  // share of a side left out where the block shrinks to nothing
constexpr int kBits = 40;         // precision asked of the refinement

struct Candidate {
  double x_m = 0.0;
  double factor_of_safety = std::numeric_limits<double>::infinity();
};

// Factor of safety against sliding down as a function of the crack's position. Where the forces
// push the block up there is no such slide.
class CrackObjective {
 public:
  CrackObjective(const PlaneSlideInput& input, const SectionShape& shape)
      : input_(input), shape_(shape), loads_(section_loads(input, shape.azimuth)) {}

  double operator()(double x_m) const {
    const CutBlock block = block_before_crack(shape_, x_m);
    const SlideForces forces = slide_forces(input_, shape_, loads_, block, true);
    const SlideBalance balance = slide_balance(input_.strength, forces, block.sliding_length_m);
    const bool upward = balance.mode == PlaneSlideMode::slides && forces.driving_kN_m <= 0.0;
    return upward ? std::numeric_limits<double>::infinity() : balance.factor_of_safety;
  }

 private:
  const PlaneSlideInput& input_;
  const SectionShape& shape_;
  SectionLoads loads_;
};

[[noreturn]] void refuse_depth(double water_m, double most_m) {
  throw Error(ErrorKind::argument, Place{{}, 0, 0, "water depth"},
              "is deeper than a crack can be anywhere on the block", shortest(water_m),
              "0 to " + fixed(most_m, 3) + " m");
}

// The positions at which a crack holds the water, in front of the crest and behind it. Depth grows
// linearly from the toe to the crest and falls linearly behind it.
struct Range {
  double front_m = 0.0;
  double crest_m = 0.0;
  double back_m = 0.0;
};

Range possible_positions(const PlaneSlideInput& input, const SectionShape& shape) {
  const double water_m = input.water_depth_m;
  const double crest_m = std::max(shape.crest.x(), 0.0);
  const double most_m = crack_depth_m(shape, crest_m);
  if (strictly_above(water_m / shape.height_m, most_m / shape.height_m))
    refuse_depth(water_m, most_m);
  const double share = std::min(water_m / most_m, 1.0);
  Range range{crest_m * share, crest_m, shape.exit.x() + (crest_m - shape.exit.x()) * share};
  if (water_m > 0.0) return range;
  range.front_m += kSliver * (crest_m > 0.0 ? crest_m : range.back_m);
  range.crest_m = std::max(crest_m, range.front_m);
  range.back_m -= kSliver * (range.back_m - range.crest_m);
  return range;
}

Candidate refined(const CrackObjective& objective, double low_m, double high_m, Candidate best) {
  if (!(high_m > low_m)) return best;
  const auto [x_m, fs] = boost::math::tools::brent_find_minima(objective, low_m, high_m, kBits);
  return fs < best.factor_of_safety ? Candidate{x_m, fs} : best;
}

// Steps crowd at both ends, where a small block under a full crack changes fastest.
double crowded_share(int step) {
  return (1.0 - std::cos(std::numbers::pi * step / kSteps)) / 2.0;
}

// Every valley of a fine scan is refined, so that the least of several is found.
class Scan {
 public:
  Scan(const CrackObjective& objective, double from_m, double to_m) {
    if (!(to_m > from_m)) return;
    std::vector<Candidate> points;
    for (int i = 0; i <= kSteps; ++i) {
      const double x_m = i == kSteps ? to_m : from_m + (to_m - from_m) * crowded_share(i);
      points.push_back({x_m, objective(x_m)});
      highest_ = std::max(highest_, points.back().factor_of_safety);
    }
    const int last = kSteps;
    for (int i = 0; i <= last; ++i) {
      const auto at = [&](int k) {
        return points[static_cast<std::size_t>(std::clamp(k, 0, last))];
      };
      if (at(i).factor_of_safety > at(i - 1).factor_of_safety ||
          at(i).factor_of_safety > at(i + 1).factor_of_safety)
        continue;
      take(refined(objective, at(i - 1).x_m, at(i + 1).x_m, at(i)));
    }
  }

  const Candidate& best() const { return best_; }
  double highest() const { return highest_; }

 private:
  void take(const Candidate& candidate) {
    if (candidate.factor_of_safety < best_.factor_of_safety) best_ = candidate;
  }

  Candidate best_;
  double highest_ = 0.0;
};

}  // namespace

CrackSearch search_critical_crack(const PlaneSlideInput& input, const SectionShape& shape) {
  const CrackObjective objective(input, shape);
  const Range range = possible_positions(input, shape);
  const Scan behind(objective, range.crest_m, range.back_m);
  const Scan front(objective, range.front_m, range.crest_m);
  const Candidate crest{range.crest_m, objective(range.crest_m)};
  Candidate best = crest;
  for (const Candidate& c : {behind.best(), front.best()}) {
    if (c.factor_of_safety < best.factor_of_safety * (1.0 - kTie)) best = c;
  }
  CrackSearch out;
  out.x_m = best.x_m;
  const double highest = std::max(behind.highest(), front.highest());
  out.flat = at_most(highest / best.factor_of_safety, 1.0);
  if (best.x_m < range.crest_m)
    out.least_behind_crest = std::min(crest.factor_of_safety, behind.best().factor_of_safety);
  const double reach_m = kTie * shape.height_m;
  out.at_edge = best.x_m <= range.front_m + reach_m || best.x_m >= range.back_m - reach_m;
  return out;
}

}  // namespace brink
