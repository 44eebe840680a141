// Spacing, persistence and aperture as people read them.
#pragma once

#include <string>
#include <vector>

#include "brink/readings/spacing.hpp"

namespace brink::cli {

// One table of the sets and one of the traverses; empty where nothing was measured. `names` are the
// sets'.
std::string spacing_text(const JointLengths& lengths, const std::vector<std::string>& names);

}  // namespace brink::cli
