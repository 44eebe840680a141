#include "brink/risk/sensitivity.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "brink/base/error.hpp"
#include "brink/risk/wedge_variation.hpp"

namespace brink {
namespace {

WedgeCase plain_wedge() {
  WedgeCase w;
  w.geometry.plane1 = {45_deg, 105_deg};
  w.geometry.plane2 = {70_deg, 235_deg};
  w.geometry.face = {65_deg, 185_deg};
  w.geometry.size.value = 20;
  w.unit_weight_kN_m3 = 26;
  w.strength1 = w.strength2 = MohrCoulomb{10, 30_deg};
  return w;
}

SensitivityCurve curve(const WedgeCase& w, const char* name, double from, double to) {
  return sensitivity_curve(varied_wedge(w, wedge_variable(name)), {from, to, 11});
}

TEST(Sensitivity, CurvesRunTheWayTheyMust) {
  const WedgeCase w = plain_wedge();
  for (const auto& [name, from, to, rises] :
       std::vector<std::tuple<const char*, double, double, bool>>{{"friction", 10, 50, true},
                                                                  {"cohesion", 0, 50, true},
                                                                  {"water-fill", 0, 1, false},
                                                                  {"height", 5, 50, false},
                                                                  {"seismic", 0, 0.3, false},
                                                                  {"surcharge", 0, 50, false}}) {
    const SensitivityCurve c = curve(w, name, from, to);
    ASSERT_EQ(c.points.size(), 11U);
    EXPECT_EQ(c.points.front().value, from);
    EXPECT_EQ(c.points.back().value, to);
    for (std::size_t i = 1; i < c.points.size(); ++i) {
      const double step = *c.points[i].factor_of_safety - *c.points[i - 1].factor_of_safety;
      EXPECT_GT(rises ? step : -step, 0) << name << ' ' << i;
    }
    EXPECT_NEAR(c.swing(), std::abs(*c.points[0].factor_of_safety - *c.points[10].factor_of_safety),
                1e-12);
  }
}

TEST(Sensitivity, RanksBySwing) {
  const WedgeCase w = plain_wedge();
  const std::vector<SensitivityCurve> curves{
      curve(w, "cohesion", 9, 11), curve(w, "friction", 20, 40), curve(w, "water-fill", 0, 0.1)};
  EXPECT_EQ(rank_by_swing(curves).front(), 1U);
}

TEST(Sensitivity, BackAnalysisGivesTheValueThatWentIn) {
  const WedgeCase w = plain_wedge();
  const double target = analyse_wedge(w).factor_of_safety;
  for (const auto& [name, value] : std::vector<std::pair<const char*, double>>{
           {"friction", 30}, {"cohesion", 10}, {"height", 20}, {"face-dip", 65}}) {
    const WedgeVariable& v = wedge_variable(name);
    const auto crossings =
        find_crossings(varied_wedge(w, v).safety, target, v.solve_low, v.solve_high, v.by_ratio);
    bool found = false;
    for (const Crossing& c : crossings) found = found || std::abs(c.value - value) < 1e-8 * value;
    EXPECT_TRUE(found) << name;
  }
}

TEST(Sensitivity, CrossingsAndJumps) {
  const auto wave = [](double x) -> std::optional<double> { return 1.0 + std::sin(x); };
  const auto crossings = find_crossings(wave, 1.0, 1.0, 10.0);
  ASSERT_EQ(crossings.size(), 3U);
  EXPECT_NEAR(crossings[0].value, M_PI, 1e-10);
  EXPECT_FALSE(crossings[0].rising);
  EXPECT_TRUE(crossings[1].rising);
  EXPECT_FALSE(crossings[1].jump);
  const auto leap = [](double x) -> std::optional<double> { return x < 3 ? 2.0 : 0.0; };
  const auto jumps = find_crossings(leap, 1.0, 0.0, 10.0);
  ASSERT_EQ(jumps.size(), 1U);
  EXPECT_TRUE(jumps[0].jump);
  EXPECT_NEAR(jumps[0].value, 3, 1e-10);
  EXPECT_LT(jumps[0].value, 3);
  EXPECT_TRUE(find_crossings(wave, 5.0, 0.0, 10.0).empty());
}

TEST(Sensitivity, SaysWhatCannotVary) {
  const WedgeCase w = plain_wedge();
  EXPECT_THROW(wedge_variable("frictoin"), Error);
  EXPECT_THROW(varied_wedge(w, wedge_variable("bolt-force")), Error);
  WedgeCase curved = w;
  curved.strength1 = BartonBandis{25_deg, 6, 30000};
  EXPECT_THROW(varied_wedge(curved, wedge_variable("friction")), Error);
  EXPECT_THROW(sensitivity_curve(varied_wedge(w, wedge_variable("height")), {1, 2, 1}), Error);
}

TEST(Sensitivity, BoltForceKeepsTheShares) {
  WedgeCase w = plain_wedge();
  w.bolts = {{100, {5_deg, 0_deg}}, {300, {350_deg, 10_deg}}};
  const WedgeCase changed = wedge_variable("bolt-force").apply(w, 800);
  EXPECT_NEAR(changed.bolts[0].force_kN, 200, 1e-12);
  EXPECT_NEAR(changed.bolts[1].force_kN, 600, 1e-12);
}

}  // namespace
}  // namespace brink
