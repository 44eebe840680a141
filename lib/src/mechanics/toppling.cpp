#include "brink/mechanics/toppling.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "require.hpp"
#include "topple_chain.hpp"

namespace brink {
namespace {

constexpr std::size_t kMostBlocks = 10000;

[[noreturn]] void refuse(const std::string& name, const std::string& what, const std::string& value,
                         const std::string& accepted) {
  throw Error(ErrorKind::argument, Place{{}, 0, 0, name}, what, value, accepted);
}

void check_columns(const ToppleColumns& c) {
  const std::size_t count = c.heights_m.size();
  if (count == 0) refuse("blocks", "there is no block", {}, "at least 1 block");
  if (count > kMostBlocks)
    refuse("blocks", "are too many", std::to_string(count), fmt::format("at most {}", kMostBlocks));
  for (std::size_t i = 0; i < count; ++i)
    require_positive(fmt::format("height of block {}", i + 1), c.heights_m[i]);
  if (c.crest < 1 || c.crest > count)
    refuse("crest", "is not the number of a block", std::to_string(c.crest),
           fmt::format("1 to {}", count));
  require_positive("width", c.width_m);
  require_between("base dip", c.base_dip.deg(), 0.0, 90.0);
  require_not_negative("a1", c.a1_m);
  require_finite("a2", c.a2_m);
}

void check_block(const std::string& name, std::size_t block, std::size_t count) {
  if (block >= 1 && block <= count) return;
  refuse(name, "is on a block that does not exist", std::to_string(block),
         fmt::format("block 1 to {}", count));
}

void check_water(const ToppleInput& in) {
  const std::size_t count = in.columns.heights_m.size();
  require_positive("water unit weight", in.water_unit_weight_kN_m3);
  require_between("water fill", in.water_fill, 0.0, 1.0);
  if (in.water_fill > 0.0 && !in.water.empty())
    refuse("water", "is given twice, as a fill of every joint and block by block", {},
           "one of the two");
  std::vector<bool> wet(count, false);
  for (const BlockWater& w : in.water) {
    check_block("water", w.block, count);
    const std::string name = fmt::format("water at block {}", w.block);
    const double height_m = in.columns.heights_m[w.block - 1];
    require_between(name, w.upper_m, 0.0, height_m);
    require_between(name, w.lower_m, 0.0, height_m);
    if (wet[w.block - 1]) refuse(name, "is given twice", {}, "one depth behind and one in front");
    wet[w.block - 1] = true;
  }
}

void check_forces(const std::string& name, const std::vector<BlockForce>& forces,
                  const ToppleColumns& columns) {
  for (const BlockForce& f : forces) {
    check_block(name, f.block, columns.heights_m.size());
    require_not_negative(name, f.force_kN_m);
    require_between(name + " plunge", f.plunge.deg(), -90.0, 90.0);
    if (f.height_m)
      require_between(name + " height", *f.height_m, 0.0, columns.heights_m[f.block - 1]);
  }
}

void check_input(const ToppleInput& in) {
  check_columns(in.columns);
  require_positive("unit weight", in.unit_weight_kN_m3);
  require_friction("friction", in.friction);
  check_water(in);
  check_forces("load", in.loads, in.columns);
  check_forces("bolt", in.bolts, in.columns);
  require_finite("seismic horizontal", in.seismic_horizontal);
  require_between("bolt plunge", in.balance_bolt_plunge.deg(), -90.0, 90.0);
  if (in.balance_bolt_height_m) {
    require_positive("bolt height", *in.balance_bolt_height_m);
    require_between("bolt height", *in.balance_bolt_height_m, 0.0, in.columns.heights_m.front());
  }
}

void check_geometry(const ToppleGeometry& g) {
  const double face_deg = g.face_dip.deg();
  require_positive("face dip", face_deg);
  require_between("face dip", face_deg, 0.0, 179.0);
  require_positive("height", g.height_m);
  require_between("upper dip", g.upper_dip.deg(), -90.0, 90.0);
  require_between("base dip", g.base_dip.deg(), 0.0, 90.0);
  require_positive("width", g.width_m);
  require_not_negative("step", g.step_m);
  const Angle over = g.face_dip - g.base_dip;
  if (!strictly_above(over, Angle{}) || !strictly_below(over, 90_deg))
    refuse("base dip", "leaves no columns in a face of " + shortest(face_deg) + " degrees",
           shortest(g.base_dip.deg()), "less than the face dip, and by less than 90 degrees");
  if (!strictly_below(azimuth_difference(g.base_dip, g.upper_dip), 90_deg))
    refuse("upper dip", "is square to the bases or beyond", shortest(g.upper_dip.deg()),
           "within 90 degrees of the base dip");
}

std::size_t crest_number(const ToppleGeometry& g) {
  const Angle over = g.face_dip - g.base_dip;
  const double along_m = g.height_m / sin(g.face_dip) * cos(over);
  const double number = std::max(std::round(along_m / g.width_m), 1.0);
  if (number > static_cast<double>(kMostBlocks))
    refuse("width", "makes too many blocks", shortest(g.width_m),
           fmt::format("a width that makes at most {}", kMostBlocks));
  return static_cast<std::size_t>(number);
}

void warn_of_tension(ToppleResult& out) {
  for (const ToppleBlock& b : out.blocks) {
    if (strictly_below(b.normal_kN_m / b.weight_kN_m, 0.0))
      out.warnings.push_back(
          fmt::format("block {} lifts off its base (normal force {} kN/m): outside the method",
                      b.number, fixed(b.normal_kN_m, 1)));
  }
}

// The pull on block 1 that takes the demand away: along the base its part up the slope and the
// friction that its part into the base raises; about the front corner its part along the base.
std::optional<double> balance_bolt(const ToppleInput& in, ToppleResult& out) {
  if (out.stable) return 0.0;
  const ToppleBlock& toe = out.blocks.front();
  const SinCos to_base = sincos(in.balance_bolt_plunge + in.columns.base_dip);
  const double slope = tan(in.friction);
  double pull_kN_m = 0.0;
  if (toe.can_slide && toe.force_to_stop_sliding_kN_m > 0.0) {
    const double grip = to_base.cos + to_base.sin * slope;
    if (!strictly_above(grip, 0.0)) return {};
    pull_kN_m = toe.force_to_stop_sliding_kN_m * (1.0 - slope * slope) / grip;
  }
  if (!toe.can_topple || toe.force_to_stop_toppling_kN_m <= 0.0) return pull_kN_m;
  if (!in.balance_bolt_height_m) {
    out.warnings.emplace_back(
        "block 1 topples too: the bolt for balance counts sliding alone until the bolt's height on "
        "the block is given");
    return pull_kN_m > 0.0 ? std::optional(pull_kN_m) : std::nullopt;
  }
  if (!strictly_above(to_base.cos, 0.0)) return {};
  const double moment_kN = toe.force_to_stop_toppling_kN_m * toe.force_height_m;
  return std::max(pull_kN_m, moment_kN / (*in.balance_bolt_height_m * to_base.cos));
}

double safety(Angle available, const std::optional<Angle>& required) {
  if (!required) return 0.0;
  const double needed = tan(*required);
  return needed > 0.0 ? tan(available) / needed : std::numeric_limits<double>::infinity();
}

}  // namespace

ToppleColumns topple_columns(const ToppleGeometry& g) {
  check_geometry(g);
  ToppleColumns out;
  out.width_m = g.width_m;
  out.base_dip = g.base_dip;
  out.a1_m = g.width_m * tan(g.face_dip - g.base_dip);
  out.a2_m = g.width_m * tan(g.base_dip - g.upper_dip);
  out.crest = crest_number(g);
  if (out.a1_m <= g.step_m)
    refuse("step", "leaves no columns, the base rising as fast as the face", shortest(g.step_m),
           fmt::format("0 and below {} m", fixed(out.a1_m, 3)));
  for (std::size_t n = 1; n <= out.crest; ++n)
    out.heights_m.push_back(static_cast<double>(n) * (out.a1_m - g.step_m));
  const double fall_m = out.a2_m + g.step_m;
  if (fall_m <= 0.0 || out.heights_m.back() / fall_m > static_cast<double>(kMostBlocks))
    refuse("upper dip", "leaves the columns without end behind the crest",
           shortest(g.upper_dip.deg()), "upper ground less steep than the stepped base");
  while (strictly_above((out.heights_m.back() - fall_m) / g.width_m, 0.0))
    out.heights_m.push_back(out.heights_m.back() - fall_m);
  return out;
}

std::vector<std::array<SectionPoint, 4>> topple_outlines(const ToppleColumns& columns) {
  const SinCos p = sincos(columns.base_dip);
  const auto at = [&](double along_m, double above_m) {
    return SectionPoint{along_m * p.cos - above_m * p.sin, along_m * p.sin + above_m * p.cos};
  };
  std::vector<std::array<SectionPoint, 4>> outlines;
  double base_m = 0.0;
  for (std::size_t n = 1; n <= columns.heights_m.size(); ++n) {
    const ContactArms arms = contact_arms(columns, n);
    if (n > 1) base_m += contact_arms(columns, n - 1).upper_m - arms.lower_m;
    const double front_m = static_cast<double>(n - 1) * columns.width_m;
    const double back_m = front_m + columns.width_m;
    const double top_m = base_m + columns.heights_m[n - 1];
    outlines.push_back(
        {at(front_m, base_m), at(back_m, base_m), at(back_m, top_m), at(front_m, top_m)});
  }
  return outlines;
}

ToppleResult analyse_toppling(const ToppleInput& input) {
  check_input(input);
  const std::vector<BlockLoading> loading = block_loading(input);
  const double width_m = input.columns.width_m;
  ToppleResult out;
  out.blocks = pass_down(loading, width_m, input.friction);
  out.toe_force_kN_m = out.blocks.front().force_on_next_kN_m;
  out.stable = out.blocks.front().mode == BlockMode::stable;
  out.friction_for_balance = friction_for_balance(loading, width_m);
  out.factor_of_safety = safety(input.friction, out.friction_for_balance);
  if (!out.friction_for_balance)
    out.warnings.emplace_back("no friction below 90 degrees balances the toe: it needs support");
  warn_of_tension(out);
  out.bolt_for_balance_kN_m = balance_bolt(input, out);
  return out;
}

}  // namespace brink
