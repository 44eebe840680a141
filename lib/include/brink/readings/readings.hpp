// Orientation readings as the rest of the program sees them, whatever file and notation they came
// in.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "brink/orientation/borehole.hpp"
#include "brink/orientation/notation.hpp"
#include "brink/orientation/orientation.hpp"
#include "brink/readings/filter.hpp"

namespace brink {

// Where a reading stood. `file` indexes Readings::files; lines count from 1, the heading included.
// Kept small: there is one for each reading.
struct ReadingPlace {
  ReadingPlace() = default;
  ReadingPlace(std::size_t file_index, std::size_t line_number)
      : file(static_cast<std::uint32_t>(file_index)),
        line(static_cast<std::uint32_t>(line_number)) {}
  std::uint32_t file = 0;
  std::uint32_t line = 0;
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

// Texts in one block of memory: at 10^6 readings a string each would cost more than the rest.
class TextCells {
 public:
  // std::length_error where the texts together pass 4 GiB.
  void push_back(std::string_view cell);
  // Room for so many cells of so many bytes each.
  void reserve(std::size_t cells, std::size_t bytes_each);
  std::size_t size() const { return ends_.size(); }
  bool empty() const { return ends_.empty(); }
  // Valid until the next push_back().
  std::string_view operator[](std::size_t index) const {
    const std::size_t begin = index == 0 ? 0 : ends_[index - 1];
    return std::string_view(text_).substr(begin, ends_[index] - begin);
  }

 private:
  std::string text_;
  std::vector<std::uint32_t> ends_;
};

// A column that travels along: one cell a used reading, in reading order; empty where the file of
// the reading has no such column.
struct ExtraColumn {
  std::string heading;
  TextCells cells;
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
  // The extra column with this heading, compared by heading_key() (so "kind" finds "Type"); null
  // where there is none.
  const ExtraColumn* find_column(std::string_view heading) const;
};

// The bytes of one input file. Both must outlive the call they are handed to.
struct InputBytes {
  std::string name;
  std::string_view bytes;
};

struct ReadingOptions {
  std::optional<Notation> notation;  // nothing: the headings decide
  std::optional<StrikeRule> strike_rule;
  Angle declination;         // added once to every azimuth, east positive; a column overrides it
  std::optional<Hole> hole;  // for core where no column says how the hole runs
  bool overturned = false;   // dips above 90 up to 180 are beds past vertical, not mistakes
  std::vector<Filter> only;  // a row must pass all of them
};

// Reads every row of the files into one Readings, in order. Each file has its own headings; their
// extra columns are joined by heading.
//
// A row that can't be used is a Rejection with its place and what would be accepted; the rest go
// on. Rows that a filter leaves out are counted, not judged. Azimuth 360 is 0; dip 0 has direction
// 0 (it may be blank); dip 90 keeps its direction. With `overturned`, the plane is kept and a
// column "overturned" says "yes" for it. Weights are those of the columns weight and count,
// multiplied, and scaled to sum to the number of readings.
//
// Error(input): no heading line, headings that don't make a plane or are ambiguous, a strike with
// neither rule nor quadrant, a text column of bare pairs of numbers in which nothing shows which
// comes first, or more than 100,000 rejected rows that are nine in ten of all.
// Error(argument): a filter on a column that a file doesn't have.
// Cost: linear; about 50 ns and 100 bytes a reading beside the text.
Readings read_readings(std::span<const InputBytes> files, const ReadingOptions& options);

// The same where each file is written in its own way.
struct ReadingSource {
  InputBytes file;
  ReadingOptions options;
};
Readings read_readings(std::span<const ReadingSource> sources);

}  // namespace brink
