#include "brink/design/alignment.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr double kMicro = 1e-6;

Angle bearing(const CentrelinePoint& from, const CentrelinePoint& to) {
  return wrap_360(atan2(to.easting_m - from.easting_m, to.northing_m - from.northing_m));
}

// Whether the legs from point `first` to `last` all run along the line between the two.
bool runs_straight(const std::vector<CentrelinePoint>& points, std::size_t first, std::size_t last,
                   Angle tolerance) {
  const CentrelinePoint& a = points[first];
  const CentrelinePoint& b = points[last];
  if (a.easting_m == b.easting_m && a.northing_m == b.northing_m) return false;
  const Angle along = bearing(a, b);
  for (std::size_t i = first; i < last; ++i) {
    if (!at_most(azimuth_difference(bearing(points[i], points[i + 1]), along), tolerance)) {
      return false;
    }
  }
  return true;
}

// The way a face looks. Rounded to a millionth of a degree, so that equal bearings give one
// azimuth.
Angle looks_towards(const AlignmentSegment& segment, bool left) {
  const double azimuth = wrap_360(segment.bearing + Angle::degrees(left ? 90.0 : -90.0)).deg();
  return wrap_360(Angle::degrees(std::round(azimuth / kMicro) * kMicro));
}

std::vector<Angle> azimuths_of(const std::vector<AlignmentSegment>& segments) {
  std::vector<Angle> azimuths;
  for (const AlignmentSegment& segment : segments) {
    for (const SegmentCut& cut : segment.cuts) azimuths.push_back(cut.face.dip_direction);
  }
  std::ranges::sort(azimuths);
  const auto repeated = std::ranges::unique(azimuths);
  azimuths.erase(repeated.begin(), repeated.end());
  return azimuths;
}

}  // namespace

std::vector<AlignmentSegment> divide_alignment(const Centreline& line, Angle tolerance) {
  std::vector<AlignmentSegment> segments;
  const auto& points = line.points;
  for (std::size_t first = 0; first + 1 < points.size();) {
    std::size_t last = first + 1;
    while (last + 1 < points.size() && runs_straight(points, first, last + 1, tolerance)) ++last;
    segments.push_back({first,
                        last,
                        points[first].chainage_m,
                        points[last].chainage_m,
                        bearing(points[first], points[last]),
                        {}});
    first = last;
  }
  return segments;
}

AlignmentResult design_alignment(const Centreline& line, const Readings& readings,
                                 const SetsResult& sets, const AlignmentOptions& options) {
  if (!(options.tolerance.deg() > 0.0 && options.tolerance.deg() <= 45.0)) {
    throw Error(ErrorKind::argument, Place{.file = {}, .key = "--tolerance"}, "out of range",
                shortest(options.tolerance.deg()), "above 0, at most 45 degrees");
  }
  AlignmentResult result{options, line, divide_alignment(line, options.tolerance), line.warnings};
  for (AlignmentSegment& segment : result.segments) {
    for (const bool left : {true, false}) {
      if (options.cut == (left ? CutSide::right : CutSide::left)) continue;
      segment.cuts.push_back({left, {}});
      segment.cuts.back().face.dip_direction = looks_towards(segment, left);
    }
  }
  result.options.search.azimuths = azimuths_of(result.segments);
  const SteepestResult found = find_steepest(readings, sets, result.options.search);
  for (AlignmentSegment& segment : result.segments) {
    for (SegmentCut& cut : segment.cuts) {
      cut.face =
          *std::ranges::find(found.azimuths, cut.face.dip_direction, &SteepestFace::dip_direction);
    }
  }
  result.warnings.insert(result.warnings.end(), found.warnings.begin(), found.warnings.end());
  return result;
}

}  // namespace brink
