#include "brink/mechanics/toppling.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "brink/base/error.hpp"

namespace brink {
namespace {

// The dimensions of Goodman & Bray's slope (from memory): 92.5 m high, face 56.6, upper ground 4.
ToppleGeometry example_geometry() {
  return {Angle::degrees(56.6), 92.5, 4_deg, 30_deg, 10.0, 1.0};
}

ToppleInput example() {
  ToppleInput in;
  in.columns = topple_columns(example_geometry());
  in.unit_weight_kN_m3 = 25.0;
  in.friction = 35_deg;
  return in;
}

template <typename Work>
std::string refusal(const Work& work) {
  try {
    work();
  } catch (const Error& e) {
    EXPECT_EQ(e.kind(), ErrorKind::argument);
    return e.what();
  }
  return "accepted";
}

TEST(Toppling, BlocksFromGeometry) {
  const ToppleColumns columns = topple_columns(example_geometry());
  EXPECT_EQ(columns.heights_m.size(), 16U);
  EXPECT_EQ(columns.crest, 10U);
  EXPECT_NEAR(columns.a1_m, 5.0, 0.01);
  EXPECT_NEAR(columns.a2_m, 4.88, 0.005);
  EXPECT_NEAR(columns.heights_m[0], 4.0, 0.01);
  EXPECT_NEAR(columns.heights_m[9], 40.0, 0.1);
  EXPECT_NEAR(columns.heights_m[10], 34.2, 0.1);
}

// Drawn from the heights and steps, the blocks give back the face: front tops below the crest lie
// a1 apart, bases one step apart.
TEST(Toppling, OutlinesFollowTheSteps) {
  const ToppleColumns columns = topple_columns(example_geometry());
  const auto outlines = topple_outlines(columns);
  ASSERT_EQ(outlines.size(), 16U);
  const SinCos p = sincos(columns.base_dip);
  for (std::size_t n = 1; n < outlines.size(); ++n) {
    const SectionPoint& base = outlines[n][0];
    const SectionPoint& before = outlines[n - 1][1];
    EXPECT_NEAR(-(base.x_m - before.x_m) * p.sin + (base.z_m - before.z_m) * p.cos, 1.0, 1e-9) << n;
    EXPECT_NEAR((base.x_m - before.x_m) * p.cos + (base.z_m - before.z_m) * p.sin, 0.0, 1e-9) << n;
  }
  // The back top of every block below the crest lies on the face, one step down: it rises from the
  // toe at the face's dip.
  const SectionPoint& first = outlines[0][2];
  const SectionPoint& tenth = outlines[9][2];
  EXPECT_NEAR(atan2(tenth.z_m - first.z_m, tenth.x_m - first.x_m).deg(), 56.6, 1e-9);
}

TEST(Toppling, GeometryThatMakesNoBlocks) {
  ToppleGeometry g = example_geometry();
  g.base_dip = 60_deg;
  EXPECT_EQ(refusal([&] { topple_columns(g); }),
            "base dip: '60' leaves no columns in a face of 56.6 degrees; accepted: less than the "
            "face dip, and "
            "by less than 90 degrees");
  g = example_geometry();
  g.step_m = 6.0;
  EXPECT_EQ(refusal([&] { topple_columns(g); }),
            "step: '6' leaves no columns, the base rising as fast as the face; accepted: 0 and "
            "below 5.008 m");
  g = example_geometry();
  g.upper_dip = 40_deg;
  EXPECT_EQ(refusal([&] { topple_columns(g); }),
            "upper dip: '40' leaves the columns without end behind the crest; accepted: upper "
            "ground less steep "
            "than the stepped base");
  g = example_geometry();
  g.width_m = 0.0;
  EXPECT_EQ(refusal([&] { topple_columns(g); }),
            "width: '0' is not above 0; accepted: a number above 0");
  g.width_m = 1e-6;
  EXPECT_EQ(refusal([&] { topple_columns(g); }),
            "width: '1e-06' makes too many blocks; accepted: a width that makes at most 10000");
}

// One column: it tips when taller than width / tan(base dip), and slides when the base is steeper
// than its friction (exact).
TEST(Toppling, ASingleColumn) {
  ToppleInput in;
  in.columns = {{2.0}, 1, 1.0, 20_deg, 0.0, 0.0};
  in.unit_weight_kN_m3 = 25.0;
  in.friction = 30_deg;
  EXPECT_TRUE(analyse_toppling(in).stable);
  EXPECT_NEAR(analyse_toppling(in).friction_for_balance.value().deg(), 20.0, 1e-9);
  in.friction = 15_deg;
  EXPECT_EQ(analyse_toppling(in).blocks[0].mode, BlockMode::slides);
  in.friction = 30_deg;
  in.columns.heights_m = {1.0 / std::tan(Angle::degrees(20).rad()) + 0.01};
  const ToppleResult tall = analyse_toppling(in);
  EXPECT_EQ(tall.blocks[0].mode, BlockMode::topples);
  EXPECT_FALSE(tall.friction_for_balance);
  EXPECT_EQ(tall.factor_of_safety, 0.0);
  EXPECT_EQ(tall.warnings.front(),
            "no friction below 90 degrees balances the toe: it needs support");
}

TEST(Toppling, ColumnsLockFromFortyFiveDegrees) {
  ToppleInput in = example();
  for (const Angle friction : {45_deg, 60_deg, 89_deg}) {
    in.friction = friction;
    for (const ToppleBlock& block : analyse_toppling(in).blocks) {
      EXPECT_FALSE(block.can_slide);
      EXPECT_NE(block.mode, BlockMode::slides);
      EXPECT_TRUE(std::isfinite(block.normal_kN_m));
    }
  }
}

// Base steeper than 45 degrees: only locking holds the columns, and that ends at 45.
TEST(Toppling, LockingAloneHoldsASteepBase) {
  ToppleInput in;
  in.columns = {{0.5}, 1, 1.0, 50_deg, 0.0, 0.0};
  in.unit_weight_kN_m3 = 25.0;
  in.friction = 48_deg;
  EXPECT_EQ(analyse_toppling(in).friction_for_balance, 45_deg);
}

TEST(Toppling, ALevelBaseNeedsNoFriction) {
  ToppleInput in;
  in.columns = {{2.0, 3.0}, 2, 1.0, 0_deg, 1.0, 0.5};
  in.unit_weight_kN_m3 = 25.0;
  in.friction = 30_deg;
  const ToppleResult result = analyse_toppling(in);
  EXPECT_TRUE(result.stable);
  EXPECT_EQ(result.friction_for_balance, Angle{});
  EXPECT_EQ(result.factor_of_safety, std::numeric_limits<double>::infinity());
  EXPECT_EQ(result.bolt_for_balance_kN_m, 0.0);
}

// Common practice, no source: water in the joints can only call for more friction.
TEST(Toppling, WaterCallsForMoreFriction) {
  ToppleInput in = example();
  double last = 0.0;
  for (const double fill : {0.0, 0.1, 0.2, 0.3}) {
    in.water_fill = fill;
    const auto needed = analyse_toppling(in).friction_for_balance;
    ASSERT_TRUE(needed);
    EXPECT_GT(needed->deg(), last);
    last = needed->deg();
  }
}

TEST(Toppling, AToeThatTopplesAsksForTheBoltsHeight) {
  ToppleInput in;
  in.columns = {{3.0, 4.0, 5.0}, 3, 1.0, 25_deg, 1.0, 1.0};
  in.unit_weight_kN_m3 = 25.0;
  in.friction = 40_deg;
  const ToppleResult open = analyse_toppling(in);
  ASSERT_EQ(open.blocks[0].mode, BlockMode::topples);
  EXPECT_FALSE(open.bolt_for_balance_kN_m);
  EXPECT_NE(open.warnings.back().find("block 1 topples too"), std::string::npos);
  in.balance_bolt_height_m = 2.0;
  EXPECT_GT(analyse_toppling(in).bolt_for_balance_kN_m.value(), 0.0);
}

TEST(Toppling, RefusesValuesOutOfRange) {
  const auto with = [](auto change) {
    ToppleInput in = example();
    change(in);
    return refusal([&] { analyse_toppling(in); });
  };
  EXPECT_EQ(with([](ToppleInput& in) { in.friction = 90_deg; }),
            "friction: '90' is no friction angle; accepted: 0 or more and below 90 degrees");
  EXPECT_EQ(with([](ToppleInput& in) { in.columns.crest = 17; }),
            "crest: '17' is not the number of a block; accepted: 1 to 16");
  EXPECT_EQ(with([](ToppleInput& in) { in.columns.heights_m[2] = 0.0; }),
            "height of block 3: '0' is not above 0; accepted: a number above 0");
  EXPECT_EQ(with([](ToppleInput& in) { in.columns.heights_m.clear(); }),
            "blocks: there is no block; accepted: at least 1 block");
  EXPECT_EQ(with([](ToppleInput& in) {
              in.loads = {{17, 1.0, 0_deg, {}}};
            }),
            "load: '17' is on a block that does not exist; accepted: block 1 to 16");
  EXPECT_EQ(with([](ToppleInput& in) {
              in.water = {{1, 5.0, 0.0}};
            }),
            "water at block 1: '5' is too large; accepted: 0 to 4.00763");
  EXPECT_EQ(with([](ToppleInput& in) {
              in.water = {{1, 1.0, 0.0}};
              in.water_fill = 0.5;
            }),
            "water: is given twice, as a fill of every joint and block by block; accepted: one of "
            "the two");
}

}  // namespace
}  // namespace brink
