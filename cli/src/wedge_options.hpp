// The options of `brink wedge`, and what they ask for.
#pragma once

#include <optional>
#include <utility>
#include <vector>

#include "brink/mechanics/wedge_support.hpp"
#include "options.hpp"
#include "sensitivity_options.hpp"
#include "simulation_options.hpp"

namespace brink::cli {

// As typed; what was not given is absent.
struct WedgeOptions {
  WedgeCase wedge;
  std::optional<double> height, height_on_plane1, volume, trace_length1, trace_length2;
  std::optional<double> target;
  std::optional<std::pair<Angle, Angle>> bolt_plunge;
  std::optional<Line> bolt_direction;
  // Numbers, or distributions with --draws.
  std::optional<Distribution> friction, friction1, friction2;
  std::optional<Distribution> cohesion, cohesion1, cohesion2;
  std::optional<Distribution> water_fill, seismic_horizontal;
  std::optional<Plane> crack;
  std::optional<double> crack_distance;
  std::optional<double> water_pressure1, water_pressure2, water_pressure_crack;
  SensitivityOptions sensitivity;
  SimulationOptions simulation;
  OutputOptions output;
};

// Binds every option but those of the output to `target`.
void add_wedge_options(std::vector<Option>& options, WedgeOptions& target);

// The case that the options describe. Throws ErrorKind::argument naming the option where they
// contradict each other or one is missing.
// A distribution stands in it with its median; throws where one is given without --draws.
WedgeCase wedge_case(const WedgeOptions& options);

// The case with the distributions that the options give.
WedgeSimulation uncertain_wedge(const WedgeOptions& options);

// Nothing without --target.
std::optional<WedgeTarget> wedge_target(const WedgeOptions& options);

}  // namespace brink::cli
