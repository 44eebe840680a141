// Sensitivity and back-analysis as values of a record and as CSV.
#pragma once

#include <string>
#include <vector>

#include "brink/record/document.hpp"
#include "brink/risk/sensitivity.hpp"

namespace brink {

// {curves[] {name, unit, least, greatest, swing, points[] {value, factor_of_safety}}, ranked[]
// (names, by how much each moves the factor of safety)}; null without curves. A factor of safety is
// null where no block forms.
Value sensitivity_value(const std::vector<SensitivityCurve>& curves);

// What was asked of find_crossings, and what came of it.
struct BackAnalysis {
  std::string name;
  std::string unit;
  double target = 0.0;
  double low = 0.0;  // searched from here
  double high = 0.0;
  std::vector<Crossing> crossings;
};

// {name, unit, target, searched_from, searched_to, values[] {value, rising, jump}}.
Value back_analysis_value(const BackAnalysis& analysis);

// Columns input, unit, value, factor_of_safety; one row a point. "infinite" and empty cells as in
// the record.
std::string sensitivity_csv(const std::vector<SensitivityCurve>& curves);

}  // namespace brink
