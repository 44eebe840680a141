#include "brink/readings/columns.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <utility>

#include "brink/base/error.hpp"

namespace brink {

namespace {

struct Spelling {
  std::string_view key;
  Meaning meaning;
};

constexpr Spelling kMeaningKeys[] = {
    {"dip", Meaning::dip},
    {"dipangle", Meaning::dip},
    {"dipdirection", Meaning::dip_direction},
    {"strike", Meaning::strike},
    {"strikerighthandrule", Meaning::strike},
    {"strikelefthandrule", Meaning::strike},
    {"quadrant", Meaning::quadrant},
    {"poletrend", Meaning::pole_trend},
    {"poleplunge", Meaning::pole_plunge},
    {"alpha", Meaning::alpha},
    {"beta", Meaning::beta},
    {"holetrend", Meaning::hole_trend},
    {"holeplunge", Meaning::hole_plunge},
    {"referenceline", Meaning::reference_line},
    {"orientation", Meaning::orientation},
    {"declination", Meaning::declination},
    {"weight", Meaning::weight},
    {"count", Meaning::count},
};

// Other spellings of the trade, and the one used here.
constexpr std::pair<std::string_view, std::string_view> kOtherSpellings[] = {
    {"dipdir", "dipdirection"},
    {"dipdirn", "dipdirection"},
    {"dd", "dipdirection"},
    {"dipazimuth", "dipdirection"},
    {"dipaz", "dipdirection"},
    {"azimuthofdip", "dipdirection"},
    {"directionofdip", "dipdirection"},
    {"strikeright", "strikerighthandrule"},
    {"strikerighthand", "strikerighthandrule"},
    {"strikerhr", "strikerighthandrule"},
    {"strikeleft", "strikelefthandrule"},
    {"strikelefthand", "strikelefthandrule"},
    {"strikelhr", "strikelefthandrule"},
    {"dipquadrant", "quadrant"},
    {"dipquad", "quadrant"},
    {"quad", "quadrant"},
    {"trendofpole", "poletrend"},
    {"plungeofpole", "poleplunge"},
    {"alphaangle", "alpha"},
    {"betaangle", "beta"},
    {"boreholetrend", "holetrend"},
    {"boreholeplunge", "holeplunge"},
    {"holeazimuth", "holetrend"},
    {"refline", "referenceline"},
    {"magneticdeclination", "declination"},
    // AGS4
    {"discdip", "dip"},
    {"discdir", "dipdirection"},
    {"fracset", "set"},
    {"disctype", "kind"},
    {"locaid", "traverse"},
    {"disctop", "position"},
    {"discterm", "termination"},
    {"discpers", "persistence"},
    {"discapt", "aperture"},
    {"discrgh", "roughness"},
    {"discnumb", "id"},
    {"discrem", "note"},
    {"hornornt", "traversetrend"},
    {"hornincl", "traverseplunge"},
    {"locanate", "east"},
    {"locanatn", "north"},
    {"locagl", "level"},
    // Travelling columns
    {"loggedby", "observer"},
    {"geologist", "observer"},
    {"type", "kind"},
    {"distance", "position"},
    {"chainage", "position"},
    {"setid", "set"},
    {"setnumber", "set"},
    {"jointset", "set"},
    {"scanline", "traverse"},
    {"remarks", "note"},
    {"remark", "note"},
    {"notes", "note"},
    {"comment", "note"},
    {"comments", "note"},
};

// Headings that are understood only once the notation is named.
constexpr std::string_view kAmbiguous[] = {"azimuth", "az",    "direction", "dir",
                                           "bearing", "trend", "plunge",    "inclination"};

constexpr std::string_view kUnits[] = {"deg", "degrees", "degree", "m", "mm", "cm", "kn"};

constexpr std::string_view kPlaneHeadings =
    "dip with dip_direction; strike with dip and dip_quadrant; pole_trend with pole_plunge; alpha "
    "with beta; or one text column orientation";

bool is_separator(char c) {
  return c == ' ' || c == '_' || c == '-' || c == '.' || c == '\t';
}

std::string without_brackets(std::string_view heading) {
  std::string text;
  int depth = 0;
  for (const char c : heading) {
    const bool opens = c == '(' || c == '[' || c == '{';
    const bool closes = c == ')' || c == ']' || c == '}';
    if (opens) ++depth;
    if (depth == 0) text += c;
    if (closes && depth > 0) --depth;
  }
  return text;
}

// "dip_deg" -> "dip": a unit that stands as a word of its own at the end.
std::string_view without_unit_word(std::string_view text) {
  while (!text.empty() && is_separator(text.back())) text.remove_suffix(1);
  for (const std::string_view unit : kUnits) {
    if (text.size() <= unit.size() + 1 || !text.ends_with(unit)) continue;
    const std::string_view rest = text.substr(0, text.size() - unit.size());
    if (is_separator(rest.back())) return rest;
  }
  return text;
}

bool is_ambiguous(std::string_view key) {
  return std::find(std::begin(kAmbiguous), std::end(kAmbiguous), key) != std::end(kAmbiguous);
}

// What an ambiguous heading means once the notation is known.
std::optional<Meaning> meaning_under(std::string_view key, std::optional<Notation> notation) {
  if (!notation || !is_ambiguous(key)) return std::nullopt;
  const bool is_plunge = key == "plunge" || key == "inclination";
  switch (*notation) {
    case Notation::dip_direction:
      return is_plunge ? std::nullopt : std::optional(Meaning::dip_direction);
    case Notation::strike_dip:
    case Notation::strike_quadrant:
    case Notation::quadrant_bearing:
      return is_plunge ? std::nullopt : std::optional(Meaning::strike);
    case Notation::pole:
      return is_plunge ? Meaning::pole_plunge : Meaning::pole_trend;
    case Notation::core:
      return std::nullopt;
  }
  return std::nullopt;
}

// The headings of one table on their way to Columns.
class HeadingReader {
 public:
  HeadingReader(const Row& headings, const std::string& file, std::optional<Notation> notation)
      : headings_(headings), file_(file), notation_(notation) {
    for (const std::string_view cell : headings.cells) keys_.push_back(heading_key(cell));
    find_meanings();
  }

