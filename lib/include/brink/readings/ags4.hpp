// Discontinuities from AGS4, the open data-exchange standard of the Association of Geotechnical and
// Geoenvironmental Specialists (edition 4).
#pragma once

#include <deque>
#include <map>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "brink/readings/table.hpp"

namespace brink {

// Whether the first line that is not blank begins a group.
bool is_ags4(std::string_view text);

// One group of an AGS4 file as it stands: fields without their quotes, by heading.
struct Ags4Group {
  struct Line {
    std::size_t number = 0;
    std::string_view text;  // without the line end
  };
  std::string name;
  std::size_t line = 0;               // of the GROUP row
  std::vector<std::string> headings;  // without the descriptor
  std::vector<std::string> units;
  std::vector<std::string> types;
  std::vector<Line> data;

  // Index of a heading, or npos.
  static constexpr std::size_t npos = static_cast<std::size_t>(-1);
  std::size_t find(std::string_view heading) const;
};

// All groups of a file, and where the file breaks the standard's rules: each breach a warning with
// line and group. Group, heading, unit and type rows are checked in every group; fields against
// their types in the groups that readings come from.
struct Ags4File {
  std::vector<Ags4Group> groups;
  std::vector<std::string> breaches;

  const Ags4Group* find(std::string_view group) const;
};
Ags4File parse_ags4(std::string_view text, const std::string& file);

// The DATA rows of the group DISC as rows of a table: first the descriptor's column, without a
// heading, then those of DISC under their own headings, then what the groups LOCA (kind, easting,
// northing, level) and HORN (azimuth and inclination of the traverse that holds the row's depth)
// say of the row's location. A dip or direction written as a range, "65-70", comes as its middle,
// with a warning. A DISC row with another number of fields than its headings has a `problem`.
class Ags4Reader final : public RowSource {
 public:
  // `text` must outlive the reader. Error(input) where there is no group DISC with headings.
  Ags4Reader(std::string_view text, std::string file);

  const Row& headings() const override { return headings_; }
  bool next(Row& row) override;
  bool comma_separates() const override { return true; }
  const std::vector<std::string>& warnings() const override { return file_.breaches; }

 private:
  // What one row of LOCA or HORN says, and of which stretch of which location.
  struct Stretch {
    double top_m;                    // minus infinity where not stated
    double base_m;                   // infinity where not stated
    std::vector<std::string> cells;  // in the order of the joined headings
  };
  // The group's rows by location.
  struct JoinedGroup {
    std::size_t cell_count = 0;
    std::map<std::string, std::vector<Stretch>, std::less<>> by_location;
  };

  void join_group(std::string_view name, std::span<const std::string_view> wanted);
  void join(Row& row) const;
  void read_range(Row& row, std::string_view heading, bool azimuth);

  std::string name_;
  Ags4File file_;
  const Ags4Group* disc_ = nullptr;
  std::vector<JoinedGroup> joined_;
  std::size_t next_ = 0;
  std::size_t ranges_ = 0;
  Row headings_;
  std::deque<std::string> cells_;  // of the present row, where they don't stand in the text
};

}  // namespace brink
