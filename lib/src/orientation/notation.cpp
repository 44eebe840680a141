#include "brink/orientation/notation.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "notation_scanner.hpp"

namespace brink {

namespace {

constexpr std::string_view kAngleForms = "a number of degrees, as in 65, 65.5 or 65°30'";
constexpr std::string_view kLetters = "N, NE, E, SE, S, SW, W or NW";
constexpr std::string_view kTextForms =
    "30/135, 045/30SE, N45E 30SE or 315->60, the notation being named where it is two bare numbers";

std::string wrong(std::string_view what, std::string_view accepted) {
  return fmt::format("{}; accepted: {}", what, accepted);
}

ParsedPlane no_plane(std::string problem) {
  ParsedPlane outcome;
  outcome.problem = std::move(problem);
  return outcome;
}

Angle above_zero(Angle angle) {
  return Angle::degrees(angle.deg() + 0.0);
}

// "dip: " before what is wrong with one number of several in a cell.
ParsedPlane no_plane_by(std::string_view part, const std::string& problem) {
  return no_plane(fmt::format("has a wrong {}, which {}", part, problem));
}

// Two letters are a bearing only where the second half is east or west.
ParsedAngle bearing_angle(char from, double degrees, char towards) {
  if (degrees < 0.0 || degrees > 90.0) {
    return {{}, wrong("has a bearing outside 0 to 90 degrees", "as in N45E or S10W")};
  }
  const double azimuth = from == 'N' ? (towards == 'E' ? degrees : 360.0 - degrees)
                                     : (towards == 'E' ? 180.0 - degrees : 180.0 + degrees);
  return {wrap_360(Angle::degrees(azimuth)), {}};
}

std::optional<Angle> whole_bearing(NotationScanner& scan) {
  constexpr std::pair<std::string_view, double> kWords[] = {
      {"N-S", 0.0}, {"E-W", 90.0}, {"NS", 0.0}, {"EW", 90.0},
      {"N", 0.0},   {"S", 180.0},  {"E", 90.0}, {"W", 270.0},
  };
  for (const auto& [word, azimuth] : kWords) {
    if (scan.take(word)) return Angle::degrees(azimuth);
  }
  return std::nullopt;
}

bool is_letter(char c) {
  return c >= 'A' && c <= 'Z';
}

// N45E; nothing where the text is not of that form.
std::optional<ParsedAngle> partial_bearing(NotationScanner& scan) {
  const char from = scan.peek();
  if ((from != 'N' && from != 'S') || !scan.take(std::string_view(&from, 1))) return std::nullopt;
  scan.skip_blanks();
  const auto degrees = scan.take_degrees();
  scan.skip_blanks();
  const char towards = scan.peek();
  if (!degrees || (towards != 'E' && towards != 'W')) return std::nullopt;
  scan.take(std::string_view(&towards, 1));
  if (is_letter(scan.peek())) return std::nullopt;
  return bearing_angle(from, *degrees, towards);
}

// Past what parts two numbers; false where nothing does. A '-' with a blank before it and a digit
// right after it is a sign, and left for the number.
bool skip_separator(NotationScanner& scan) {
  const bool blank = scan.skip_blanks();
  NotationScanner ahead = scan.fork();
  const bool dash = ahead.take("-");
  const bool sign = dash && blank && ahead.peek() != ' ';
  const bool mark = scan.take("/") || (!sign && scan.take("-")) || scan.take(",");
  scan.skip_blanks();
  return blank || mark;
}

struct DipAndLetter {
  double dip = 0.0;
  std::string_view letter;
};

// "30SE", "30 SE" or "30" to the end of the text.
std::optional<DipAndLetter> rest_as_dip(NotationScanner& scan) {
  const auto dip = scan.take_degrees();
  if (!dip) return std::nullopt;
  scan.skip_blanks();
  const std::string_view letter = scan.take_letters();
  if (!scan.at_end()) return std::nullopt;
  return DipAndLetter{*dip, letter};
}

ParsedPlane plane_of_bearing(const ParsedAngle& strike, const DipAndLetter& rest,
                             const TextRules& rules) {
  if (!strike.ok()) return no_plane(strike.problem);
  const Angle dip = above_zero(Angle::degrees(rest.dip));
  if (const auto problem = dip_problem(dip, rules.greatest_dip); !problem.empty()) {
    return no_plane_by("dip", problem);
  }
  ParsedPlane outcome = plane_of_strike(strike.value, dip, rest.letter, std::nullopt);
  if (outcome.bare_strike) {
    return no_plane(wrong("has no letter for the side to which it dips", "as in N45E 30SE"));
  }
  return outcome;
}

ParsedPlane parse_bearing_text(std::string_view text, const TextRules& rules) {
  NotationScanner scan(text, rules.comma);
  bool lacks_dip = false;
  if (const auto strike = partial_bearing(scan)) {
    skip_separator(scan);
    if (const auto rest = rest_as_dip(scan)) return plane_of_bearing(*strike, *rest, rules);
    lacks_dip = scan.at_end();
  }
  scan = NotationScanner(text, rules.comma);
  if (const auto strike = whole_bearing(scan)) {
    // A blank must follow: "N30E" alone is more likely a bearing that lost its dip.
    const bool parted = scan.peek() == ' ' || scan.peek() == '/' || scan.peek() == ',';
    skip_separator(scan);
    const auto rest = parted ? rest_as_dip(scan) : std::nullopt;
    if (rest) return plane_of_bearing({*strike, {}}, *rest, rules);
  }
  if (lacks_dip) return no_plane(wrong("has a strike but no dip", "as in N45E 30SE"));
  return no_plane(wrong("is not a strike bearing with a dip", "as in N45E 30SE or EW 40N"));
}

ParsedPlane plane_of_pole_angles(Angle trend, Angle plunge) {
  if (const auto problem = azimuth_problem(trend); !problem.empty()) {
    return no_plane_by("trend", problem);
  }
  if (const auto problem = dip_problem(plunge, Angle::degrees(90.0)); !problem.empty()) {
    return no_plane_by("plunge", problem);
  }
  return {plane_of_pole({wrap_360(trend), above_zero(plunge)}), {}, {}};
}

ParsedPlane parse_arrow_text(std::string_view text, const TextRules& rules) {
  NotationScanner scan(text, rules.comma);
  const auto trend = scan.take_degrees();
  scan.skip_blanks();
  const bool arrow = scan.take("->");
  scan.skip_blanks();
  const auto plunge = arrow ? scan.take_degrees() : std::nullopt;
  if (!trend || !plunge || !scan.at_end()) {
    return no_plane(wrong("is not the trend and plunge of a pole", "as in 315->60"));
  }
  return plane_of_pole_angles(Angle::degrees(*trend), Angle::degrees(*plunge));
}

struct Pair {
  double first = 0.0;
  double second = 0.0;
  std::string_view letter;
};

std::optional<Pair> scan_pair(std::string_view text, DecimalComma comma) {
  NotationScanner scan(text, comma);
  const auto first = scan.take_degrees();
  if (!first) return std::nullopt;
  if (!skip_separator(scan)) return std::nullopt;
  const auto rest = rest_as_dip(scan);
  if (!rest) return std::nullopt;
  return Pair{*first, rest->dip, rest->letter};
}

ParsedPlane plane_of_dip_pair(Angle dip, Angle azimuth, Angle greatest) {
  if (auto problem = dip_problem(dip, greatest); !problem.empty()) {
    const bool swapped = dip.deg() > 90.0 && dip.deg() <= 360.0 && azimuth.deg() <= 90.0;
    if (swapped) problem += " (are the dip and the azimuth swapped?)";
    return no_plane_by("dip", problem);
  }
  if (const auto problem = azimuth_problem(azimuth); !problem.empty()) {
    return no_plane_by("dip direction", problem);
  }
  return plane_of_dip(above_zero(dip), azimuth);
}

ParsedPlane plane_of_strike_pair(const Pair& pair, const TextRules& rules) {
  const Angle strike = Angle::degrees(pair.first);
  const Angle dip = Angle::degrees(pair.second);
  if (const auto problem = azimuth_problem(strike); !problem.empty()) {
    return no_plane_by("strike", problem);
  }
  if (auto problem = dip_problem(dip, rules.greatest_dip); !problem.empty()) {
    const bool swapped = dip.deg() > 90.0 && dip.deg() <= 360.0 && strike.deg() <= 90.0;
    if (swapped) problem += " (are the strike and the dip swapped?)";
    return no_plane_by("dip", problem);
  }
  const bool ruled = rules.notation == Notation::strike_dip && pair.letter.empty();
  return plane_of_strike(wrap_360(strike), above_zero(dip), pair.letter,
                         ruled ? rules.strike_rule : std::nullopt);
}

ParsedPlane plane_of_pair(const Pair& pair, const TextRules& rules) {
  if (!pair.letter.empty()) return plane_of_strike_pair(pair, rules);
  if (!rules.notation) {
    return no_plane(
        "is two bare numbers; accepted: the notation named, dip/dip-direction, strike/dip or pole");
  }
  const Angle first = Angle::degrees(pair.first);
  const Angle second = Angle::degrees(pair.second);
  switch (*rules.notation) {
    case Notation::dip_direction:
      return plane_of_dip_pair(first, second, rules.greatest_dip);
    case Notation::pole:
      return plane_of_pole_angles(first, second);
    case Notation::core:
      return no_plane("is core notation, which needs the columns alpha and beta");
    default:
      return plane_of_strike_pair(pair, rules);
  }
}

}  // namespace

Angle dip_direction_of_strike(Angle strike, StrikeRule rule) {
  const double turn = rule == StrikeRule::right ? 90.0 : -90.0;
  return wrap_360(strike + Angle::degrees(turn));
}

Angle strike_of_dip_direction(Angle dip_direction, StrikeRule rule) {
  return dip_direction_of_strike(dip_direction,
                                 rule == StrikeRule::right ? StrikeRule::left : StrikeRule::right);
}

bool is_missing(std::string_view cell) {
  constexpr std::string_view kWords[] = {"",    "-",    "--", "---", "NI",  "NA",
                                         "N/A", "N.A.", "NR", "NIL", "NONE"};
  if (cell.size() > 8) return false;
  const std::string text = in_capitals(normalise_notation(cell));
  return std::find(std::begin(kWords), std::end(kWords), text) != std::end(kWords);
}

ParsedAngle parse_angle(std::string_view cell, DecimalComma comma) {
  if (const auto plain = parse_decimal(cell)) return {Angle::degrees(*plain), {}};
  const std::string text = in_capitals(normalise_notation(cell));
  NotationScanner scan(text, comma);
  const auto degrees = scan.take_degrees();
  if (degrees && scan.at_end()) return {Angle::degrees(*degrees), {}};
  const bool decimal_comma = comma == DecimalComma::no && text.find(',') != std::string::npos &&
                             parse_angle(cell, DecimalComma::yes).ok();
  if (decimal_comma) {
    return {{},
            wrong("has a decimal comma where the comma separates fields",
                  "a decimal point, or fields separated by semicolons or tabs")};
  }
  return {{}, wrong("is not an angle", kAngleForms)};
}

std::string dip_problem(Angle dip, Angle greatest) {
  if (dip.deg() < 0.0) return wrong("is below 0", fmt::format("0 to {:g} degrees", greatest.deg()));
  if (dip.deg() <= greatest.deg()) return {};
  return wrong(fmt::format("is above {:g}", greatest.deg()),
               fmt::format("0 to {:g} degrees", greatest.deg()));
}

std::string azimuth_problem(Angle azimuth) {
  if (azimuth.deg() < 0.0) return wrong("is below 0", "0 to 360 degrees");
  if (azimuth.deg() > 360.0) return wrong("is above 360", "0 to 360 degrees");
  return {};
}

ParsedAngle parse_dip(std::string_view cell, DecimalComma comma, Angle greatest) {
  ParsedAngle angle = parse_angle(cell, comma);
  if (!angle.ok()) return angle;
  return {above_zero(angle.value), dip_problem(angle.value, greatest)};
}

ParsedAngle parse_azimuth(std::string_view cell, DecimalComma comma) {
  ParsedAngle angle = parse_angle(cell, comma);
  if (!angle.ok()) return angle;
  return {wrap_360(angle.value), azimuth_problem(angle.value)};
}

ParsedDip parse_dip_with_letter(std::string_view cell, DecimalComma comma, Angle greatest) {
  const std::string text = in_capitals(normalise_notation(cell));
  NotationScanner scan(text, comma);
  const auto rest = rest_as_dip(scan);
  if (!rest || rest->letter.empty()) return {parse_dip(cell, comma, greatest), {}};
  const Angle dip = Angle::degrees(rest->dip);
  return {{above_zero(dip), dip_problem(dip, greatest)}, std::string(rest->letter)};
}

std::optional<ParsedAngle> parse_bearing(std::string_view cell, DecimalComma comma) {
  const std::string text = in_capitals(normalise_notation(cell));
  if (text.empty() || std::string_view("NSEW").find(text.front()) == std::string_view::npos) {
    return std::nullopt;
  }
  NotationScanner scan(text, comma);
  if (const auto bearing = partial_bearing(scan); bearing && scan.at_end()) return bearing;
  scan = NotationScanner(text, comma);
  if (const auto whole = whole_bearing(scan); whole && scan.at_end()) return {{*whole, {}}};
  return {{{}, wrong("is not a bearing", "as in N45E, S10W, NS or EW")}};
}

std::optional<Angle> compass_letter(std::string_view text) {
  constexpr std::string_view kCompass[] = {"N", "NE", "E", "SE", "S", "SW", "W", "NW"};
  const std::string letter = in_capitals(normalise_notation(text));
  for (std::size_t i = 0; i < std::size(kCompass); ++i) {
    if (letter == kCompass[i]) return Angle::degrees(45.0 * static_cast<double>(i));
  }
  return std::nullopt;
}

ParsedPlane plane_of_dip(Angle dip, Angle dip_direction) {
  ParsedPlane outcome;
  outcome.overturned = dip.deg() > 90.0;
  if (outcome.overturned) {
    dip = Angle::degrees(180.0) - dip;
    dip_direction = dip_direction + Angle::degrees(180.0);
  }
  outcome.plane = {dip, dip.deg() == 0.0 ? Angle{} : wrap_360(dip_direction)};
  return outcome;
}

ParsedPlane plane_of_strike(Angle strike, Angle dip, std::string_view letter,
                            std::optional<StrikeRule> rule) {
  const Angle to_right = dip_direction_of_strike(strike, StrikeRule::right);
  if (letter.empty()) {
    if (rule) return plane_of_dip(dip, dip_direction_of_strike(strike, *rule));
    if (dip.deg() == 0.0 || dip.deg() == 90.0) return plane_of_dip(dip, to_right);
    ParsedPlane bare = no_plane(wrong("is a strike that doesn't say to which side the plane dips",
                                      "a strike rule, or a dip quadrant such as SE"));
    bare.bare_strike = true;
    return bare;
  }
  const auto side = compass_letter(letter);
  if (!side) return no_plane(wrong("has a dip quadrant that is not a compass letter", kLetters));
  const Angle off_right = azimuth_difference(*side, to_right);
  const bool right = off_right.deg() <= 90.0;
  const Angle off = right ? off_right : Angle::degrees(180.0) - off_right;
  if (at_least(off, Angle::degrees(80.0)) && dip.deg() > 0.0) {
    return no_plane(wrong(fmt::format("has dip quadrant {}, which lies along the strike {:g}",
                                      in_capitals(normalise_notation(letter)), strike.deg()),
                          "the letter of a side of the strike"));
  }
  ParsedPlane outcome = plane_of_dip(
      dip, dip_direction_of_strike(strike, right ? StrikeRule::right : StrikeRule::left));
  if (strictly_above(off, Angle::degrees(45.0)) && dip.deg() > 0.0) {
    outcome.doubt = fmt::format("dip quadrant {} is {:g} degrees off the dip direction {:g}",
                                in_capitals(normalise_notation(letter)), off.deg(),
                                outcome.plane.dip_direction.deg());
  }
  return outcome;
}

ParsedPlane parse_plane(std::string_view cell, const TextRules& rules) {
  const std::string text = in_capitals(normalise_notation(cell));
  if (is_missing(cell)) return no_plane(wrong("is missing", kTextForms));
  if (text.find("->") != std::string::npos) return parse_arrow_text(text, rules);
  if (std::string_view("NSEW").find(text.front()) != std::string_view::npos) {
    return parse_bearing_text(text, rules);
  }
  if (const auto pair = scan_pair(text, rules.comma)) return plane_of_pair(*pair, rules);
  return no_plane(wrong("is not an orientation", kTextForms));
}

BarePair bare_pair(std::string_view cell, DecimalComma comma) {
  const std::string text = in_capitals(normalise_notation(cell));
  if (text.find("->") != std::string::npos) return BarePair::not_a_pair;
  const auto pair = scan_pair(text, comma);
  if (!pair || !pair->letter.empty()) return BarePair::not_a_pair;
  const std::size_t digits = std::min(text.find_first_not_of("0123456789"), text.size());
  if (pair->first > 90.0 || (digits >= 3 && text.front() == '0')) return BarePair::azimuth_first;
  return pair->second > 90.0 ? BarePair::dip_first : BarePair::either;
}

}  // namespace brink
