#include "brink/record/set_names.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "brink/base/error.hpp"
#include "brink/base/ties.hpp"
#include "brink/orientation/intersection.hpp"

namespace brink {

namespace {

using Matches = std::vector<std::optional<std::size_t>>;

struct Candidate {
  Angle apart;
  std::size_t known;
  std::size_t set;
};

Matches match_by_name(const SetsResult& sets, const SiteSets& site_sets) {
  Matches matches(sets.sets.size());
  for (std::size_t s = 0; s < sets.sets.size(); ++s) {
    for (std::size_t k = 0; k < site_sets.known.size(); ++k) {
      if (site_sets.known[k].name == sets.sets[s].name) matches[s] = k;
    }
  }
  return matches;
}

// Nearest pairs first; equal angles by the order in the site file, then by weight.
std::vector<Candidate> candidates(const SetsResult& sets, const SiteSets& site_sets) {
  std::vector<Candidate> result;
  for (std::size_t k = 0; k < site_sets.known.size(); ++k) {
    if (!site_sets.known[k].near) continue;
    const Vector3 near = upward_normal(*site_sets.known[k].near);
    for (std::size_t s = 0; s < sets.sets.size(); ++s) {
      const Angle apart = axis_angle(near, upward_normal(sets.sets[s].mean));
      if (at_most(apart, kFarthestNamed)) result.push_back({apart, k, s});
    }
  }
  std::stable_sort(result.begin(), result.end(),
                   [](const Candidate& a, const Candidate& b) { return a.apart < b.apart; });
  return result;
}

Matches match_by_orientation(const SetsResult& sets, const SiteSets& site_sets) {
  Matches matches(sets.sets.size());
  std::vector<bool> taken(site_sets.known.size(), false);
  for (const Candidate& candidate : candidates(sets, site_sets)) {
    if (taken[candidate.known] || matches[candidate.set]) continue;
    taken[candidate.known] = true;
    matches[candidate.set] = candidate.known;
  }
  return matches;
}

void number_the_others(SetsResult& sets, const Matches& matches, const SiteSets& site_sets) {
  const auto in_use = [&](const std::string& name) {
    return std::any_of(site_sets.known.begin(), site_sets.known.end(),
                       [&](const SiteSet& known) { return known.name == name; });
  };
  std::size_t number = 1;
  for (std::size_t s = 0; s < matches.size(); ++s) {
    if (matches[s]) {
      sets.sets[s].name = site_sets.known[*matches[s]].name;
      continue;
    }
    while (in_use(fmt::format("J{}", number))) ++number;
    sets.sets[s].name = fmt::format("J{}", number++);
  }
}

}  // namespace

std::vector<std::optional<std::size_t>> name_sets(SetsResult& sets, const SiteSets& site_sets) {
  const bool by_column = site_sets.column.has_value();
  Matches matches =
      by_column ? match_by_name(sets, site_sets) : match_by_orientation(sets, site_sets);
  if (!by_column) number_the_others(sets, matches, site_sets);
  for (std::size_t k = 0; k < site_sets.known.size(); ++k) {
    if (std::find(matches.begin(), matches.end(), std::optional(k)) != matches.end()) continue;
    const SiteSet& known = site_sets.known[k];
    sets.warnings.push_back(
        by_column
            ? fmt::format("set '{}' of the site file (line {}) is not in column '{}'", known.name,
                          known.line, *site_sets.column)
            : fmt::format("set '{}' of the site file (line {}) lies more than {:.0f} degrees from "
                          "every set found that is not nearer to another",
                          known.name, known.line, kFarthestNamed.deg()));
  }
  return matches;
}

NamedSets sets_of_site(const Site& site, const Readings& readings, FindSetsOptions options) {
  NamedSets result;
  if (site.sets.column) {
    if (readings.find_column(*site.sets.column) == nullptr) {
      throw Error(ErrorKind::input, Place{.file = site.source.name, .key = "sets.column"},
                  "is not a column of the readings", *site.sets.column,
                  "the heading of a column that names the set of each reading");
    }
    result.sets = sets_by_column(readings, *site.sets.column, options);
  } else {
    if (site.sets.count) options.count = site.sets.count;
    result.sets = find_sets(readings, options);
  }
  result.known = name_sets(result.sets, site.sets);
  return result;
}

}  // namespace brink
