#include "brink/mechanics/topple_table.hpp"

#include <fmt/format.h>

#include <array>
#include <map>
#include <optional>

#include "brink/base/error.hpp"
#include "brink/base/interval.hpp"
#include "brink/base/number.hpp"
#include "brink/readings/columns.hpp"
#include "brink/readings/csv.hpp"

namespace brink {

namespace {

constexpr std::size_t kMostBlocks = 10000;

enum Column { number, height, water_behind, water_front, load, load_plunge, bolt, bolt_plunge };
constexpr std::array<const char*, 8> kHeadings{"number",        "height_m",       "water_behind_m",
                                               "water_front_m", "load_kN_m",      "load_plunge_deg",
                                               "bolt_kN_m",     "bolt_plunge_deg"};

struct TableRow {
  double height_m = 0.0;
  std::array<std::optional<double>, kHeadings.size()> cells;
};

class TableReader {
 public:
  TableReader(std::string_view text, const std::string& file) : file_(file), csv_(text, file) {
    const Row& headings = csv_.headings();
    for (std::size_t c = 0; c < kHeadings.size(); ++c) {
      for (std::size_t i = 0; i < headings.cells.size(); ++i) {
        if (heading_key(headings.cells[i]) == heading_key(kHeadings[c])) find(c, i, headings.line);
      }
    }
    for (const std::size_t needed : {number, height}) {
      if (!index_[needed])
        throw Error(ErrorKind::input, Place{file_, headings.line, 0, {}},
                    fmt::format("there is no column '{}'", kHeadings[needed]), {},
                    "the columns number and height_m");
    }
    check_pairs(headings.line);
  }

  std::map<std::size_t, TableRow> rows() {
    std::map<std::size_t, TableRow> rows;
    Row row;
    while (csv_.next(row)) {
      if (!row.problem.empty())
        throw Error(ErrorKind::input, Place{file_, row.line, row.problem_column, {}}, row.problem);
      add(row, rows);
    }
    return rows;
  }

  const std::vector<std::string>& warnings() const { return csv_.warnings(); }

 private:
  void find(std::size_t column, std::size_t at, std::size_t line) {
    if (index_[column])
      throw Error(ErrorKind::input, Place{file_, line, at + 1, {}}, "stands in the headings twice",
                  kHeadings[column], "each column once");
    index_[column] = at;
  }

  void check_pairs(std::size_t line) const {
    for (const auto& [force, plunge] : {std::pair{load, load_plunge}, {bolt, bolt_plunge}}) {
      if (index_[force].has_value() == index_[plunge].has_value()) continue;
      throw Error(ErrorKind::input, Place{file_, line, 0, {}},
                  "one of two columns that belong together is missing", {},
                  fmt::format("{} with {}", kHeadings[force], kHeadings[plunge]));
    }
  }

  [[noreturn]] void refuse(const Row& row, std::size_t column, std::string_view what,
                           const std::string& accepted) const {
    throw Error(ErrorKind::input, Place{file_, row.line, *index_[column] + 1, kHeadings[column]},
                what, row.cell(*index_[column]), accepted);
  }

  std::optional<double> cell(const Row& row, std::size_t column, const Interval& accepted) const {
    if (!index_[column] || row.cell(*index_[column]).empty()) return {};
    const auto value = parse_decimal(row.cell(*index_[column]));
    if (!value) refuse(row, column, "is not a number", accepted.text());
    if (!accepted.contains(*value)) refuse(row, column, "is out of range", accepted.text());
    return value;
  }

  void add(const Row& row, std::map<std::size_t, TableRow>& rows) const {
    const auto block = parse_integer(row.cell(*index_[number]));
    if (!block || *block < 1 || *block > static_cast<long long>(kMostBlocks))
      refuse(row, number, "is not the number of a block",
             fmt::format("a whole number, 1 to {}", kMostBlocks));
    TableRow entry;
    const auto height_m = cell(row, height, above(0.0, "m"));
    if (!height_m) refuse(row, height, "a height is missing", "a number above 0 m");
    entry.height_m = *height_m;
    for (const std::size_t c : {water_behind, water_front})
      entry.cells[c] = cell(row, c, from_to(0.0, *height_m, "m"));
    for (const std::size_t c : {load, bolt}) {
      entry.cells[c] = cell(row, c, at_least_value(0.0, "kN/m"));
      entry.cells[c + 1] = cell(row, c + 1, from_to(-90.0, 90.0, "degrees"));
      if (entry.cells[c] && !entry.cells[c + 1])
        refuse(row, c + 1, "the plunge of a force is missing", "-90 to 90 degrees");
    }
    if (!rows.emplace(static_cast<std::size_t>(*block), entry).second)
      refuse(row, number, "stands in the table twice", "each block once");
  }

  std::string file_;
  CsvReader csv_;
  std::array<std::optional<std::size_t>, kHeadings.size()> index_;
};

void add_block(std::size_t block, const TableRow& row, ToppleTable& table) {
  table.heights_m.push_back(row.height_m);
  const auto& cells = row.cells;
  if (cells[water_behind] || cells[water_front])
    table.water.push_back(
        {block, cells[water_behind].value_or(0.0), cells[water_front].value_or(0.0)});
  if (cells[load])
    table.loads.push_back({block, *cells[load], Angle::degrees(*cells[load_plunge]), {}});
  if (cells[bolt])
    table.bolts.push_back({block, *cells[bolt], Angle::degrees(*cells[bolt_plunge]), {}});
}

}  // namespace

ToppleTable read_topple_table(std::string_view bytes, const std::string& file) {
  const Text text(bytes, file);
  TableReader reader(text.view(), file);
  ToppleTable table;
  for (const auto& [block, row] : reader.rows()) {
    const std::size_t expected = table.heights_m.size() + 1;
    if (block != expected)
      throw Error(ErrorKind::input, Place{file, 0, 0, {}},
                  fmt::format("block {} is missing", expected), {},
                  "blocks numbered from 1 without a gap");
    add_block(block, row, table);
  }
  if (table.heights_m.empty())
    throw Error(ErrorKind::input, Place{file, 0, 0, {}}, "there is no block", {}, "at least 1 row");
  table.warnings = text.warnings();
  table.warnings.insert(table.warnings.end(), reader.warnings().begin(), reader.warnings().end());
  return table;
}

}  // namespace brink
