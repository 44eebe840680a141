// What the headings of a table mean.
#pragma once

#include <array>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/orientation/notation.hpp"
#include "brink/readings/table.hpp"

namespace brink {

// Columns that the reading itself is made of. All others travel along.
enum class Meaning {
  dip,
  dip_direction,
  strike,
  quadrant,
  pole_trend,
  pole_plunge,
  alpha,
  beta,
  hole_trend,
  hole_plunge,
  reference_line,  // "top" or "bottom" of the core
  orientation,     // one text that holds the whole reading
  declination,
  weight,
  count,
};
inline constexpr std::size_t kMeanings = 15;

// Which columns make the plane.
enum class Layout { dip_direction, strike, pole, core, text };

struct Columns {
  Layout layout = Layout::dip_direction;
  std::array<std::optional<std::size_t>, kMeanings> index;  // of each meaning that the layout uses
  std::optional<StrikeRule> strike_rule;  // where the heading of the strike says it
  std::vector<std::size_t> extra;         // the columns that travel along
  std::vector<std::string> warnings;

  std::optional<std::size_t> of(Meaning meaning) const {
    return index[static_cast<std::size_t>(meaning)];
  }
};

// A heading reduced to its letters and digits: in small letters, without blanks, '_', '-', '.' and
// degree signs, without a unit in brackets or as a last word (deg, degrees, m, mm, cm, kN), and
// with the trade's other spellings replaced: "Dip Azimuth (deg)" and "DD" give "dipdirection",
// "type" gives "kind", "distance" gives "position".
std::string heading_key(std::string_view heading);

// The meaning of a heading, nothing for a column that travels along. Doesn't know the headings that
// need the notation to be understood ("azimuth", "trend").
std::optional<Meaning> meaning_of(std::string_view heading);

// Finds the columns of a plane. `notation` decides where headings allow several readings; it also
// settles what "azimuth", "bearing", "direction", "trend" and "plunge" mean, which otherwise is
// Error(input) that asks. So are two columns of the same meaning or heading, and headings that
// don't make a plane. A strike with neither rule nor quadrant is left to the rows: some may name
// the side.
Columns understand_columns(const Row& headings, const std::string& file,
                           std::optional<Notation> notation);

}  // namespace brink
