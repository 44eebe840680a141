#include <algorithm>
#include <cassert>
#include <cmath>
#include <numeric>

#include "brink/sets/sets.hpp"
#include "brink/sphere/tensor.hpp"

namespace brink {

namespace {

// One standard deviation of a normal distribution, as the variability cone is defined.
constexpr double kVariabilityShare = 0.6827;

std::optional<Angle> cone_for(const std::optional<double>& kappa, double share) {
  if (!kappa) return std::nullopt;
  if (std::isinf(*kappa)) return Angle{};
  return containment_cone(*kappa, share);
}

// Sets by number, in the order in which their first readings stand.
struct Group {
  int number = 0;
  double weight = 0.0;
  std::size_t first = 0;
  std::vector<std::size_t> members;
};

std::vector<Group> groups_of(std::span<const int> assignment, std::span<const double> weights,
                             std::size_t names) {
  std::vector<Group> groups(names);
  for (std::size_t k = 0; k < names; ++k) groups[k].number = static_cast<int>(k) + 1;
  for (std::size_t i = 0; i < assignment.size(); ++i) {
    if (assignment[i] == 0) continue;
    Group& g = groups[static_cast<std::size_t>(assignment[i]) - 1];
    if (g.members.empty()) g.first = i;
    g.members.push_back(i);
    g.weight += weights[i];
  }
  std::erase_if(groups, [](const Group& g) { return g.members.empty(); });
  std::sort(groups.begin(), groups.end(), [](const Group& a, const Group& b) {
    return a.weight != b.weight ? a.weight > b.weight : a.first < b.first;
  });
  return groups;
}

}  // namespace

SetStatistics describe_set(std::string name, std::span<const Vector3> axes,
                           std::span<const double> weights,
                           std::span<const double> containment_shares) {
  assert(!axes.empty());
  SetStatistics s;
  s.name = std::move(name);
  s.count = axes.size();
  s.weight = weights.empty() ? static_cast<double>(axes.size())
                             : std::accumulate(weights.begin(), weights.end(), 0.0);
  const Resultant sample = axial_resultant(axes, weights);
  s.effective_number = sample.count;
  s.mean = plane_of_normal(sample.mean);
  s.resultant_length = sample.length;
  s.fisher_k = kappa_fisher(sample);
  s.unbiased_k = kappa_unbiased(sample);
  s.k_interval = kappa_interval(sample);
  s.confidence_cone = confidence_cone(sample);
  s.variability_cone = cone_for(s.fisher_k, kVariabilityShare);
  for (const double share : containment_shares) {
    if (const auto cone = cone_for(s.fisher_k, share)) s.containment.push_back({share, *cone});
  }
  const OrientationTensor tensor = orientation_tensor(axes, weights);
  s.eigenvalues = tensor.eigenvalues;
  for (std::size_t k = 0; k < 3; ++k) s.principal_planes[k] = plane_of_normal(tensor.axes[k]);
  s.woodcock_shape = woodcock_shape(tensor.eigenvalues);
  s.woodcock_strength = woodcock_strength(tensor.eigenvalues);
  return s;
}

SetsResult sets_by_membership(const Readings& readings, std::span<const int> assignment,
                              std::span<const std::string> names, const FindSetsOptions& options) {
  assert(assignment.size() == readings.size());
  SetsResult result;
  result.assignment.assign(readings.size(), 0);
  for (const Group& group : groups_of(assignment, readings.weights, names.size())) {
    std::vector<Vector3> axes;
    std::vector<double> weights;
    const int place = static_cast<int>(result.sets.size()) + 1;
    for (const std::size_t i : group.members) {
      axes.push_back(readings.normals[i]);
      weights.push_back(readings.weights[i]);
      result.assignment[i] = place;
    }
    const std::string& name = names[static_cast<std::size_t>(group.number) - 1];
    result.sets.push_back(describe_set(name, axes, weights, options.containment_shares));
  }
  result.unassigned =
      static_cast<std::size_t>(std::count(result.assignment.begin(), result.assignment.end(), 0));
  return result;
}

}  // namespace brink
