// Does a Fisher distribution fit, are axes uniform, do samples share a mean? Each with a p value.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <string>

#include "brink/sphere/fisher.hpp"
#include "brink/sphere/tensor.hpp"

namespace brink {

// A test's value, and the probability of one at least as large if the hypothesis holds.
struct TestResult {
  double statistic = 0.0;
  double p_value = 0.0;
};

// Whether R < N: identical directions say nothing about a distribution.
bool scatters(const Resultant& sample);

// Statistics of the three tests of fit of Fisher & Best 1984 (Austral. J. Statist. 26:142; FLE
// 5.3.2), larger for a worse fit. In axes in which the sample mean is the pole:
struct FisherFitStatistics {
  double colatitude = 0.0;    // 1 - cos theta exponential with rate (N-1)/(N-R); Kolmogorov, ME
  double longitude = 0.0;     // azimuth about the mean uniform; Kuiper, MU
  double two_variable = 0.0;  // phi sqrt(sin theta) normal with the mean on the equator; MN
};
// Vectors with a sense (axes turned to one hemisphere first), at least 2, not identical. The
// two-variable value depends on how the frame is turned about the mean: here the equator runs
// through the mean and the horizontal.
FisherFitStatistics fisher_fit_statistics(std::span<const Vector3> vectors);

// The three tests with p values, and the verdict: the test with the smallest p value, that p value
// times 3 (Bonferroni), at most 1.
struct FisherFit {
  std::string test;  // "colatitude (exponential)", "longitude (uniform)" or "two-variable (normal)"
  double statistic = 0.0;
  double p_value = 0.0;
};
struct FisherFitTests {
  TestResult colatitude;
  TestResult longitude;
  TestResult two_variable;
  FisherFit verdict;
};

// The p values are those of a parametric bootstrap: the tables of the three tests hold for a narrow
// range of sizes only, and not at all for a set that was cut out of a larger sample. `replicates`
// are the statistics of samples drawn under the hypothesis and treated as the data were (turned,
// cut). p = (1 + replicates at least as large) / (1 + replicates). Absent for fewer than
// kLeastForFit vectors, for identical ones, and without replicates.
inline constexpr std::size_t kLeastForFit = 8;
std::optional<FisherFitTests> fisher_fit(std::span<const Vector3> vectors,
                                         std::span<const FisherFitStatistics> replicates);
// For a whole sample of axes, with Fisher replicates of the same size and kappa. Samples above 1000
// are thinned to every n-th axis: the cost stays bounded, and what 1000 axes can't show is no
// practical misfit.
std::optional<FisherFitTests> fisher_fit_axes(std::span<const Vector3> axes, std::uint64_t seed = 1,
                                              unsigned threads = 0);
// Number of replicates that fisher_fit_axes draws for a sample of this size: 199 to 999.
std::size_t fit_draws(std::size_t count);

// Bingham's test of uniformity of axes: S = (15/2) N sum (S_i - 1/3)^2 ~ chi-square with 5 degrees
// of freedom (Mardia & Jupp 2000, 10.7). `count` may be an effective number. Absent below 10, where
// the chi-square no longer holds.
std::optional<TestResult> bingham_uniformity(const OrientationTensor& tensor, double count);
// Rayleigh's test of uniformity of vectors: 3 R^2/N ~ chi-square with 3. Wrong for axes.
TestResult rayleigh_uniformity(const Resultant& sample);

// Watson & Williams 1956 (Biometrika 43): F = (N-q)/(q-1) (sum R_i - R)/(N - sum R_i) with 2(q-1)
// and 2(N-q) degrees of freedom: do q samples of one kappa share their mean? Samples of axes: each
// is first turned to the side of the others. Absent for fewer than two samples, N <= q, or where
// nothing scatters.
struct CommonMean {
  TestResult test;
  double numerator_freedom = 0.0;
  double denominator_freedom = 0.0;
};
std::optional<CommonMean> common_mean(std::span<const Resultant> samples);
std::optional<CommonMean> common_mean_axial(std::span<const Resultant> samples);

}  // namespace brink
