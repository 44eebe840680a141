// From the cells of one row to its plane.
#pragma once

#include <optional>
#include <string>

#include "brink/readings/columns.hpp"
#include "brink/readings/readings.hpp"
#include "brink/readings/table.hpp"

namespace brink {

struct RowOutcome {
  ParsedPlane parsed;
  std::optional<std::size_t> column;  // index of the cell that is wrong; nothing: the whole row
};

class PlaneReader {
 public:
  // `columns` and `options` must outlive the reader.
  PlaneReader(const Columns& columns, const ReadingOptions& options, DecimalComma comma);

  // Declination included.
  RowOutcome read(const Row& row) const;

  // The plane of a row whose cells are plain numbers in range under the layout dip and dip
  // direction, without declination: nearly all rows of a large file. False: use read().
  bool read_plain(const Row& row, Plane& plane) const;

  const TextRules& text_rules() const { return rules_; }

 private:
  RowOutcome read_layout(const Row& row) const;
  RowOutcome read_dip_direction(const Row& row) const;
  RowOutcome read_strike(const Row& row) const;
  RowOutcome read_pole(const Row& row) const;
  RowOutcome read_core(const Row& row) const;
  RowOutcome read_text(const Row& row) const;
  RowOutcome turn_to_grid(const Row& row, RowOutcome outcome) const;
  // The hole of the row: its columns, and the option where they are blank.
  std::optional<Hole> hole_of(const Row& row, RowOutcome& failed) const;

  const Columns& columns_;
  const ReadingOptions& options_;
  TextRules rules_;
  Angle greatest_dip_;
  bool plain_possible_;
};

}  // namespace brink