  Columns read() {
    refuse_repeated_headings();
    columns_.layout = find_layout();
    keep_columns_of_layout();
    for (std::size_t i = 0; i < keys_.size(); ++i) {
      if (!used_[i] && !keys_[i].empty()) columns_.extra.push_back(i);
    }
    return columns_;
  }

 private:
  bool has(Meaning meaning) const { return found_[static_cast<std::size_t>(meaning)].has_value(); }

  void find_meanings() {
    used_.assign(keys_.size(), false);
    for (std::size_t i = 0; i < keys_.size(); ++i) {
      auto meaning = meaning_of(headings_.cells[i]);
      if (!meaning) meaning = meaning_under(keys_[i], notation_);
      if (!meaning) continue;
      auto& place = found_[static_cast<std::size_t>(*meaning)];
      if (place) refuse_twice(*place, i);
      place = i;
    }
  }

  [[noreturn]] void refuse_twice(std::size_t first, std::size_t second) const {
    throw Error(ErrorKind::input,
                {file_, headings_.line, second + 1, std::string(headings_.cells[second])},
                fmt::format("the heading means the same as column {}, '{}'", first + 1,
                            printable(headings_.cells[first])),
                {}, "one column for each quantity");
  }

  void refuse_repeated_headings() const {
    for (std::size_t i = 0; i < keys_.size(); ++i) {
      for (std::size_t j = 0; j < i; ++j) {
        if (!keys_[i].empty() && keys_[i] == keys_[j]) refuse_twice(j, i);
      }
    }
  }

