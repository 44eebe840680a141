#include "brink/record/cautions.hpp"

namespace brink {

std::string_view kinematic_caution() {
  return "Kinematic tests are a screen. They look at directions and friction alone: how far the "
         "joints reach, water, cohesion and blocks that jam against each other are left out.";
}

std::string_view rigid_block_caution() {
  return "Factors of safety are for one rigid block in equilibrium. Progressive failure, bridges "
         "of intact rock and rotation of the block are left out.";
}

std::string_view practice_caution() {
  return "Check the geometry, strength and water on site. Local codes and a licensed practitioner "
         "decide what may be built.";
}

}  // namespace brink
