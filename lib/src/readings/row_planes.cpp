#include "row_planes.hpp"

#include <fmt/format.h>

#include "brink/base/number.hpp"

namespace brink {

namespace {

RowOutcome fails(std::optional<std::size_t> column, std::string problem) {
  RowOutcome outcome;
  outcome.parsed.problem = std::move(problem);
  outcome.column = column;
  return outcome;
}

constexpr std::string_view kDipRange = "0 to 90 degrees";
constexpr std::string_view kAzimuthRange = "0 to 360 degrees";

std::string missing(std::string_view accepted) {
  return fmt::format("is missing; accepted: {}", accepted);
}

// One cell as an angle by `parse`; the outcome holds the failure.
template <typename Parse>
std::optional<Angle> angle_of(const Row& row, std::optional<std::size_t> column,
                              std::string_view accepted, RowOutcome& failed, Parse parse) {
  const std::string_view cell = row.cell(*column);
  if (is_missing(cell)) {
    failed = fails(column, missing(accepted));
    return std::nullopt;
  }
  const ParsedAngle angle = parse(cell);
  if (angle.ok()) return angle.value;
  failed = fails(column, angle.problem);
  return std::nullopt;
}

TextRules rules_of(const ReadingOptions& options, DecimalComma comma, Angle greatest) {
  TextRules rules{options.notation, options.strike_rule, comma, greatest};
  if (!rules.notation) {
    rules.notation = options.strike_rule ? Notation::strike_dip : Notation::dip_direction;
  }
  return rules;
}

}  // namespace

PlaneReader::PlaneReader(const Columns& columns, const ReadingOptions& options, DecimalComma comma)
    : columns_(columns),
      options_(options),
      greatest_dip_(Angle::degrees(options.overturned ? 180.0 : 90.0)),
      plain_possible_(columns.layout == Layout::dip_direction &&
                      !columns.of(Meaning::declination) && options.declination.deg() == 0.0) {
  rules_ = rules_of(options, comma, greatest_dip_);
  if (!rules_.strike_rule) rules_.strike_rule = columns.strike_rule;
}

bool PlaneReader::read_plain(const Row& row, Plane& plane) const {
  if (!plain_possible_) return false;
  const auto dip = parse_decimal(row.cell(*columns_.of(Meaning::dip)));
  const auto azimuth = parse_decimal(row.cell(*columns_.of(Meaning::dip_direction)));
  if (!dip || !azimuth) return false;
  const bool in_range = *dip > 0.0 && *dip <= 90.0 && *azimuth >= 0.0 && *azimuth <= 360.0;
  if (!in_range) return false;
  plane.dip = Angle::degrees(*dip);
  plane.dip_direction = Angle::degrees(*azimuth == 360.0 ? 0.0 : *azimuth + 0.0);
  return true;
}

RowOutcome PlaneReader::read(const Row& row) const {
  return turn_to_grid(row, read_layout(row));
}

RowOutcome PlaneReader::read_layout(const Row& row) const {
  switch (columns_.layout) {
    case Layout::dip_direction:
      return read_dip_direction(row);
    case Layout::strike:
      return read_strike(row);
    case Layout::pole:
      return read_pole(row);
    case Layout::core:
      return read_core(row);
    case Layout::text:
      return read_text(row);
  }
  return {};
}

RowOutcome PlaneReader::read_dip_direction(const Row& row) const {
  RowOutcome failed;
  const auto dip_column = columns_.of(Meaning::dip);
  const auto direction_column = columns_.of(Meaning::dip_direction);
  const std::string_view direction_cell = row.cell(*direction_column);
  const auto dip = angle_of(row, dip_column, kDipRange, failed, [&](std::string_view cell) {
    ParsedAngle angle = parse_dip(cell, rules_.comma, greatest_dip_);
    const ParsedAngle other = parse_angle(direction_cell, rules_.comma);
    const bool swapped = !angle.ok() && angle.value.deg() > 90.0 && angle.value.deg() <= 360.0 &&
                         other.ok() && other.value.deg() <= 90.0;
    if (swapped) angle.problem += " (are dip and dip direction swapped?)";
    if (!angle.ok() && angle.value.deg() > 90.0 && angle.value.deg() <= 180.0 && !swapped) {
      angle.problem += ", or beds stated as overturned";
    }
    return angle;
  });
  if (!dip) return failed;
  if (dip->deg() == 0.0 && is_missing(direction_cell)) return {};
  const auto azimuth =
      angle_of(row, direction_column, kAzimuthRange, failed,
               [&](std::string_view cell) { return parse_azimuth(cell, rules_.comma); });
  if (!azimuth) return failed;
  return {plane_of_dip(*dip, *azimuth), {}};
}

RowOutcome PlaneReader::read_strike(const Row& row) const {
  RowOutcome failed;
  const auto dip_column = columns_.of(Meaning::dip);
  const auto strike_column = columns_.of(Meaning::strike);
  std::string letter;
  const auto dip = angle_of(row, dip_column, kDipRange, failed, [&](std::string_view cell) {
    ParsedDip parsed = parse_dip_with_letter(cell, rules_.comma, greatest_dip_);
    letter = std::move(parsed.letter);
    return parsed.dip;
  });
  if (!dip) return failed;
  const std::string_view strike_cell = row.cell(*strike_column);
  if (dip->deg() == 0.0 && is_missing(strike_cell)) return {};

  const auto quadrant_column = columns_.of(Meaning::quadrant);
  if (quadrant_column && !is_missing(row.cell(*quadrant_column))) {
    const std::string_view quadrant = row.cell(*quadrant_column);
    if (!letter.empty() && compass_letter(letter) != compass_letter(quadrant)) {
      return fails(
          quadrant_column,
          fmt::format("differs from the letter {} at the dip; accepted: one of the two", letter));
    }
    letter = quadrant;
  }
  bool is_bearing = false;
  const auto strike = angle_of(row, strike_column, "0 to 360 degrees, or a bearing as in N45E",
                               failed, [&](std::string_view cell) {
                                 const auto bearing = parse_bearing(cell, rules_.comma);
                                 is_bearing = bearing.has_value();
                                 return bearing ? *bearing : parse_azimuth(cell, rules_.comma);
                               });
  if (!strike) return failed;
  RowOutcome outcome{
      plane_of_strike(*strike, *dip, letter, is_bearing ? std::nullopt : rules_.strike_rule), {}};
  if (outcome.parsed.ok()) return outcome;
  outcome.column = outcome.parsed.bare_strike || !quadrant_column ? strike_column : quadrant_column;
  if (outcome.parsed.bare_strike && quadrant_column) {
    outcome.column = quadrant_column;
    outcome.parsed.problem = missing("N, NE, E, SE, S, SW, W or NW");
  }
  // A row that has no side is one row's mistake where others name theirs.
  outcome.parsed.bare_strike = outcome.parsed.bare_strike && !quadrant_column && !is_bearing;
  return outcome;
}

RowOutcome PlaneReader::read_pole(const Row& row) const {
  RowOutcome failed;
  const auto trend_column = columns_.of(Meaning::pole_trend);
  const auto plunge = angle_of(
      row, columns_.of(Meaning::pole_plunge), "0 to 90 degrees, down from horizontal", failed,
      [&](std::string_view cell) { return parse_dip(cell, rules_.comma, Angle::degrees(90.0)); });
  if (!plunge) return failed;
  if (plunge->deg() == 90.0 && is_missing(row.cell(*trend_column))) return {};
  const auto trend = angle_of(row, trend_column, kAzimuthRange, failed, [&](std::string_view cell) {
    return parse_azimuth(cell, rules_.comma);
  });
  if (!trend) return failed;
  RowOutcome outcome;
  outcome.parsed.plane = plane_of_pole({*trend, *plunge});
  return outcome;
}

std::optional<Hole> PlaneReader::hole_of(const Row& row, RowOutcome& failed) const {
  Hole hole = options_.hole.value_or(Hole{});
  const auto value = [&](Meaning meaning, Angle& into, auto parse,
                         std::string_view accepted) -> bool {
    const auto column = columns_.of(meaning);
    const bool given = column && !is_missing(row.cell(*column));
    if (!given && options_.hole) return true;
    if (!column) {
      failed = fails({},
                     "has no hole trend and plunge; accepted: the columns hole_trend and "
                     "hole_plunge, or one hole for the file");
      return false;
    }
    const auto angle = angle_of(row, column, accepted, failed, parse);
    if (angle) into = *angle;
    return angle.has_value();
  };
  const auto plunge = [&](std::string_view cell) {
    ParsedAngle angle = parse_angle(cell, rules_.comma);
    if (angle.ok() && (angle.value.deg() < -90.0 || angle.value.deg() > 90.0)) {
      angle.problem = "is outside -90 to 90; accepted: degrees down from horizontal";
    }
    return angle;
  };
  const auto azimuth = [&](std::string_view cell) { return parse_azimuth(cell, rules_.comma); };
  if (!value(Meaning::hole_trend, hole.axis.trend, azimuth, kAzimuthRange)) return std::nullopt;
  if (!value(Meaning::hole_plunge, hole.axis.plunge, plunge, "-90 to 90 degrees")) {
    return std::nullopt;
  }
  const auto reference = columns_.of(Meaning::reference_line);
  if (!reference || is_missing(row.cell(*reference))) return hole;
  const std::string_view side = row.cell(*reference);
  if (side == "top" || side == "bottom") {
    hole.reference = side == "top" ? ReferenceLine::top : ReferenceLine::bottom;
    return hole;
  }
  failed = fails(reference, "is not a side of the core; accepted: top or bottom");
  return std::nullopt;
}

RowOutcome PlaneReader::read_core(const Row& row) const {
  RowOutcome failed;
  const auto beta_column = columns_.of(Meaning::beta);
  const auto alpha = angle_of(
      row, columns_.of(Meaning::alpha), kDipRange, failed,
      [&](std::string_view cell) { return parse_dip(cell, rules_.comma, Angle::degrees(90.0)); });
  if (!alpha) return failed;
  const bool beta_needed = alpha->deg() < 90.0 || !is_missing(row.cell(*beta_column));
  Angle beta;
  if (beta_needed) {
    const auto given =
        angle_of(row, beta_column, kAzimuthRange, failed,
                 [&](std::string_view cell) { return parse_azimuth(cell, rules_.comma); });
    if (!given) return failed;
    beta = *given;
  }
  const auto hole = hole_of(row, failed);
  if (!hole) return failed;
  RowOutcome outcome;
  outcome.parsed.plane = plane_of_core({*alpha, beta}, *hole);
  return outcome;
}

RowOutcome PlaneReader::read_text(const Row& row) const {
  const auto column = columns_.of(Meaning::orientation);
  RowOutcome outcome{parse_plane(row.cell(*column), rules_), {}};
  if (!outcome.parsed.ok()) outcome.column = column;
  return outcome;
}

// Turning the plane about the vertical is the same as adding to every azimuth it was read from.
RowOutcome PlaneReader::turn_to_grid(const Row& row, RowOutcome outcome) const {
  if (!outcome.parsed.ok()) return outcome;
  Angle declination = options_.declination;
  const auto column = columns_.of(Meaning::declination);
  if (column && !is_missing(row.cell(*column))) {
    ParsedAngle given = parse_angle(row.cell(*column), rules_.comma);
    const bool in_range = given.value.deg() >= -180.0 && given.value.deg() <= 180.0;
    if (given.ok() && !in_range) given.problem = "is outside -180 to 180; accepted: degrees east";
    if (!given.ok()) return fails(column, given.problem);
    declination = given.value;
  }
  Plane& plane = outcome.parsed.plane;
  if (declination.deg() == 0.0 || plane.dip.deg() == 0.0) return outcome;
  plane.dip_direction = wrap_360(plane.dip_direction + declination);
  return outcome;
}

}  // namespace brink
