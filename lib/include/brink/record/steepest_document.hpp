// The steepest faces as a record and as a table for other programs.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "brink/design/steepest.hpp"
#include "brink/record/csv_tables.hpp"
#include "brink/record/document.hpp"
#include "brink/sets/sets.hpp"

namespace brink {

// Key of a mode in records: "planar_sliding" and so on.
std::string_view mode_key(Mode mode);

// "J1", "J1 + J2": the sets of a governing part or a weakest wedge; kNoSet for "no set".
std::string set_pair_name(const SetsResult& sets, int set_a, int set_b);

// The options as a record: {every_deg or azimuths_deg[], resolution_deg, greatest_dip_deg,
// limits_percent{}, weighted, confident, target, upper, friction_deg, strike_tolerance_deg,
// toppling_tolerance_deg, seed}. Commands add where readings and sets came from.
Object steepest_inputs(const SteepestOptions& options);

// One face: {dip_direction_deg, steepest_dip_deg, governing_mode, governed_by, governing_sets[]
// {set or sets[2], part}, shares{}, shares_one_step_steeper{}, shares_five_degrees_steeper{},
// confident_dip_deg, weakest_wedge{sets[2], factor_of_safety}, weakest_wedge_one_step_steeper}.
Object steepest_face_object(const SteepestFace& face, const SetsResult& sets);

// What a document says of the sets behind its names: [] {name, count, mean}.
Value known_sets_value(const SetsResult& sets);

// {azimuths[], sets[] {name, count, mean}}.
Value steepest_result(const SteepestResult& result, const SetsResult& sets);

// The columns of one face in a table, and its cells; shares in percent.
std::vector<std::string> steepest_headings();
void add_steepest_cells(CsvTable& table, const SteepestFace& face, const SetsResult& sets);

// One row an azimuth.
std::string steepest_csv(const SteepestResult& result, const SetsResult& sets);

}  // namespace brink