  Layout find_layout() const {
    if (notation_) return layout_of_notation(*notation_);
    if (has(Meaning::dip) && has(Meaning::dip_direction)) return Layout::dip_direction;
    if (has(Meaning::orientation)) return Layout::text;
    if (has(Meaning::pole_trend) && has(Meaning::pole_plunge)) return Layout::pole;
    if (has(Meaning::alpha) && has(Meaning::beta)) return Layout::core;
    if (has(Meaning::strike) && has(Meaning::dip)) return Layout::strike;
    refuse_headings();
  }

  Layout layout_of_notation(Notation notation) const {
    switch (notation) {
      case Notation::dip_direction:
        return complete({Meaning::dip, Meaning::dip_direction}, notation)
                   ? Layout::dip_direction
                   : text_layout(notation, "dip and dip_direction");
      case Notation::strike_dip:
        return complete({Meaning::strike, Meaning::dip}, notation)
                   ? Layout::strike
                   : text_layout(notation, "strike and dip");
      case Notation::strike_quadrant:
      case Notation::quadrant_bearing:
        return complete({Meaning::strike, Meaning::dip}, notation)
                   ? Layout::strike
                   : text_layout(notation, "strike, dip and dip_quadrant");
      case Notation::pole:
        return complete({Meaning::pole_trend, Meaning::pole_plunge}, notation)
                   ? Layout::pole
                   : text_layout(notation, "pole_trend and pole_plunge");
      case Notation::core:
        if (complete({Meaning::alpha, Meaning::beta}, notation)) return Layout::core;
        refuse_for(notation, "alpha and beta");
    }
    refuse_headings();
  }

  bool complete(std::initializer_list<Meaning> meanings, Notation) const {
    return std::all_of(meanings.begin(), meanings.end(), [&](Meaning m) { return has(m); });
  }

  Layout text_layout(Notation notation, std::string_view columns) const {
    if (has(Meaning::orientation)) return Layout::text;
    refuse_for(notation, fmt::format("{}, or a text column orientation", columns));
  }

  Place place(std::size_t column = 0) const { return {file_, headings_.line, column, {}}; }

  [[noreturn]] void refuse_for(Notation notation, std::string_view accepted) const {
    throw Error(ErrorKind::input, place(),
                fmt::format("are not the headings of the notation {}", name_of(notation)),
                headings_.text, accepted);
  }

  [[noreturn]] void refuse_headings() const {
    for (std::size_t i = 0; i < keys_.size(); ++i) {
      if (!is_ambiguous(keys_[i])) continue;
      throw Error(
          ErrorKind::input, {file_, headings_.line, i + 1, {}},
          "is a heading that can mean several things: of the dip, of the strike, or of the "
          "pole?",
          headings_.cells[i],
          "dip_direction, strike, pole_trend or pole_plunge as the heading, or the notation "
          "named (dip/dip-direction, strike/dip, pole)");
    }
    const bool numbers = std::any_of(headings_.cells.begin(), headings_.cells.end(), [](auto cell) {
      return parse_angle(cell, DecimalComma::no).ok();
    });
    if (numbers) {
      throw Error(ErrorKind::input, place(), "stands where the headings are expected",
                  headings_.text, fmt::format("a first line of headings: {}", kPlaneHeadings));
    }
    const bool unparted =
        headings_.cells.size() == 1 && keys_.front().size() + 1 < headings_.text.size();
    throw Error(ErrorKind::input, place(), missing_part(), headings_.text,
                (unparted ? "headings parted by commas, semicolons or tabs: " : "") +
                    std::string(kPlaneHeadings));
  }

  std::string missing_part() const {
    if (has(Meaning::dip)) return "are headings with a dip, but no dip direction or strike";
    if (has(Meaning::dip_direction)) return "are headings with a dip direction, but no dip";
    if (has(Meaning::strike)) return "are headings with a strike, but no dip";
    if (has(Meaning::pole_trend)) return "are headings with a pole's trend, but not its plunge";
    if (has(Meaning::pole_plunge)) return "are headings with a pole's plunge, but not its trend";
    if (has(Meaning::alpha)) return "are headings with alpha, but no beta";
    if (has(Meaning::beta)) return "are headings with beta, but no alpha";
    return "are headings without the columns of a plane";
  }

