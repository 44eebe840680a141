#include "brink/readings/traverse.hpp"

#include <fmt/format.h>

#include <Eigen/Geometry>
#include <cmath>
#include <optional>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr std::string_view kForm =
    "NAME=scanline@TREND/PLUNGE, NAME=borehole@TREND/PLUNGE or NAME=window@DIP/DIR, as in "
    "SL1=scanline@062/2";

Error not_a_traverse(std::string_view text, const std::string& option) {
  return Error(ErrorKind::argument, Place{.file = {}, .key = option}, "is not a traverse", text,
               kForm);
}

std::optional<TraverseKind> kind_named(std::string_view name) {
  for (const auto kind : {TraverseKind::scanline, TraverseKind::borehole, TraverseKind::window}) {
    if (name == name_of(kind)) return kind;
  }
  return std::nullopt;
}

Angle number_within(std::string_view text, double low, double high, std::string_view what,
                    const std::string& option) {
  const auto value = parse_decimal(text);
  if (!value || *value < low || *value > high) {
    throw Error(ErrorKind::argument, Place{.file = {}, .key = option},
                fmt::format("is not {} of a traverse", what), text,
                fmt::format("{} to {} degrees", low, high));
  }
  return Angle::degrees(*value);
}

void read_numbers(Traverse& traverse, std::string_view first, std::string_view second,
                  const std::string& option) {
  if (traverse.kind == TraverseKind::window) {
    traverse.window.dip = number_within(first, 0.0, 90.0, "the dip", option);
    traverse.window.dip_direction =
        wrap_360(number_within(second, 0.0, 360.0, "the dip direction", option));
    return;
  }
  traverse.line.trend = wrap_360(number_within(first, 0.0, 360.0, "the trend", option));
  traverse.line.plunge = number_within(second, -90.0, 90.0, "the plunge", option);
}

}  // namespace

std::string_view name_of(TraverseKind kind) {
  switch (kind) {
    case TraverseKind::scanline:
      return "scanline";
    case TraverseKind::borehole:
      return "borehole";
    case TraverseKind::window:
      break;
  }
  return "window";
}

Traverse parse_traverse(std::string_view text, const std::string& option) {
  const std::size_t at = text.rfind('@');
  if (at == std::string_view::npos) throw not_a_traverse(text, option);
  // A name may hold '=': the last one before '@' ends it.
  const std::string_view head = text.substr(0, at);
  const std::size_t equals = head.rfind('=');
  const bool named = equals != std::string_view::npos;
  const auto kind = kind_named(named ? head.substr(equals + 1) : head);
  const std::string_view numbers = text.substr(at + 1);
  const std::size_t slash = numbers.find('/');
  if (!kind || equals == 0 || slash == std::string_view::npos) throw not_a_traverse(text, option);
  Traverse traverse;
  traverse.name = named ? head.substr(0, equals) : std::string_view();
  traverse.kind = *kind;
  read_numbers(traverse, numbers.substr(0, slash), numbers.substr(slash + 1), option);
  return traverse;
}

double meeting_sine(const Traverse& traverse, const Vector3& n) {
  if (traverse.kind == TraverseKind::window) {
    return std::min(upward_normal(traverse.window).cross(n).norm(), 1.0);
  }
  return std::min(std::abs(direction(traverse.line).dot(n)), 1.0);
}

bool in_blind_zone(const Traverse& traverse, const Vector3& n, Angle angle) {
  return strictly_below(asin(meeting_sine(traverse, n)), angle);
}

std::string in_words(const Traverse& traverse) {
  const bool window = traverse.kind == TraverseKind::window;
  return fmt::format(
      "{}{}{} ({}/{})", name_of(traverse.kind), traverse.name.empty() ? "" : " ", traverse.name,
      shortest((window ? traverse.window.dip : traverse.line.trend).deg()),
      shortest((window ? traverse.window.dip_direction : traverse.line.plunge).deg()));
}

}  // namespace brink
