#include "brink/mechanics/wedge_support.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <random>

#include "brink/base/error.hpp"
#include "reference/wedge_twin.hpp"

namespace brink {
namespace {

Vector3 random_direction(std::mt19937_64& draw) {
  std::normal_distribution<double> part;
  return Vector3(part(draw), part(draw), part(draw)).normalized();
}

double safety_with(WedgeCase w, double force_kN, const Line& towards) {
  w.bolts.push_back({force_kN, towards});
  return analyse_wedge(w).factor_of_safety;
}

bool allowed(const Vector3& b, const WedgeCase& w, const WedgeTarget& target) {
  const double plunge = -asin(b.z()).deg();
  return b.dot(outward_normal(w.geometry.face)) <= 0 && plunge >= target.least_plunge.deg() &&
         plunge <= target.greatest_plunge.deg();
}

// A case that forms, falls short of the target and is not absurd.
WedgeCase short_case(reference::RandomWedges& draw, double target) {
  for (;;) {
    WedgeCase w = draw.next();
    w.geometry.size.measure = WedgeMeasure::height;
    w.bolts.clear();
    const WedgeResult r = analyse_wedge(w);
    if (!r.forms || r.block.total_height_m > 200 || r.weight_kN < 10) continue;
    if (r.factor_of_safety < target - 1e-6) return w;
  }
}

// The bolt found reaches the target, and no weaker one does: a fine search over directions of the
// sphere (random, and close about the one found) and over forces from none to just below it, by the
// full analysis.
TEST(WedgeSupport, NoWeakerBoltReachesTheTarget) {
  reference::RandomWedges draw(31);
  std::mt19937_64 random(32);
  int active = 0, passive = 0, limited = 0, lifted = 0, none = 0;
  for (int i = 0; i < 120; ++i) {
    WedgeTarget target{draw.number(1.0, 2.0)};
    if (draw.chance(0.5)) {
      target.least_plunge = draw.degrees(-30, 10);
      target.greatest_plunge = target.least_plunge + draw.degrees(5, 60);
    }
    const WedgeCase w = short_case(draw, target.factor_of_safety);
    const WedgeResult r = analyse_wedge(w);
    const WedgeSupport support = support_wedge(w, r, target);
    const double reach = support.least ? support.least->force_kN : 20 * r.weight_kN;
    if (support.least) {
      ASSERT_TRUE(support.least->direction);
      const Line way = *support.least->direction;
      EXPECT_TRUE(allowed(direction(way) * (1 - 1e-9), w, target) ||
                  direction(way).dot(outward_normal(w.geometry.face)) < 1e-9);
      EXPECT_GE(safety_with(w, reach * (1 + 1e-8), way), target.factor_of_safety - 1e-6) << i;
      (w.bolt_action == BoltAction::active ? active : passive)++;
      limited += target.least_plunge.deg() > -90;
      lifted += r.contact.mode == WedgeMode::lifts;
    } else {
      ++none;
    }
    for (int k = 0; k < 400; ++k) {
      Vector3 b = random_direction(random);
      if (support.least && k % 2 == 0) {
        b = (direction(*support.least->direction) + std::pow(10.0, -k % 5) * b).normalized();
      }
      if (!allowed(b, w, target)) continue;
      for (const double part : {0.02, 0.1, 0.25, 0.5, 0.75, 0.9, 0.97, 0.999}) {
        ASSERT_LT(safety_with(w, part * reach, line_with_sense(b)), target.factor_of_safety)
            << i << ' ' << part << ' ' << to_string(w.bolt_action);
      }
    }
  }
  EXPECT_GT(active, 25);
  EXPECT_GT(passive, 25);
  EXPECT_GT(limited, 25);
  EXPECT_GT(lifted, 1);
  EXPECT_GT(none, 1);
}

TEST(WedgeSupport, FixedDirection) {
  reference::RandomWedges draw(33);
  int reached = 0;
  for (int i = 0; i < 300; ++i) {
    const double safety = draw.number(1.0, 1.8);
    const WedgeCase w = short_case(draw, safety);
    const WedgeResult r = analyse_wedge(w);
    WedgeTarget target{safety};
    target.direction = Line{draw.degrees(0, 360), draw.degrees(-90, 90)};
    const WedgeSupport support = support_wedge(w, r, target);
    const double reach = support.along_direction_kN.value_or(20 * r.weight_kN);
    if (support.along_direction_kN) {
      EXPECT_GE(safety_with(w, reach * (1 + 1e-8), *target.direction), safety - 1e-6) << i;
      ++reached;
    }
    for (int k = 0; k < 500; ++k) {
      ASSERT_LT(safety_with(w, 0.002 * k * reach, *target.direction), safety) << i << ' ' << k;
    }
  }
  EXPECT_GT(reached, 50);
}

// Wyllie & Mah, Rock Slope Engineering, 4th ed. 2004, ch. 6: for a plane an active bolt works best
// at atan(tan phi / FS) - dip below horizontal. A wedge that slides on one plane is such a plane.
TEST(WedgeSupport, OnOnePlaneTheBestPlungeIsThePlanes) {
  WedgeCase w;
  w.geometry.plane1 = {40_deg, 175_deg};
  w.geometry.plane2 = {90_deg, 65_deg};
  w.geometry.face = {70_deg, 180_deg};
  w.geometry.size.value = 10;
  w.unit_weight_kN_m3 = 26;
  w.strength1 = w.strength2 = MohrCoulomb{0, 30_deg};
  const WedgeResult r = analyse_wedge(w);
  ASSERT_EQ(r.contact.mode, WedgeMode::plane1);
  const WedgeSupport active = support_wedge(w, r, {1.2});
  ASSERT_TRUE(active.least && active.least->direction);
  EXPECT_NEAR(active.least->direction->plunge.deg(), std::atan(tan(30_deg) / 1.2) * 180 / M_PI - 40,
              1e-9);
  EXPECT_NEAR(active.least->direction->trend.deg(), 355, 1e-9);
  w.bolt_action = BoltAction::passive;
  const WedgeSupport passive = support_wedge(w, r, {1.2});
  ASSERT_TRUE(passive.least && passive.least->direction);
  EXPECT_NEAR(passive.least->direction->plunge.deg(), 30 - 40, 1e-9);
}

TEST(WedgeSupport, CurvedStrengthSettles) {
  WedgeCase w;
  w.geometry.plane1 = {45_deg, 105_deg};
  w.geometry.plane2 = {70_deg, 235_deg};
  w.geometry.face = {65_deg, 185_deg};
  w.geometry.size.value = 30;
  w.unit_weight_kN_m3 = 26;
  w.strength1 = BartonBandis{25_deg, 6, 30000};
  w.strength2 = BilinearPatton{28_deg, 8_deg, 150};
  const WedgeResult r = analyse_wedge(w);
  const double target = r.factor_of_safety + 0.3;
  const WedgeSupport support = support_wedge(w, r, {target});
  ASSERT_TRUE(support.least && support.least->direction);
  EXPECT_NEAR(safety_with(w, support.least->force_kN, *support.least->direction), target, 1e-6);
}

TEST(WedgeSupport, TargetReachedAlreadyAndBadTargets) {
  WedgeCase w;
  w.geometry.plane1 = {45_deg, 105_deg};
  w.geometry.plane2 = {70_deg, 235_deg};
  w.geometry.face = {65_deg, 185_deg};
  w.geometry.size.value = 10;
  w.unit_weight_kN_m3 = 26;
  w.strength1 = w.strength2 = MohrCoulomb{0, 40_deg};
  const WedgeResult r = analyse_wedge(w);
  const WedgeSupport support = support_wedge(w, r, {0.9 * r.factor_of_safety});
  ASSERT_TRUE(support.least);
  EXPECT_EQ(support.least->force_kN, 0);
  EXPECT_FALSE(support.least->direction);
  EXPECT_THROW(support_wedge(w, r, {0}), Error);
  EXPECT_THROW(support_wedge(w, r, {1.5, 20_deg, 10_deg}), Error);
}

// A surcharge on a dry, cohesive block on both planes lowers its factor of safety; it weighs as
// much as its pressure on the ground in plan.
TEST(WedgeSurcharge, WeighsOnTheBlock) {
  WedgeCase w;
  w.geometry.plane1 = {45_deg, 135_deg};
  w.geometry.plane2 = {45_deg, 225_deg};
  w.geometry.face = {90_deg, 180_deg};
  w.geometry.size.value = 10;
  w.unit_weight_kN_m3 = 26;
  w.strength1 = w.strength2 = MohrCoulomb{20, 30_deg};
  const double before = analyse_wedge(w).factor_of_safety;
  w.surcharge_kPa = 15;
  const WedgeResult r = analyse_wedge(w);
  EXPECT_NEAR(r.surcharge_kN, 15 * 200, 1e-9);
  EXPECT_LT(r.factor_of_safety, before);
  WedgeCase loaded = w;
  loaded.surcharge_kPa = 0;
  loaded.loads.push_back({15 * 200, {0_deg, 90_deg}});
  EXPECT_NEAR(analyse_wedge(loaded).factor_of_safety, r.factor_of_safety, 1e-12);
}

}  // namespace
}  // namespace brink
