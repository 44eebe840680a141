#include "brink/readings/readings.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <memory>
#include <stdexcept>
#include <utility>

#include "brink/base/digest.hpp"
#include "brink/base/error.hpp"
#include "brink/base/large_memory.hpp"
#include "brink/base/number.hpp"
#include "brink/readings/ags4.hpp"
#include "brink/readings/columns.hpp"
#include "brink/readings/csv.hpp"
#include "row_planes.hpp"

namespace brink {

namespace {

// A file of which more than this many rows and nine in ten are rejected is not what the user meant
// to read; the limit keeps the memory of the list in bounds.
constexpr std::size_t kMostRejected = 100'000;

// Warnings of one kind in a file are named singly up to here, then counted.
constexpr std::size_t kMostWarnings = 20;

constexpr std::string_view kNotationOptions =
    "the notation named (dip/dip-direction, or strike/dip with the strike rule)";

// Upward normals. Sine and cosine of the whole tenths of a degree in which nearly all readings are
// logged are looked up: the same bits, without the trigonometry.
class NormalMaker {
 public:
  explicit NormalMaker(std::size_t expected_readings) {
    if (expected_readings < kTenths) return;
    table_.reserve(kTenths + 1);
    for (std::size_t i = 0; i <= kTenths; ++i) {
      const Angle angle = Angle::degrees(static_cast<double>(i) / 10.0);
      table_.push_back({angle, sincos(angle)});
    }
  }

  Vector3 operator()(const Plane& plane) const {
    const SinCos dip = look_up(plane.dip);
    const SinCos azimuth = look_up(plane.dip_direction);
    return {dip.sin * azimuth.sin, dip.sin * azimuth.cos, dip.cos};
  }

 private:
  struct Entry {
    Angle angle;
    SinCos value;
  };
  static constexpr std::size_t kTenths = 3600;

  SinCos look_up(Angle angle) const {  // 0 <= angle <= 360
    if (table_.empty()) return sincos(angle);
    const Entry& nearest = table_[static_cast<std::size_t>(angle.deg() * 10.0 + 0.5)];
    return nearest.angle == angle ? nearest.value : sincos(angle);
  }

  std::vector<Entry> table_;
};

// A filter and the column of the present file that it looks at.
struct ColumnFilter {
  const Filter* filter;
  std::size_t column;
};

class ReadingCollector {
 public:
  explicit ReadingCollector(std::size_t expected) : normal_of_(expected) {
    expected = std::min(expected, std::size_t{1} << 26);
    reserve_large(readings_.planes, expected);
    reserve_large(readings_.normals, expected);
    reserve_large(readings_.places, expected);
    reserve_large(readings_.weights, expected);
  }

  void read_file(const InputBytes& file, const ReadingOptions& options);
  Readings finish();

 private:
  struct Source {
    const std::string& name;
    RowSource& rows;
    const Columns& columns;
    const PlaneReader& planes;
  };

  void read_rows(const Source& source);
  void read_row(const Source& source, const Row& row);
  bool passes_filters(const Source& source, const Row& row) const;
  void find_filters(const std::string& name, const Row& headings);
  void find_extra(const Columns& columns, const Row& headings);
  void use(const Source& source, const Row& row, const Plane& plane, bool overturned);
  void mark_overturned();
  std::optional<double> weight_of(const Source& source, const Row& row);
  void reject(const Source& source, const Row& row, std::optional<std::size_t> column,
              std::string reason);
  void watch_bare_pair(const Source& source, const Row& row);
  void settle_bare_pairs(const Source& source) const;
  void doubt(const Source& source, const Row& row, const std::string& what);
  std::size_t extra_index(std::string_view heading);
  void pad(TextCells& cells) const {
    while (cells.size() < readings_.size()) cells.push_back({});
  }

