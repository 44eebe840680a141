#include "brink/readings/ags4.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <optional>
#include <set>
#include <span>

#include "brink/base/angle.hpp"
#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "capped_warnings.hpp"

namespace brink {

namespace {

constexpr auto npos = std::string_view::npos;

// What the reader joins to each reading.
constexpr std::string_view kLocationHeadings[] = {"LOCA_TYPE", "LOCA_NATE", "LOCA_NATN", "LOCA_GL"};
constexpr std::string_view kTraverseHeadings[] = {"HORN_ORNT", "HORN_INCL"};
// Groups whose fields are checked against their types.
constexpr std::string_view kCheckedGroups[] = {"DISC", "LOCA", "HORN"};
// From memory: the groups that the standard requires in every file.
constexpr std::string_view kRequiredGroups[] = {"PROJ", "TRAN", "UNIT", "TYPE"};

struct Fields {
  std::vector<std::string> values;
  bool unquoted = false;    // a field without quotes
  bool unclosed = false;    // a quote that doesn't close on its line
  bool stray_text = false;  // text between a quote and the next comma
};

// One field from `at` on; `at` is left at the comma after it or at the end.
std::string take_field(std::string_view line, std::size_t& at, Fields& fields) {
  std::string value;
  if (at >= line.size() || line[at] != '"') {
    const std::size_t comma = std::min(line.find(',', at), line.size());
    value = trimmed(line.substr(std::min(at, line.size()), comma - std::min(at, line.size())));
    fields.unquoted = true;
    at = comma;
    return value;
  }
  for (++at;; ++at) {
    if (at >= line.size()) {
      fields.unclosed = true;
      return value;
    }
    if (line[at] == '"' && (at + 1 >= line.size() || line[at + 1] != '"')) break;
    if (line[at] == '"') ++at;
    value += line[at];
  }
  ++at;
  const std::size_t comma = std::min(line.find(',', at), line.size());
  if (!trimmed(line.substr(at, comma - at)).empty()) fields.stray_text = true;
  at = comma;
  return value;
}

Fields split_fields(std::string_view line) {
  Fields fields;
  for (std::size_t at = 0;;) {
    fields.values.push_back(take_field(line, at, fields));
    if (at >= line.size()) return fields;
    ++at;
  }
}

// The field under a heading of the group; empty where the row or the heading lacks it.
std::string field_of(const Fields& fields, std::size_t column) {
  return column != Ags4Group::npos && column + 1 < fields.values.size() ? fields.values[column + 1]
                                                                        : std::string{};
}

bool contains(std::span<const std::string_view> list, std::string_view name) {
  return std::find(list.begin(), list.end(), name) != list.end();
}

class Ags4Parser {
 public:
  Ags4Parser(std::string_view text, const std::string& file) : text_(text), file_(file) {}

  Ags4File parse() {
    std::size_t number = 1;
    for (std::size_t at = 0; at < text_.size(); ++number) {
      const std::size_t feed = std::min(text_.find('\n', at), text_.size());
      read_line(text_.substr(at, feed - at), number, feed < text_.size());
      at = feed + 1;
    }
    close_group();
    check_required_groups();
    check_locations();
    result_.breaches = warnings_.list(file_);
    return std::move(result_);
  }

 private:
  void breach(std::size_t line, std::string_view group, const std::string& kind,
              std::string_view detail = {}) {
    warnings_.add(kind, fmt::format("{}:{}: {}{}{}{}", file_, line,
                                    group.empty() ? "" : fmt::format("group {}: ", group), kind,
                                    detail.empty() ? "" : ": ", detail));
  }

  std::string_view group_name() const {
    return result_.groups.empty() ? std::string_view{} : result_.groups.back().name;
  }

  void read_line(std::string_view line, std::size_t number, bool ended) {
    const bool carriage_return = !line.empty() && line.back() == '\r';
    if (ended && !carriage_return) breach(number, group_name(), "the line doesn't end in CR LF");
    if (carriage_return) line.remove_suffix(1);
    if (trimmed(line).empty()) {
      after_blank_ = true;
      return;
    }
    const auto not_ascii = [](char c) { return static_cast<unsigned char>(c) >= 0x80; };
    if (std::any_of(line.begin(), line.end(), not_ascii)) {
      breach(number, group_name(), "the line holds characters beyond ASCII");
    }
    Fields fields = split_fields(line);
    if (fields.unclosed) breach(number, group_name(), "a quote is not closed on its line");
    if (fields.stray_text) breach(number, group_name(), "text stands between a quote and a comma");
    if (fields.unquoted) breach(number, group_name(), "a field is not in double quotes");
    take_row(std::move(fields), {number, line});
    after_blank_ = false;
  }

