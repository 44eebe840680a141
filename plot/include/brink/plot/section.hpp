// Vertical sections to scale: a planar slide, toppling columns. Slopes face to the left.
#pragma once

#include <string>

#include "brink/mechanics/plane_slide.hpp"
#include "brink/mechanics/toppling.hpp"
#include "brink/plot/picture.hpp"

namespace brink::plot {

// Where a section may be drawn, its scale bar included.
struct SectionBox {
  Point top_left;
  double width_mm = 0.0;
  double height_mm = 0.0;
};

// Face, ground, plane, block, crack, the water's pressures as diagrams, bolts and loads as arrows.
// A block that does not form is drawn as the slope and the plane alone. The scale is a round one
// (1:100, 1:250 ...), the largest that fits; it stands beside the scale bar. The group's
// description says the result in words.
Group draw_plane_section(const PlaneSlideInput& input, const PlaneSlide& slide,
                         const SectionBox& box);

// The columns with their numbers, each filled by its mode: blank where it stands, hatched where it
// topples, cross-hatched where it slides; every run of one mode is named; water, loads and bolts.
Group draw_topple_section(const ToppleInput& input, const ToppleResult& result,
                          const SectionBox& box);

// The same on a sheet of A4 across with title, numbers, key and cautions.
Picture plane_sheet(const PlaneSlideInput& input, const PlaneSlide& slide,
                    const std::string& title);
Picture topple_sheet(const ToppleInput& input, const ToppleResult& result,
                     const std::string& title);

// The length of the scale bar for a drawing of `metres_per_mm`: 1, 2 or 5 times a power of ten,
// between 15 and 40 mm long.
double scale_bar_m(double metres_per_mm);

}  // namespace brink::plot
