// Numbers and names as a drawing says them.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>

#include "brink/kinematics/kinematics.hpp"
#include "brink/kinematics/modes.hpp"
#include "brink/sets/sets.hpp"
#include "brink/sphere/projection.hpp"

namespace brink::plot {

// Digits in groups of three with narrow spaces from 10 000 up: "15 931", "3120".
std::string grouped(std::uint64_t number);

// "65/120": dip and dip direction in whole degrees, the direction with three digits; a direction
// that rounds to 360 is 000.
std::string dip_and_direction(Angle dip, Angle dip_direction);

// Degrees with at most one decimal: "32°", "32.5°".
std::string degrees(Angle angle);

std::string_view mode_name(Mode mode);                    // "Planar sliding"
std::string_view projection_name(Projection projection);  // "Equal-angle"

// What was counted in a mode, in words for under its net.
struct CountInWords {
  std::string count;    // "44 of 179 readings, 25 %", "no pair of 15 931"
  std::string leading;  // which sets it comes from, or why there is none
  bool any = false;
};
CountInWords count_in_words(Mode mode, const ModeCount& counts, const SetsResult& sets,
                            bool region_is_empty);

}  // namespace brink::plot
