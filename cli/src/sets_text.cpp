#include "sets_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/record/sets_document.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

std::string plane_text(const Plane& plane) {
  return fmt::format("{:02.0f}/{:03.0f}", plane.dip.deg(),
                     std::fmod(std::round(plane.dip_direction.deg()), 360.0));
}

std::string number_text(const std::optional<double>& value, int decimals) {
  if (!value) return "-";
  return std::isinf(*value) ? "infinite" : fixed(*value, decimals);
}

std::string angle_text(const std::optional<Angle>& angle) {
  return angle ? fixed(angle->deg(), 1) : "-";
}

std::string fit_text(const std::optional<FisherFit>& fit) {
  if (!fit) return "-";
  return fit->p_value < 0.01 ? fmt::format("p {:.3f}", fit->p_value)
                             : fmt::format("p {:.2f}", fit->p_value);
}

bool weighted(const Readings& readings) {
  return std::any_of(readings.weights.begin(), readings.weights.end(),
                     [](double w) { return std::abs(w - 1.0) > 1e-9; });
}

std::string table_of(const SetsResult& result, const Readings& readings) {
  const bool weights = weighted(readings);
  std::vector<TextTable::Column> columns{{"set", Align::left}, {"readings"}};
  if (weights) columns.push_back({"weight"});
  columns.insert(columns.end(), {{"mean,\ndip/direction"},
                                 {"kappa,\n(N-1)/(N-R)"},
                                 {"kappa,\n(N-2)/(N-R)"},
                                 {"95 % cone of\nthe mean, deg"},
                                 {"68 % of readings\nwithin, deg"},
                                 {"shape", Align::left},
                                 {"Fisher\nfit"}});
  const bool stability = !result.sets.empty() && result.sets.front().stability;
  if (stability) columns.push_back({"came back,\n%"});
  TextTable table(std::move(columns));
  for (const SetStatistics& s : result.sets) {
    std::vector<std::string> cells{s.name, std::to_string(s.count)};
    if (weights) cells.push_back(fixed(s.weight, 1));
    for (std::string cell :
         {plane_text(s.mean), number_text(s.fisher_k, 1), number_text(s.unbiased_k, 1),
          angle_text(s.confidence_cone), angle_text(s.variability_cone),
          std::string(s.shape ? name_of(*s.shape) : "-"), fit_text(s.fisher_fit)}) {
      cells.push_back(std::move(cell));
    }
    if (stability) cells.push_back(s.stability ? fixed(100.0 * *s.stability, 0) : "-");
    table.add_row(std::move(cells));
  }
  return table.text();
}

std::string count_text(const SetsResult& result) {
  if (!result.bic) return {};
  if (!result.runner_up) return fmt::format("BIC {:.1f}\n", *result.bic);
  return fmt::format("{} set{} chosen by the Bayesian criterion; {} would be {:.1f} worse{}\n",
                     result.sets.size(), result.sets.size() == 1 ? "" : "s",
                     result.runner_up->count, result.runner_up->bic - *result.bic,
                     result.undecided ? ", which decides nothing" : "");
}

// What to go by where a Fisher distribution does not fit.
std::string misfit_text(const SetsResult& result) {
  std::string text;
  for (const SetStatistics& s : result.sets) {
    if (!s.pattern) continue;
    std::string line = fmt::format(
        "{}: a Fisher distribution does not fit (test of the {}, p {:.3f}), so kappa and the cones "
        "above describe it only roughly. It is a {} (eigenvalues {:.3f}, {:.3f}, {:.3f})",
        s.name, s.fisher_fit->test, s.fisher_fit->p_value, name_of(*s.pattern), s.eigenvalues[0],
        s.eigenvalues[1], s.eigenvalues[2]);
    if (s.bootstrap_cone) {
      line += fmt::format("; the mean lies within {:.1f} degrees by resampling (95 %)",
                          s.bootstrap_cone->deg());
    }
    text += paragraph(line + ".");
  }
  return text;
}

// Sets whose means can't be told apart.
std::string comparison_text(const SetsResult& result) {
  std::string text;
  for (const MeanComparison& c : result.comparisons) {
    if (c.test.p_value < kFitFails) continue;
    text +=
        fmt::format("{} and {} may share their mean: {:.1f} degrees apart, p {:.2f}\n",
                    result.sets[c.a].name, result.sets[c.b].name, c.between.deg(), c.test.p_value);
  }
  return text;
}

std::string containment_text(const SetsResult& result) {
  if (result.sets.empty() || result.sets.front().containment.empty()) return {};
  std::vector<TextTable::Column> columns{{"set", Align::left}};
  for (const ContainmentCone& cone : result.sets.front().containment) {
    columns.push_back({fmt::format("{:g} % within,\ndeg", 100.0 * cone.share)});
  }
  TextTable table(std::move(columns));
  for (const SetStatistics& s : result.sets) {
    std::vector<std::string> cells{s.name};
    for (const ContainmentCone& cone : s.containment) cells.push_back(angle_text(cone.half_angle));
    table.add_row(std::move(cells));
  }
  return "\n" + table.text();
}

}  // namespace

std::string sets_text(const SetsResult& result, const Readings& readings) {
  std::string text = result.sets.empty() ? std::string(
                                               "No sets: the readings show no more order "
                                               "than chance would give.\n")
                                         : table_of(result, readings);
  text += fmt::format("{} of {} readings belong to no set\n", result.unassigned, readings.size());
  text += count_text(result);
  if (result.uniformity) {
    text += fmt::format("uniformity of all readings (Bingham): {:.1f}, p {:.2g}\n",
                        result.uniformity->statistic, result.uniformity->p_value);
  }
  return text + misfit_text(result) + comparison_text(result) + containment_text(result);
}

}  // namespace brink::cli
