#include "brink/record/sensitivity_document.hpp"

#include <cmath>

#include "brink/base/number.hpp"

namespace brink {

namespace {

Value safety_value(const std::optional<double>& safety) {
  return safety ? number_or_word(*safety) : Value();
}

Value curve_value(const SensitivityCurve& curve) {
  Array points;
  for (const SensitivityPoint& point : curve.points) {
    points.push_back(
        Object{{"value", point.value}, {"factor_of_safety", safety_value(point.factor_of_safety)}});
  }
  return Object{{"name", curve.name},
                {"unit", curve.unit},
                {"least", curve.least},
                {"greatest", curve.greatest},
                {"swing", curve.least ? Value(curve.swing()) : Value()},
                {"points", std::move(points)}};
}

std::string safety_cell(const std::optional<double>& safety) {
  if (!safety) return {};
  return std::isfinite(*safety) ? shortest(*safety) : "infinite";
}

}  // namespace

Value sensitivity_value(const std::vector<SensitivityCurve>& curves) {
  if (curves.empty()) return nullptr;
  Array list;
  Array ranked;
  for (const SensitivityCurve& curve : curves) list.push_back(curve_value(curve));
  for (const std::size_t i : rank_by_swing(curves)) ranked.push_back(curves[i].name);
  return Object{{"curves", std::move(list)}, {"ranked", std::move(ranked)}};
}

Value back_analysis_value(const BackAnalysis& analysis) {
  Array values;
  for (const Crossing& crossing : analysis.crossings) {
    values.push_back(
        Object{{"value", crossing.value}, {"rising", crossing.rising}, {"jump", crossing.jump}});
  }
  return Object{{"name", analysis.name},        {"unit", analysis.unit},
                {"target", analysis.target},    {"searched_from", analysis.low},
                {"searched_to", analysis.high}, {"values", std::move(values)}};
}

std::string sensitivity_csv(const std::vector<SensitivityCurve>& curves) {
  std::string text = "input,unit,value,factor_of_safety\n";
  for (const SensitivityCurve& curve : curves) {
    for (const SensitivityPoint& point : curve.points) {
      text += curve.name + ',' + curve.unit + ',' + shortest(point.value) + ',' +
              safety_cell(point.factor_of_safety) + '\n';
    }
  }
  return text;
}

}  // namespace brink
