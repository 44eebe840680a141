// How orientations are written in the field: reading every notation, and writing it again.
//
// Nothing is guessed. Which notation a bare pair of numbers is in must be said (by headings or an
// option); a text may name itself by quadrant letters or an arrow. What is wrong with a text is an
// outcome, not an exception: the caller knows the line and goes on with the next.
#pragma once

#include <array>
#include <optional>
#include <string>
#include <string_view>

#include "brink/orientation/orientation.hpp"

namespace brink {

enum class Notation {
  dip_direction,     // 30/135      dip, then the azimuth it falls towards
  strike_dip,        // 045/30      strike, then dip; needs a StrikeRule
  strike_quadrant,   // 045/30SE    strike and dip with the compass letter of the side it falls to
  quadrant_bearing,  // N45E 30SE   the same with the strike as a bearing from north or south
  pole,              // 315->60     trend and plunge of the downward normal
  core,              // alpha and beta of borehole core; in columns only
};

// Names as options and messages spell them: "dip/dip-direction", "strike/dip",
// "strike/dip/quadrant", "quadrant-bearing", "pole", "core".
std::string_view name_of(Notation notation);
std::optional<Notation> notation_named(std::string_view name);
// All names, separated by ", ".
std::string notation_names();

// On which side of its strike a plane dips: right, dip direction = strike + 90; left, strike - 90.
enum class StrikeRule { right, left };
std::string_view name_of(StrikeRule rule);

// Dip direction of a strike under a rule, wrapped to 0 <= a < 360, and back.
Angle dip_direction_of_strike(Angle strike, StrikeRule rule);
Angle strike_of_dip_direction(Angle dip_direction, StrikeRule rule);

// `text` without the blanks around it, with no-break and thin spaces as blanks, the typographic
// minus and dashes as '-', an arrow as "->", a typographic minute mark as '\'', and every degree
// sign (also the ordinal indicator and the ring that stand in for it) as the one byte kDegreeMark.
inline constexpr char kDegreeMark = '\xB0';
std::string normalise_notation(std::string_view text);

// True for a cell that says there is no value: empty, "-", "--", "NI", "NA", "N/A", "NR", "nil",
// "none", in any case.
bool is_missing(std::string_view cell);

// A number or what is wrong with it. `problem` is a clause about the text, with what would be
// accepted: "is not an angle; accepted: ...".
struct ParsedAngle {
  Angle value;
  std::string problem;
  bool ok() const { return problem.empty(); }
};

// Whether "65,5" is a number: only where the comma doesn't already separate fields.
enum class DecimalComma { no, yes };

// A decimal number of degrees, alone in its cell: "65", "65.5", "65°", "65 deg", "65° 30'". No
// range.
ParsedAngle parse_angle(std::string_view cell, DecimalComma comma);

// The same, within a range: dip 0..90 (`greatest` 180 where overturned beds are accepted); azimuth
// 0..360, where 360 becomes 0.
ParsedAngle parse_dip(std::string_view cell, DecimalComma comma, Angle greatest);
ParsedAngle parse_azimuth(std::string_view cell, DecimalComma comma);

// A dip with or without the letter of its side: "30SE", "30° se", "30". The letter is not checked.
struct ParsedDip {
  ParsedAngle dip;
  std::string letter;
};
ParsedDip parse_dip_with_letter(std::string_view cell, DecimalComma comma, Angle greatest);

// What is wrong with a value already parsed; empty where nothing is. "-0" is 0.
std::string dip_problem(Angle dip, Angle greatest);
std::string azimuth_problem(Angle azimuth);

// A strike as a bearing, "N45E", "S 45 W", "NS", "E-W"; nothing where the text doesn't start with a
// compass letter. NxE = x, SxE = 180 - x, SxW = 180 + x, NxW = 360 - x.
std::optional<ParsedAngle> parse_bearing(std::string_view cell, DecimalComma comma);

// Azimuth of one of the eight compass letters N, NE, .. NW in any case; nothing for other text.
std::optional<Angle> compass_letter(std::string_view text);

// A plane or why there is none. `doubt` is a clause for a warning about a plane that is usable.
struct ParsedPlane {
  Plane plane;
  std::string problem;
  std::string doubt;
  bool overturned = false;   // the dip was written above 90: the bed's top faces down
  bool bare_strike = false;  // failed only because neither rule nor letter says the side
  bool ok() const { return problem.empty(); }
};

// A dip up to 180 and a direction to a plane: past 90 the bed is overturned and the plane is the
// one that dips 180 - dip the other way. Dip 0 loses its direction.
ParsedPlane plane_of_dip(Angle dip, Angle dip_direction);

// The plane that strikes and dips so and falls to the side of the compass letter. The nearer of
// strike +- 90 is taken; a letter more than 45 degrees off it is a doubt, from 80 a problem (it
// lies along the strike). Vertical and horizontal planes need no side. Without a letter the rule
// decides; with neither, the outcome is bare_strike.
ParsedPlane plane_of_strike(Angle strike, Angle dip, std::string_view letter,
                            std::optional<StrikeRule> rule);

// How to read a text cell.
struct TextRules {
  std::optional<Notation> notation;  // of bare number pairs; nothing: they are refused
  std::optional<StrikeRule> strike_rule;
  DecimalComma comma = DecimalComma::no;
  Angle greatest_dip = Angle::degrees(90.0);
};

// One whole reading in a text: any notation that names itself, or a bare pair in rules.notation.
ParsedPlane parse_plane(std::string_view cell, const TextRules& rules);

// What a bare pair of numbers, which doesn't name its notation, could be. Used to find out from a
// whole column what a single cell can't say.
enum class BarePair {
  not_a_pair,     // anything else, readable or not
  either,         // 45/30: dip first or strike first
  dip_first,      // 45/130: the second number can only be an azimuth
  azimuth_first,  // 130/45 or 045/30: the first can only be an azimuth, or is written like one
};
BarePair bare_pair(std::string_view cell, DecimalComma comma);

// `plane` as a text in `notation` (not core): "30/135", "045/30", "045/30SE", "N45E 30SE",
// "315->60". Azimuths have three digits before the point. Numbers are exact to 1e-10 degrees;
// parse_plane() gives the plane back. `rule` is used by strike_dip; other strikes follow the right-
// hand rule.
std::string print_plane(const Plane& plane, Notation notation, StrikeRule rule = StrikeRule::right);

// The compass letter, of eight, nearest to an azimuth.
std::string_view nearest_compass_letter(Angle azimuth);
// Strike as a bearing from north: "N45E", "N80W", "NS", "EW".
std::string print_bearing(Angle strike);
// A number of degrees with at most ten decimals and no trailing zeros.
std::string print_degrees(Angle angle);

}  // namespace brink
