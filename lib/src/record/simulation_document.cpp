#include "brink/record/simulation_document.hpp"

#include <cmath>

#include "brink/base/number.hpp"

namespace brink {

namespace {

Value written(const std::optional<Distribution>& distribution) {
  return distribution ? Value(to_string(*distribution)) : Value();
}

Value drawn_plane_value(const DrawnPlane& plane) {
  if (!plane.readings.empty()) return Object{{"readings", std::uint64_t{plane.readings.size()}}};
  if (plane.fisher_k) return Object{{"fisher_k", *plane.fisher_k}};
  return nullptr;
}

Value share_value(const std::optional<Share>& share) {
  if (!share) return nullptr;
  return Object{{"value", share->value}, {"standard_error", share->standard_error}};
}

Value quantiles_value(const SimulationResult& r) {
  Array list;
  for (const SafetyQuantile& q : r.quantiles) {
    list.push_back(
        Object{{"share", q.share}, {"factor_of_safety", number_or_word(q.factor_of_safety)}});
  }
  return list;
}

Value histogram_value(const SimulationResult& r) {
  Array list;
  for (const SafetyBin& bin : r.histogram) {
    list.push_back(Object{{"from", bin.from},
                          {"to", number_or_word(bin.to)},
                          {"count", bin.count},
                          {"cumulative", bin.cumulative}});
  }
  return list;
}

}  // namespace

Value simulation_inputs(const WedgeSimulation& s) {
  return Object{
      {"draws", s.draws},
      {"seed", s.seed},
      {"sampling", s.sampling == Sampling::plain ? "plain" : "latin-hypercube"},
      {"plane1", drawn_plane_value(s.plane1)},
      {"plane2", drawn_plane_value(s.plane2)},
      {"friction1_deg", written(s.friction1)},
      {"friction2_deg", written(s.friction2)},
      {"cohesion1_kPa", written(s.cohesion1)},
      {"cohesion2_kPa", written(s.cohesion2)},
      {"water_fill", written(s.water_fill)},
      {"seismic_horizontal", written(s.seismic)},
      {"correlation", s.correlation},
      {"until_error", s.until_error},
  };
}

Value simulation_value(const SimulationResult& r, bool has_target) {
  const auto if_target = [&](const std::optional<Share>& share) {
    return has_target ? share_value(share) : Value();
  };
  return Object{
      {"draws", r.draws},
      {"formed", r.formed},
      {"stopped_early", r.stopped_early},
      {"forms", share_value(r.forms)},
      {"below_one", share_value(r.below_one)},
      {"below_target", if_target(r.below_target)},
      {"fails", share_value(r.fails)},
      {"misses_target", if_target(r.misses_target)},
      {"modes",
       Object{{"both", r.both}, {"plane1", r.plane1}, {"plane2", r.plane2}, {"lifts", r.lifts}}},
      {"mean_factor_of_safety", r.mean},
      {"quantiles", quantiles_value(r)},
      {"histogram", histogram_value(r)}};
}

std::string histogram_csv(const SimulationResult& r) {
  std::string text = "from,to,count,cumulative\n";
  for (const SafetyBin& bin : r.histogram) {
    text += shortest(bin.from) + ',' + (std::isfinite(bin.to) ? shortest(bin.to) : "infinite") +
            ',' + std::to_string(bin.count) + ',' + shortest(bin.cumulative) + '\n';
  }
  return text;
}

}  // namespace brink
