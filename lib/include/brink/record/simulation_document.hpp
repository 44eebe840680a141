// A simulation as values of a record and as CSV.
#pragma once

#include <string>

#include "brink/record/document.hpp"
#include "brink/risk/monte_carlo.hpp"

namespace brink {

// Distributions in their written form, sampling, draws, seed; null for what is not drawn.
Value simulation_inputs(const WedgeSimulation& simulation);

// {draws, formed, stopped_early, forms, below_one, below_target, fails, misses_target (each {value,
// standard_error}), modes, mean_factor_of_safety, quantiles[], histogram[]}.
Value simulation_value(const SimulationResult& result, bool has_target);

// Columns from, to, count, cumulative: the histogram of the factor of safety.
std::string histogram_csv(const SimulationResult& result);

}  // namespace brink
