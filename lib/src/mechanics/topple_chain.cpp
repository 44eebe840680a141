#include "topple_chain.hpp"

#include <algorithm>
#include <boost/math/tools/toms748_solve.hpp>
#include <cmath>

#include "brink/base/ties.hpp"

namespace brink {
namespace {

// From here up columns lock: neither can slide on the other (Goodman & Bray's P_s divides by
// 1 - tan^2 phi, which is 0 at 45 degrees and negative above).
constexpr Angle kLocks = Angle::degrees(45.0);

bool locks(Angle friction) {
  return at_least(friction, kLocks);
}

struct Slope {
  double tan_friction;
  double sliding_divisor;  // 1 - tan^2; unused where columns lock
  bool locked;
};

Slope slope_of(Angle friction) {
  const double t = tan(friction);
  return {t, 1.0 - t * t, locks(friction)};
}

// P(n-1),s (1 - tan^2): the sliding demand times its divisor, from the force of the block behind.
double scaled_sliding(const BlockLoading& b, double behind_kN_m, const Slope& s) {
  return behind_kN_m * s.sliding_divisor + b.along_kN_m - b.across_kN_m * s.tan_friction;
}

double toppling(const BlockLoading& b, double behind_kN_m, double width_m, const Slope& s) {
  return (behind_kN_m * (b.upper_arm_m - width_m * s.tan_friction) + b.moment_kN) / b.lower_arm_m;
}

ToppleBlock settle_block(const BlockLoading& b, double behind_kN_m, double width_m,
                         const Slope& s) {
  ToppleBlock out;
  out.height_m = b.height_m;
  out.weight_kN_m = b.weight_kN_m;
  out.can_topple = strictly_above(b.lower_arm_m / width_m, 0.0);
  out.can_slide = !s.locked;
  if (out.can_topple) out.force_to_stop_toppling_kN_m = toppling(b, behind_kN_m, width_m, s);
  if (out.can_slide)
    out.force_to_stop_sliding_kN_m = scaled_sliding(b, behind_kN_m, s) / s.sliding_divisor;
  const double tip = out.can_topple ? out.force_to_stop_toppling_kN_m : 0.0;
  const double slide = out.can_slide ? out.force_to_stop_sliding_kN_m : 0.0;
  const double held_kN_m = std::max({tip, slide, 0.0});
  // A demand that rounding alone has made is none.
  if (strictly_above(held_kN_m / (b.weight_kN_m + behind_kN_m), 0.0)) {
    out.force_on_next_kN_m = held_kN_m;
    out.mode = tip >= slide ? BlockMode::topples : BlockMode::slides;
  }
  out.force_height_m = out.can_topple ? b.lower_arm_m : 0.0;
  const double gained_kN_m = behind_kN_m - out.force_on_next_kN_m;
  out.normal_kN_m = b.across_kN_m + gained_kN_m * s.tan_friction;
  out.shear_kN_m = b.along_kN_m + gained_kN_m;
  return out;
}

// From block `from` (counted from 0) of the top down to, but not with, block `to`.
double force_behind_toe(const std::vector<BlockLoading>& loading, double width_m, const Slope& s) {
  double force_kN_m = 0.0;
  for (std::size_t i = loading.size() - 1; i > 0; --i)
    force_kN_m = settle_block(loading[i], force_kN_m, width_m, s).force_on_next_kN_m;
  return force_kN_m;
}

constexpr double kScanStep = 0.125;   // degrees
constexpr double kBelowLock = 1e-7;   // degrees short of 45, where sliding is still possible
constexpr double kSteepest = 89.875;  // degrees; tan = 458

}  // namespace

std::vector<ToppleBlock> pass_down(const std::vector<BlockLoading>& loading, double width_m,
                                   Angle friction) {
  const Slope s = slope_of(friction);
  std::vector<ToppleBlock> blocks(loading.size());
  double behind_kN_m = 0.0;
  for (std::size_t i = loading.size(); i-- > 0;) {
    blocks[i] = settle_block(loading[i], behind_kN_m, width_m, s);
    blocks[i].number = i + 1;
    behind_kN_m = blocks[i].force_on_next_kN_m;
  }
  return blocks;
}

double toe_demand_kN_m(const std::vector<BlockLoading>& loading, double width_m, Angle friction) {
  const Slope s = slope_of(friction);
  const double behind_kN_m = force_behind_toe(loading, width_m, s);
  const BlockLoading& toe = loading.front();
  const bool can_topple = strictly_above(toe.lower_arm_m / width_m, 0.0);
  // A toe that can neither tip nor slide asks for nothing.
  double demand = -toe.weight_kN_m;
  if (can_topple) demand = std::max(demand, toppling(toe, behind_kN_m, width_m, s));
  if (!s.locked) demand = std::max(demand, scaled_sliding(toe, behind_kN_m, s));
  return demand;
}

std::optional<Angle> friction_for_balance(const std::vector<BlockLoading>& loading,
                                          double width_m) {
  const auto demand = [&](double deg) {
    return toe_demand_kN_m(loading, width_m, Angle::degrees(deg));
  };
  // Coming down from the steepest angle, the first that no longer balances brackets the answer.
  double holds_deg = kSteepest;
  if (demand(holds_deg) > 0.0) return {};
  const auto solve_above = [&](double fails_deg) {
    std::uintmax_t rounds = 200;
    const auto [low, high] = boost::math::tools::toms748_solve(
        demand, fails_deg, holds_deg, boost::math::tools::eps_tolerance<double>(48), rounds);
    return Angle::degrees((low + high) / 2.0);
  };
  const double lock_deg = kLocks.deg();
  for (double deg = holds_deg - kScanStep; deg >= lock_deg; deg -= kScanStep) {
    if (demand(deg) > 0.0) return solve_above(deg);
    holds_deg = deg;
  }
  // Held by locking alone, and lost as soon as columns can slide.
  if (demand(lock_deg - kBelowLock) > 0.0) return kLocks;
  holds_deg = lock_deg - kBelowLock;
  for (double deg = lock_deg - kScanStep; deg >= 0.0; deg -= kScanStep) {
    if (demand(deg) > 0.0) return solve_above(deg);
    holds_deg = deg;
  }
  return Angle{};
}

}  // namespace brink