  void take_row(Fields fields, Ags4Group::Line line) {
    const std::string descriptor = fields.values.front();
    if (descriptor == "GROUP") {
      begin_group(fields, line.number);
      return;
    }
    if (result_.groups.empty()) {
      breach(line.number, {}, "the row stands before the first GROUP", printable(descriptor));
      return;
    }
    Ags4Group& group = result_.groups.back();
    fields.values.erase(fields.values.begin());
    if (descriptor == "HEADING") {
      take_headings(group, std::move(fields.values), line.number);
    } else if (descriptor == "UNIT" || descriptor == "TYPE") {
      take_units(group, descriptor, std::move(fields.values), line.number);
    } else if (descriptor == "DATA") {
      take_data(group, fields.values, line);
    } else {
      breach(line.number, group.name, "the row begins with no descriptor of the standard",
             printable(descriptor));
    }
  }

  void begin_group(const Fields& fields, std::size_t line) {
    close_group();
    const std::string name = fields.values.size() > 1 ? fields.values[1] : "";
    if (fields.values.size() != 2) breach(line, name, "a GROUP row has its name and nothing else");
    if (!result_.groups.empty() && !after_blank_) {
      breach(line, name, "no blank line stands before the group");
    }
    if (result_.find(name) != nullptr) breach(line, name, "the group stands twice in the file");
    result_.groups.push_back({name, line, {}, {}, {}, {}});
  }

  void take_headings(Ags4Group& group, std::vector<std::string> headings, std::size_t line) {
    if (!group.headings.empty()) {
      breach(line, group.name, "the group has a second HEADING row");
      return;
    }
    for (std::size_t i = 0; i < headings.size(); ++i) {
      const auto before = headings.begin() + static_cast<std::ptrdiff_t>(i);
      if (std::find(headings.begin(), before, headings[i]) != before) {
        breach(line, group.name, "a heading stands twice", headings[i]);
      }
    }
    group.headings = std::move(headings);
  }

  void take_units(Ags4Group& group, const std::string& descriptor, std::vector<std::string> fields,
                  std::size_t line) {
    if (group.headings.empty() || !group.data.empty()) {
      breach(line, group.name, "the rows don't come as GROUP, HEADING, UNIT, TYPE, DATA",
             descriptor);
    }
    if (fields.size() != group.headings.size()) wrong_count(group, descriptor, fields.size(), line);
    (descriptor == "UNIT" ? group.units : group.types) = std::move(fields);
  }

  void wrong_count(const Ags4Group& group, const std::string& descriptor, std::size_t count,
                   std::size_t line) {
    breach(line, group.name,
           fmt::format("the {} row has another number of fields than the headings", descriptor),
           fmt::format("{} instead of {}", count, group.headings.size()));
  }

  void take_data(Ags4Group& group, const std::vector<std::string>& fields, Ags4Group::Line line) {
    if (group.headings.empty()) {
      breach(line.number, group.name, "a DATA row stands before the headings");
      return;
    }
    if (fields.size() != group.headings.size())
      wrong_count(group, "DATA", fields.size(), line.number);
    if (contains(kCheckedGroups, group.name)) check_types(group, fields, line.number);
    group.data.push_back(line);
  }

  // Of the standard's data types the one that readings depend on: nDP, a number with n decimals.
  void check_types(const Ags4Group& group, const std::vector<std::string>& fields,
                   std::size_t line) {
    for (std::size_t i = 0; i < std::min(fields.size(), group.types.size()); ++i) {
      const std::string& type = group.types[i];
      if (type.size() != 3 || !type.ends_with("DP") || type[0] < '0' || type[0] > '9') continue;
      if (fields[i].empty()) continue;
      const std::size_t point = std::min(fields[i].find('.'), fields[i].size());
      const std::size_t decimals = point == fields[i].size() ? 0 : fields[i].size() - point - 1;
      const bool right =
          parse_decimal(fields[i]) && decimals == static_cast<std::size_t>(type[0] - '0');
      if (right) continue;
      breach(
          line, group.name, "a field is not of the type of its heading",
          fmt::format("{} is '{}', not {}", i < group.headings.size() ? group.headings[i] : "field",
                      printable(fields[i]), type));
    }
  }

