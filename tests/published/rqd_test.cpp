// RQD estimated from the frequency of joints: Priest & Hudson 1976, Int. J. Rock Mech. Min. Sci.
// 13:135 (the formula as in its abstract; values computed independently to eight decimals).
#include <gtest/gtest.h>

#include "brink/readings/spacing.hpp"

namespace {

TEST(RqdEstimate, PriestAndHudson) {
  const std::pair<double, double> values[] = {
      {0.0, 100.0},        {1.0, 99.53211600},  {5.0, 90.97959890}, {10.0, 73.57588823},
      {20.0, 40.60058497}, {30.0, 19.91482735}, {40.0, 9.157819}};
  for (const auto& [frequency, rqd] : values) {
    EXPECT_NEAR(brink::rqd_estimate(frequency), rqd, 5e-7) << frequency;
  }
}

}  // namespace
