// Agreement of two partitions, for judging found sets against true ones.
#pragma once

#include <map>
#include <span>
#include <utility>

namespace brink::test {

// Adjusted Rand index (Hubert & Arabie 1985, J. Classification 2): 1 for equal partitions, 0 on
// average for independent ones. Every label, 0 included, is a class of its own.
inline double adjusted_rand_index(std::span<const int> a, std::span<const int> b) {
  std::map<std::pair<int, int>, double> both;
  std::map<int, double> rows;
  std::map<int, double> columns;
  for (std::size_t i = 0; i < a.size(); ++i) {
    both[{a[i], b[i]}] += 1.0;
    rows[a[i]] += 1.0;
    columns[b[i]] += 1.0;
  }
  const auto pairs = [](double n) { return n * (n - 1.0) / 2.0; };
  double same = 0.0;
  double in_a = 0.0;
  double in_b = 0.0;
  for (const auto& cell : both) same += pairs(cell.second);
  for (const auto& row : rows) in_a += pairs(row.second);
  for (const auto& column : columns) in_b += pairs(column.second);
  const double expected = in_a * in_b / pairs(static_cast<double>(a.size()));
  const double greatest = (in_a + in_b) / 2.0;
  return greatest == expected ? 1.0 : (same - expected) / (greatest - expected);
}

}  // namespace brink::test
