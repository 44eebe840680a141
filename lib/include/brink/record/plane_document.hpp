// Planar slides as values of a record.
#pragma once

#include "brink/mechanics/plane_slide.hpp"
#include "brink/record/document.hpp"

namespace brink {

// Every value that went in, defaults too.
Value plane_slide_inputs(const PlaneSlideInput& input);

// Every key is always there; what does not exist (the weight of a block that does not form) is
// null.
Object plane_slide_value(const PlaneSlide& slide);

std::string_view to_string(PlaneSlideMode mode);  // "slides", "lifts"

}  // namespace brink
