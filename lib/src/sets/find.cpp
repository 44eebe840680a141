#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/ties.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/sets/sets.hpp"
#include "brink/sets/stability.hpp"
#include "complete.hpp"
#include "found_fit.hpp"
#include "search.hpp"

namespace brink {

namespace {

// Counts whose criterion is this close to the least are in question in a resample: exp(-5) is the
// odds of the worse one (Kass & Raftery 1995: "very strong" evidence).
constexpr double kInQuestion = 10.0;

[[noreturn]] void refuse(const char* key, std::string_view what, std::string_view accepted) {
  throw Error(ErrorKind::argument, Place{.file = {}, .key = key}, what, {}, accepted);
}

void check(const FindSetsOptions& options) {
  if (!(options.least_share >= 0.0 && options.least_share < 1.0)) {
    refuse("least share", "is out of its range", "0 up to below 1");
  }
  const auto reaching =
      static_cast<std::size_t>(std::count_if(options.centres.begin(), options.centres.end(),
                                             [](const Centre& c) { return c.within.has_value(); }));
  if (reaching != 0 && reaching != options.centres.size()) {
    refuse("centre", "some centres say how far they reach and some don't",
           "an angle for every centre, or for none");
  }
  if (!options.centres.empty() && options.count && *options.count != options.centres.size()) {
    refuse("count", "is not the number of centres", fmt::format("{}", options.centres.size()));
  }
}

// The components in the order in which the sets ended up.
Mixture reordered(const Mixture& mixture, const SetsResult& result,
                  const std::vector<int>& labels) {
  std::vector<int> component(result.sets.size(), 0);
  for (std::size_t i = 0; i < labels.size(); ++i) {
    if (result.assignment[i] == 0) continue;
    component[static_cast<std::size_t>(result.assignment[i]) - 1] = labels[i];
  }
  Mixture ordered{mixture.uniform_weight, {}};
  for (const int c : component) {
    ordered.components.push_back(mixture.components[static_cast<std::size_t>(c) - 1]);
  }
  return ordered;
}

void note_counts(SetsResult& result, const detail::SearchResult& search,
                 const std::optional<std::size_t>& count) {
  const detail::Candidate& best = search.best(count);
  result.log_likelihood = best.fit.log_likelihood;
  result.bic = best.criterion;
  const std::size_t chosen = best.fit.mixture.components.size();
  if (count) {
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

void warn(SetsResult& result, const std::optional<std::size_t>& count) {
  if (result.undecided) {
    result.warnings.push_back(fmt::format(
        "the number of sets is undecided: {} beats {} by {} in the criterion, and less than {} is "
        "no difference; look at both (--count {})",
        result.sets.size(), result.runner_up->count,
        std::round(10.0 * (result.runner_up->bic - *result.bic)) / 10.0, kDecided,
        result.runner_up->count));
  }
  if (count && result.sets.size() < *count) {
    result.warnings.push_back(fmt::format("{} sets were asked for, but the readings give only {}",
                                          *count, result.sets.size()));
  }
  for (const SetStatistics& s : result.sets) {
    if (!s.stability || *s.stability >= kDoubtfulBelow) continue;
    result.warnings.push_back(
        fmt::format("set {} is doubtful: it came back in {} of 100 resamples of the readings",
                    s.name, std::round(100.0 * *s.stability)));
  }
}

void warn_of_drift(SetsResult& result, const FindSetsOptions& options) {
  for (const Centre& centre : options.centres) {
    const Vector3 axis = upward_normal(centre.plane);
    const bool held =
        std::any_of(result.sets.begin(), result.sets.end(), [&](const SetStatistics& s) {
          return s.variability_cone &&
                 axis_angle(axis, upward_normal(s.mean)) <= *s.variability_cone;
        });
    if (held) continue;
    result.warnings.push_back(
        fmt::format("no set stayed near the centre {}/{}: the readings there belong elsewhere",
                    centre.plane.dip.deg(), centre.plane.dip_direction.deg()));
  }
}

void add_stability(SetsResult& result, const Readings& readings, const detail::SearchResult& search,
                   const FindSetsOptions& options) {
  if (options.resamples == 0 || result.sets.empty()) return;
  std::vector<Mixture> candidates;
  for (const auto& candidate : search.by_count) {
    if (candidate && candidate->criterion <= *result.bic + kInQuestion) {
      candidates.push_back(candidate->fit.mixture);
    }
  }
  std::vector<Angle> cones;
  for (const SetStatistics& s : result.sets) {
    cones.push_back(s.confidence_cone.value_or(Angle{}) + angle_tie());
  }
  const std::vector<double> shares =
      set_stability(readings, *result.mixture, cones, candidates, options.resamples, options.seed,
                    options.threads);
  for (std::size_t k = 0; k < shares.size(); ++k) result.sets[k].stability = shares[k];
}

detail::SearchResult search(const AxisSample& sample, const Readings& readings,
                            const FindSetsOptions& options) {
  detail::SearchOptions asked;
  asked.count = options.count;
  asked.least_weight = std::max(static_cast<double>(options.least_size),
                                options.least_share * static_cast<double>(readings.size())) *
                       sample.total_weight / static_cast<double>(readings.size());
  asked.seed = options.seed;
  asked.threads = options.threads;
  for (const Centre& centre : options.centres) {
    asked.centres.push_back(upward_normal(centre.plane));
  }
  asked.any_size = !asked.centres.empty();
  detail::SearchResult result = detail::search_mixture(sample, asked);
  if (!options.count ||
      result.best(options.count).fit.mixture.components.size() == *options.count) {
    return result;
  }
  // So many sets are only there if they may be tiny; the user wants them.
  asked.any_size = true;
  return detail::search_mixture(sample, asked);
}

SetsResult within_cones(const Readings& readings, const FindSetsOptions& options) {
  std::vector<int> assignment(readings.size(), 0);
  for (std::size_t i = 0; i < readings.size(); ++i) {
    Angle nearest = Angle::degrees(180.0);
    for (std::size_t k = 0; k < options.centres.size(); ++k) {
      const Angle away = axis_angle(readings.normals[i], upward_normal(options.centres[k].plane));
      if (!at_most(away, *options.centres[k].within) || !strictly_below(away, nearest)) continue;
      nearest = away;
      assignment[i] = static_cast<int>(k) + 1;
    }
  }
  SetsResult result = sets_by_membership(readings, assignment,
                                         detail::default_names(options.centres.size()), options);
  const std::vector<std::string> names = detail::default_names(result.sets.size());
  for (std::size_t k = 0; k < names.size(); ++k) result.sets[k].name = names[k];
  detail::complete(result, readings);
  warn(result, options.centres.size());
  return result;
}

}  // namespace

SetsResult find_sets(const Readings& readings, const FindSetsOptions& options) {
  check(options);
  if (!options.centres.empty() && options.centres.front().within) {
    return within_cones(readings, options);
  }
  const std::optional<std::size_t> count =
      options.centres.empty() ? options.count : std::optional(options.centres.size());
  const AxisSample sample = merge_equal_axes(readings.normals, readings.weights);
  const detail::SearchResult searched = search(sample, readings, options);
  const Mixture& mixture = searched.best(count).fit.mixture;
  const std::vector<int> by_axis = classify(mixture, sample);
  std::vector<int> labels;
  labels.reserve(readings.size());
  for (const std::size_t at : sample.merged) labels.push_back(by_axis[at]);
  SetsResult result = sets_by_membership(readings, labels,
                                         detail::default_names(mixture.components.size()), options);
  const std::vector<std::string> names = detail::default_names(result.sets.size());
  for (std::size_t k = 0; k < names.size(); ++k) result.sets[k].name = names[k];
  result.mixture = reordered(mixture, result, labels);
  for (std::size_t k = 0; k < names.size(); ++k) {
    result.sets[k].shape = result.mixture->components[k].shape;
  }
  detail::add_fits(result, readings,
                   detail::found_fits(*result.mixture, readings.normals, result.assignment,
                                      options.seed, options.threads));
  note_counts(result, searched, count);
  detail::complete(result, readings);
  add_stability(result, readings, searched, options);
  warn(result, count);
  warn_of_drift(result, options);
  return result;
}

}  // namespace brink
