#include "brink/sphere/tensor.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace brink {
namespace {

// Woodcock 1977 with eigenvalues 0.8, 0.15, 0.05, computed by hand: ln 5.333 / ln 3 and ln 16.
TEST(Tensor, WoodcockShapeAndStrength) {
  EXPECT_NEAR(woodcock_shape({0.8, 0.15, 0.05}), 1.523719014, 1e-9);
  EXPECT_NEAR(woodcock_strength({0.8, 0.15, 0.05}), 2.772588722, 1e-9);
  EXPECT_TRUE(std::isinf(woodcock_shape({0.8, 0.1, 0.1})));
  EXPECT_TRUE(std::isinf(woodcock_strength({0.6, 0.4, 0.0})));
  EXPECT_EQ(woodcock_shape({0.6, 0.4, 0.0}), 0.0);
  EXPECT_EQ(woodcock_shape({0.45, 0.45, 0.1}), 0.0);
}

TEST(Tensor, IdenticalAxesArePerfectlyStrong) {
  const std::vector<Vector3> axes(5, normal(33_deg, 77_deg));
  const OrientationTensor t = orientation_tensor(axes);
  EXPECT_NEAR(t.eigenvalues[0], 1.0, 1e-14);
  EXPECT_NEAR((t.axes[0] - axes[0]).norm(), 0.0, 1e-7);
  EXPECT_TRUE(std::isinf(woodcock_strength(t.eigenvalues)));
  EXPECT_TRUE(std::isinf(woodcock_shape(t.eigenvalues)));
}

TEST(Tensor, WeightsCountAsRepeats) {
  const std::vector<Vector3> axes{normal(10_deg, 20_deg), normal(60_deg, 120_deg),
                                  normal(85_deg, 300_deg)};
  const std::vector<Vector3> repeated{axes[0], axes[0], axes[1], axes[2], axes[2], axes[2]};
  const OrientationTensor a = orientation_tensor(axes, std::vector<double>{2, 1, 3});
  const OrientationTensor b = orientation_tensor(repeated);
  EXPECT_LT((a.matrix - b.matrix).norm(), 1e-15);
}

}  // namespace
}  // namespace brink
