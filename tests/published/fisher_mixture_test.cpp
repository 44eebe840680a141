// The mixture fit against a separate implementation (Python with numpy, log-sum-exp throughout) on
// two invented files with known membership, data/three_sets_*.csv. That implementation took the
// density over the hemisphere: its ln likelihood is higher by N ln 2.
#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

#include "brink/orientation/intersection.hpp"
#include "brink/sets/mixture.hpp"
#include "brink/sphere/fisher.hpp"
#include "support/numbers_file.hpp"

namespace brink {
namespace {

struct Sample {
  std::vector<Vector3> axes;
  std::vector<int> truth;
};

Sample read(const std::string& name) {
  Sample sample;
  for (const auto& row : test::read_numbers(BRINK_TEST_DIR "/published/data/" + name)) {
    sample.axes.push_back(normal(Angle::degrees(row[0]), Angle::degrees(row[1])));
    sample.truth.push_back(static_cast<int>(row[2]));
  }
  return sample;
}

std::vector<Vector3> members(const Sample& sample, int set) {
  std::vector<Vector3> axes;
  for (std::size_t i = 0; i < sample.axes.size(); ++i) {
    if (sample.truth[i] == set) axes.push_back(sample.axes[i]);
  }
  return axes;
}

// Starts at the true membership and runs until nothing changes any more.
MixtureFit fit_from_truth(const Sample& sample) {
  Mixture start{0.1, {}};
  for (int set = 1; set <= 3; ++set) {
    const Resultant r = axial_resultant(members(sample, set));
    start.components.push_back({Shape::fisher, 0.3, r.mean, *kappa_fisher(r)});
  }
  return fit_mixture(start, merge_equal_axes(sample.axes), {20000, 1e-14});
}

struct Expected {
  double dip_deg;
  double direction_deg;
  double kappa;
  double weight;
};

void expect_components(const Mixture& mixture, const std::vector<Expected>& expected) {
  for (std::size_t k = 0; k < expected.size(); ++k) {
    const Component& c = mixture.components[k];
    const Vector3 mean =
        normal(Angle::degrees(expected[k].dip_deg), Angle::degrees(expected[k].direction_deg));
    EXPECT_LT(axis_angle(c.mean, mean).deg(), 1e-4);
    EXPECT_NEAR(c.kappa, expected[k].kappa, 1e-4);
    EXPECT_NEAR(c.weight, expected[k].weight, 1e-6);
  }
}

double over_hemisphere(const MixtureFit& fit, const Sample& sample) {
  return fit.log_likelihood + static_cast<double>(sample.axes.size()) * std::numbers::ln2;
}

TEST(FisherMixture, ThreeSetsAndAUniformPart) {
  const Sample sample = read("three_sets_120.csv");
  ASSERT_EQ(sample.axes.size(), 120U);
  const MixtureFit fit = fit_from_truth(sample);
  EXPECT_NEAR(over_hemisphere(fit, sample), -95.49577408, 1e-6);
  EXPECT_NEAR(bic(fit.mixture, over_hemisphere(fit, sample), 120), 248.441449, 2e-6);
  EXPECT_NEAR(fit.mixture.uniform_weight, 0.12401629, 1e-6);
  expect_components(fit.mixture, {{7.847759, 128.734070, 25.370823, 0.31152160},
                                  {88.894521, 22.937053, 43.114271, 0.21369316},
                                  {87.913274, 110.044327, 32.875206, 0.35076895}});
}

// Here the uniform part vanishes: a fit at the boundary.
TEST(FisherMixture, ThreeSetsWithoutUniformPart) {
  const Sample sample = read("three_sets_60.csv");
  const MixtureFit fit = fit_from_truth(sample);
  EXPECT_NEAR(over_hemisphere(fit, sample), -44.08683794, 1e-5);
  EXPECT_NEAR(bic(fit.mixture, over_hemisphere(fit, sample), 60), 137.305811, 2e-5);
  EXPECT_NEAR(fit.mixture.uniform_weight, 0.0, 1e-4);
  expect_components(fit.mixture, {{37.350317, 108.826293, 21.940579, 0.44999041},
                                  {89.788527, 35.422682, 30.754586, 0.35116350},
                                  {61.584837, 323.222179, 15.436747, 0.19884609}});
}

TEST(FisherMixture, TrueSetStatistics) {
  const Resultant large = axial_resultant(members(read("three_sets_120.csv"), 1));
  EXPECT_EQ(large.count, 37.0);
  EXPECT_NEAR(large.length, 35.66015450, 1e-8);
  EXPECT_NEAR(*kappa_fisher(large), 26.868770, 1e-6);
  EXPECT_NEAR(confidence_cone(large)->deg(), 4.627957, 1e-6);
  const Resultant small = axial_resultant(members(read("three_sets_60.csv"), 1));
  EXPECT_EQ(small.count, 22.0);
  EXPECT_NEAR(small.length, 21.29494824, 1e-8);
  EXPECT_NEAR(*kappa_fisher(small), 29.785047, 1e-6);
  EXPECT_NEAR(confidence_cone(small)->deg(), 5.775747, 1e-6);
}

}  // namespace
}  // namespace brink
