// Planar slides and toppling as text for people.
#pragma once

#include <string>

#include "brink/mechanics/plane_slide.hpp"
#include "brink/mechanics/toppling.hpp"

namespace brink::cli {

// `more` stands before the cautions.
std::string plane_slide_text(const PlaneSlideInput& input, const PlaneSlide& slide,
                             const std::string& more = {});
std::string topple_text(const ToppleInput& input, const ToppleResult& result);

}  // namespace brink::cli
