// Every pair of readings, one by one: which lines of intersection slide or topple on a face.
//
// N (N - 1) / 2 pairs in blocks that stay in the cache; memory grows with N. This loop is the plain
// way, needed where each pair has its own answer (`unstable_dry`, pairs by reading); whatever
// counts faster must agree with it.
#pragma once

#include <cstddef>
#include <cstdint>
#include <vector>

#include "brink/kinematics/modes.hpp"
#include "brink/readings/readings.hpp"

namespace brink {

// Readings in columns, sorted by set (input order within a set) so that pairs of sets are blocks.
// Group g holds set g + 1; the last group holds the readings of no set.
struct PairReadings {
  std::vector<double> x, y, z;  // unit normals
  std::vector<double> weight;
  std::vector<std::size_t> source;       // index in Readings
  std::vector<std::size_t> group_begin;  // first of each group, and the end

  std::size_t size() const { return x.size(); }
  std::size_t groups() const { return group_begin.size() - 1; }
};

// `assignment` holds 0 (no set) to `set_count`, one a reading. Throws ErrorKind::argument
// otherwise.
PairReadings arrange_by_set(const Readings& readings, const std::vector<int>& assignment,
                            std::size_t set_count);

// Place of the pair of groups a <= b in by_groups, of `groups` * (groups + 1) / 2 entries.
constexpr std::size_t pair_slot(std::size_t a, std::size_t b, std::size_t groups) {
  return a * groups - a * (a + 1) / 2 + b;
}

struct PairSum {
  std::uint64_t count = 0;
  double weight = 0.0;  // a pair weighs the product of its readings' weights
};

// The pairs that have some property.
struct PairTally {
  std::vector<PairSum> by_groups;         // at pair_slot
  std::vector<std::uint64_t> of_reading;  // pairs that each reading is in, in arranged order
  PairSum total() const;
};

// Pairs that have a line: their normals, as axes, are more than kParallel radians apart.
PairTally count_lines(const PairReadings& readings, unsigned threads);

struct PairCounts {
  PairTally wedge_sliding;
  PairTally block_toppling;
  // Pairs that daylight, whatever their plunge, with a dry, cohesionless factor of safety below 1
  // (mechanics/dry_wedge.hpp).
  std::uint64_t unstable_dry = 0;
};

// Tests every pair on one face. `friction` as in the limits. The same bits for any number of
// threads (0: all cores). About 1 ns a pair on one core.
PairCounts count_pairs(const PairReadings& readings, const FaceLimits& limits, Angle friction,
                       unsigned threads);

}  // namespace brink