  void close_group() {
    if (result_.groups.empty()) return;
    const Ags4Group& group = result_.groups.back();
    if (group.headings.empty()) breach(group.line, group.name, "the group has no HEADING row");
    if (group.units.empty()) breach(group.line, group.name, "the group has no UNIT row");
    if (group.types.empty()) breach(group.line, group.name, "the group has no TYPE row");
    if (group.data.empty()) breach(group.line, group.name, "the group has no DATA row");
  }

  void check_required_groups() {
    std::string missing;
    for (const std::string_view name : kRequiredGroups) {
      if (result_.find(name) == nullptr)
        missing += fmt::format("{}{}", missing.empty() ? "" : ", ", name);
    }
    if (missing.empty()) return;
    warnings_.add("groups", fmt::format("{}: the file lacks groups that the standard requires: {}",
                                        file_, missing));
  }

  void check_locations() {
    const Ags4Group* disc = result_.find("DISC");
    const Ags4Group* locations = result_.find("LOCA");
    if (disc == nullptr || locations == nullptr) return;
    const std::size_t child = disc->find("LOCA_ID");
    const std::size_t parent = locations->find("LOCA_ID");
    if (child == npos || parent == npos) return;
    std::set<std::string> known;
    for (const Ags4Group::Line& line : locations->data) {
      known.insert(field_of(split_fields(line.text), parent));
    }
    for (const Ags4Group::Line& line : disc->data) {
      const std::string id = field_of(split_fields(line.text), child);
      const bool is_new = known.insert(id).second;
      if (is_new)
        breach(line.number, "DISC", "the location is not in the group LOCA", printable(id));
    }
  }

