#include "brink/sphere/fisher.hpp"

#include <gtest/gtest.h>

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace brink {
namespace {

TEST(Fisher, MeanCosineAndItsInverse) {
  // Computed with SciPy and Boost.Math.
  EXPECT_NEAR(mean_cosine(0.1), 0.033311132253990, 1e-15);
  EXPECT_NEAR(mean_cosine(1.0), 0.313035285499331, 1e-15);
  EXPECT_NEAR(mean_cosine(5.0), 0.800090803982019, 1e-15);
  EXPECT_NEAR(mean_cosine(10.0), 0.900000004122307, 1e-15);
  EXPECT_NEAR(kappa_of_mean_cosine(0.1), 0.301817149206, 1e-12);
  EXPECT_NEAR(kappa_of_mean_cosine(0.2), 0.614966600190980, 1e-14);
  EXPECT_NEAR(kappa_of_mean_cosine(0.5), 1.796755984723713, 1e-14);
  EXPECT_NEAR(kappa_of_mean_cosine(0.8), 4.997720566907421, 1e-13);
  EXPECT_NEAR(kappa_of_mean_cosine(0.9), 9.999999587768945, 1e-12);
  EXPECT_NEAR(kappa_of_mean_cosine(0.95), 20.0, 1e-12);
  EXPECT_NEAR(kappa_of_mean_cosine(0.99), 100.0, 1e-11);
  EXPECT_EQ(kappa_of_mean_cosine(0.0), 0.0);
  EXPECT_TRUE(std::isinf(kappa_of_mean_cosine(1.0)));
}

TEST(Fisher, InverseReturnsEveryKappa) {
  for (double kappa = 1e-4; kappa < 1e5; kappa *= 1.7) {
    const double r = mean_cosine(kappa);
    // What one unit in the last place of coth or of r moves kappa by.
    const double slope = kappa > 20 ? kappa * kappa : 3.0 + kappa * kappa;
    EXPECT_NEAR(kappa_of_mean_cosine(r), kappa,
                4e-16 * slope + 2e-15 / std::max(kappa, 0.1) + 1e-13 * kappa)
        << kappa;
  }
}

// Half angles that hold 50, 95 and 99 %, computed with numpy; the exact form was checked by
// quadrature of the density.
TEST(Fisher, ContainmentCones) {
  struct Row {
    double kappa;
    double share;
    double vector_deg;
    double axial_deg;
  };
  for (const Row& row :
       {Row{1, .5, 64.2922584278, 56.0711163535}, Row{1, .95, 136.2847216360, 86.6332939021},
        Row{1, .99, 159.7295054238, 89.3266593144}, Row{5, .5, 30.5281560937, 30.5261084129},
        Row{5, .95, 66.3576662106, 66.1476161310}, Row{5, .99, 85.4193166094, 82.1053454906},
        Row{10, .5, 21.4581088938, 21.4581088292}, Row{10, .95, 45.5387456200, 45.5387393324},
        Row{10, .99, 57.3515485277, 57.3514096781}, Row{20, .5, 15.1285638020, 15.1285638020},
        Row{40, .95, 22.3155510930, 22.3155510930}, Row{80, .99, 19.5353480984, 19.5353480984},
        Row{500, .5, 3.0172795065, 3.0172795065}, Row{500, .95, 6.2751079895, 6.2751079895},
        Row{2, .68, 63.29646817, 0}, Row{50, .68, 12.25534345, 0}}) {
    const double near = row.axial_deg == 0 ? 1e-8 : 1e-9;
    EXPECT_NEAR(containment_cone(row.kappa, row.share).deg(), row.vector_deg, near);
    if (row.axial_deg == 0) continue;
    EXPECT_NEAR(containment_cone_axial(row.kappa, row.share).deg(), row.axial_deg, 1e-9);
  }
  EXPECT_NEAR(containment_cone(0.0, 0.5).deg(), 90.0, 1e-12);
  EXPECT_NEAR(containment_cone_axial(0.0, 0.5).deg(), 60.0, 1e-12);
  EXPECT_EQ(containment_cone(10.0, 0.0).deg(), 0.0);
}

// Computed with 40 digits.
TEST(Fisher, LogAxialDensity) {
  const auto ln = [](double kappa, Angle a) { return log_axial_density(kappa, cos(a)); };
  EXPECT_NEAR(ln(50, 0_deg), 1.380998758458855, 1e-14);
  EXPECT_NEAR(ln(50, 10_deg), 0.6213864090692563, 1e-14);
  EXPECT_NEAR(ln(50, 90_deg), -47.9258540609812, 1e-13);
  EXPECT_NEAR(ln(1000, 0_deg), 4.376731032012846, 1e-14);
  EXPECT_NEAR(ln(1000, 10_deg), -10.81551595577913, 1e-12);
  EXPECT_NEAR(ln(1000, 90_deg), -994.9301217874272, 1e-12);
  EXPECT_NEAR(ln(1, 90_deg), -2.692463608540486, 1e-14);
  EXPECT_NEAR(ln(0, 33_deg), -std::log(4.0 * std::numbers::pi), 1e-15);
}

TEST(Fisher, AxialDensityIntegratesToOne) {
  for (const double kappa : {0.5, 3.0, 40.0}) {
    double sum = 0.0;
    constexpr int steps = 20000;
    for (int i = 0; i < steps; ++i) {
      const double t = (i + 0.5) / steps;
      sum += 4.0 * std::numbers::pi * std::exp(log_axial_density(kappa, t)) / steps;
    }
    EXPECT_NEAR(sum, 1.0, 1e-6);
  }
}

// Six and six directions of two palaeomagnetic sites; R and kappa computed with numpy from the data
// of Wessel, Introduction to Statistics and Data Analysis, ch. 9.
TEST(Fisher, EstimatorsFromCountAndLength) {
  const Resultant site{6.0, 5.8627456906, Vector3::UnitZ()};
  EXPECT_NEAR(*kappa_fisher(site), 36.4287287052, 1e-6);
  EXPECT_NEAR(*kappa_unbiased(site), 29.1429829642, 1e-6);
  EXPECT_NEAR(*kappa_maximum_likelihood(site), 43.7144744463, 1e-6);
  EXPECT_NEAR(confidence_cone(site)->deg(), 11.2487455004, 1e-7);
}

TEST(Fisher, SamplesThatSayNothing) {
  const std::vector<Vector3> one{Vector3::UnitX()};
  const Resultant single = vector_resultant(one);
  EXPECT_FALSE(kappa_fisher(single));
  EXPECT_FALSE(confidence_cone(single));
  const std::vector<Vector3> twice{normal(37_deg, 211_deg), normal(37_deg, 211_deg)};
  const Resultant same = axial_resultant(twice);
  EXPECT_TRUE(std::isinf(*kappa_fisher(same)));
  EXPECT_FALSE(kappa_unbiased(same));
  EXPECT_EQ(confidence_cone(same)->deg(), 0.0);
  const std::vector<Vector3> opposed{Vector3::UnitX(), -Vector3::UnitX()};
  EXPECT_NEAR(vector_resultant(opposed).length, 0.0, 1e-15);
  EXPECT_FALSE(confidence_cone(vector_resultant(opposed)));
  EXPECT_NEAR(axial_resultant(opposed).length, 2.0, 1e-12);
  EXPECT_EQ(vector_resultant({}).count, 0.0);
}

TEST(Fisher, TurningAxesChangesNothing) {
  std::vector<Vector3> axes;
  std::vector<Vector3> mixed;
  for (std::uint64_t i = 0; i < 60; ++i) {
    axes.push_back(draw_fisher(normal(89_deg, 40_deg), 15.0, 3, 1, i));
    mixed.push_back(i % 3 == 0 ? Vector3(-axes.back()) : axes.back());
  }
  const Resultant a = axial_resultant(axes);
  const Resultant b = axial_resultant(mixed);
  EXPECT_NEAR(a.length, b.length, 1e-12);
  EXPECT_NEAR(std::abs(a.mean.dot(b.mean)), 1.0, 1e-14);
}

TEST(Fisher, EqualWeightsAreNoWeights) {
  std::vector<Vector3> axes;
  for (std::uint64_t i = 0; i < 20; ++i) {
    axes.push_back(draw_fisher(normal(50_deg, 40_deg), 15.0, 3, 1, i));
  }
  const Resultant plain = axial_resultant(axes);
  const Resultant weighted = axial_resultant(axes, std::vector<double>(20, 2.5));
  EXPECT_NEAR(weighted.count, 20.0, 1e-12);
  EXPECT_NEAR(weighted.length, plain.length, 1e-12);
  std::vector<double> uneven(20, 1.0);
  uneven[0] = 11.0;
  EXPECT_NEAR(axial_resultant(axes, uneven).count, 30.0 * 30.0 / 140.0, 1e-12);
}

// u to cos theta for kappa 10, computed from the closed form with numpy.
TEST(Fisher, DrawsByTheInverseDistribution) {
  const Vector3 mean = normal(25_deg, 300_deg);
  const auto cosine = [&](double u) { return draw_fisher(mean, 10.0, u, 0.3).dot(mean); };
  EXPECT_NEAR(cosine(0.001), 0.309224678010821, 1e-14);
  EXPECT_NEAR(cosine(0.5), 0.930685282150121, 1e-14);
  EXPECT_NEAR(cosine(0.999), 0.999899949966848, 1e-14);
}

TEST(Fisher, DrawsHaveTheirMeanAndKappa) {
  std::vector<Vector3> drawn;
  const Vector3 mean = normal(80_deg, 10_deg);
  for (std::uint64_t i = 0; i < 20000; ++i) drawn.push_back(draw_fisher(mean, 25.0, 7, 1, i));
  const Resultant r = vector_resultant(drawn);
  // Standard errors: kappa / sqrt N, and 1 / sqrt(kappa N) radians; four of them.
  EXPECT_NEAR(*kappa_fisher(r), 25.0, 4 * 25.0 / std::sqrt(20000.0));
  EXPECT_LT(acos(r.mean.dot(mean)).rad(), 4.0 / std::sqrt(25.0 * 20000.0));
}

TEST(Fisher, TangentsMakeARightHandedFrame) {
  for (const Vector3& axis : {normal(0_deg, 0_deg), normal(90_deg, 17_deg), normal(40_deg, 200_deg),
                              Vector3(-Vector3::UnitZ())}) {
    const Tangents t = tangents(axis);
    EXPECT_NEAR(t.across.z(), 0.0, 1e-15);
    EXPECT_NEAR((t.across.cross(t.along) - axis).norm(), 0.0, 1e-14);
  }
}

}  // namespace
}  // namespace brink
