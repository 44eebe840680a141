// Orientation tensor of axes, its eigenvalues, and Woodcock's shape and strength.
#pragma once

#include <Eigen/Core>
#include <array>
#include <span>

#include "brink/orientation/orientation.hpp"

namespace brink {

// T = sum w n n^T / sum w (Scheidegger 1965; Woodcock 1977, GSA Bull. 88:1231). Trace 1; the sense
// of an axis doesn't matter.
struct OrientationTensor {
  Eigen::Matrix3d matrix = Eigen::Matrix3d::Zero();
  std::array<double, 3> eigenvalues{};  // descending, each at least 0, sum 1
  std::array<Vector3, 3> axes{};        // unit eigenvectors in the same order, turned upward
};

// Weights as in fisher.hpp. At least one axis.
OrientationTensor orientation_tensor(std::span<const Vector3> axes,
                                     std::span<const double> weights = {});
// The decomposition of a symmetric matrix scaled to trace 1.
OrientationTensor decompose(const Eigen::Matrix3d& symmetric);

// ln(S1/S2)/ln(S2/S3): above 1 a cluster, below 1 a girdle. Infinite where S2 = S3, 0 where S1 = S2
// and S2 > S3 (Woodcock 1977). S3 = 0 < S2 gives 0: a perfect girdle.
double woodcock_shape(const std::array<double, 3>& eigenvalues);
// ln(S1/S3); infinite where S3 = 0.
double woodcock_strength(const std::array<double, 3>& eigenvalues);

}  // namespace brink
