// Bootstrap intervals of shares over readings, for shares of readings and of pairs of readings.
// Private to kinematics.
#pragma once

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace brink {

// A share of readings (order 1) or of pairs of readings (order 2), as sums over the readings.
struct ShareSample {
  // For each reading: whether it is admissible (1 or 0), or the number of admissible pairs it is
  // in.
  std::span<const std::uint64_t> admissible;
  // The same of what was tested.
  std::span<const std::uint64_t> tested;
  int order = 1;
};

struct ShareInterval {
  double low = 0.0;
  double high = 0.0;
};

// 95 % percentile intervals from 999 resamples of the readings with replacement (Efron & Tibshirani
// 1993, An Introduction to the Bootstrap, ch. 13; the 25th and 975th of 999: Davison & Hinkley
// 1997, Bootstrap Methods and their Application, sec. 5.2). All samples have one entry a reading
// and see the same resamples. Nothing for fewer than two readings or where nothing was tested.
//
// Pairs share readings, so pairs cannot be resampled themselves; a count of pairs is a U-statistic
// of the readings. A resample that draws reading i m_i times holds sum_{i<j} m_i m_j h_ij
// admissible pairs (copies of one reading are parallel: no pair), N^2 work. Its first-order part is
// Hajek's projection A (1 + 2 d), d = sum (m_i - 1) a_i / 2A, with a_i the pairs of reading i and A
// all of them (Hoeffding 1948, Ann. Math. Statist. 19:293; bootstrap of U-statistics: Bickel &
// Freedman 1981, Ann. Statist. 9:1196). Used here is A (1 + d)^2, the same to first order and never
// negative: a resample then costs N. Tests compare it with resampled pairs.
//
// Past 10,000 readings they are first thrown together into 10,000 random groups, resampled whole
// (random groups: Wolter 2007, Introduction to Variance Estimation, ch. 2). Memory N; the same bits
// for any number of threads.
std::vector<std::optional<ShareInterval>> share_intervals(const std::vector<ShareSample>& samples,
                                                          std::uint64_t seed, unsigned threads);

}  // namespace brink
