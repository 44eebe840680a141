// An alignment in plan, each cut coloured by how steep it may be.
#pragma once

#include "brink/design/alignment.hpp"
#include "brink/plot/sheet.hpp"

namespace brink::plot {

// Of a steepest dip: warm where a face has to be flat, cool where it may be steep.
Colour dip_colour(Angle dip);

// A4 across: the line with a strip on each side that is cut, north up, to scale; chainage at the
// ends of segments and the dip beside each cut where there is room; scale bar, north arrow, key and
// cautions.
Picture plan_sheet(const AlignmentResult& result, const SheetText& text);

}  // namespace brink::plot
