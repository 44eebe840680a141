// A bench in section with the crests that breaking blocks leave, and the distribution of
// back-break.
#pragma once

#include "brink/design/bench.hpp"
#include "brink/plot/sheet.hpp"

namespace brink::plot {

// Two benches to scale, facing left: the design in full, the broken face of each governing
// percentile from the toe, the berm left at it and the Ritchie width it should keep.
Group draw_bench_section(const BenchResult& result, Point top_left, double width_mm,
                         double height_mm);

// A4 across: the section, and curves of the share of planes and of wedges that break back by at
// most so much, with caption and cautions.
Picture bench_sheet(const BenchResult& result, const SheetText& text);

}  // namespace brink::plot
