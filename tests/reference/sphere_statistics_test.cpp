// Statistics on the sphere against the GNU Scientific Library, which the library itself doesn't
// use.
#include <gsl/gsl_cdf.h>
#include <gsl/gsl_eigen.h>
#include <gsl/gsl_sort_vector.h>
#include <gtest/gtest.h>

#include "brink/base/random.hpp"
#include "brink/sphere/fisher.hpp"
#include "brink/sphere/goodness.hpp"
#include "brink/sphere/tensor.hpp"

namespace brink {
namespace {

std::vector<Vector3> sample(std::uint64_t stream, double kappa, std::size_t count) {
  std::vector<Vector3> axes;
  const double z = random_uniform(8, stream, 0);
  const Vector3 mean = draw_uniform(z, random_uniform(8, stream, 1));
  for (std::size_t i = 0; i < count; ++i) axes.push_back(draw_fisher(mean, kappa, 8, stream, i));
  return axes;
}

TEST(GslReference, EigenvaluesOfOrientationTensors) {
  gsl_eigen_symm_workspace* const work = gsl_eigen_symm_alloc(3);
  gsl_vector* const values = gsl_vector_alloc(3);
  for (std::uint64_t s = 0; s < 200; ++s) {
    const OrientationTensor t = orientation_tensor(sample(s, 0.5 + static_cast<double>(s), 30));
    Eigen::Matrix3d copy = t.matrix;
    gsl_matrix_view view = gsl_matrix_view_array(copy.data(), 3, 3);
    gsl_eigen_symm(&view.matrix, values, work);
    gsl_sort_vector(values);
    for (std::size_t k = 0; k < 3; ++k) {
      EXPECT_NEAR(t.eigenvalues[k], gsl_vector_get(values, 2 - k), 1e-14);
    }
  }
  gsl_vector_free(values);
  gsl_eigen_symm_free(work);
}

TEST(GslReference, KappaInterval) {
  for (std::uint64_t s = 0; s < 50; ++s) {
    const Resultant r = vector_resultant(sample(s, 20.0, 5 + 3 * s));
    const double freedom = 2.0 * (r.count - 1.0);
    const double scale = 2.0 * (r.count - r.length);
    const auto interval = kappa_interval(r);
    ASSERT_TRUE(interval);
    EXPECT_NEAR(interval->low * scale / gsl_cdf_chisq_Pinv(0.025, freedom), 1.0, 1e-9);
    EXPECT_NEAR(interval->high * scale / gsl_cdf_chisq_Qinv(0.025, freedom), 1.0, 1e-9);
  }
}

TEST(GslReference, TailsOfTheTests) {
  for (std::uint64_t s = 0; s < 50; ++s) {
    const auto axes = sample(s, 1.0 + 0.1 * static_cast<double>(s), 25);
    const auto bingham = bingham_uniformity(orientation_tensor(axes), 25.0);
    EXPECT_NEAR(bingham->p_value / gsl_cdf_chisq_Q(bingham->statistic, 5.0), 1.0, 1e-9);
    const std::vector<Resultant> pair{vector_resultant(sample(s, 30.0, 12)),
                                      vector_resultant(sample(s, 30.0, 17))};
    const auto f = common_mean(pair);
    EXPECT_NEAR(f->test.p_value,
                gsl_cdf_fdist_Q(f->test.statistic, f->numerator_freedom, f->denominator_freedom),
                1e-10);
  }
}

}  // namespace
}  // namespace brink
