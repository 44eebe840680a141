// Benches: how far blocks break back from the crest, and what is left of the berm.
//
// A plane or a line of intersection that daylights at the toe of the bench face takes the crest
// back to where it reaches the bench's level: seen square to the crest, by H (cot a - cot f) for a
// bench H high, a face of dip f and an apparent dip a. So "breaks back further than x" means "still
// daylights on the flatter face through the toe that starts x behind the crest", and the
// distribution of back-break is that of the counts on flatter faces: exact for any number of pairs
// (chords.hpp).
//
// What slides is taken to break out to the full height of the bench; how far joints reach is not
// known to it.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "brink/kinematics/modes.hpp"
#include "brink/readings/readings.hpp"

namespace brink {

// Least berm that catches what falls from the bench above, 0.2 H + 4.5 m (modified Ritchie
// criterion; common practice, no source).
double ritchie_width_m(double height_m);

// Berm width that an inter-ramp angle (toe to toe of benches above each other) leaves, H (cot
// inter-ramp - cot face); and the angle that a berm gives. Angles above 0 and below 90 degrees, a
// face up to 90.
double berm_width_m(double height_m, Angle inter_ramp, Angle face_dip);
Angle inter_ramp_angle(double height_m, double berm_m, Angle face_dip);

struct BenchOptions {
  Face face;                                    // dip above 0, at most 90
  double height_m = 0.0;                        // > 0
  double berm_m = 0.0;                          // > 0
  std::vector<double> percentiles{50, 80, 95};  // above 0, below 100
  ModeSettings settings;                        // friction above 0
  bool weighted = false;
  unsigned threads = 0;
};

// One percentile of the back-break of what breaks back.
struct BackBreak {
  double percentile = 0.0;
  double back_break_m = 0.0;
  Angle effective_face;        // from the toe to the broken crest
  double berm_left_m = 0.0;    // negative where the break cuts deeper than the berm is wide
  bool keeps_ritchie = false;  // berm_left is at least the Ritchie width
  Angle inter_ramp_to_keep;    // with a berm wide enough to leave that width
};

// Planes, or lines of intersection.
struct BreakingJoints {
  double tested = 0.0;    // readings or pairs, or their weight
  double breaking = 0.0;  // that slide out of the face: take the crest where they control it
  double share = 0.0;     // of crest lost: breaking / tested
  std::vector<BackBreak> percentiles;  // none where nothing breaks
  // Share of what breaks back by at most this much, for drawing: one entry each degree of effective
  // face, from the steepest down.
  struct Step {
    double back_break_m;
    double share;
  };
  std::vector<Step> distribution;
};

struct BenchResult {
  BenchOptions options;
  double ritchie_width_m = 0.0;
  Angle inter_ramp;  // as designed
  BreakingJoints planes;
  BreakingJoints wedges;
  std::vector<BackBreak> governing;  // at each percentile the larger of the two
  std::vector<std::string> warnings;
};

// Throws ErrorKind::argument for a value out of its range.
BenchResult design_bench(const Readings& readings, const BenchOptions& options);

}  // namespace brink
