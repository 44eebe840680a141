// Weight, shaking, water, loads and bolts as forces on each block.
#include <algorithm>
#include <cmath>

#include "topple_chain.hpp"

namespace brink {
namespace {

void add_body(const ToppleInput& input, BlockLoading& b) {
  const SinCos p = sincos(input.columns.base_dip);
  const double width_m = input.columns.width_m;
  const double k = input.seismic_horizontal;
  b.weight_kN_m = input.unit_weight_kN_m3 * b.height_m * width_m;
  const double along = b.weight_kN_m * (p.sin + k * p.cos);
  const double across = b.weight_kN_m * (p.cos - k * p.sin);
  b.along_kN_m += along;
  b.across_kN_m += across;
  b.moment_kN += (along * b.height_m - across * width_m) / 2.0;
}

// Triangles of pressure in the joints and a trapezium on the base. Depths are measured along the
// columns, so the pressure at the base is that of the depth times cos(base dip).
void add_water(const ToppleInput& input, const BlockWater& water, BlockLoading& b) {
  const double upper_m = water.upper_m;
  const double lower_m = water.lower_m;
  const double width_m = input.columns.width_m;
  const double gradient = input.water_unit_weight_kN_m3 * cos(input.columns.base_dip);
  const double behind = gradient * upper_m * upper_m / 2.0;
  const double front = gradient * lower_m * lower_m / 2.0;
  b.along_kN_m += behind - front;
  b.across_kN_m -= gradient * (upper_m + lower_m) * width_m / 2.0;
  b.moment_kN += behind * upper_m / 3.0 - front * lower_m / 3.0 +
                 gradient * width_m * width_m * (2.0 * upper_m + lower_m) / 6.0;
}

void add_load(const ToppleInput& input, const BlockForce& load, BlockLoading& b) {
  const SinCos to_base = sincos(load.plunge - input.columns.base_dip);
  const double along = load.force_kN_m * to_base.cos;
  const double across = load.force_kN_m * to_base.sin;
  b.along_kN_m += along;
  b.across_kN_m += across;
  b.moment_kN += along * load.height_m.value_or(b.height_m) - across * input.columns.width_m / 2.0;
}

void add_bolt(const ToppleInput& input, const BlockForce& bolt, BlockLoading& b) {
  const SinCos to_base = sincos(bolt.plunge + input.columns.base_dip);
  const double up = bolt.force_kN_m * to_base.cos;
  b.along_kN_m -= up;
  b.across_kN_m += bolt.force_kN_m * to_base.sin;
  b.moment_kN -= up * bolt.height_m.value_or(b.height_m / 2.0);
}

}  // namespace

ContactArms contact_arms(const ToppleColumns& columns, std::size_t number) {
  const double height_m = columns.heights_m[number - 1];
  return {number < columns.crest ? height_m : height_m - columns.a2_m,
          number > columns.crest ? height_m : height_m - columns.a1_m};
}

std::vector<BlockWater> block_water(const ToppleInput& input) {
  if (input.water_fill == 0.0) return input.water;
  const std::size_t count = input.columns.heights_m.size();
  std::vector<BlockWater> water;
  double front_level_m = 0.0;  // of the joint in front, above the base of the block in front
  double front_contact_m = 0.0;
  for (std::size_t n = 1; n <= count; ++n) {
    const ContactArms arms = contact_arms(input.columns, n);
    // The same water as seen from this block's base, a step above that of the block in front.
    const double step_m = front_contact_m - arms.lower_m;
    const double lower_m = n == 1 ? 0.0 : std::max(front_level_m - step_m, 0.0);
    const double upper_m = n == count ? 0.0 : input.water_fill * std::max(arms.upper_m, 0.0);
    water.push_back({n, upper_m, lower_m});
    front_level_m = upper_m;
    front_contact_m = arms.upper_m;
  }
  return water;
}

std::vector<BlockLoading> block_loading(const ToppleInput& input) {
  const ToppleColumns& columns = input.columns;
  std::vector<BlockLoading> blocks(columns.heights_m.size());
  for (std::size_t i = 0; i < blocks.size(); ++i) {
    blocks[i].height_m = columns.heights_m[i];
    const ContactArms arms = contact_arms(columns, i + 1);
    blocks[i].upper_arm_m = arms.upper_m;
    blocks[i].lower_arm_m = arms.lower_m;
    add_body(input, blocks[i]);
  }
  for (const BlockWater& w : block_water(input)) add_water(input, w, blocks[w.block - 1]);
  for (const BlockForce& f : input.loads) add_load(input, f, blocks[f.block - 1]);
  for (const BlockForce& f : input.bolts) add_bolt(input, f, blocks[f.block - 1]);
  return blocks;
}

}  // namespace brink
