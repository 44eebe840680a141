#include "options.hpp"

#include <fmt/format.h>

#include <limits>
#include <ostream>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"

namespace brink::cli {

namespace {

constexpr auto kDegrees = "degrees";

Error value_error(const std::string& option, std::string_view text, std::string_view what,
                  std::string_view accepted) {
  return Error(ErrorKind::argument, Place{.key = option}, what, text.empty() ? "''" : text,
               accepted);
}

std::string_view trimmed(std::string_view text) {
  const std::size_t first = text.find_first_not_of(" \t");
  if (first == std::string_view::npos) return {};
  return text.substr(first, text.find_last_not_of(" \t") - first + 1);
}

// The two numbers of "A/B".
std::optional<std::pair<double, double>> parse_pair(std::string_view text) {
  const std::size_t slash = text.find('/');
  if (slash == std::string_view::npos) return {};
  const auto first = parse_decimal(trimmed(text.substr(0, slash)));
  const auto second = parse_decimal(trimmed(text.substr(slash + 1)));
  if (!first || !second) return {};
  return std::pair(*first, *second);
}

void check_part(const std::string& option, std::string_view text, const char* part, double value,
                const Interval& accepted) {
  if (accepted.contains(value)) return;
  throw value_error(option, text, fmt::format("has a {} of {}", part, shortest(value)),
                    fmt::format("a {} of {}", part, accepted.text()));
}

Angle checked_azimuth(const std::string& option, std::string_view text, const char* part,
                      double value) {
  check_part(option, text, part, value, from_to(0.0, 360.0, kDegrees));
  return wrap_360(Angle::degrees(value));
}

}  // namespace

double parse_number(const std::string& option, std::string_view text, const Interval& accepted) {
  const auto value = parse_decimal(trimmed(text));
  if (!value) throw value_error(option, text, "is not a number", accepted.text());
  if (!accepted.contains(*value)) {
    throw value_error(option, text, "is out of range", accepted.text());
  }
  return *value + 0.0;  // no negative zero
}

Angle parse_angle(const std::string& option, std::string_view text, const Interval& accepted) {
  return Angle::degrees(parse_number(option, text, accepted));
}

std::uint64_t parse_whole(const std::string& option, std::string_view text, std::uint64_t low,
                          std::uint64_t high) {
  const auto value = parse_integer(trimmed(text));
  const std::string accepted = fmt::format("a whole number, {} to {}", low, high);
  if (!value) throw value_error(option, text, "is not a whole number", accepted);
  if (*value < 0 || std::cmp_less(*value, low) || std::cmp_greater(*value, high)) {
    throw value_error(option, text, "is out of range", accepted);
  }
  return static_cast<std::uint64_t>(*value);
}

Plane parse_plane(const std::string& option, std::string_view text) {
  const auto pair = parse_pair(text);
  if (!pair) {
    throw value_error(option, text, "is not a plane", "DIP/DIR in degrees, as in 65/120");
  }
  check_part(option, text, "dip", pair->first, from_to(0.0, 90.0, kDegrees));
  const Angle direction = checked_azimuth(option, text, "dip direction", pair->second);
  const Angle dip = Angle::degrees(pair->first + 0.0);
  return {dip, dip == Angle() ? Angle() : direction};
}

Face parse_face(const std::string& option, std::string_view text) {
  const auto pair = parse_pair(text);
  if (!pair) throw value_error(option, text, "is not a face", "DIP/DIR in degrees, as in 65/120");
  check_part(option, text, "dip", pair->first, between(0.0, 180.0, kDegrees));
  return {Angle::degrees(pair->first),
          checked_azimuth(option, text, "dip direction", pair->second)};
}

Line parse_line(const std::string& option, std::string_view text) {
  const auto pair = parse_pair(text);
  if (!pair) {
    throw value_error(option, text, "is not a line", "TREND/PLUNGE in degrees, as in 120/35");
  }
  const Angle trend = checked_azimuth(option, text, "trend", pair->first);
  check_part(option, text, "plunge", pair->second, from_to(-90.0, 90.0, kDegrees));
  const Angle plunge = Angle::degrees(pair->second + 0.0);
  const bool vertical = plunge.deg() == 90.0 || plunge.deg() == -90.0;
  return {vertical ? Angle() : trend, plunge};
}

ForceAlong parse_force(const std::string& option, std::string_view text, const std::string& form) {
  const std::size_t at = text.find('@');
  const auto magnitude =
      at == std::string_view::npos ? std::nullopt : parse_decimal(trimmed(text.substr(0, at)));
  if (!magnitude || !parse_pair(text.substr(at + 1))) {
    throw value_error(option, text, "is not a force", form + ", as in 250@120/35");
  }
  check_part(option, text, "force", *magnitude, at_least_value(0.0, "kN"));
  return {*magnitude + 0.0, parse_line(option, text.substr(at + 1))};
}

Option flag_option(std::string name, std::string help, bool& target, std::string group) {
  Option option;
  option.name = std::move(name);
  option.help = std::move(help);
  option.group = std::move(group);
  option.take = [&target](std::string_view) { target = true; };
  return option;
}

namespace {

Option value_option(std::string name, std::string value, std::string help, std::string group) {
  Option option;
  option.name = std::move(name);
  option.value = std::move(value);
  option.help = std::move(help);
  option.group = std::move(group);
  return option;
}

}  // namespace

Option text_option(std::string name, std::string value, std::string help, std::string& target,
                   std::string group) {
  Option option =
      value_option(std::move(name), std::move(value), std::move(help), std::move(group));
  option.take = [&target](std::string_view text) { target = text; };
  return option;
}

Option number_option(std::string name, std::string value, std::string help, Interval accepted,
                     double& target, std::string group) {
  Option option = value_option(name, std::move(value), std::move(help), std::move(group));
  option.take = [&target, name, accepted](std::string_view text) {
    target = parse_number(name, text, accepted);
  };
  return option;
}

Option number_option(std::string name, std::string value, std::string help, Interval accepted,
                     std::optional<double>& target, std::string group) {
  Option option = value_option(name, std::move(value), std::move(help), std::move(group));
  option.take = [&target, name, accepted](std::string_view text) {
    target = parse_number(name, text, accepted);
  };
  return option;
}

Option angle_option(std::string name, std::string help, Interval accepted, Angle& target,
                    std::string group) {
  Option option = value_option(name, "DEG", std::move(help), std::move(group));
  option.take = [&target, name, accepted](std::string_view text) {
    target = parse_angle(name, text, accepted);
  };
  return option;
}

Option plane_option(std::string name, std::string help, Plane& target, std::string group) {
  Option option = value_option(name, "DIP/DIR", std::move(help), std::move(group));
  option.take = [&target, name](std::string_view text) { target = parse_plane(name, text); };
  return option;
}

Option face_option(std::string name, std::string help, Face& target, std::string group) {
  Option option = value_option(name, "DIP/DIR", std::move(help), std::move(group));
  option.take = [&target, name](std::string_view text) { target = parse_face(name, text); };
  return option;
}

Option required(Option option) {
  option.required = true;
  return option;
}

Option with_default(Option option, std::string text) {
  option.default_text = std::move(text);
  return option;
}

void add_output_options(std::vector<Option>& options, OutputOptions& target) {
  options.push_back(flag_option("--json",
                                "Prints one JSON document on standard output, full precision.",
                                target.json, "Output"));
  options.push_back(
      flag_option("--quiet", "Prints no warnings; errors stay.", target.quiet, "Output"));
}

Option output_option(std::string value, std::string help, OutputOptions& target) {
  Option option =
      text_option("--output", std::move(value), std::move(help), target.output, "Output");
  option.short_name = "-o";
  return option;
}

Option seed_option(std::uint64_t& target) {
  Option option = value_option(
      "--seed", "N", "Whole number that fixes the random draws: same seed, same bytes.", "Output");
  option.default_text = std::to_string(target);
  option.take = [&target](std::string_view text) {
    target = parse_whole("--seed", text, 0, std::numeric_limits<std::int64_t>::max());
  };
  return option;
}

Option threads_option(unsigned& target) {
  Option option = value_option("--threads", "N",
                               "Threads to work with; results do not depend on it.", "Output");
  option.default_text = "one a processor core";
  option.take = [&target](std::string_view text) {
    constexpr std::uint64_t most = 1024;
    target = static_cast<unsigned>(parse_whole("--threads", text, 1, most));
  };
  return option;
}

void add_kinematic_options(std::vector<Option>& options, KinematicsOptions& target, bool required) {
  const std::string group = "Face and friction";
  Option face = value_option(
      "--face", "DIP/DIR",
      "Cut face: dip above 0 and below 180 degrees (past 90 it overhangs) and dip direction.",
      group);
  face.required = required;
  face.repeatable = true;
  face.take = [&target](std::string_view text) {
    target.faces.push_back(parse_face("--face", text));
  };
  options.push_back(std::move(face));

  options.push_back(with_default(
      plane_option("--upper", "Ground above the crest.", target.upper, group), "level, 0/0"));

  constexpr double right_angle = 90.0;
  Option friction =
      angle_option("--friction", "Friction angle of the joints, 0 to below 90 degrees.",
                   {0.0, right_angle, false, true, kDegrees}, target.friction, group);
  friction.required = required;
  options.push_back(std::move(friction));

  constexpr double half_turn = 180.0;
  options.push_back(with_default(
      angle_option("--strike-tolerance",
                   "Planar sliding: greatest angle between the dip directions of joint and face.",
                   from_to(0.0, half_turn, kDegrees), target.strike_tolerance, group),
      shortest(target.strike_tolerance.deg())));
  options.push_back(with_default(
      angle_option(
          "--toppling-tolerance",
          "Toppling: greatest angle between a joint's dip direction and the face's, turned "
          "about.",
          from_to(0.0, half_turn, kDegrees), target.toppling_tolerance, group),
      shortest(target.toppling_tolerance.deg())));
}

void print_warnings(const std::vector<std::string>& warnings, const OutputOptions& output,
                    Streams& streams) {
  if (output.quiet) return;
  for (const std::string& warning : warnings) streams.err << "warning: " << warning << '\n';
}

}  // namespace brink::cli
