// The steepest faces as text for people.
#pragma once

#include <string>

#include "brink/design/steepest.hpp"
#include "brink/sets/sets.hpp"

namespace brink::cli {

// "wedge sliding" and so on, as tables say it.
std::string mode_in_words(Mode mode);

// What governs a face: "wedge sliding (J1 + J2)", "factor of safety (J1 + J2)", or "" where nothing
// does.
std::string governing_in_words(const SteepestFace& face, const SetsResult& sets);

// A table by azimuth, what governs where, and the cautions.
std::string steepest_text(const SteepestResult& result, const SetsResult& sets);

}  // namespace brink::cli
