// Mixture of axial components and a uniform part, fitted by expectation-maximisation.
//
// Density over the whole sphere: w0/(4 pi) + sum w_j f_j(x). A component is
//  - Fisher: f(x) = kappa/(4 pi sinh kappa) cosh(kappa mu.x), 4 parameters with its weight;
//  - elliptical, angular central Gaussian: f(x) = |A|^(-1/2) (x' A^-1 x)^(-3/2)/(4 pi)
//    (Tyler 1987, Biometrika 74), 6 parameters with its weight.
// EM for the Fisher part is exact, with the hidden sense of each axis: Banerjee, Dhillon, Ghosh &
// Sra 2005, J. Machine Learning Res. 6, for directions; Peel, Whiten & McLachlan 2001, J. Am. Stat.
// Assoc. 96, for joint sets with a uniform part. The update of A is Tyler's, a minorising step. So
// the likelihood never falls.
#pragma once

#include <Eigen/Core>
#include <cstddef>
#include <span>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

enum class Shape { fisher, elliptical };

// Bounds of a component's concentration. Below 1 a Fisher component can't be told from the uniform
// part; 2000 is a spread of 1.3 degrees, about what a compass resolves. The ellipse keeps the
// same upper bound: its axes' variances are at least 1/2000 of the largest.
inline constexpr double kLeastKappa = 1.0;
inline constexpr double kGreatestKappa = 2000.0;

struct Component {
  Shape shape = Shape::fisher;
  double weight = 0.0;
  Vector3 mean = Vector3::UnitZ();                        // elliptical: principal axis of A
  double kappa = kLeastKappa;                             // Fisher only
  Eigen::Matrix3d scatter = Eigen::Matrix3d::Identity();  // A, elliptical only; trace 3
};

struct Mixture {
  double uniform_weight = 1.0;
  std::vector<Component> components;
};

// ln of one component's density at an axis, its weight left out.
double log_density(const Component& component, const Vector3& axis);

// Readings as the fit sees them: equal axes merged and their weights added, in an order that
// depends on the axes alone; arrays padded to a whole number of lanes with weight 0. Whole-degree
// data has at most 32,760 distinct planes.
struct AxisSample {
  std::vector<double> x, y, z, weight;
  std::size_t size = 0;             // distinct axes; the arrays are padded beyond
  std::vector<std::size_t> merged;  // for each reading, its place in the arrays
  double total_weight = 0.0;        // the effective number (sum w)^2 / sum w^2 of the readings
  Vector3 axis(std::size_t i) const { return {x[i], y[i], z[i]}; }
};
// Weights above 0, one a reading, or none for 1 each; scaled to sum to the effective number, so
// that the criterion below counts what the readings are worth.
AxisSample merge_equal_axes(std::span<const Vector3> axes, std::span<const double> weights = {});

// Fewer axes that stand for the sample: cells of about `cell_deg` degrees, each at the mean of its
// axes. For a search over 10^5 and more readings; the fit itself uses all.
AxisSample binned(const AxisSample& sample, Angle cell);

struct MixtureFit {
  Mixture mixture;
  double log_likelihood = 0.0;
  bool converged = false;
  std::vector<double> trace;  // ln likelihood before each step: never falls
};

struct FitLimits {
  std::size_t iterations = 1000;
  double tolerance = 1e-10;  // stop when a step gains less than this times the number of readings
};

// Runs EM from `start`. Bit-identical for any number of threads: fixed blocks added in order.
MixtureFit fit_mixture(const Mixture& start, const AxisSample& sample, const FitLimits& limits,
                       unsigned threads = 1);

// One EM step and the ln likelihood of `mixture` before it. Cost: one pass over the sample.
struct EmStep {
  Mixture next;
  double log_likelihood = 0.0;
};
EmStep em_step(const Mixture& mixture, const AxisSample& sample, unsigned threads = 1);

// Number of free parameters, the weight of each component included: 4 a Fisher component, 6 an
// elliptical one.
std::size_t parameter_count(Shape shape);
std::size_t parameter_count(const Mixture& mixture);
// Bayesian information criterion -2 ln L + p ln N (Schwarz 1978, Ann. Statist. 6), least is best.
double bic(const Mixture& mixture, double log_likelihood, double count);

// The likeliest component of each axis of the sample: 0 the uniform part, k the k-th component; on
// a tie the lowest number.
std::vector<int> classify(const Mixture& mixture, const AxisSample& sample);

}  // namespace brink
