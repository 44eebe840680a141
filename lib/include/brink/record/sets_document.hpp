// Sets as a record, and readings with the set of each.
#pragma once

#include "brink/readings/spacing.hpp"
#include "brink/record/document.hpp"
#include "brink/sets/sets.hpp"

namespace brink {

// What find_sets() was asked for: {count, centres[] {dip_deg, dip_direction_deg,
// within_deg}, least_share, least_size, containment_shares[], resamples, seed}; what was not given
// is null.
Object sets_inputs(const FindSetsOptions& options);

// "round" for a Fisher component, "elliptical" for an angular central Gaussian one.
std::string_view name_of(Shape shape);
// "cluster" or "girdle".
std::string_view name_of(Pattern pattern);

// One set: {name, count, weight, effective_number, mean{dip_deg, dip_direction_deg},
// resultant_length, fisher_k, unbiased_k, k_interval{low, high}, confidence_cone_deg,
// variability_cone_deg, containment[] {share, half_angle_deg}, eigenvalues[3],
// principal_planes[3] {dip_deg, dip_direction_deg}, woodcock_shape, woodcock_strength,
// fisher_fit{test, statistic, p_value}, fit_tests{colatitude, longitude, two_variable} (each
// {statistic, p_value}), pattern, bootstrap_cone_deg, shape, stability}.
Value set_value(const SetStatistics& set);

// {sets[], unassigned, assignment[], log_likelihood, bic, counts_tried[] {count, bic}, undecided,
// runner_up{count, bic}, uniformity{test, statistic, p_value}, mean_comparisons[] {sets[2],
// angle_deg, test, statistic, p_value}, traverses[]}. Each set is set_value() with the spacing,
// persistence and aperture of spacing_document.hpp.
Value sets_result(const SetsResult& result, const JointLengths& lengths = {});

// The readings with one more column, the name of each one's set ("" for none), under the first of
// these headings that is free: "set", "found_set", "found_set_2" ...
Readings with_set_column(const Readings& readings, const SetsResult& result);

}  // namespace brink
