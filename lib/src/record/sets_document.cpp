#include "brink/record/sets_document.hpp"

#include <string>
#include <utility>

#include "brink/record/spacing_document.hpp"

namespace brink {

namespace {

Value angle_value(const std::optional<Angle>& angle) {
  return angle ? Value(angle->deg()) : Value();
}

Value word_value(const std::optional<double>& number) {
  return number ? number_or_word(*number) : Value();
}

Value interval_value(const std::optional<KappaInterval>& interval) {
  if (!interval) return nullptr;
  return Object{{"low", interval->low}, {"high", interval->high}};
}

Value fit_value(const std::optional<FisherFit>& fit) {
  if (!fit) return nullptr;
  return Object{{"test", fit->test}, {"statistic", fit->statistic}, {"p_value", fit->p_value}};
}

Value count_value(const CountTried& tried) {
  return Object{{"count", std::uint64_t{tried.count}}, {"bic", tried.bic}};
}

Value uniformity_value(const std::optional<TestResult>& test) {
  if (!test) return nullptr;
  return Object{{"test", "Bingham"}, {"statistic", test->statistic}, {"p_value", test->p_value}};
}

Value tests_value(const std::optional<FisherFitTests>& tests) {
  if (!tests) return nullptr;
  const auto one = [](const TestResult& test) {
    return Object{{"statistic", test.statistic}, {"p_value", test.p_value}};
  };
  return Object{{"colatitude", one(tests->colatitude)},
                {"longitude", one(tests->longitude)},
                {"two_variable", one(tests->two_variable)}};
}

Array comparisons_value(const SetsResult& result) {
  Array comparisons;
  for (const MeanComparison& c : result.comparisons) {
    comparisons.push_back(Object{{"sets", Array{result.sets[c.a].name, result.sets[c.b].name}},
                                 {"angle_deg", c.between.deg()},
                                 {"test", "Watson and Williams"},
                                 {"statistic", c.test.statistic},
                                 {"p_value", c.test.p_value}});
  }
  return comparisons;
}

Array centres_value(const FindSetsOptions& options) {
  Array centres;
  for (const Centre& centre : options.centres) {
    Object object{{"dip_deg", centre.plane.dip.deg()},
                  {"dip_direction_deg", centre.plane.dip_direction.deg()}};
    object.add("within_deg", angle_value(centre.within));
    centres.push_back(std::move(object));
  }
  return centres;
}

Array containment_value(const SetStatistics& set) {
  Array cones;
  for (const ContainmentCone& cone : set.containment) {
    cones.push_back(Object{{"share", cone.share}, {"half_angle_deg", cone.half_angle.deg()}});
  }
  return cones;
}

Object set_object(const SetStatistics& set) {
  Array eigenvalues;
  Array planes;
  for (std::size_t k = 0; k < 3; ++k) {
    eigenvalues.push_back(set.eigenvalues[k]);
    planes.push_back(plane_value(set.principal_planes[k]));
  }
  return Object{{"name", set.name},
                {"count", std::uint64_t{set.count}},
                {"weight", set.weight},
                {"effective_number", set.effective_number},
                {"mean", plane_value(set.mean)},
                {"resultant_length", set.resultant_length},
                {"fisher_k", word_value(set.fisher_k)},
                {"unbiased_k", word_value(set.unbiased_k)},
                {"k_interval", interval_value(set.k_interval)},
                {"confidence_cone_deg", angle_value(set.confidence_cone)},
                {"variability_cone_deg", angle_value(set.variability_cone)},
                {"containment", containment_value(set)},
                {"eigenvalues", std::move(eigenvalues)},
                {"principal_planes", std::move(planes)},
                {"woodcock_shape", word_value(set.woodcock_shape)},
                {"woodcock_strength", word_value(set.woodcock_strength)},
                {"fisher_fit", fit_value(set.fisher_fit)},
                {"fit_tests", tests_value(set.fit_tests)},
                {"pattern", set.pattern ? Value(name_of(*set.pattern)) : Value()},
                {"bootstrap_cone_deg", angle_value(set.bootstrap_cone)},
                {"shape", set.shape ? Value(name_of(*set.shape)) : Value()},
                {"stability", set.stability}};
}

}  // namespace

std::string_view name_of(Shape shape) {
  return shape == Shape::fisher ? "round" : "elliptical";
}

std::string_view name_of(Pattern pattern) {
  return pattern == Pattern::girdle ? "girdle" : "cluster";
}

Object sets_inputs(const FindSetsOptions& options) {
  Array shares;
  for (const double share : options.containment_shares) shares.push_back(share);
  return Object{{"count", options.count ? Value(std::uint64_t{*options.count}) : Value()},
                {"centres", centres_value(options)},
                {"least_share", options.least_share},
                {"least_size", std::uint64_t{options.least_size}},
                {"containment_shares", std::move(shares)},
                {"resamples", std::uint64_t{options.resamples}},
                {"seed", options.seed}};
}

Value set_value(const SetStatistics& set) {
  return set_object(set);
}

Value sets_result(const SetsResult& result, const JointLengths& lengths) {
  Array sets;
  for (std::size_t s = 0; s < result.sets.size(); ++s) {
    Object set = set_object(result.sets[s]);
    const Object measured = joint_lengths_of_set(lengths, s);
    for (const auto& [key, value] : measured.members()) set.add(key, value);
    sets.push_back(std::move(set));
  }
  Array assignment;
  for (const int set : result.assignment) assignment.push_back(set);
  Array tried;
  for (const CountTried& one : result.tried) tried.push_back(count_value(one));
  return Object{{"sets", std::move(sets)},
                {"unassigned", std::uint64_t{result.unassigned}},
                {"assignment", std::move(assignment)},
                {"log_likelihood", result.log_likelihood},
                {"bic", result.bic},
                {"counts_tried", std::move(tried)},
                {"undecided", result.undecided},
                {"runner_up", result.runner_up ? count_value(*result.runner_up) : Value()},
                {"uniformity", uniformity_value(result.uniformity)},
                {"mean_comparisons", comparisons_value(result)},
                {"traverses", traverse_frequencies(lengths.spacing)}};
}

Readings with_set_column(const Readings& readings, const SetsResult& result) {
  std::string heading = "set";
  for (int n = 1; readings.find_column(heading) != nullptr; ++n) {
    heading = n == 1 ? "found_set" : "found_set_" + std::to_string(n);
  }
  Readings marked = readings;
  ExtraColumn column{std::move(heading), {}};
  for (const int set : result.assignment) {
    column.cells.push_back(set == 0 ? std::string_view()
                                    : result.sets[static_cast<std::size_t>(set) - 1].name);
  }
  marked.extra.push_back(std::move(column));
  return marked;
}

}  // namespace brink
