#include "brink/sets/sets.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <map>

#include "brink/base/error.hpp"
#include "brink/base/near_name.hpp"
#include "complete.hpp"

namespace brink {

namespace {

std::string_view trimmed(std::string_view text) {
  const auto first = text.find_first_not_of(" \t");
  if (first == std::string_view::npos) return {};
  return text.substr(first, text.find_last_not_of(" \t") - first + 1);
}

[[noreturn]] void throw_no_column(const Readings& readings, std::string_view heading) {
  std::vector<std::string> headings;
  for (const ExtraColumn& column : readings.extra) headings.push_back(column.heading);
  throw Error(ErrorKind::argument, Place{.file = {}, .key = "set column"},
              fmt::format("no column has this heading{}", did_you_mean(heading, headings)), heading,
              headings.empty() ? std::string("the file has no columns beside the orientation")
                               : fmt::format("one of: {}", fmt::join(headings, ", ")));
}

std::size_t set_named(const SetsResult& result, const std::string& name) {
  std::vector<std::string> names;
  for (const SetStatistics& s : result.sets) names.push_back(s.name);
  const auto at = std::find(names.begin(), names.end(), name);
  if (at != names.end()) return static_cast<std::size_t>(at - names.begin());
  throw Error(ErrorKind::argument, Place{.file = {}, .key = "sets"},
              fmt::format("no set has this name{}", did_you_mean(name, names)), name,
              names.empty() ? std::string("there are no sets")
                            : fmt::format("one of: {}", fmt::join(names, ", ")));
}

// For each set of `result` the number of its group: merges first, the untouched sets after them.
struct Regrouping {
  std::vector<std::string> names;
  std::vector<int> group_of_set;
  std::vector<std::vector<std::size_t>> sets_of_group;
};

Regrouping regroup(const SetsResult& result, std::span<const SetMerge> merges) {
  Regrouping r;
  r.group_of_set.assign(result.sets.size(), 0);
  const auto join = [&](std::size_t set) {
    if (r.group_of_set[set] != 0) {
      throw Error(ErrorKind::argument, Place{.file = {}, .key = "sets"}, "a set is used twice",
                  result.sets[set].name, "each set in one merge");
    }
    r.group_of_set[set] = static_cast<int>(r.names.size());
    r.sets_of_group.back().push_back(set);
  };
  const auto open = [&](const std::string& name) {
    if (std::find(r.names.begin(), r.names.end(), name) != r.names.end()) {
      throw Error(ErrorKind::argument, Place{.file = {}, .key = "sets"},
                  "two sets would have this name", name, "a name of its own for each set");
    }
    r.names.push_back(name);
    r.sets_of_group.emplace_back();
  };
  for (const SetMerge& merge : merges) {
    open(merge.name);
    for (const std::string& name : merge.of) join(set_named(result, name));
  }
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    if (r.group_of_set[k] != 0) continue;
    open(result.sets[k].name);
    join(k);
  }
  return r;
}

}  // namespace

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
    const auto known = numbers.find(name);
    if (known != numbers.end()) {
      assignment[i] = known->second;
      continue;
    }
    names.emplace_back(name);
    assignment[i] = static_cast<int>(names.size());
    numbers.emplace(name, assignment[i]);
  }
  SetsResult result = sets_by_membership(readings, assignment, names, options);
  detail::add_fits(result, readings, detail::whole_fits(result, readings, options));
  detail::complete(result, readings);
  return result;
}

SetsResult merge_sets(const Readings& readings, const SetsResult& result,
                      std::span<const SetMerge> merges, const FindSetsOptions& options) {
  const Regrouping groups = regroup(result, merges);
  std::vector<int> assignment;
  for (const int set : result.assignment) {
    assignment.push_back(set == 0 ? 0 : groups.group_of_set[static_cast<std::size_t>(set) - 1]);
  }
  SetsResult merged = sets_by_membership(readings, assignment, groups.names, options);
  std::vector<std::optional<FisherFitTests>> fits = detail::whole_fits(merged, readings, options);
  bool renamed_only = true;
  Mixture mixture{result.mixture ? result.mixture->uniform_weight : 1.0, {}};
  for (std::size_t k = 0; k < merged.sets.size(); ++k) {
    SetStatistics& s = merged.sets[k];
    const auto at = std::find(groups.names.begin(), groups.names.end(), s.name);
    const auto& parts = groups.sets_of_group[static_cast<std::size_t>(at - groups.names.begin())];
    renamed_only = renamed_only && parts.size() == 1;
    if (parts.size() != 1) continue;
    const std::string name = s.name;
    s = result.sets[parts.front()];
    s.name = name;
    fits[k] = s.fit_tests;
    if (result.mixture) mixture.components.push_back(result.mixture->components[parts.front()]);
  }
  detail::add_fits(merged, readings, fits);
  detail::complete(merged, readings);
  if (renamed_only && result.mixture) merged.mixture = mixture;
  merged.log_likelihood = result.log_likelihood;
  merged.bic = result.bic;
  merged.tried = result.tried;
  merged.runner_up = result.runner_up;
  merged.undecided = result.undecided;
  merged.warnings.insert(merged.warnings.begin(), result.warnings.begin(), result.warnings.end());
  return merged;
}

}  // namespace brink
