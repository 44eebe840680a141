// Block toppling printed in handbooks.
#include "brink/mechanics/toppling.hpp"

#include <gtest/gtest.h>

namespace brink {
namespace {

// Goodman & Bray 1976, also Hoek & Bray, Rock Slope Engineering, 3rd ed. 1981, ch. 10 (from
// memory). The text prints a2 as 5.2; its table is built with 5.0.
ToppleInput goodman_bray(double tan_friction) {
  ToppleInput in;
  in.columns.heights_m = {4, 8, 12, 16, 20, 24, 28, 32, 36, 40, 34, 28, 22, 16, 10, 4};
  in.columns.crest = 10;
  in.columns.width_m = 10.0;
  in.columns.base_dip = 30_deg;
  in.columns.a1_m = 5.0;
  in.columns.a2_m = 5.0;
  in.unit_weight_kN_m3 = 25.0;
  in.friction = atan2(tan_friction, 1.0);
  return in;
}

struct Row {
  std::size_t number;
  BlockMode mode;
  double passed_on, normal, shear;
};

TEST(PublishedToppling, GoodmanBrayTable) {
  using enum BlockMode;
  const ToppleResult result = analyse_toppling(goodman_bray(0.7855));
  for (const Row& row : {Row{16, stable, 0, 866, 500},
                         {15, stable, 0, 2165, 1250},
                         {14, stable, 0, 3464, 2000},
                         {13, topples, 292.5, 4533.4, 2457.5},
                         {12, topples, 825.7, 5643.3, 2966.8},
                         {11, topples, 1556.0, 6787.6, 3520.0},
                         {10, topples, 2826.7, 7662.1, 3729.3},
                         {9, topples, 3922.1, 6933.8, 3404.6},
                         {8, topples, 4594.8, 6399.8, 3327.3},
                         {7, topples, 4837.0, 5872.0, 3257.8},
                         {6, topples, 4637.5, 5352.9, 3199.5},
                         {5, topples, 3978.1, 4848.1, 3159.4},
                         {4, topples, 2825.6, 4369.4, 3152.5},
                         {3, slides, 1413.5, 3707.3, 2912.1},
                         {2, slides, 472.2, 2471.4, 1941.3}}) {
    const ToppleBlock& block = result.blocks[row.number - 1];
    EXPECT_EQ(block.number, row.number);
    EXPECT_EQ(block.mode, row.mode) << row.number;
    EXPECT_NEAR(block.force_on_next_kN_m, row.passed_on, 0.4) << row.number;
    EXPECT_NEAR(block.normal_kN_m, row.normal, 0.4) << row.number;
    EXPECT_NEAR(block.shear_kN_m, row.shear, 0.4) << row.number;
  }
  EXPECT_EQ(result.blocks[0].mode, slides);
  EXPECT_NEAR(result.toe_force_kN_m, 0.5, 2.0);
  ASSERT_TRUE(result.friction_for_balance);
  EXPECT_NEAR(result.friction_for_balance->deg(), 38.15, 0.01);
}

// The same source: at tan 0.65 blocks 1 to 4 slide, 5 to 13 topple, and a bolt through block 1 of
// 2013 kN per metre restores balance; the factor of safety of tan 0.800 is 1.02.
TEST(PublishedToppling, GoodmanBrayBoltAndFactorOfSafety) {
  const ToppleResult weak = analyse_toppling(goodman_bray(0.65));
  for (std::size_t n = 1; n <= 13; ++n)
    EXPECT_EQ(weak.blocks[n - 1].mode, n <= 4 ? BlockMode::slides : BlockMode::topples) << n;
  ASSERT_TRUE(weak.bolt_for_balance_kN_m);
  EXPECT_NEAR(*weak.bolt_for_balance_kN_m, 2013.0, 1.0);
  EXPECT_NEAR(analyse_toppling(goodman_bray(0.8)).factor_of_safety, 1.02, 0.005);
}

}  // namespace
}  // namespace brink
