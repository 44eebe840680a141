// The options of `brink steepest`, which `brink alignment` has too.
#pragma once

#include <optional>
#include <vector>

#include "brink/design/steepest.hpp"
#include "brink/record/site.hpp"
#include "options.hpp"
#include "site_tests.hpp"

namespace brink::cli {

// As typed; what was not given is absent, and then taken from the site file where there is one.
struct SteepestChoice {
  Typed typed;
  KinematicsOptions tests;  // upper ground, friction, tolerances, seed and threads
  SteepestOptions search;
  std::optional<double> target, height, unit_weight, cohesion, water_fill;
};

// --friction, --upper, the tolerances, --limit, --resolution, --greatest-dip,
// --weighted, --confident, --target with what it needs, --seed, --threads; --every unless the
// azimuths come from elsewhere.
void add_steepest_options(std::vector<Option>& options, SteepestChoice& target,
                          bool every_azimuth = true);

// --friction, --upper and the tolerances, without --face.
void add_test_options(std::vector<Option>& options, KinematicsOptions& target, Typed& typed);

// The settings of the tests; friction and tolerances that were not typed are the site's. Throws
// ErrorKind::argument where there is no friction.
ModeSettings test_settings(const KinematicsOptions& tests, const Typed& typed,
                           const std::optional<Site>& site);

// What they ask for. Throws ErrorKind::argument naming the option where one is missing.
SteepestOptions steepest_options(const SteepestChoice& choice, const std::optional<Site>& site);

}  // namespace brink::cli
