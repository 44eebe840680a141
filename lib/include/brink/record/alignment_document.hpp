// Cuts along an alignment as a record and as a table for other programs.
#pragma once

#include <string>

#include "brink/design/alignment.hpp"
#include "brink/record/document.hpp"

namespace brink {

// {cut, tolerance_deg}, followed by steepest_inputs() without the azimuths.
Object alignment_inputs(const AlignmentOptions& options);

// {closed, points, segments[] {from_chainage_m, to_chainage_m, bearing_deg, cuts[] {side, ... as
// steepest_face_object()}}, sets[]}.
Value alignment_result(const AlignmentResult& result, const SetsResult& sets);

// One row a cut: from_chainage_m, to_chainage_m, bearing_deg, side, then steepest_headings().
std::string alignment_csv(const AlignmentResult& result, const SetsResult& sets);

}  // namespace brink