  NormalMaker normal_of_;
  Readings readings_;
  std::vector<std::string> extra_keys_;  // of readings_.extra
  // Of the present file:
  const ReadingOptions* options_ = nullptr;
  std::vector<ColumnFilter> filters_;
  std::vector<std::size_t> extra_of_column_;  // index into readings_.extra, by columns.extra
  std::size_t doubts_ = 0;
  std::optional<Row> undecided_;  // first bare pair that could be either way round
  bool dip_first_seen_ = false;
};

void ReadingCollector::find_filters(const std::string& name, const Row& headings) {
  filters_.clear();
  for (const Filter& filter : options_->only) {
    const std::string key = heading_key(filter.heading);
    const auto at = std::find_if(headings.cells.begin(), headings.cells.end(),
                                 [&](auto heading) { return heading_key(heading) == key; });
    if (at == headings.cells.end()) {
      throw Error(ErrorKind::argument, {name, headings.line, 0, {}},
                  "is a filter on a column that is not there", filter.text,
                  fmt::format("one of the headings {}", printable(headings.text)));
    }
    filters_.push_back({&filter, static_cast<std::size_t>(at - headings.cells.begin())});
  }
}

std::size_t ReadingCollector::extra_index(std::string_view heading) {
  const std::string key = heading_key(heading);
  const auto known = std::find(extra_keys_.begin(), extra_keys_.end(), key);
  if (known != extra_keys_.end()) return static_cast<std::size_t>(known - extra_keys_.begin());
  extra_keys_.push_back(key);
  readings_.extra.push_back({std::string(heading), {}});
  constexpr std::size_t kUsualBytes = 8;
  readings_.extra.back().cells.reserve(readings_.planes.capacity(), kUsualBytes);
  pad(readings_.extra.back().cells);
  return extra_keys_.size() - 1;
}

void ReadingCollector::find_extra(const Columns& columns, const Row& headings) {
  extra_of_column_.clear();
  for (const std::size_t i : columns.extra) {
    extra_of_column_.push_back(extra_index(headings.cells[i]));
  }
}

void check_strike_rule(const Columns& columns, const ReadingOptions& options,
                       const std::string& name, const Row& headings) {
  const bool conflict =
      columns.strike_rule && options.strike_rule && *columns.strike_rule != *options.strike_rule;
  if (!conflict) return;
  const std::size_t column = *columns.of(Meaning::strike);
  throw Error(ErrorKind::input, {name, headings.line, column + 1, {}},
              fmt::format("is a heading that contradicts the strike rule given, {}",
                          name_of(*options.strike_rule)),
              headings.cells[column], "one and the same rule");
}

std::unique_ptr<RowSource> open_rows(std::string_view text, const std::string& name) {
  if (is_ags4(text)) return std::make_unique<Ags4Reader>(text, name);
  return std::make_unique<CsvReader>(text, name);
}

void ReadingCollector::read_file(const InputBytes& file, const ReadingOptions& options) {
  options_ = &options;
  readings_.files.push_back({file.name, sha256_hex(file.bytes)});
  const Text text(file.bytes, file.name);
  const std::unique_ptr<RowSource> source = open_rows(text.view(), file.name);
  RowSource& rows = *source;
  const Row& headings = rows.headings();
  const Columns columns = understand_columns(headings, file.name, options_->notation);
  check_strike_rule(columns, options, file.name, headings);
  find_filters(file.name, headings);
  find_extra(columns, headings);
  const PlaneReader planes(columns, options,
                           rows.comma_separates() ? DecimalComma::no : DecimalComma::yes);
  doubts_ = 0;
  undecided_.reset();
  dip_first_seen_ = false;

  auto& warnings = readings_.warnings;
  warnings.insert(warnings.end(), text.warnings().begin(), text.warnings().end());
  warnings.insert(warnings.end(), columns.warnings.begin(), columns.warnings.end());
  read_rows({file.name, rows, columns, planes});
  warnings.insert(warnings.end(), rows.warnings().begin(), rows.warnings().end());
}

void ReadingCollector::read_rows(const Source& source) {
  Row row;
  while (source.rows.next(row)) {
    ++readings_.read;
    read_row(source, row);
  }
  settle_bare_pairs(source);
  for (ExtraColumn& column : readings_.extra) pad(column.cells);
  if (doubts_ > kMostWarnings) {
    readings_.warnings.push_back(fmt::format("{}: {} more readings with doubts like these",
                                             source.name, doubts_ - kMostWarnings));
  }
}

bool ReadingCollector::passes_filters(const Source& source, const Row& row) const {
  return std::all_of(filters_.begin(), filters_.end(), [&](const ColumnFilter& f) {
    return passes(*f.filter, row.cell(f.column), !source.rows.comma_separates());
  });
}

void ReadingCollector::read_row(const Source& source, const Row& row) {
  if (!row.problem.empty()) {
    reject(source, row, std::nullopt, row.problem);
    return;
  }
  if (!filters_.empty() && !passes_filters(source, row)) {
    ++readings_.filtered;
    return;
  }
  const std::size_t headings = source.rows.headings().cells.size();
  const bool too_long =
      row.cells.size() > headings &&
      std::any_of(row.cells.begin() + static_cast<std::ptrdiff_t>(headings), row.cells.end(),
                  [](std::string_view cell) { return !cell.empty(); });
  if (too_long) {
    const std::string_view hint = source.rows.comma_separates() ? " (a decimal comma?)" : "";
    reject(source, row, std::nullopt,
           fmt::format("has {} fields{}; accepted: {} as in the heading", row.cells.size(), hint,
                       headings));
    return;
  }
  Plane plane;
  if (source.planes.read_plain(row, plane)) {
    use(source, row, plane, false);
    return;
  }
  if (source.columns.layout == Layout::text) watch_bare_pair(source, row);
  const RowOutcome outcome = source.planes.read(row);
  if (outcome.parsed.bare_strike) {
    const std::size_t column = outcome.column.value_or(0);
    throw Error(
        ErrorKind::input,
        {source.name, row.line, column + 1, std::string(source.rows.headings().cell(column))},
        "is a strike that doesn't say to which side the plane dips", row.cell(column),
        "--strike-rule right (dip direction = strike + 90) or left (strike - 90), or a "
        "column dip_quadrant (SE)");
  }
  if (!outcome.parsed.ok()) {
    reject(source, row, outcome.column, outcome.parsed.problem);
    return;
  }
  if (!outcome.parsed.doubt.empty()) doubt(source, row, outcome.parsed.doubt);
  use(source, row, outcome.parsed.plane, outcome.parsed.overturned);
}

std::optional<double> ReadingCollector::weight_of(const Source& source, const Row& row) {
  double weight = 1.0;
  for (const Meaning meaning : {Meaning::weight, Meaning::count}) {
    const auto column = source.columns.of(meaning);
    if (!column) continue;
    const auto comma = source.planes.text_rules().comma;
    const ParsedAngle number = parse_angle(row.cell(*column), comma);
    if (!number.ok() || number.value.deg() <= 0.0) {
      const bool missing = is_missing(row.cell(*column));
      reject(source, row, *column,
             missing ? "is missing; accepted: a number above 0"
                     : "is not a number above 0; accepted: a number above 0");
      return std::nullopt;
    }
    weight *= number.value.deg();
  }
  return weight;
}

void ReadingCollector::use(const Source& source, const Row& row, const Plane& plane,
                           bool overturned) {
  const auto weight = weight_of(source, row);
  if (!weight) return;
  if (overturned) mark_overturned();
  readings_.planes.push_back(plane);
  readings_.normals.push_back(normal_of_(plane));
  readings_.weights.push_back(*weight);
  readings_.places.push_back({readings_.files.size() - 1, row.line});
  const auto& columns = source.columns.extra;
  for (std::size_t i = 0; i < columns.size(); ++i) {
    readings_.extra[extra_of_column_[i]].cells.push_back(row.cell(columns[i]));
  }
}

// Ahead of the reading itself: its cells of this column are then complete. A column of that name in
// the file is the user's own.
void ReadingCollector::mark_overturned() {
  const std::size_t index = extra_index("overturned");
  const bool from_file =
      std::find(extra_of_column_.begin(), extra_of_column_.end(), index) != extra_of_column_.end();
  if (from_file) return;
  pad(readings_.extra[index].cells);
  readings_.extra[index].cells.push_back("yes");
}

void ReadingCollector::reject(const Source& source, const Row& row,
                              std::optional<std::size_t> column, std::string reason) {
  constexpr std::size_t kShownBytes = 72;
  Rejection rejection;
  rejection.file = source.name;
  rejection.line = row.line;
  rejection.column = column ? *column + 1 : row.problem_column;
  if (column) rejection.heading = source.rows.headings().cell(*column);
  rejection.value = printable(column ? row.cell(*column) : row.text, kShownBytes);
  rejection.reason = std::move(reason);
  readings_.rejected.push_back(std::move(rejection));
  const std::size_t rejected = readings_.rejected.size();
  if (rejected > kMostRejected && rejected > 9 * readings_.size()) {
    throw Error(ErrorKind::input, {source.name, row.line, 0, {}},
                fmt::format("more than {} lines, nine in ten, can't be used; the last one {}",
                            kMostRejected, readings_.rejected.back().reason),
                {}, "a table of orientation readings");
  }
}

void ReadingCollector::doubt(const Source& source, const Row& row, const std::string& what) {
  if (++doubts_ > kMostWarnings) return;
  readings_.warnings.push_back(fmt::format("{}:{}: {}", source.name, row.line, what));
}

// In a text column without a stated notation the whole column must show which number comes first.
void ReadingCollector::watch_bare_pair(const Source& source, const Row& row) {
  if (options_->notation || options_->strike_rule) return;
  const std::size_t column = *source.columns.of(Meaning::orientation);
  const std::string_view cell = row.cell(column);
  switch (bare_pair(cell, source.planes.text_rules().comma)) {
    case BarePair::azimuth_first:
      throw Error(
          ErrorKind::input,
          {source.name, row.line, column + 1, std::string(source.rows.headings().cell(column))},
          "has the azimuth first: is it a strike, or the trend of a pole?", cell,
          "the notation named (strike/dip with the strike rule, or pole)");
    case BarePair::dip_first:
      dip_first_seen_ = true;
      break;
    case BarePair::either:
      if (!undecided_) undecided_ = row;
      break;
    case BarePair::not_a_pair:
      break;
  }
}

void ReadingCollector::settle_bare_pairs(const Source& source) const {
  if (!undecided_ || dip_first_seen_) return;
  const std::size_t column = *source.columns.of(Meaning::orientation);
  throw Error(
      ErrorKind::input,
      {source.name, undecided_->line, column + 1, std::string(source.rows.headings().cell(column))},
      "may be dip/dip direction or strike/dip, and no other reading of the file shows which",
      undecided_->text, kNotationOptions);
}

Readings ReadingCollector::finish() {
  double sum = 0.0;
  bool even = true;
  for (const double weight : readings_.weights) {
    sum += weight;
    even = even && weight == 1.0;
  }
  if (!even) {
    const double scale = static_cast<double>(readings_.size()) / sum;
    for (double& weight : readings_.weights) weight *= scale;
  }
  return std::move(readings_);
}

}  // namespace

void TextCells::push_back(std::string_view cell) {
  constexpr std::size_t kMost = 0xFFFFFFFF;
  if (cell.size() > kMost - text_.size()) {
    throw std::length_error("the texts of a column pass 4 GiB");
  }
  text_ += cell;
  ends_.push_back(static_cast<std::uint32_t>(text_.size()));
}

void TextCells::reserve(std::size_t cells, std::size_t bytes_each) {
  text_.reserve(cells * bytes_each);
  expect_large(text_.data(), text_.capacity());
  reserve_large(ends_, cells);
}

const ExtraColumn* Readings::find_column(std::string_view heading) const {
  const std::string key = heading_key(heading);
  const auto at = std::find_if(extra.begin(), extra.end(), [&](const ExtraColumn& column) {
    return heading_key(column.heading) == key;
  });
  return at == extra.end() ? nullptr : &*at;
}

namespace {

// Lines that may hold a reading: no usable row is shorter than "5,5".
std::size_t most_rows(const InputBytes& file) {
  const auto count = std::count(file.bytes.begin(), file.bytes.end(), '\n');
  return std::min(static_cast<std::size_t>(count), file.bytes.size() / 4) + 1;
}

}  // namespace

Readings read_readings(std::span<const InputBytes> files, const ReadingOptions& options) {
  std::size_t rows = 0;
  for (const InputBytes& file : files) rows += most_rows(file);
  ReadingCollector collector(rows);
  for (const InputBytes& file : files) collector.read_file(file, options);
  return collector.finish();
}

Readings read_readings(std::span<const ReadingSource> sources) {
  std::size_t rows = 0;
  for (const ReadingSource& source : sources) rows += most_rows(source.file);
  ReadingCollector collector(rows);
  for (const ReadingSource& source : sources) collector.read_file(source.file, source.options);
  return collector.finish();
}

}  // namespace brink
