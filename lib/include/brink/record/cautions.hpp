// The texts that go with every result that somebody could act on.
#pragma once

#include <string_view>

namespace brink {

// Goes with shares and counts of the kinematic tests.
std::string_view kinematic_caution();

// Goes with factors of safety of wedges, planar slides and toppling blocks.
std::string_view rigid_block_caution();

// Goes once with a report or a drawing, after the others: who decides.
std::string_view practice_caution();

}  // namespace brink
