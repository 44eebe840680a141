#include "step_table.hpp"

#include <bit>
#include <cmath>
#include <limits>
#include <stdexcept>

namespace brink {

namespace {

// A threshold this far below a cell, relatively, is beyond doubt: comparisons shift thresholds by
// less.
constexpr double kSlack = 1e-4;
constexpr int kMantissaBits = 20;  // of the upper word

std::int32_t upper_word(double value) {
  return static_cast<std::int32_t>(std::bit_cast<std::uint64_t>(value) >> 32);
}

double from_upper_word(std::int32_t word) {
  return std::bit_cast<double>(static_cast<std::uint64_t>(word) << 32);
}

}  // namespace

StepTable::StepTable(std::span<const double> thresholds) {
  for (int bits = 3; bits <= 12; ++bits) {
    if (build(thresholds, bits)) return;
  }
  throw std::logic_error("thresholds too close for a table");
}

// Cell 0 reaches down to 0 and the last cell up to infinity; between them a cell is one value of
// the exponent and the first `bits` of the mantissa. False where a cell would hold two thresholds.
bool StepTable::build(std::span<const double> thresholds, int bits) {
  double least = 1.0;
  double most = 1.0;
  for (const double t : thresholds) {
    if (t > 0.0) least = std::min(least, t);
    most = std::max(most, t);
  }
  shift_ = kMantissaBits - bits;
  first_ = upper_word(least / 2.0) >> shift_;
  const std::int32_t cells = (upper_word(most * 2.0) >> shift_) - first_ + 1;
  below_.clear();
  threshold_.clear();
  index_.clear();
  for (std::int32_t cell = 0; cell < cells; ++cell) {
    const double low = cell == 0 ? 0.0 : from_upper_word((first_ + cell) << shift_);
    const double high = cell + 1 == cells ? std::numeric_limits<double>::infinity()
                                          : from_upper_word((first_ + cell + 1) << shift_);
    std::int32_t below = 0;
    std::int32_t inside = -1;
    for (std::size_t i = 0; i < thresholds.size(); ++i) {
      if (thresholds[i] < low * (1.0 - kSlack)) {
        ++below;
      } else if (thresholds[i] < high) {
        if (inside >= 0) return false;
        inside = static_cast<std::int32_t>(i);
      }
    }
    below_.push_back(below);
    index_.push_back(inside);
    threshold_.push_back(inside < 0 ? std::numeric_limits<double>::infinity()
                                    : thresholds[static_cast<std::size_t>(inside)]);
  }
  companion_.assign(below_.size(), 0.0);
  return true;
}

void StepTable::set_companions(std::span<const double> companions) {
  for (std::size_t cell = 0; cell < index_.size(); ++cell) {
    if (index_[cell] >= 0) companion_[cell] = companions[static_cast<std::size_t>(index_[cell])];
  }
}

StepTable::View StepTable::view() const {
  return {below_.data(),
          threshold_.data(),
          companion_.data(),
          first_,
          static_cast<std::int32_t>(below_.size()) - 1,
          shift_};
}

}  // namespace brink
