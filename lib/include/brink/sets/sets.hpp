// Discontinuity sets: found in the readings or given, and described.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/readings/readings.hpp"
#include "brink/sphere/goodness.hpp"

namespace brink {

// Statistics of one set; estimators and sources in sphere/fisher.hpp and sphere/tensor.hpp. A value
// that the data cannot give (one reading has no kappa) is absent.
struct SetStatistics {
  std::string name;       // "J1", or as the user's column names it
  std::size_t count = 0;  // readings
  double weight = 0.0;    // sum of their weights
  Plane mean;
  double resultant_length = 0.0;            // R, not R/N
  std::optional<double> fisher_k;           // (N-1)/(N-R); infinite for identical readings
  std::optional<Angle> confidence_cone;     // 95 % cone on the mean
  std::optional<Angle> variability_cone;    // holds 68.27 % of a Fisher distribution of that kappa
  std::array<double, 3> eigenvalues{};      // of the orientation tensor, descending
  std::optional<double> woodcock_shape;     // infinite where S2 = S3
  std::optional<double> woodcock_strength;  // infinite where S3 = 0
  std::optional<FisherFit> fisher_fit;
};

// Sets by weight, heaviest first, then by first appearance.
struct SetsResult {
  std::vector<SetStatistics> sets;
  std::vector<int> assignment;  // one a reading: 0 none, k the k-th set
  std::size_t unassigned = 0;
  std::optional<double> log_likelihood;  // absent where membership was given
  std::optional<double> bic;
  std::vector<std::string> warnings;
};

struct FindSetsOptions {
  std::optional<std::size_t> count;  // fixed number of sets; chosen by the criterion where absent
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

// Finds the sets by the mixture of sets/mixture.hpp. At least one reading is needed; no set at all
// is a result.
SetsResult find_sets(const Readings& readings, const FindSetsOptions& options);

// Describes the sets that an extra column names; empty cells and "0" are no set. Throws
// ErrorKind::argument where there is no such column.
SetsResult sets_by_column(const Readings& readings, std::string_view heading);

}  // namespace brink
