// Naming readings in warnings. Private to readings.
#pragma once

#include <cstddef>
#include <string>
#include <vector>

#include "brink/readings/readings.hpp"

namespace brink {

// "pit.csv: lines 3, 7, 12 and 4 more": the places of the readings with these indices, at most
// eight of each file.
std::string lines_in_words(const Readings& readings, const std::vector<std::size_t>& which);

}  // namespace brink
