#include "brink/sphere/goodness.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace brink {
namespace {

std::vector<Vector3> fisher_sample(std::size_t count, double kappa, std::uint64_t stream) {
  std::vector<Vector3> drawn;
  for (std::size_t i = 0; i < count; ++i) {
    drawn.push_back(draw_fisher(normal(88_deg, 120_deg), kappa, 5, stream, i));
  }
  return drawn;
}

// Two palaeomagnetic sites of six directions each (Wessel, Introduction to Statistics and Data
// Analysis, ch. 9): R and pooled R computed from its data give F = 47.3786; the book prints 47.4.
// It refers F to (1, 10) degrees of freedom; on the sphere they are (2, 20), which makes
// p = 2.585e-8 (SciPy).
TEST(Goodness, CommonMeanOfTwoPublishedSites) {
  const double r1 = 5.86274569;
  const double r2 = 5.87584492;
  const double pooled = 10.50006894;
  const double cosine = (pooled * pooled - r1 * r1 - r2 * r2) / (2.0 * r1 * r2);
  const Vector3 other(std::sqrt(1.0 - cosine * cosine), 0.0, cosine);
  const std::vector<Resultant> sites{{6.0, r1, Vector3::UnitZ()}, {6.0, r2, other}};
  const auto result = common_mean(sites);
  ASSERT_TRUE(result);
  EXPECT_NEAR(result->test.statistic, 47.37862134, 1e-5);
  EXPECT_EQ(result->numerator_freedom, 2.0);
  EXPECT_EQ(result->denominator_freedom, 20.0);
  EXPECT_NEAR(result->test.p_value, 2.585e-8, 1e-11);
  // As axes the sense of a sample carries nothing.
  const std::vector<Resultant> turned{sites[0], {6.0, r2, Vector3(-other)}};
  EXPECT_NEAR(common_mean_axial(turned)->test.statistic, 47.37862134, 1e-5);
}

TEST(Goodness, CommonMeanNeedsTwoSamples) {
  const std::vector<Resultant> one{{6.0, 5.0, Vector3::UnitZ()}};
  EXPECT_FALSE(common_mean(one));
  const std::vector<Resultant> same{{6.0, 6.0, Vector3::UnitZ()}, {6.0, 6.0, Vector3::UnitX()}};
  EXPECT_FALSE(common_mean(same));
}

// Under the hypothesis a p value below 0.1 comes up one time in ten: within 4 standard errors.
TEST(Goodness, FisherFitKeepsItsSize) {
  constexpr int trials = 150;
  int rejected = 0;
  for (std::uint64_t t = 0; t < trials; ++t) {
    rejected += fisher_fit_axes(fisher_sample(20, 20.0, t))->longitude.p_value <= 0.1 ? 1 : 0;
  }
  EXPECT_NEAR(rejected, 0.1 * trials, 4.0 * std::sqrt(0.09 * trials));
}

TEST(Goodness, AGirdleIsNoFisherDistribution) {
  std::vector<Vector3> girdle;
  for (int i = 0; i < 40; ++i) girdle.push_back(normal(Angle::degrees(20 + 2 * i), 90_deg));
  const auto fit = fisher_fit_axes(girdle);
  ASSERT_TRUE(fit);
  EXPECT_LT(fit->longitude.p_value, 0.01);
  EXPECT_EQ(fit->verdict.test, "longitude (uniform)");
}

TEST(Goodness, TooFewOrIdenticalAxesHaveNoFit) {
  EXPECT_FALSE(fisher_fit_axes(fisher_sample(7, 20.0, 1)));
  EXPECT_TRUE(fisher_fit_axes(fisher_sample(8, 20.0, 1)));
  EXPECT_FALSE(fisher_fit_axes(std::vector<Vector3>(20, normal(30_deg, 30_deg))));
}

TEST(Goodness, SameSeedSameNumbersWhateverTheThreads) {
  const auto sample = fisher_sample(30, 12.0, 9);
  const auto one = fisher_fit_axes(sample, 4, 1);
  const auto three = fisher_fit_axes(sample, 4, 3);
  EXPECT_EQ(one->colatitude.p_value, three->colatitude.p_value);
  EXPECT_EQ(one->two_variable.p_value, three->two_variable.p_value);
}

}  // namespace
}  // namespace brink
