// Sets as text for people.
#pragma once

#include <string>

#include "brink/readings/readings.hpp"
#include "brink/sets/sets.hpp"

namespace brink::cli {

// Table of the sets, how their number came about, and what their scatter looks like.
std::string sets_text(const SetsResult& result, const Readings& readings);

}  // namespace brink::cli
