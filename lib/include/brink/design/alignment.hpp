// Cuts along an alignment: which way their faces look, and how steep each may be.
#pragma once

#include <vector>

#include "brink/design/centreline.hpp"
#include "brink/design/steepest.hpp"

namespace brink {

// Seen along the line, in the direction of growing chainage.
enum class CutSide { left, right, both };

struct AlignmentOptions {
  CutSide cut = CutSide::both;
  // A segment goes on while each of its legs runs within this of the line from the segment's first
  // point to its last; above 0, at most 45 degrees.
  Angle tolerance = Angle::degrees(10.0);
  SteepestOptions search;  // its azimuths are set from the line
};

// A face of a segment. On the left of the line it looks to the right: its dip direction is the
// bearing + 90; on the right, the bearing - 90.
struct SegmentCut {
  bool left = true;
  SteepestFace face;
};

struct AlignmentSegment {
  std::size_t first = 0;  // points of the centreline, both ends included
  std::size_t last = 0;
  double from_chainage_m = 0.0;
  double to_chainage_m = 0.0;
  Angle bearing;                 // from the first point to the last
  std::vector<SegmentCut> cuts;  // left, then right, those asked for
};

struct AlignmentResult {
  AlignmentOptions options;
  Centreline centreline;
  std::vector<AlignmentSegment> segments;  // by chainage
  std::vector<std::string> warnings;
};

// Segments alone, cuts without an answer. Cost: linear in the points, but for long straight
// stretches (legs times legs of a segment).
std::vector<AlignmentSegment> divide_alignment(const Centreline& line, Angle tolerance);

// Finds the steepest face of every cut, as find_steepest() does. Throws ErrorKind::argument for a
// tolerance out of its range.
AlignmentResult design_alignment(const Centreline& line, const Readings& readings,
                                 const SetsResult& sets, const AlignmentOptions& options);

}  // namespace brink
