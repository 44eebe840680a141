// How many of a few fixed thresholds a positive number is beyond: a table by the number's leading
// bits, where each cell holds one threshold at most. Private to design.
#pragma once

#include <cstdint>
#include <span>
#include <vector>

namespace brink {

class StepTable {
 public:
  // `thresholds` ascending, 0 or more; those above 0 at least a thousandth apart, relatively.
  explicit StepTable(std::span<const double> thresholds);

  struct View {
    const std::int32_t* below;  // thresholds certainly below every number in the cell
    const double* threshold;    // the one that is left to compare with; infinite where none
    const double* companion;    // companions()[i] of that threshold
    std::int32_t first;         // leading bits of cell 0
    std::int32_t last;          // number of the last cell
    std::int32_t shift;         // of the upper word
  };
  View view() const;
  // A second number kept with each threshold, in their order; 0 for a cell without one.
  void set_companions(std::span<const double> companions);

 private:
  bool build(std::span<const double> thresholds, int bits);

  std::vector<std::int32_t> below_;
  std::vector<double> threshold_;
  std::vector<double> companion_;
  std::vector<std::int32_t> index_;  // of the cell's threshold, or -1
  std::int32_t first_ = 0;
  std::int32_t shift_ = 0;
};

}  // namespace brink
