// Pairs of readings counted without going through the pairs: N log N in place of N^2.
//
// A reading is a great circle on the sphere of lines. The lines that a mode admits fill a convex
// zone, which the great circle crosses along a chord; two readings meet inside the zone exactly
// when their chords interleave on its border (one end of each between the ends of the other).
// Sorting the ends round the border and one pass with a binary indexed tree (Fenwick 1994,
// Software: Practice and Experience 24:327) count the interleaving pairs, with multiplicities and
// weights. Equal readings are put together first; pairs within kParallel of each other have no line
// and are left out one by one.
//
// The counts are those of the loop over all pairs (pairs.hpp), to the last one: the comparison
// margins are part of the zone. Weights agree to rounding. Only a line that falls within rounding
// (1e-15) of the border of the margin itself could differ.
#pragma once

#include <cstddef>
#include <cstdint>
#include <utility>
#include <vector>

#include "brink/kinematics/modes.hpp"
#include "brink/kinematics/pairs.hpp"

namespace brink {

struct LineZone;

// The different planes of an arrangement, sets not told apart, and how many readings each stands
// for.
struct DistinctPlanes {
  PairReadings planes;  // one group; sources empty
  std::vector<std::int64_t> copies;
};

// Counts pairs of one arrangement of readings on any number of faces. Memory grows with the number
// of readings (and with the near-parallel pairs of unequal readings, which are few unless the data
// are copies with noise below 1e-6). Safe to share between threads.
class ChordCounter {
 public:
  explicit ChordCounter(const PairReadings& readings);

  // Different planes among the readings, sets apart.
  std::size_t distinct() const { return planes_.size(); }
  DistinctPlanes distinct_planes() const;

  // What count_lines() gives: pairs that have a line.
  PairTally lines() const;
  // What count_pairs() gives. About 0.3 microseconds a reading, times the number of groups.
  PairTally wedge_sliding(const FaceLimits& limits, unsigned threads) const;
  PairTally block_toppling(const FaceLimits& limits, unsigned threads) const;

  // The totals alone, sets not told apart.
  PairSum wedge_sliding_total(const FaceLimits& limits) const;
  PairSum block_toppling_total(const FaceLimits& limits) const;

 private:
  // Equal readings of one group, as one.
  struct Merged {
    Vector3 normal;
    std::uint64_t count = 0;
    double weight = 0.0;
    std::size_t group = 0;
  };
  struct Event;
  struct Sweep;

  void merge(const PairReadings& readings);
  void find_parallel();
  PairTally empty_tally() const;
  PairTally all_pairs(const std::vector<bool>& taken) const;
  std::vector<bool> vertical_planes() const;
  std::vector<Event> events(const LineZone& zone) const;
  PairSum interleaving(const std::vector<Event>& events, const std::vector<bool>& groups,
                       std::vector<std::uint64_t>* degrees) const;
  std::vector<std::pair<std::uint32_t, std::uint32_t>> parallel_inside(
      const std::vector<Event>& events) const;
  PairTally inside(const LineZone& zone, unsigned threads) const;
  PairSum total_inside(const LineZone& zone) const;
  void spread(const std::vector<std::uint64_t>& degrees, PairTally& tally) const;

  std::size_t groups_ = 0;
  std::vector<Merged> planes_;
  std::vector<std::uint32_t> merged_of_;  // index in planes_ of each arranged reading
  std::vector<std::pair<std::uint32_t, std::uint32_t>> parallel_;  // unequal, yet within kParallel
};

}  // namespace brink
