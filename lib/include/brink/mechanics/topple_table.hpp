// Columns of toppling blocks from a table.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "brink/mechanics/toppling.hpp"

namespace brink {

struct ToppleTable {
  std::vector<double> heights_m;  // [0] is block 1, at the toe
  std::vector<BlockWater> water;
  std::vector<BlockForce> loads;
  std::vector<BlockForce> bolts;
  std::vector<std::string> warnings;
};

// Reads comma-separated text (readings/csv.hpp) with the columns `number` and `height_m`, in any
// order, and, where there are any, `water_behind_m`, `water_front_m`, `load_kN_m`,
// `load_plunge_deg`, `bolt_kN_m` and `bolt_plunge_deg`; an empty cell is none. The numbers run from
// 1 without a gap; the rows may stand in any order. Anything else is Error(input) with file, line
// and column: a slope with a block missing is another slope.
ToppleTable read_topple_table(std::string_view bytes, const std::string& file);

}  // namespace brink
