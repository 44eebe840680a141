// Orientation readings as the rest of the program sees them, whatever file and notation they came
// in.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

// Where a reading stood. `file` indexes Readings::files; lines count from 1, the heading included.
struct ReadingPlace {
  std::size_t file = 0;
  std::size_t line = 0;
};

struct InputFile {
  std::string name;    // as given; "-" for standard input
  std::string sha256;  // of the bytes read
};

// A line that was not used, and why. A missing value is a rejection too.
struct Rejection {
  std::string file;
  std::size_t line = 0;
  std::size_t column = 0;  // 1-based field number, 0 where the whole line is meant
  std::string heading;     // of that column, where there is one
  std::string value;       // the offending text
  std::string reason;      // what is wrong, and what would be accepted
};

// A column that travels along: one cell a used reading, in reading order.
struct ExtraColumn {
  std::string heading;
  std::vector<std::string> cells;
};

// All arrays have one entry a used reading, in input order. read == planes.size() + rejected.size()
// + filtered.
struct Readings {
  std::vector<Plane> planes;
  std::vector<Vector3> normals;  // upward unit normals
  std::vector<double>
      weights;  // > 0; user's weight times bias weight, scaled to sum to the number of readings
  std::vector<ReadingPlace> places;
  std::vector<ExtraColumn> extra;
  std::vector<InputFile> files;
  std::vector<Rejection> rejected;
  std::vector<std::string> warnings;  // doubtful but used; each names its file and line
  std::size_t read = 0;               // data rows; comments and blank lines don't count
  std::size_t filtered = 0;           // left out by the user's filter

  std::size_t size() const { return planes.size(); }
  // The extra column with this heading, case, spaces and underscores ignored; null where there is
  // none.
  const ExtraColumn* find_column(std::string_view heading) const;
};

}  // namespace brink
