// How steep a face may be cut at each azimuth.
//
// For every azimuth the greatest dip at which the share of each mode stays within its limit and,
// where asked, no wedge between two set means falls below a factor of safety. Each share never
// falls as the face steepens, so that the answer for the shares is the last dip within every limit;
// factors of safety may rise and fall with the dip and are looked at for each.
#pragma once

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "brink/kinematics/modes.hpp"
#include "brink/mechanics/wedge_equilibrium.hpp"
#include "brink/readings/readings.hpp"
#include "brink/sets/sets.hpp"

namespace brink {

inline constexpr std::size_t kModes = 4;

// One number for each mode, by Mode; a share is 0..1, and 0 where nothing was tested.
using ModeShares = std::array<double, kModes>;

// Wedges between the means of every two sets, on each face.
struct SafetyTarget {
  double factor_of_safety = 0.0;  // that each wedge has to reach, > 0
  WedgeCase wedge;                // all but the planes and the face, which are set in turn
};

struct SteepestOptions {
  ModeSettings settings;
  Angle every = Angle::degrees(5.0);       // azimuths 0, every, 2 every ...; above 0, at most 180
  Angle resolution = Angle::degrees(1.0);  // dips tried: 1, 2 ... times this; 0.1 to 45
  Angle greatest_dip = Angle::degrees(90.0);  // from the resolution to below 180
  // Faces of just these azimuths where there are any, in place of `every`; 0..360, ascending.
  std::vector<Angle> azimuths;
  ModeShares limits{0.05, 0.05, 0.05, 0.05};  // a share equal to its limit is within it
  bool weighted = false;                      // shares of weight in place of number
  std::optional<double> confident;  // share of resamples in which the dip has to hold: 0.5 to 0.99
  std::optional<SafetyTarget> safety;
  bool map = false;  // keep the shares of every face, for drawing
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

enum class Governs { nothing, share, factor_of_safety };

// A set, or a pair of sets, with what it adds to a mode: indices from 1, 0 for "no set".
struct GoverningSets {
  int set_a = 0;
  int set_b = 0;      // pairs
  double part = 0.0;  // of the mode's admissible readings or pairs, 0..1
};

// The wedge of two set means with the least factor of safety.
struct WeakestWedge {
  int set_a = 0;
  int set_b = 0;
  double factor_of_safety = 0.0;
};

struct SteepestFace {
  Angle dip_direction;
  Angle steepest_dip;  // 0 where even the first dip tried is too steep
  Governs governs = Governs::nothing;
  // The first mode, in order, to pass its limit one step steeper.
  std::optional<Mode> governing_mode;
  std::vector<GoverningSets> governing_sets;  // of that mode one step steeper, the largest first
  ModeShares shares{};                        // at the steepest dip; 0 at dip 0
  std::optional<ModeShares> shares_one_step_steeper;      // absent at the greatest dip
  std::optional<ModeShares> shares_five_degrees_steeper;  // absent beyond the greatest dip
  std::optional<Angle> confident_dip;
  std::optional<WeakestWedge> weakest_wedge;  // at the steepest dip
  std::optional<WeakestWedge> weakest_wedge_one_step_steeper;
};

struct SteepestResult {
  SteepestOptions options;
  std::vector<Angle> dips;  // tried
  std::vector<SteepestFace> azimuths;
  // Shares of every face, azimuth by azimuth, where options.map asked for them.
  std::vector<ModeShares> map;
  std::vector<std::string> warnings;
};

// The dips and azimuths that the options stand for.
std::vector<Angle> dips_tried(const SteepestOptions& options);
std::vector<Angle> azimuths_tried(const SteepestOptions& options);

// Finds the steepest faces. Shares are exact, as test_kinematics() counts them. The confident dip
// comes from 499 resamples of the readings (sets kept as they are): it is the greatest dip at which
// every share stays within its limit in at least that part of them; pairs by their first-order
// part, as the intervals of test_kinematics() are. Cost: up to 30,000 different readings and 90
// degrees one pass over the pairs (dip_sweep.hpp); beyond, some seven counts by chords (chords.hpp)
// for each azimuth. Throws ErrorKind::argument for a value out of its range, and for `confident`
// together with `weighted`.
SteepestResult find_steepest(const Readings& readings, const SetsResult& sets,
                             const SteepestOptions& options);

}  // namespace brink
