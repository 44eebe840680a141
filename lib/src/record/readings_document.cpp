#include "brink/record/readings_document.hpp"

#include <algorithm>
#include <array>
#include <vector>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/readings/bias.hpp"
#include "brink/readings/columns.hpp"

namespace brink {

namespace {

Value hole_value(const std::optional<Hole>& hole) {
  if (!hole) return nullptr;
  return Object{{"trend_deg", hole->axis.trend.deg()},
                {"plunge_deg", hole->axis.plunge.deg()},
                {"reference_line", hole->reference == ReferenceLine::top ? "top" : "bottom"}};
}

Value rejection_value(const Rejection& rejection) {
  Object object{{"file", rejection.file}, {"line", std::uint64_t{rejection.line}}};
  object.add("column", rejection.column == 0 ? Value() : Value(std::uint64_t{rejection.column}));
  object.add("heading", rejection.heading.empty() ? Value() : Value(rejection.heading));
  object.add("value", rejection.value);
  object.add("reason", rejection.reason);
  return object;
}

Value reading_value(const Readings& readings, std::size_t i) {
  const ReadingPlace& place = readings.places[i];
  const Plane& plane = readings.planes[i];
  Object object{{"file", readings.files[place.file].name},
                {"line", std::uint64_t{place.line}},
                {"dip_deg", plane.dip.deg()},
                {"dip_direction_deg", plane.dip_direction.deg()},
                {"weight", readings.weights[i]}};
  for (const ExtraColumn& column : readings.extra) {
    std::string key = column.heading;
    while (object.find(key) != nullptr) key = "column " + key;
    object.add(std::move(key), column.cells[i]);
  }
  return object;
}

std::vector<std::string> headings_of(const TableForm& form) {
  switch (form.notation) {
    case Notation::dip_direction:
      return {"dip_deg", "dip_direction_deg"};
    case Notation::strike_dip:
      return {form.strike_rule == StrikeRule::right ? "strike_right_hand_rule_deg"
                                                    : "strike_left_hand_rule_deg",
              "dip_deg"};
    case Notation::strike_quadrant:
      return {"strike_deg", "dip_deg", "dip_quadrant"};
    case Notation::quadrant_bearing:
      return {"orientation"};
    case Notation::pole:
      return {"pole_trend_deg", "pole_plunge_deg"};
    case Notation::core:
      return {"alpha_deg", "beta_deg", "hole_trend_deg", "hole_plunge_deg", "reference_line"};
  }
  return {};
}

std::vector<std::string> cells_of(const Plane& plane, const TableForm& form) {
  const Angle direction = plane.dip_direction;
  switch (form.notation) {
    case Notation::dip_direction:
      return {shortest(plane.dip.deg()), shortest(direction.deg())};
    case Notation::strike_dip:
      return {print_degrees(strike_of_dip_direction(direction, form.strike_rule)),
              shortest(plane.dip.deg())};
    case Notation::strike_quadrant:
      return {print_degrees(strike_of_dip_direction(direction, StrikeRule::right)),
              shortest(plane.dip.deg()), std::string(nearest_compass_letter(direction))};
    case Notation::quadrant_bearing:
      return {print_plane(plane, form.notation)};
    case Notation::pole: {
      const Line line = pole(plane);
      return {print_degrees(line.trend), print_degrees(line.plunge)};
    }
    case Notation::core: {
      const CoreAngles core = core_of_plane(plane, *form.hole);
      return {print_degrees(core.alpha), print_degrees(core.beta),
              shortest(form.hole->axis.trend.deg()), shortest(form.hole->axis.plunge.deg()),
              form.hole->reference == ReferenceLine::top ? "top" : "bottom"};
    }
  }
  return {};
}

void append_cell(std::string& csv, std::string_view cell, bool first) {
  if (!first) csv += ',';
  const bool quoted = cell.find_first_of(",\"\n\r;\t#") != std::string_view::npos;
  if (!quoted) {
    csv += cell;
    return;
  }
  csv += '"';
  for (const char c : cell) {
    if (c == '"') csv += '"';
    csv += c;
  }
  csv += '"';
}

// Columns that may stand beside the plane without contradicting it when read again.
std::vector<const ExtraColumn*> columns_beside(const Readings& readings) {
  std::vector<const ExtraColumn*> columns;
  for (const ExtraColumn& column : readings.extra) {
    if (!meaning_of(column.heading)) columns.push_back(&column);
  }
  return columns;
}

}  // namespace

Object readings_inputs(const Readings& readings, const ReadingOptions& options) {
  Array files;
  for (const InputFile& file : readings.files) {
    files.push_back(Object{{"name", file.name}, {"sha256", file.sha256}});
  }
  Array only;
  for (const Filter& filter : options.only) only.push_back(filter.text);
  Object inputs{{"files", std::move(files)}};
  inputs.add("notation", options.notation ? Value(name_of(*options.notation)) : Value());
  inputs.add("strike_rule", options.strike_rule ? Value(name_of(*options.strike_rule)) : Value());
  inputs.add("declination_deg", options.declination.deg());
  inputs.add("hole", hole_value(options.hole));
  inputs.add("overturned", options.overturned);
  inputs.add("only", std::move(only));
  return inputs;
}

Value traverse_value(const Traverse& traverse) {
  Object object{{"name", traverse.name}, {"kind", name_of(traverse.kind)}};
  if (traverse.kind == TraverseKind::window) {
    object.add("dip_deg", traverse.window.dip.deg());
    object.add("dip_direction_deg", traverse.window.dip_direction.deg());
  } else {
    object.add("trend_deg", traverse.line.trend.deg());
    object.add("plunge_deg", traverse.line.plunge.deg());
  }
  return object;
}

Value readings_result(const Readings& readings) {
  Array rejected;
  for (const Rejection& rejection : readings.rejected) {
    rejected.push_back(rejection_value(rejection));
  }
  Array used;
  used.reserve(readings.size());
  for (std::size_t i = 0; i < readings.size(); ++i) used.push_back(reading_value(readings, i));
  return Object{{"read", std::uint64_t{readings.read}},
                {"used", std::uint64_t{readings.size()}},
                {"filtered", std::uint64_t{readings.filtered}},
                {"effective_number", effective_number(readings.weights)},
                {"rejected", std::move(rejected)},
                {"readings", std::move(used)}};
}

std::string readings_csv(const Readings& readings, const TableForm& form) {
  if (form.notation == Notation::core && !form.hole) {
    throw Error(ErrorKind::argument, {{}, 0, 0, "core"}, "needs to know how the hole runs", {},
                "its trend and plunge");
  }
  const auto [least, greatest] =
      std::minmax_element(readings.weights.begin(), readings.weights.end());
  const bool weighted = form.with_weights && !readings.weights.empty() && *least != *greatest;
  const auto beside = columns_beside(readings);
  std::string csv;
  const auto add_row = [&](const std::vector<std::string>& plane_cells, std::string_view weight,
                           auto other) {
    for (std::size_t i = 0; i < plane_cells.size(); ++i) append_cell(csv, plane_cells[i], i == 0);
    if (weighted) append_cell(csv, weight, false);
    for (const ExtraColumn* column : beside) append_cell(csv, other(*column), false);
    csv += '\n';
  };
  add_row(headings_of(form), "weight",
          [](const ExtraColumn& column) -> std::string_view { return column.heading; });
  for (std::size_t i = 0; i < readings.size(); ++i) {
    add_row(cells_of(readings.planes[i], form), shortest(readings.weights[i]),
            [i](const ExtraColumn& column) { return column.cells[i]; });
  }
  return csv;
}

}  // namespace brink
