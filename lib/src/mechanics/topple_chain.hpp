// One pass down the columns at one friction angle.
#pragma once

#include <vector>

#include "brink/mechanics/toppling.hpp"

namespace brink {

// What acts on a block besides its neighbours, its friction and its base: components down the base
// and into it, and the moment about its lower front corner that tips it forward.
struct BlockLoading {
  double height_m = 0.0;
  double weight_kN_m = 0.0;
  double along_kN_m = 0.0;
  double across_kN_m = 0.0;  // effective: the water's uplift on the base taken off
  double moment_kN = 0.0;
  double upper_arm_m = 0.0;  // M: height at which the block behind presses
  double lower_arm_m = 0.0;  // L: height at which the block in front holds
};

// M and L of the block with this number, Goodman & Bray 1976.
struct ContactArms {
  double upper_m = 0.0;
  double lower_m = 0.0;
};
ContactArms contact_arms(const ToppleColumns& columns, std::size_t number);

// Water, loads, bolts, shaking and weight of every block, in the order of their numbers.
std::vector<BlockLoading> block_loading(const ToppleInput& input);

// The blocks with their forces, by number.
std::vector<ToppleBlock> pass_down(const std::vector<BlockLoading>& loading, double width_m,
                                   Angle friction);

// What block 1 asks for, whatever its sign: above 0 it does not stand by itself. The sliding part
// is multiplied by 1 - tan^2(friction), which keeps it finite near 45 degrees and leaves its sign.
double toe_demand_kN_m(const std::vector<BlockLoading>& loading, double width_m, Angle friction);

// Least friction from which on the toe stays in balance; nothing where no friction below 90 degrees
// does that.
std::optional<Angle> friction_for_balance(const std::vector<BlockLoading>& loading, double width_m);

}  // namespace brink
