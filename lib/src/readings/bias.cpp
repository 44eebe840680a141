#include "brink/readings/bias.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <map>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "lines_in_words.hpp"

namespace brink {

namespace {

Error option_error(std::string_view key, std::string_view what, std::string_view value,
                   std::string_view accepted) {
  return Error(ErrorKind::argument, Place{.file = {}, .key = std::string(key)}, what, value,
               accepted);
}

void check_names(const std::vector<Traverse>& traverses) {
  for (std::size_t i = 0; i < traverses.size(); ++i) {
    if (traverses[i].name.empty() && traverses.size() > 1) {
      throw option_error("traverse", "one without a name stands for all readings", {},
                         "a name for each traverse, or one traverse alone");
    }
    for (std::size_t j = 0; j < i; ++j) {
      if (traverses[i].name == traverses[j].name) {
        throw option_error("traverse", "is given twice", traverses[i].name, "each name once");
      }
    }
  }
}

void warn_of_unknown(Readings& readings, const TraverseOfReading& on) {
  std::vector<std::size_t> unknown;
  for (std::size_t i = 0; i < on.size(); ++i) {
    if (!on[i]) unknown.push_back(i);
  }
  if (unknown.empty()) return;
  readings.warnings.push_back(lines_in_words(readings, unknown) +
                              ": on no traverse that is defined, so not corrected for orientation "
                              "bias");
}

void warn_of_blind(Readings& readings, const TraverseOfReading& on, const BiasOptions& options) {
  for (std::size_t t = 0; t < options.traverses.size(); ++t) {
    const Traverse& traverse = options.traverses[t];
    std::vector<std::size_t> blind;
    for (std::size_t i = 0; i < on.size(); ++i) {
      if (on[i] == t && in_blind_zone(traverse, readings.normals[i], options.blind_angle)) {
        blind.push_back(i);
      }
    }
    if (blind.empty()) continue;
    readings.warnings.push_back(fmt::format(
        "{}: in the blind zone of {}, less than {} degrees from it; weighed as at {} degrees",
        lines_in_words(readings, blind), in_words(traverse), shortest(options.blind_angle.deg()),
        shortest(options.blind_angle.deg())));
  }
}

void scale_to_count(std::vector<double>& weights) {
  double sum = 0.0;
  for (const double weight : weights) sum += weight;
  const double factor = static_cast<double>(weights.size()) / sum;
  for (double& weight : weights) weight *= factor;
}

}  // namespace

double bias_weight(const Traverse& traverse, const Vector3& n, Angle blind_angle) {
  return 1.0 / std::max(meeting_sine(traverse, n), sin(blind_angle));
}

double effective_number(std::span<const double> weights) {
  double sum = 0.0;
  double squares = 0.0;
  for (const double weight : weights) {
    sum += weight;
    squares += weight * weight;
  }
  return squares > 0.0 ? sum * sum / squares : 0.0;
}

TraverseOfReading traverses_of(const Readings& readings, const BiasOptions& options) {
  check_names(options.traverses);
  TraverseOfReading on(readings.size());
  if (options.traverses.empty()) return on;
  if (options.traverses.front().name.empty()) {
    std::fill(on.begin(), on.end(), std::size_t{0});
    return on;
  }
  const ExtraColumn* column = readings.find_column(options.column);
  if (column == nullptr) {
    throw option_error("traverse", "the readings have no column that names their traverse",
                       options.column,
                       "the heading of such a column, or one traverse without a "
                       "name for all readings");
  }
  std::map<std::string_view, std::size_t> by_name;
  for (std::size_t t = 0; t < options.traverses.size(); ++t) {
    by_name[options.traverses[t].name] = t;
  }
  for (std::size_t i = 0; i < on.size(); ++i) {
    const auto found = by_name.find(column->cells[i]);
    if (found != by_name.end()) on[i] = found->second;
  }
  return on;
}

void weigh_readings(Readings& readings, const BiasOptions& options) {
  if (options.unweighted) {
    std::fill(readings.weights.begin(), readings.weights.end(), 1.0);
    return;
  }
  if (options.traverses.empty() || readings.size() == 0) return;
  const TraverseOfReading on = traverses_of(readings, options);
  for (std::size_t i = 0; i < on.size(); ++i) {
    if (!on[i]) continue;
    readings.weights[i] *=
        bias_weight(options.traverses[*on[i]], readings.normals[i], options.blind_angle);
  }
  scale_to_count(readings.weights);
  warn_of_unknown(readings, on);
  warn_of_blind(readings, on, options);
}

}  // namespace brink
