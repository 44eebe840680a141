// Block toppling: columns on a stepped base, per metre of face.
//
// Columns of equal width stand on bases that dip out of the slope. From the top block down, each
// passes on to the next the force that keeps it from toppling or from sliding, the larger. Blocks
// are numbered from 1 at the toe. In the section "along" is down the bases, "across" is into them.
//
// Source: Goodman & Bray 1976, Toppling of rock slopes, Proc. ASCE Specialty Conf. Rock Engineering
// for Foundations and Slopes, Boulder, 2:201. Water and loads: Wyllie & Mah 2004, Rock Slope
// Engineering, 4th ed., ch. 9, each by the equilibrium of the block.
#pragma once

#include <array>
#include <cstddef>
#include <optional>
#include <string>
#include <vector>

#include "brink/base/angle.hpp"
#include "brink/mechanics/section_point.hpp"

namespace brink {

// Blocks and the two lengths by which block tops step, in Goodman & Bray's symbols: below the crest
// a block touches its upper neighbour over its whole height and its lower one up to height - a1;
// above the crest up to height - a2 and over its whole height. At the crest a2 behind, a1 in front.
struct ToppleColumns {
  std::vector<double> heights_m;  // [0] is block 1
  std::size_t crest = 0;          // number of the crest block
  double width_m = 0.0;
  Angle base_dip;
  double a1_m = 0.0;
  double a2_m = 0.0;
};

struct ToppleGeometry {
  Angle face_dip;
  double height_m = 0.0;
  Angle upper_dip;  // positive: rising behind the crest
  Angle base_dip;
  double width_m = 0.0;
  double step_m = 0.0;  // rise of the base from block to block, square to the bases
};

// a1 = dx tan(face - base), a2 = dx tan(base - upper); block n below the crest is n (a1 - step)
// high, each above it a2 + step lower than the one before, as long as any height is left. The crest
// block is the one whose upper edge lies nearest the crest. Throws ErrorKind::argument for values
// out of range, bases at least as steep as the face, and geometry that leaves no block or more than
// 10,000.
ToppleColumns topple_columns(const ToppleGeometry& geometry);

// Corners of every block, by number, in the section: front of the base, back of the base, back of
// the top, front of the top. The origin is the front of block 1's base; each base stands above the
// one in front of it by what the heights, a1 and a2 leave.
std::vector<std::array<SectionPoint, 4>> topple_outlines(const ToppleColumns& columns);

// Depth of water in the joints behind a block (upper) and in front of it (lower), above the block's
// own base.
struct BlockWater {
  std::size_t block = 0;
  double upper_m = 0.0;
  double lower_m = 0.0;
};

// A force in the section on one block. The plunge is below horizontal, negative upwards. A load
// points out of the slope and acts at the middle of the block's width, at the top unless a height
// is given; a bolt pulls into the slope and acts on the block's front, at half its height unless
// given.
struct BlockForce {
  std::size_t block = 0;
  double force_kN_m = 0.0;
  Angle plunge;
  std::optional<double> height_m;  // above the block's base
};

struct ToppleInput {
  ToppleColumns columns;
  double unit_weight_kN_m3 = 0.0;
  Angle friction;  // between blocks and on the bases
  double water_unit_weight_kN_m3 = 9.81;
  // Every joint filled to this share of the height over which its blocks touch, the toe drained; or
  // block by block in `water`, which then must not name a block twice.
  double water_fill = 0.0;
  std::vector<BlockWater> water;
  std::vector<BlockForce> loads;
  std::vector<BlockForce> bolts;
  double seismic_horizontal = 0.0;  // share of the weight, out of the slope
  Angle balance_bolt_plunge;        // of the bolt on block 1 that would balance the slope
  std::optional<double> balance_bolt_height_m;
};

// The water at every wet block: as given, or as the fill of the joints makes it.
std::vector<BlockWater> block_water(const ToppleInput& input);

enum class BlockMode { stable, topples, slides };

struct ToppleBlock {
  std::size_t number = 0;
  double height_m = 0.0;
  BlockMode mode = BlockMode::stable;
  double weight_kN_m = 0.0;
  double force_to_stop_toppling_kN_m = 0.0;  // P(n-1),t, before the choice; see can_topple
  double force_to_stop_sliding_kN_m = 0.0;   // P(n-1),s; see can_slide
  bool can_topple = false;                   // false: no contact in front to tip over (L <= 0)
  bool can_slide = false;                    // false: columns lock from friction 45 degrees up
  double force_on_next_kN_m = 0.0;           // on the block below; on nothing, for block 1
  double force_height_m = 0.0;  // of that force above this block's base (L, or where L <= 0, 0)
  double normal_kN_m = 0.0;     // R, on the base
  double shear_kN_m = 0.0;      // S, along the base
};

struct ToppleResult {
  std::vector<ToppleBlock> blocks;  // by number
  bool stable = false;              // block 1 needs nothing to hold it
  double toe_force_kN_m = 0.0;      // what would have to hold block 1; 0 where nothing
  // Least friction above which the slope stays in balance; absent where none below 90 degrees
  // balances it.
  std::optional<Angle> friction_for_balance;
  double factor_of_safety = 0.0;  // tan(friction) / tan(friction_for_balance); infinite, or 0 where
                                  // that is absent
  std::optional<double> bolt_for_balance_kN_m;  // absent where a bolt of that plunge can't
  std::vector<std::string> warnings;
};

// Throws ErrorKind::argument for a value out of its range, a block that does not exist or one with
// water above its top. Cost: one pass over the blocks for each of about 800 friction angles.
//
// Properties: the forces scale with the unit weight where there is neither water nor outside force;
// the toe force never rises with friction over the angles from the required one up to 90 degrees.
ToppleResult analyse_toppling(const ToppleInput& input);

}  // namespace brink
