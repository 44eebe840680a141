// Vertical sections to scale: a planar slide, toppling columns. Slopes face to the left.
#pragma once

#include "brink/mechanics/plane_slide.hpp"
#include "brink/mechanics/toppling.hpp"
#include "brink/plot/picture.hpp"

namespace brink::plot {

// Where a section may be drawn; it is scaled to fit and keeps its proportions.
struct SectionBox {
  Point top_left;
  double width_mm = 0.0;
  double height_mm = 0.0;
};

// Rock, block, sliding plane, crack with its water; a scale bar, and what the block weighs and how
// safe it is in words. A block that doesn't form shows the slope alone, with the reason.
Group draw_plane_section(const PlaneSlideInput& input, const PlaneSlide& slide,
                         const SectionBox& box);

// Columns on their stepped base, each by what it does: stable white, toppling hatched, sliding
// filled; numbers where they fit; a scale bar and a key.
Group draw_topple_section(const ToppleColumns& columns, const ToppleResult& result,
                          const SectionBox& box);

// The length of the scale bar for a drawing of `metres_per_mm`: 1, 2 or 5 times a power of ten,
// between 15 and 40 mm long.
double scale_bar_m(double metres_per_mm);

}  // namespace brink::plot