  void use(Meaning meaning) {
    const auto at = found_[static_cast<std::size_t>(meaning)];
    if (!at) return;
    columns_.index[static_cast<std::size_t>(meaning)] = at;
    used_[*at] = true;
  }

  void keep_columns_of_layout() {
    for (const Meaning m : {Meaning::declination, Meaning::weight, Meaning::count}) use(m);
    switch (columns_.layout) {
      case Layout::dip_direction:
        for (const Meaning m : {Meaning::dip, Meaning::dip_direction}) use(m);
        break;
      case Layout::strike:
        for (const Meaning m : {Meaning::strike, Meaning::dip, Meaning::quadrant}) use(m);
        columns_.strike_rule = rule_of_heading();
        break;
      case Layout::pole:
        for (const Meaning m : {Meaning::pole_trend, Meaning::pole_plunge}) use(m);
        break;
      case Layout::core:
        for (const Meaning m : {Meaning::alpha, Meaning::beta, Meaning::hole_trend,
                                Meaning::hole_plunge, Meaning::reference_line}) {
          use(m);
        }
        break;
      case Layout::text:
        use(Meaning::orientation);
        break;
    }
    warn_of_unused();
  }

  std::optional<StrikeRule> rule_of_heading() const {
    const std::string& key = keys_[*columns_.of(Meaning::strike)];
    if (key == "strikerighthandrule") return StrikeRule::right;
    if (key == "strikelefthandrule") return StrikeRule::left;
    return std::nullopt;
  }

  // Orientation columns beside the ones that were read: the user should know which counted.
  void warn_of_unused() {
    std::string names;
    for (std::size_t i = 0; i < keys_.size(); ++i) {
      if (used_[i] || !meaning_of(headings_.cells[i])) continue;
      names += fmt::format("{}{}", names.empty() ? "" : ", ", printable(headings_.cells[i]));
    }
    if (names.empty()) return;
    columns_.warnings.push_back(fmt::format("{}:{}: the plane is read from {}; not read: {}", file_,
                                            headings_.line, layout_columns(), names));
  }

  std::string layout_columns() const {
    std::string names;
    for (const auto& at : columns_.index) {
      if (!at || at == columns_.of(Meaning::weight) || at == columns_.of(Meaning::count) ||
          at == columns_.of(Meaning::declination)) {
        continue;
      }
      names += fmt::format("{}{}", names.empty() ? "" : ", ", printable(headings_.cells[*at]));
    }
    return names;
  }

  const Row& headings_;
  const std::string& file_;
  std::optional<Notation> notation_;
  std::vector<std::string> keys_;
  std::array<std::optional<std::size_t>, kMeanings> found_;
  std::vector<bool> used_;
  Columns columns_;
};

}  // namespace

std::string heading_key(std::string_view heading) {
  std::string text = without_brackets(normalise_notation(heading));
  for (char& c : text) {
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  }
  std::string key;
  for (const char c : without_unit_word(text)) {
    if (!is_separator(c) && c != kDegreeMark) key += c;
  }
  for (const auto& [spelling, used] : kOtherSpellings) {
    if (key == spelling) return std::string(used);
  }
  return key;
}

std::optional<Meaning> meaning_of(std::string_view heading) {
  const std::string key = heading_key(heading);
  for (const Spelling& known : kMeaningKeys) {
    if (key == known.key) return known.meaning;
  }
  return std::nullopt;
}

Columns understand_columns(const Row& headings, const std::string& file,
                           std::optional<Notation> notation) {
  return HeadingReader(headings, file, notation).read();
}

}  // namespace brink
