// How the factor of safety answers to one input at a time: curves, a ranking, and the value at
// which a target is reached. For any analysis that gives a factor of safety.
#pragma once

#include <cstddef>
#include <functional>
#include <optional>
#include <string>
#include <vector>

namespace brink {

// Factor of safety with the input at `value`, everything else as it stands: infinite where nothing
// drives the block, nothing where no block forms.
using SafetyAt = std::function<std::optional<double>(double value)>;

// An input that may vary, and what is known of it.
struct VariedInput {
  std::string name;  // "friction"
  std::string unit;  // "deg"; empty: none
  SafetyAt safety;
};

// From one end to the other in equal steps; points >= 2.
struct VariedRange {
  double from = 0.0;
  double to = 0.0;
  std::size_t points = 21;
};

struct SensitivityPoint {
  double value = 0.0;
  std::optional<double> factor_of_safety;
};

struct SensitivityCurve {
  std::string name;
  std::string unit;
  std::vector<SensitivityPoint> points;  // both ends included
  // Of the finite factors of safety on the curve; absent where there is none.
  std::optional<double> least;
  std::optional<double> greatest;

  double swing() const;  // greatest - least, 0 where absent
};

// Throws ErrorKind::argument for fewer than two or more than 100,000 points, or an end that is not
// finite.
SensitivityCurve sensitivity_curve(const VariedInput& input, const VariedRange& range);

// Indices of the curves by swing, largest first; equal ones in the order given.
std::vector<std::size_t> rank_by_swing(const std::vector<SensitivityCurve>& curves);

// A value at which the factor of safety passes the target.
struct Crossing {
  double value = 0.0;
  bool rising = false;  // the factor of safety is below the target before, at or above it after
  bool jump = false;    // it leaps over the target there (the block changes its mode, or stops
                        // forming); the value is the last on the safe side
};

// Between `low` and `high`: a scan in 400 steps (of equal ratio where `by_ratio`, which needs low >
// 0), each change of side narrowed to 1e-12 of the value. Two crossings within one step can pass
// unseen. Where no block forms nothing is to be held: it counts as safe. Empty: no value reaches
// the target, or every one is on the same side of it.
std::vector<Crossing> find_crossings(const SafetyAt& safety, double target, double low, double high,
                                     bool by_ratio = false);

}  // namespace brink
