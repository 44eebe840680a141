#include <fmt/format.h>

#include <cmath>
#include <stdexcept>

#include "brink/base/number.hpp"
#include "brink/orientation/notation.hpp"

namespace brink {

namespace {

struct Named {
  Notation notation;
  std::string_view name;
};

constexpr std::array<Named, 6> kNames = {{
    {Notation::dip_direction, "dip/dip-direction"},
    {Notation::strike_dip, "strike/dip"},
    {Notation::strike_quadrant, "strike/dip/quadrant"},
    {Notation::quadrant_bearing, "quadrant-bearing"},
    {Notation::pole, "pole"},
    {Notation::core, "core"},
}};

std::string print_azimuth(Angle angle) {
  const std::string text = print_degrees(wrap_360(angle));
  const std::size_t whole = std::min(text.find('.'), text.size());
  return std::string(whole < 3 ? 3 - whole : 0, '0') + text;
}

}  // namespace

std::string_view name_of(Notation notation) {
  for (const Named& named : kNames) {
    if (named.notation == notation) return named.name;
  }
  throw std::logic_error("a notation without a name");
}

std::optional<Notation> notation_named(std::string_view name) {
  for (const Named& named : kNames) {
    if (named.name == name) return named.notation;
  }
  return std::nullopt;
}

std::string notation_names() {
  std::string names;
  for (const Named& named : kNames)
    names += fmt::format("{}{}", names.empty() ? "" : ", ", named.name);
  return names;
}

std::string_view name_of(StrikeRule rule) {
  return rule == StrikeRule::right ? "right" : "left";
}

std::string print_degrees(Angle angle) {
  std::string text = fixed(angle.deg(), 10);
  text.erase(text.find_last_not_of('0') + 1);
  if (text.back() == '.') text.pop_back();
  return text;
}

std::string_view nearest_compass_letter(Angle azimuth) {
  constexpr std::string_view kCompass[] = {"N", "NE", "E", "SE", "S", "SW", "W", "NW"};
  const auto eighth = static_cast<std::size_t>(std::lround(wrap_360(azimuth).deg() / 45.0));
  return kCompass[eighth % 8];
}

std::string print_bearing(Angle strike) {
  const double azimuth = std::fmod(wrap_360(strike).deg(), 180.0);
  const bool east = azimuth <= 90.0;
  const std::string degrees = print_degrees(Angle::degrees(east ? azimuth : 180.0 - azimuth));
  if (degrees == "0") return "NS";
  if (degrees == "90") return "EW";
  return fmt::format("N{}{}", degrees, east ? 'E' : 'W');
}

std::string print_plane(const Plane& plane, Notation notation, StrikeRule rule) {
  const std::string dip = print_degrees(plane.dip);
  const std::string_view letter = nearest_compass_letter(plane.dip_direction);
  const Angle strike = strike_of_dip_direction(plane.dip_direction, StrikeRule::right);
  switch (notation) {
    case Notation::dip_direction:
      return fmt::format("{}/{}", dip, print_azimuth(plane.dip_direction));
    case Notation::strike_dip:
      return fmt::format("{}/{}", print_azimuth(strike_of_dip_direction(plane.dip_direction, rule)),
                         dip);
    case Notation::strike_quadrant:
      return fmt::format("{}/{}{}", print_azimuth(strike), dip, letter);
    case Notation::quadrant_bearing:
      return fmt::format("{} {}{}", print_bearing(strike), dip, letter);
    case Notation::pole: {
      const Line line = pole(plane);
      return fmt::format("{}->{}", print_azimuth(line.trend), print_degrees(line.plunge));
    }
    case Notation::core:
      break;
  }
  throw std::logic_error("core notation has no text form");
}

}  // namespace brink
