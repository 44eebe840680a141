// Benches as a record and as a table for other programs.
#pragma once

#include <string>

#include "brink/design/bench.hpp"
#include "brink/record/document.hpp"

namespace brink {

// {face, height_m, berm_m, percentiles[], weighted, upper, friction_deg, strike_tolerance_deg}.
Object bench_inputs(const BenchOptions& options);

// {ritchie_width_m, inter_ramp_deg, planes, wedges, governing[]}; planes and wedges are {tested,
// breaking, share_of_crest_lost, percentiles[]}; an entry of percentiles and of governing
// {percentile, back_break_m, effective_face_deg, berm_left_m, keeps_ritchie_width,
// inter_ramp_to_keep_deg}.
Value bench_result(const BenchResult& result);

// One row a percentile of planes, of wedges and of the larger of the two.
std::string bench_csv(const BenchResult& result);

}  // namespace brink
