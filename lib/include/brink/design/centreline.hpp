// The centreline of a road or the toe of a quarry face, as points in projected metres.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace brink {

struct CentrelinePoint {
  double chainage_m = 0.0;
  double easting_m = 0.0;
  double northing_m = 0.0;
  std::size_t line = 0;  // of the file; 0 in GeoJSON
};

struct Centreline {
  std::vector<CentrelinePoint> points;  // at least two, neighbours apart, chainage ascending
  bool closed = false;                  // the last point is the first
  std::vector<std::string> warnings;    // repeated points left out, chainage that disagrees
};

// Reads a centreline from CSV (columns easting and northing, or x and y, in metres; chainage or
// station where there is one, measured along the line from 0 otherwise) or from GeoJSON (RFC 7946,
// a LineString, alone, in a Feature or as the only line of a FeatureCollection; positions taken as
// easting and northing). Which it is, the first character says.
//
// Throws ErrorKind::input with file and line: for geographic coordinates (columns named so, a
// coordinate reference system that says so, or values that all fit longitude and latitude on a line
// that would be less than 20 m long), for fewer than two different points, for a chainage that
// falls, for anything that is no finite number.
Centreline parse_centreline(std::string_view text, const std::string& file);

}  // namespace brink
