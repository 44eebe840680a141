// Spacing, persistence and aperture as a record.
#pragma once

#include "brink/readings/spacing.hpp"
#include "brink/record/document.hpp"

namespace brink {

// What is known of set k (from 0): {spacing, persistence, aperture}. `spacing` is {count, mean_m,
// median_m, deviation_m, frequency_per_m, isrm_class}; `persistence` {column, count, mean_m,
// median_m, deviation_m, isrm_class}; `aperture` the same in mm. Null where nothing was measured.
Object joint_lengths_of_set(const JointLengths& lengths, std::size_t set);

// [] {traverse, count, span_m, frequency_per_m, rqd_percent}: RQD estimated from the frequency.
Value traverse_frequencies(const SpacingResult& spacing);

}  // namespace brink
