#include "sensitivity_options.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

constexpr auto kVaryForm = "NAME=FROM..TO or NAME=FROM..TO:POINTS, as in friction=20..40";

[[noreturn]] void refuse(const std::string& option, std::string_view text, std::string_view what) {
  throw Error(ErrorKind::argument, Place{.key = option}, what, text, kVaryForm);
}

std::string safety_text(const std::optional<double>& safety) {
  if (!safety) return "no block";
  return std::isfinite(*safety) ? fixed(*safety, 3) : "infinite";
}

std::string with_unit(const std::string& name, const std::string& unit) {
  return unit.empty() ? name : name + ", " + unit;
}

std::string curve_text(const SensitivityCurve& curve) {
  TextTable table({{with_unit(curve.name, curve.unit)}, {"factor of safety"}});
  for (const SensitivityPoint& point : curve.points) {
    table.add_row({fmt::format("{:.6g}", point.value), safety_text(point.factor_of_safety)});
  }
  return '\n' + table.text();
}

}  // namespace

VaryRequest parse_vary(const std::string& option, std::string_view text) {
  const std::size_t equals = text.find('=');
  const std::size_t dots = text.find("..", equals == std::string_view::npos ? 0 : equals);
  if (equals == std::string_view::npos || equals == 0 || dots == std::string_view::npos) {
    refuse(option, text, "is not a range");
  }
  VaryRequest request;
  request.name = text.substr(0, equals);
  std::string_view end = text.substr(dots + 2);
  if (const std::size_t colon = end.find(':'); colon != std::string_view::npos) {
    constexpr std::uint64_t most_points = 100000;
    request.range.points = parse_whole(option, end.substr(colon + 1), 2, most_points);
    end = end.substr(0, colon);
  }
  const auto from = parse_decimal(text.substr(equals + 1, dots - equals - 1));
  const auto to = parse_decimal(end);
  if (!from || !to) refuse(option, text, "is not a range");
  request.range.from = *from;
  request.range.to = *to;
  return request;
}

void add_sensitivity_options(std::vector<Option>& options, SensitivityOptions& target,
                             const std::string& names) {
  const std::string group = "Sensitivity and back-analysis";
  Option vary;
  vary.name = "--vary";
  vary.value = "NAME=FROM..TO[:POINTS]";
  vary.help =
      "Factor of safety over a range of one input, the others as given; several are ranked "
      "by how much each moves it. Names: " +
      names + ". 21 points where no number is given.";
  vary.group = group;
  vary.repeatable = true;
  vary.take = [&target](std::string_view text) {
    target.vary.push_back(parse_vary("--vary", text));
  };
  options.push_back(std::move(vary));
  Option solve;
  solve.name = "--solve";
  solve.value = "NAME";
  solve.help =
      "The value of this input at which the factor of safety reaches --target, or that "
      "none does. Names as for --vary.";
  solve.group = group;
  solve.take = [&target](std::string_view text) { target.solve = std::string(text); };
  options.push_back(std::move(solve));
}

std::string sensitivity_text(const std::vector<SensitivityCurve>& curves) {
  if (curves.empty()) return {};
  TextTable ranking({{"input", Align::left},
                     {"from"},
                     {"to"},
                     {"least\nfactor of safety"},
                     {"greatest\nfactor of safety"},
                     {"swing"}});
  std::string text;
  for (const std::size_t i : rank_by_swing(curves)) {
    const SensitivityCurve& curve = curves[i];
    ranking.add_row({with_unit(curve.name, curve.unit),
                     fmt::format("{:.6g}", curve.points.front().value),
                     fmt::format("{:.6g}", curve.points.back().value), safety_text(curve.least),
                     safety_text(curve.greatest), fixed(curve.swing(), 3)});
    text += curve_text(curve);
  }
  return '\n' + ranking.text() + text;
}

std::string back_analysis_text(const BackAnalysis& analysis) {
  const std::string unit = analysis.unit.empty() ? "" : " " + analysis.unit;
  if (analysis.crossings.empty()) {
    return '\n' + paragraph(fmt::format("No {} from {} to {}{} brings the factor of safety to {}.",
                                        analysis.name, shortest(analysis.low),
                                        shortest(analysis.high), unit, shortest(analysis.target)));
  }
  std::string text = "\n";
  for (const Crossing& crossing : analysis.crossings) {
    text += paragraph(fmt::format(
        "The factor of safety {} {} at a {} of {:.6g}{}{}.",
        crossing.rising ? "rises to" : "falls below", shortest(analysis.target), analysis.name,
        crossing.value, unit,
        crossing.jump ? ", in one leap: the block changes the way it moves, or forms, there" : ""));
  }
  return text;
}

}  // namespace brink::cli
