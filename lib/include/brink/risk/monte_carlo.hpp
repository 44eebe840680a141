// Simulation of a wedge with uncertain orientations, strength, water and shaking.
//
// Every number drawn is a function of the seed, the input and the draw's index (base/random.hpp),
// so the result is the same bytes for any number of threads.
#pragma once

#include <cstdint>
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "brink/mechanics/wedge_equilibrium.hpp"
#include "brink/risk/distribution.hpp"

namespace brink {

enum class Sampling {
  plain,            // independent draws
  latin_hypercube,  // each input's range in as many strata as draws, each drawn from once (McKay,
                    // Beckman & Conover 1979, Technometrics 21:239)
};

// How one plane of the wedge is drawn: about the case's plane by Fisher's distribution of this
// concentration (Fisher 1953), or from readings with replacement, or not at all.
struct DrawnPlane {
  std::optional<double> fisher_k;  // > 0
  std::vector<Plane> readings;
};

// Distributions replace the case's values; absent ones stay. Each plane's friction and cohesion are
// drawn on their own.
struct WedgeSimulation {
  WedgeCase wedge;
  DrawnPlane plane1;
  DrawnPlane plane2;
  std::optional<Distribution> friction1;  // degrees, 0 to below 90
  std::optional<Distribution> friction2;
  std::optional<Distribution> cohesion1;  // kPa, >= 0
  std::optional<Distribution> cohesion2;
  std::optional<Distribution> water_fill;  // 0 to 1
  std::optional<Distribution> seismic;     // horizontal, >= 0
  double correlation = 0.0;     // between friction and cohesion of one plane, -1..1: that of the
                                // normal scores (Gaussian copula)
  std::uint64_t draws = 10000;  // 1 to 10^8
  std::uint64_t seed = 1;
  unsigned threads = 0;
  Sampling sampling = Sampling::plain;
  std::optional<double> target;       // factor of safety; a share is counted below it
  std::optional<double> until_error;  // plain sampling only: stops once the standard error of the
                                      // probability of failure is at most this
  std::function<void(double share)> progress;  // called from the calling thread between rounds
};

// A share of draws and its standard error sqrt(p (1 - p) / n), which overstates it for a Latin
// hypercube.
struct Share {
  double value = 0.0;
  double standard_error = 0.0;
};

struct SafetyQuantile {
  double share = 0.0;             // of the wedges that form
  double factor_of_safety = 0.0;  // the least with at least that share at or below it
};

struct SafetyBin {
  double from = 0.0;
  double to = 0.0;  // infinite in the last bin
  std::uint64_t count = 0;
  double cumulative = 0.0;  // share of the wedges that form with a factor of safety below `to`
};

struct SimulationResult {
  std::uint64_t draws = 0;   // done
  std::uint64_t formed = 0;  // draws in which a wedge forms
  bool stopped_early = false;
  Share forms;
  // Of the wedges that form; absent where none does. A factor of safety of exactly 1 is not below.
  std::optional<Share> below_one;
  std::optional<Share> below_target;
  Share fails;          // forms and below 1: the product of the two
  Share misses_target;  // forms and below the target; 0 without a target
  std::uint64_t both = 0, plane1 = 0, plane2 = 0, lifts = 0;  // modes of those that form
  std::optional<double> mean;                                 // of the finite factors of safety
  std::vector<SafetyQuantile> quantiles;
  std::vector<SafetyBin> histogram;
  std::vector<std::string> warnings;
};

// Throws ErrorKind::argument for a value out of its range or a distribution that can leave it.
// Draws that form no wedge are counted, not an error; where none does, a warning says so.
SimulationResult simulate_wedge(const WedgeSimulation& simulation);

}  // namespace brink
