#include "brink/sets/sets.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <map>
#include <numeric>

#include "brink/base/error.hpp"
#include "brink/base/near_name.hpp"
#include "found_fit.hpp"
#include "search.hpp"

namespace brink {

namespace {

// Below this many readings a set is named in a warning: its mean and kappa mean little.
constexpr std::size_t kFewReadings = 5;

std::vector<std::string> default_names(std::size_t count) {
  std::vector<std::string> names;
  for (std::size_t k = 1; k <= count; ++k)
    names.push_back(std::string("J").append(std::to_string(k)));
  return names;
}

// The components in the order in which the sets ended up: from[k] is the component of set k + 1.
Mixture reordered(const Mixture& mixture, const std::vector<int>& from) {
  Mixture result{mixture.uniform_weight, {}};
  for (const int component : from) {
    result.components.push_back(mixture.components[static_cast<std::size_t>(component) - 1]);
  }
  return result;
}

// For each set, the component that its first reading was given to.
std::vector<int> component_of_set(const SetsResult& result, const std::vector<int>& labels) {
  std::vector<int> component(result.sets.size(), 0);
  for (std::size_t i = 0; i < labels.size(); ++i) {
    if (result.assignment[i] == 0) continue;
    component[static_cast<std::size_t>(result.assignment[i]) - 1] = labels[i];
  }
  return component;
}

void note_counts(SetsResult& result, const detail::SearchResult& search,
                 const FindSetsOptions& options) {
  const detail::Candidate& best = search.best(options.count);
  result.log_likelihood = best.fit.log_likelihood;
  result.bic = best.criterion;
  const std::size_t chosen = best.fit.mixture.components.size();
  if (options.count) {
    result.tried = {{chosen, best.criterion}};
    return;
  }
  for (std::size_t k = 0; k < search.by_count.size(); ++k) {
    if (!search.by_count[k]) continue;
    const CountTried tried{k, search.by_count[k]->criterion};
    result.tried.push_back(tried);
    if (k != chosen && (!result.runner_up || tried.bic < result.runner_up->bic)) {
      result.runner_up = tried;
    }
  }
  result.undecided = result.runner_up && result.runner_up->bic - best.criterion < kDecided;
}

void warn(SetsResult& result, const FindSetsOptions& options) {
  if (result.undecided) {
    result.warnings.push_back(fmt::format(
        "the number of sets is undecided: {} sets beat {} by {:.1f} in the criterion, and less "
        "than {:.0f} is not a difference; look at both (--count {})",
        result.sets.size(), result.runner_up->count, result.runner_up->bic - *result.bic, kDecided,
        result.runner_up->count));
  }
  if (options.count && result.sets.size() < *options.count) {
    result.warnings.push_back(fmt::format("{} sets were asked for, but the readings give only {}",
                                          *options.count, result.sets.size()));
  }
  for (const SetStatistics& s : result.sets) {
    if (s.count >= kFewReadings) continue;
    result.warnings.push_back(
        fmt::format("set {} has {} reading{}: too few for its mean and scatter to mean much",
                    s.name, s.count, s.count == 1 ? "" : "s"));
  }
}

void add_fits(SetsResult& result, const Readings& readings, const FindSetsOptions& options) {
  const auto fits = detail::found_fits(*result.mixture, readings.normals, result.assignment,
                                       options.seed, options.threads);
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    if (fits[k]) result.sets[k].fisher_fit = fits[k]->verdict;
    result.sets[k].shape = result.mixture->components[k].shape;
  }
}

std::string_view trimmed(std::string_view text) {
  const auto first = text.find_first_not_of(" \t");
  if (first == std::string_view::npos) return {};
  return text.substr(first, text.find_last_not_of(" \t") - first + 1);
}

[[noreturn]] void throw_no_column(const Readings& readings, std::string_view heading) {
  std::vector<std::string> headings;
  for (const ExtraColumn& column : readings.extra) headings.push_back(column.heading);
  throw Error(ErrorKind::argument, Place{{}, 0, 0, "set column"},
              fmt::format("no column has this heading{}", did_you_mean(heading, headings)), heading,
              headings.empty() ? std::string("the file has no columns beside the orientation")
                               : fmt::format("one of: {}", fmt::join(headings, ", ")));
}

}  // namespace

SetsResult find_sets(const Readings& readings, const FindSetsOptions& options) {
  const AxisSample sample = merge_equal_axes(readings.normals, readings.weights);
  const detail::SearchOptions search_options{options.count,  0.0, false, {}, options.seed,
                                             options.threads};
  const detail::SearchResult search = detail::search_mixture(sample, search_options);
  const Mixture& mixture = search.best(options.count).fit.mixture;
  const std::vector<int> by_axis = classify(mixture, sample);
  std::vector<int> labels;
  for (const std::size_t at : sample.merged) labels.push_back(by_axis[at]);
  SetsResult result =
      sets_by_membership(readings, labels, default_names(mixture.components.size()), options);
  const std::vector<std::string> names = default_names(result.sets.size());
  for (std::size_t k = 0; k < names.size(); ++k) result.sets[k].name = names[k];
  result.mixture = reordered(mixture, component_of_set(result, labels));
  add_fits(result, readings, options);
  note_counts(result, search, options);
  result.uniformity = bingham_uniformity(orientation_tensor(readings.normals, readings.weights),
                                         sample.total_weight);
  warn(result, options);
  return result;
}

SetsResult sets_by_column(const Readings& readings, std::string_view heading,
                          const FindSetsOptions& options) {
  const ExtraColumn* column = readings.find_column(heading);
  if (column == nullptr) throw_no_column(readings, heading);
  std::vector<std::string> names;
  std::map<std::string, int, std::less<>> numbers;
  std::vector<int> assignment(readings.size(), 0);
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const std::string_view name = trimmed(column->cells[i]);
    if (name.empty() || name == "0") continue;
    const auto [at, added] =
        numbers.try_emplace(std::string(name), static_cast<int>(names.size()) + 1);
    if (added) names.emplace_back(name);
    assignment[i] = at->second;
  }
  SetsResult result = sets_by_membership(readings, assignment, names, options);
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    std::vector<Vector3> axes;
    for (std::size_t i = 0; i < readings.size(); ++i) {
      if (result.assignment[i] == static_cast<int>(k) + 1) axes.push_back(readings.normals[i]);
    }
    if (const auto fit = fisher_fit_axes(axes, options.seed, options.threads))
      result.sets[k].fisher_fit = fit->verdict;
  }
  if (readings.size() > 0) {
    const OrientationTensor tensor = orientation_tensor(readings.normals, readings.weights);
    const double effective = axial_resultant(readings.normals, readings.weights).count;
    result.uniformity = bingham_uniformity(tensor, effective);
  }
  warn(result, {});
  return result;
}

}  // namespace brink
