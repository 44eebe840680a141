// --vary and --solve for any command that gives a factor of safety, and what they print.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/record/sensitivity_document.hpp"
#include "options.hpp"

namespace brink::cli {

struct VaryRequest {
  std::string name;
  VariedRange range;
};

struct SensitivityOptions {
  std::vector<VaryRequest> vary;
  std::optional<std::string> solve;
};

// NAME=FROM..TO[:POINTS].
VaryRequest parse_vary(const std::string& option, std::string_view text);

// `names` as the help shows them: "friction, cohesion, height".
void add_sensitivity_options(std::vector<Option>& options, SensitivityOptions& target,
                             const std::string& names);

// Ranking and curves for people; empty without curves.
std::string sensitivity_text(const std::vector<SensitivityCurve>& curves);
std::string back_analysis_text(const BackAnalysis& analysis);

}  // namespace brink::cli
