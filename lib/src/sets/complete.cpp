#include "complete.hpp"

#include <fmt/format.h>

#include "brink/orientation/intersection.hpp"
#include "brink/sphere/bootstrap.hpp"

namespace brink::detail {

namespace {

// Below this many readings a set is named in a warning: its mean and kappa mean little.
constexpr std::size_t kFewReadings = 5;

void add_comparisons(SetsResult& result, const Readings& readings) {
  std::vector<Resultant> samples;
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    const Members m = members_of(readings, result, k);
    samples.push_back(axial_resultant(m.axes, m.weights));
  }
  for (std::size_t a = 0; a < samples.size(); ++a) {
    for (std::size_t b = a + 1; b < samples.size(); ++b) {
      const std::vector<Resultant> pair{samples[a], samples[b]};
      const auto common = common_mean_axial(pair);
      if (!common) continue;
      result.comparisons.push_back(
          {a, b, axis_angle(samples[a].mean, samples[b].mean), common->test});
    }
  }
}

void warn_of_small_sets(SetsResult& result) {
  for (const SetStatistics& s : result.sets) {
    if (s.count >= kFewReadings) continue;
    result.warnings.push_back(
        fmt::format("set {} has {} reading{}: too few for its mean and scatter to mean much",
                    s.name, s.count, s.count == 1 ? "" : "s"));
  }
}

}  // namespace

std::vector<std::string> default_names(std::size_t count) {
  std::vector<std::string> names;
  for (std::size_t k = 1; k <= count; ++k) {
    names.push_back(std::string("J").append(std::to_string(k)));
  }
  return names;
}

Members members_of(const Readings& readings, const SetsResult& result, std::size_t k) {
  Members members;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (result.assignment[i] != static_cast<int>(k) + 1) continue;
    members.axes.push_back(readings.normals[i]);
    members.weights.push_back(readings.weights[i]);
  }
  return members;
}

void add_fits(SetsResult& result, const Readings& readings,
              const std::vector<std::optional<FisherFitTests>>& fits) {
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    SetStatistics& s = result.sets[k];
    if (!fits[k]) continue;
    s.fit_tests = fits[k];
    s.fisher_fit = fits[k]->verdict;
    if (s.fisher_fit->p_value >= kFitFails) continue;
    s.pattern = s.woodcock_shape.value_or(1.0) < 1.0 ? Pattern::girdle : Pattern::cluster;
    const Members m = members_of(readings, result, k);
    s.bootstrap_cone = bootstrap_cone(m.axes, m.weights);
  }
}

std::vector<std::optional<FisherFitTests>> whole_fits(const SetsResult& result,
                                                      const Readings& readings,
                                                      const FindSetsOptions& options) {
  std::vector<std::optional<FisherFitTests>> fits;
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    fits.push_back(
        fisher_fit_axes(members_of(readings, result, k).axes, options.seed, options.threads));
  }
  return fits;
}

void complete(SetsResult& result, const Readings& readings) {
  if (readings.size() == 0) return;
  const double effective = vector_resultant(readings.normals, readings.weights).count;
  const OrientationTensor tensor = orientation_tensor(readings.normals, readings.weights);
  result.uniformity = bingham_uniformity(tensor, effective);
  add_comparisons(result, readings);
  warn_of_small_sets(result);
}

}  // namespace brink::detail
