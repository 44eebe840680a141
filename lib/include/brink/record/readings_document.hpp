// Readings as a record and as a table for other programs.
#pragma once

#include <optional>
#include <string>

#include "brink/readings/readings.hpp"
#include "brink/readings/traverse.hpp"
#include "brink/record/document.hpp"

namespace brink {

// What every command that reads files echoes: {files[] {name, sha256}, notation, strike_rule,
// declination_deg, hole{trend_deg, plunge_deg, reference_line}, overturned, only[]}. What was not
// given is null. Commands add their own keys.
Object readings_inputs(const Readings& readings, const ReadingOptions& options);

// {name, kind, and trend_deg, plunge_deg or dip_deg, dip_direction_deg}.
Value traverse_value(const Traverse& traverse);

// {read, used, filtered, effective_number, rejected[] {file, line, column, heading, value, reason},
// readings[] {file, line, dip_deg, dip_direction_deg, weight, ...}}: the other columns follow by
// their headings; one whose heading is already a key gets "column " before it.
Value readings_result(const Readings& readings);

// How a table of readings is to be written.
struct TableForm {
  Notation notation = Notation::dip_direction;
  StrikeRule strike_rule = StrikeRule::right;  // of the notation strike/dip; its heading names it
  std::optional<Hole> hole;                    // the notation core needs it: Error(argument)
  bool with_weights = true;                    // a column weight, where weights differ
};

// CSV (RFC 4180 with line feeds) that read_readings() reads as the same planes: the columns of the
// plane, the weight, then the other columns, without those that say where the
// plane lies in another notation. Numbers are exact in dip/dip-direction and good to 1e-10 degrees
// otherwise.
std::string readings_csv(const Readings& readings, const TableForm& form);

}  // namespace brink
