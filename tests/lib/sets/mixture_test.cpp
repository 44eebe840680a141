#include "brink/sets/mixture.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/sphere/fisher.hpp"

namespace brink {
namespace {

void draw(std::vector<Vector3>& axes, const Vector3& mean, double kappa, std::size_t count) {
  const std::uint64_t stream = axes.size();
  for (std::size_t i = 0; i < count; ++i) axes.push_back(draw_fisher(mean, kappa, 11, stream, i));
}

std::vector<Vector3> two_sets_and_strays() {
  std::vector<Vector3> axes;
  draw(axes, normal(88_deg, 15_deg), 30.0, 500);
  draw(axes, normal(12_deg, 200_deg), 20.0, 300);
  for (std::uint64_t i = 0; i < 200; ++i) {
    axes.push_back(draw_uniform(random_uniform(3, 1, i), random_uniform(3, 2, i)));
  }
  return axes;
}

Component elliptical(const Vector3& mean, double weight) {
  Component c{Shape::elliptical, weight, mean, 10.0, Eigen::Matrix3d::Identity()};
  c.scatter = 0.1 * Eigen::Matrix3d::Identity() + 0.9 * mean * mean.transpose();
  return c;
}

Mixture rough_start() {
  return {0.2,
          {{Shape::fisher, 0.4, normal(70_deg, 30_deg), 10.0},
           elliptical(normal(20_deg, 180_deg), 0.4)}};
}

// ln likelihood straight from the definition.
double plain_log_likelihood(const Mixture& mixture, const std::vector<Vector3>& axes) {
  double sum = 0.0;
  for (const Vector3& axis : axes) {
    double density = mixture.uniform_weight / (4.0 * std::numbers::pi);
    for (const Component& c : mixture.components) {
      density += c.weight * std::exp(log_density(c, axis));
    }
    sum += std::log(density);
  }
  return sum;
}

TEST(Mixture, FastPassEqualsTheDefinition) {
  const auto axes = two_sets_and_strays();
  const EmStep step = em_step(rough_start(), merge_equal_axes(axes));
  EXPECT_NEAR(step.log_likelihood, plain_log_likelihood(rough_start(), axes), 1e-9);
}

TEST(Mixture, LikelihoodNeverFalls) {
  const MixtureFit fit =
      fit_mixture(rough_start(), merge_equal_axes(two_sets_and_strays()), {400, 1e-14});
  EXPECT_GT(fit.trace.size(), 10U);
  for (std::size_t i = 1; i < fit.trace.size(); ++i) {
    EXPECT_GE(fit.trace[i], fit.trace[i - 1] - 1e-9) << i;
  }
}

TEST(Mixture, RecoversWhatWasDrawn) {
  const MixtureFit fit = fit_mixture(rough_start(), merge_equal_axes(two_sets_and_strays()), {});
  const Component& first = fit.mixture.components[0];
  EXPECT_LT(axis_angle(first.mean, normal(88_deg, 15_deg)).deg(), 2.0);
  EXPECT_NEAR(first.weight, 0.5, 0.05);
  EXPECT_NEAR(first.kappa, 30.0, 6.0);
}

TEST(Mixture, ThreadsAndOrderChangeNothing) {
  std::vector<Vector3> axes;
  draw(axes, normal(88_deg, 15_deg), 30.0, 6000);
  draw(axes, normal(12_deg, 200_deg), 20.0, 6000);
  const MixtureFit one = fit_mixture(rough_start(), merge_equal_axes(axes), {20, 0.0}, 1);
  std::reverse(axes.begin(), axes.end());
  const MixtureFit four = fit_mixture(rough_start(), merge_equal_axes(axes), {20, 0.0}, 4);
  EXPECT_EQ(one.trace, four.trace);
  EXPECT_EQ(one.mixture.components[0].kappa, four.mixture.components[0].kappa);
}

TEST(Mixture, DensitiesIntegrateToOne) {
  constexpr int steps = 400;
  Component stretched = elliptical(normal(30_deg, 30_deg), 1.0);
  stretched.scatter(0, 1) = stretched.scatter(1, 0) = 0.05;
  const Component fisher{Shape::fisher, 1.0, normal(80_deg, 10_deg), 25.0};
  double sum_elliptical = 0.0;
  double sum_fisher = 0.0;
  for (int i = 0; i < steps; ++i) {
    for (int k = 0; k < steps; ++k) {
      const Vector3 axis = draw_uniform((i + 0.5) / steps, (k + 0.5) / steps);
      sum_elliptical += std::exp(log_density(stretched, axis));
      sum_fisher += std::exp(log_density(fisher, axis));
    }
  }
  const double area = 4.0 * std::numbers::pi / (steps * steps);
  EXPECT_NEAR(sum_elliptical * area, 1.0, 1e-3);
  EXPECT_NEAR(sum_fisher * area, 1.0, 1e-3);
}

TEST(AxisSample, MergesEqualAxesWhateverTheirSense) {
  const Vector3 vertical = normal(90_deg, 35_deg);
  const std::vector<Vector3> axes{normal(30_deg, 40_deg), vertical, normal(30_deg, 40_deg),
                                  -vertical};
  const AxisSample sample = merge_equal_axes(axes);
  EXPECT_EQ(sample.size, 2U);
  EXPECT_EQ(sample.total_weight, 4.0);
  EXPECT_EQ(sample.merged[0], sample.merged[2]);
  EXPECT_EQ(sample.merged[1], sample.merged[3]);
  EXPECT_EQ(sample.weight[sample.merged[1]], 2.0);
}

TEST(AxisSample, WeightsSumToTheEffectiveNumber) {
  const std::vector<Vector3> axes{normal(30_deg, 40_deg), normal(50_deg, 40_deg)};
  const AxisSample sample = merge_equal_axes(axes, std::vector<double>{3.0, 1.0});
  EXPECT_NEAR(sample.total_weight, 16.0 / 10.0, 1e-15);
  EXPECT_NEAR(sample.weight[sample.merged[0]], 1.2, 1e-15);
}

TEST(AxisSample, BinsKeepWeightAndPlace) {
  const AxisSample sample = merge_equal_axes(two_sets_and_strays());
  const AxisSample cells = binned(sample, 5_deg);
  EXPECT_LT(cells.size, sample.size);
  double total = 0.0;
  for (const double w : cells.weight) total += w;
  EXPECT_NEAR(total, 1000.0, 1e-9);
  for (std::size_t i = 0; i < sample.size; ++i) {
    EXPECT_LT(axis_angle(sample.axis(i), cells.axis(cells.merged[i])).deg(), 9.0);
  }
}

TEST(Mixture, ClassifiesByTheLikeliest) {
  const std::vector<Vector3> axes{normal(88_deg, 15_deg), normal(12_deg, 200_deg),
                                  normal(50_deg, 290_deg)};
  const AxisSample sample = merge_equal_axes(axes);
  const Mixture mixture{0.3,
                        {{Shape::fisher, 0.4, normal(88_deg, 195_deg), 30.0},
                         {Shape::fisher, 0.3, normal(12_deg, 200_deg), 20.0}}};
  const std::vector<int> labels = classify(mixture, sample);
  EXPECT_EQ(labels[sample.merged[0]], 1);
  EXPECT_EQ(labels[sample.merged[1]], 2);
  EXPECT_EQ(labels[sample.merged[2]], 0);
}

}  // namespace
}  // namespace brink
