// The options of `brink steepest`, which `brink alignment` has too.
#pragma once

#include <optional>
#include <vector>

#include "brink/design/steepest.hpp"
#include "options.hpp"

namespace brink::cli {

// As typed; what was not given is absent.
struct SteepestChoice {
  KinematicsOptions tests;  // upper ground, friction, tolerances, seed and threads
  SteepestOptions search;
  std::optional<double> target, height, unit_weight, cohesion, water_fill;
};

// --friction (required), --upper, the tolerances, --limit, --resolution, --greatest-dip,
// --weighted, --confident, --target with what it needs, --seed, --threads; --every unless the
// azimuths come from elsewhere.
void add_steepest_options(std::vector<Option>& options, SteepestChoice& target,
                          bool every_azimuth = true);

// What they ask for. Throws ErrorKind::argument naming the option where one is missing.
SteepestOptions steepest_options(const SteepestChoice& choice);

}  // namespace brink::cli
