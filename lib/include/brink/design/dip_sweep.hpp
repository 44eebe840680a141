// Pairs of readings that slide or topple, on faces of every dip and azimuth at once.
//
// A line daylights on all faces of one azimuth from some dip up, and topples from some dip up
// wherever its trend fits. So one pass over the pairs finds, for each line and azimuth, the first
// dip at which it counts, adds the pair there, and sums over dips at the end.
//
// - Sliding: with v the line, pointing down, and a the azimuth's horizontal direction, a face of
// dip d
//   has v . F = sin d (v . a) - cos d |v_z|, which passes the tie when
//   (v . a) / |v_z| > cot d + tie |v| / (|v_z| sin d). One product serves an azimuth and its
//   opposite. The first bits of the ratio pick a cell of a table that holds one threshold at most,
//   and one comparison with it, the tie included, settles the dip: no trigonometry, no division, no
//   search.
// - Toppling: the first dip depends on the plunge alone, and whether the azimuth fits on the trend
//   alone; one addition a pair serves all azimuths.
//
// Counts equal those of the tests on each face (modes.hpp), to the last pair.
#pragma once

#include <cstddef>
#include <span>
#include <vector>

#include "brink/kinematics/modes.hpp"
#include "brink/kinematics/pairs.hpp"

namespace brink {

struct FaceGrid {
  std::vector<Angle> azimuths;  // dip directions of the faces, 0 <= a < 360, ascending
  std::vector<Angle> dips;      // ascending, above 0 and at most 90 degrees, 0.1 apart or more
};

// Sums over pairs of the product of their factors, for every face of the grid: entry
// azimuth * dips + dip.
struct SweepSums {
  std::vector<double> wedge_sliding;
  std::vector<double> block_toppling;
};

// `factors` is one number a plane: its copies, and sums are counts (exact below 2^53), or its
// weight. Sums of whole numbers are exact; other sums are the same bits for any number of threads
// (0: all cores). About half a nanosecond a pair and azimuth for the lines steeper than friction.
// Memory: some hundred kilobytes a thread. Throws ErrorKind::argument for a grid that breaks the
// rules above.
SweepSums sweep_pairs(const PairReadings& planes, std::span<const double> factors,
                      const FaceGrid& grid, const ModeSettings& settings, unsigned threads);

}  // namespace brink