  std::string_view text_;
  const std::string& file_;
  Ags4File result_;
  CappedWarnings warnings_;
  bool after_blank_ = true;
};

// The middle of "65-70"; of azimuths, the middle of the shorter way round. Nothing for other texts.
std::optional<double> middle_of_range(std::string_view cell, bool azimuth) {
  const std::size_t dash = cell.find('-', 1);
  if (dash == npos) return std::nullopt;
  const auto low = parse_decimal(trimmed(cell.substr(0, dash)));
  const auto high = parse_decimal(trimmed(cell.substr(dash + 1)));
  if (!low || !high || *low < 0.0 || *high < 0.0) return std::nullopt;
  const bool across_north = azimuth && std::abs(*high - *low) > 180.0;
  const double middle = (*low + *high) / 2.0 + (across_north ? 180.0 : 0.0);
  return azimuth ? wrap_360(Angle::degrees(middle)).deg() : middle;
}

}  // namespace

bool is_ags4(std::string_view text) {
  const std::size_t first = text.find_first_not_of(" \t\r\n");
  return first != npos && text.substr(first).starts_with("\"GROUP\"");
}

std::size_t Ags4Group::find(std::string_view heading) const {
  const auto at = std::find(headings.begin(), headings.end(), heading);
  return at == headings.end() ? npos : static_cast<std::size_t>(at - headings.begin());
}

const Ags4Group* Ags4File::find(std::string_view group) const {
  const auto at = std::find_if(groups.begin(), groups.end(),
                               [&](const Ags4Group& g) { return g.name == group; });
  return at == groups.end() ? nullptr : &*at;
}

Ags4File parse_ags4(std::string_view text, const std::string& file) {
  return Ags4Parser(text, file).parse();
}

Ags4Reader::Ags4Reader(std::string_view text, std::string file)
    : name_(std::move(file)), file_(parse_ags4(text, name_)), disc_(file_.find("DISC")) {
  if (disc_ == nullptr || disc_->headings.empty()) {
    throw Error(ErrorKind::input, {name_, 0, 0, {}}, "is an AGS4 file without discontinuities", {},
                "a group DISC with its headings, such as DISC_DIP and DISC_DIR");
  }
  headings_.line = disc_->line;
  headings_.text = "the headings of the group DISC";
  headings_.cells.emplace_back();  // the descriptor
  for (const std::string& heading : disc_->headings) headings_.cells.push_back(heading);
  join_group("LOCA", kLocationHeadings);
  join_group("HORN", kTraverseHeadings);
}

void Ags4Reader::join_group(std::string_view name, std::span<const std::string_view> wanted) {
  const Ags4Group* group = file_.find(name);
  const std::size_t id = group == nullptr ? Ags4Group::npos : group->find("LOCA_ID");
  if (id == Ags4Group::npos || disc_->find("LOCA_ID") == Ags4Group::npos) return;
  std::vector<std::size_t> columns;
  for (const std::string_view heading : wanted) {
    const std::size_t column = group->find(heading);
    if (column == Ags4Group::npos || disc_->find(heading) != Ags4Group::npos) continue;
    columns.push_back(column);
    headings_.cells.push_back(heading);
  }
  JoinedGroup& joined = joined_.emplace_back();
  joined.cell_count = columns.size();
  const std::size_t top = group->find("HORN_TOP");
  const std::size_t base = group->find("HORN_BASE");
  constexpr double kInfinity = std::numeric_limits<double>::infinity();
  for (const Ags4Group::Line& line : group->data) {
    const Fields fields = split_fields(line.text);
    Stretch stretch{parse_decimal(field_of(fields, top)).value_or(-kInfinity),
                    parse_decimal(field_of(fields, base)).value_or(kInfinity),
                    {}};
    for (const std::size_t column : columns) stretch.cells.push_back(field_of(fields, column));
    joined.by_location[field_of(fields, id)].push_back(std::move(stretch));
  }
}

bool Ags4Reader::next(Row& row) {
  if (next_ >= disc_->data.size()) return false;
  const Ags4Group::Line& line = disc_->data[next_++];
  Fields fields = split_fields(line.text);
  cells_.clear();
  row.line = line.number;
  row.text = trimmed(line.text);
  row.cells.clear();
  row.problem.clear();
  row.problem_column = 0;
  if (fields.values.size() != disc_->headings.size() + 1 || fields.unclosed) {
    row.problem = fmt::format("has {} fields{}; accepted: {} as in the headings of DISC",
                              fields.values.size(), fields.unclosed ? " and an open quote" : "",
                              disc_->headings.size() + 1);
    return true;
  }
  for (std::string& value : fields.values) {
    row.cells.push_back(trimmed(cells_.emplace_back(std::move(value))));
  }
  read_range(row, "DISC_DIP", false);
  read_range(row, "DISC_DIR", true);
  join(row);
  return true;
}

void Ags4Reader::read_range(Row& row, std::string_view heading, bool azimuth) {
  constexpr std::size_t kNamed = 20;
  const std::size_t column = disc_->find(heading);
  if (column == Ags4Group::npos) return;
  std::string_view& cell = row.cells[column + 1];
  const auto middle = middle_of_range(cell, azimuth);
  if (!middle) return;
  const std::string& text = cells_.emplace_back(shortest(*middle));
  if (++ranges_ <= kNamed) {
    file_.breaches.push_back(
        fmt::format("{}:{}: group DISC: {}: the range '{}' is read as its middle, {}", name_,
                    row.line, heading, printable(cell), text));
  }
  cell = text;
}

void Ags4Reader::join(Row& row) const {
  const std::size_t location = disc_->find("LOCA_ID");
  const std::size_t depth = disc_->find("DISC_TOP");
  // Where the depth is not a number, the location's first stretch is taken.
  const double at_m = depth == Ags4Group::npos
                          ? std::nan("")
                          : parse_decimal(row.cells[depth + 1]).value_or(std::nan(""));
  for (const JoinedGroup& joined : joined_) {
    const auto found = joined.by_location.find(row.cells[location + 1]);
    const Stretch* here = nullptr;
    if (found != joined.by_location.end()) {
      for (const Stretch& stretch : found->second) {
        const bool outside = at_m < stretch.top_m || at_m > stretch.base_m;
        if (!outside && here == nullptr) here = &stretch;
      }
    }
    for (std::size_t i = 0; i < joined.cell_count; ++i) {
      row.cells.push_back(here == nullptr ? std::string_view{} : here->cells[i]);
    }
  }
}

}  // namespace brink
