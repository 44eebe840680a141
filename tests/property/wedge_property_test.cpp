#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "brink/orientation/intersection.hpp"
#include "reference/wedge_twin.hpp"

namespace brink {
namespace {

// Calls check(case, result) on `count` random wedges that form.
template <typename Check>
void on_random_wedges(unsigned seed, int count, bool crack, const Check& check) {
  reference::RandomWedges draw(seed);
  for (int done = 0; done < count;) {
    WedgeCase w = draw.next();
    w.geometry.size.measure = WedgeMeasure::height;
    if (!crack) w.geometry.crack.reset();
    const WedgeResult r = analyse_wedge(w);
    if (!r.forms || !std::isfinite(r.factor_of_safety) || r.block.total_height_m > 300) continue;
    check(w, r);
    ++done;
  }
}

void turn(Angle& azimuth, Angle by) {
  azimuth = wrap_360(azimuth + by);
}

TEST(WedgeProperty, TurningEverythingChangesNothing) {
  on_random_wedges(21, 500, true, [](WedgeCase w, const WedgeResult& r) {
    const Angle by = Angle::degrees(73);
    turn(w.geometry.plane1.dip_direction, by);
    turn(w.geometry.plane2.dip_direction, by);
    turn(w.geometry.face.dip_direction, by);
    turn(w.geometry.upper.dip_direction, by);
    if (w.geometry.crack) turn(w.geometry.crack->plane.dip_direction, by);
    if (w.seismic.trend) turn(*w.seismic.trend, by);
    for (auto* forces : {&w.loads, &w.bolts}) {
      for (DirectedForce& f : *forces) turn(f.towards.trend, by);
    }
    const WedgeResult turned = analyse_wedge(w);
    EXPECT_EQ(turned.contact.mode, r.contact.mode);
    EXPECT_NEAR(turned.factor_of_safety, r.factor_of_safety,
                1e-9 * std::max(1.0, r.factor_of_safety));
    EXPECT_NEAR(turned.block.volume_m3, r.block.volume_m3, 1e-9 * r.block.volume_m3);
  });
}

TEST(WedgeProperty, SwappingThePlanesChangesNothing) {
  on_random_wedges(22, 500, false, [](WedgeCase w, const WedgeResult& r) {
    std::swap(w.geometry.plane1, w.geometry.plane2);
    std::swap(w.strength1, w.strength2);
    if (auto* u = std::get_if<WaterPressures>(&w.water)) std::swap(u->plane1_kPa, u->plane2_kPa);
    const WedgeResult swapped = analyse_wedge(w);
    EXPECT_NEAR(swapped.factor_of_safety, r.factor_of_safety,
                1e-9 * std::max(1.0, r.factor_of_safety));
    EXPECT_NEAR(swapped.contact.normal1_kN, r.contact.normal2_kN, 1e-9 * r.weight_kN);
  });
}

TEST(WedgeProperty, SizeDoesNotMatterWithoutCohesionAndOutsideForces) {
  on_random_wedges(23, 500, true, [](WedgeCase w, const WedgeResult&) {
    reference::drop_cohesion(w);
    w.loads.clear();
    w.bolts.clear();
    w.water = WaterFill{0.4};
    const WedgeResult small = analyse_wedge(w);
    w.geometry.size.value *= 7;
    if (w.geometry.crack) w.geometry.crack->distance_m *= 7;
    const WedgeResult large = analyse_wedge(w);
    EXPECT_NEAR(large.factor_of_safety, small.factor_of_safety,
                1e-9 * std::max(1.0, small.factor_of_safety));
    EXPECT_NEAR(large.block.volume_m3, 343 * small.block.volume_m3, 1e-9 * large.block.volume_m3);
  });
}

// Draining never lowers the factor of safety of a block that rests on both planes. (Sliding on one
// plane alone is another matter: water on the open plane may press the block onto the other.)
TEST(WedgeProperty, DrainingHelpsABlockOnBothPlanes) {
  int compared = 0;
  on_random_wedges(24, 1500, false, [&](WedgeCase w, const WedgeResult&) {
    w.loads.clear();
    w.bolts.clear();
    w.seismic.vertical = 0;
    double before = 0;
    for (const double fill : {1.0, 0.75, 0.5, 0.25, 0.0}) {
      w.water = WaterFill{fill};
      const WedgeResult r = analyse_wedge(w);
      if (r.contact.mode != WedgeMode::both) continue;
      EXPECT_GE(r.factor_of_safety, before - 1e-9 * std::max(1.0, before)) << fill;
      before = r.factor_of_safety;
      ++compared;
    }
  });
  EXPECT_GT(compared, 1000);
}

bool between(Angle x, Angle from, Angle to) {
  const double whole = azimuth_difference(from, to).deg();
  return azimuth_difference(x, from).deg() + azimuth_difference(x, to).deg() <= whole + 1e-9;
}

// Hocking 1976 (Int. J. Rock Mech. Min. Sci. 13:225): the wedge slides on both planes unless the
// dip direction of one lies between the line's trend and the face's dip direction; then on that
// plane alone. Where both lie between, the block lies below one of them and the rule is silent.
TEST(WedgeProperty, HockingsRuleUnderGravityAlone) {
  reference::RandomWedges draw(25);
  int applied = 0, alone = 0;
  while (applied < 2000) {
    WedgeCase w = draw.next();
    w.geometry.crack.reset();
    w.geometry.upper = kLevelGround;
    w.geometry.face.dip = draw.degrees(30, 89);
    w.geometry.size = {WedgeMeasure::height, 10};
    w.water = WaterFill{0};
    w.seismic = {};
    w.loads.clear();
    w.bolts.clear();
    const WedgeResult r = analyse_wedge(w);
    if (!r.forms) continue;
    const Angle face = w.geometry.face.dip_direction;
    const bool in1 = between(w.geometry.plane1.dip_direction, r.line->trend, face);
    const bool in2 = between(w.geometry.plane2.dip_direction, r.line->trend, face);
    if (in1 && in2) continue;
    const WedgeMode rule = in1 ? WedgeMode::plane1 : in2 ? WedgeMode::plane2 : WedgeMode::both;
    ASSERT_EQ(r.contact.mode, rule) << applied;
    ++applied;
    alone += in1 || in2;
  }
  EXPECT_GT(alone, 200);
}

}  // namespace
}  // namespace brink
