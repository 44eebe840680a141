// The options of a simulation, and its result for people.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/risk/monte_carlo.hpp"
#include "options.hpp"

namespace brink::cli {

// A number within `accepted`, or a distribution that stays within it.
Option uncertain_option(std::string name, std::string value, std::string help, Interval accepted,
                        std::optional<Distribution>& target, std::string group);

struct SimulationOptions {
  std::optional<std::uint64_t> draws;
  std::optional<double> fisher_k1, fisher_k2;
  std::vector<std::string> readings;
  std::string set_column, set1, set2;
  std::optional<double> correlation;
  std::optional<double> until_error;
  std::optional<Sampling> sampling;
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

void add_simulation_options(std::vector<Option>& options, SimulationOptions& target);

// Which options of a simulation are given without --draws: the first of them, or nothing.
std::optional<std::string> needs_draws(const SimulationOptions& options);

// `wedge` with the options' draws; reads the files of --readings.
WedgeSimulation simulation_of(WedgeSimulation wedge, const SimulationOptions& options,
                              const OutputOptions& output, Streams& streams);

std::string simulation_text(const WedgeSimulation& simulation, const SimulationResult& result);

}  // namespace brink::cli
