#include "brink/sphere/tensor.hpp"

#include <Eigen/Eigenvalues>
#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>

#include "brink/base/ties.hpp"

namespace brink {

namespace {

constexpr double kInfinite = std::numeric_limits<double>::infinity();

Vector3 turned_upward(const Vector3& axis) {
  const bool down = axis.z() < 0.0 || (axis.z() == 0.0 && axis.y() < 0.0);
  return down ? Vector3(-axis) : axis;
}

}  // namespace

OrientationTensor orientation_tensor(std::span<const Vector3> axes,
                                     std::span<const double> weights) {
  assert(!axes.empty() && (weights.empty() || weights.size() == axes.size()));
  Eigen::Matrix3d sum = Eigen::Matrix3d::Zero();
  for (std::size_t i = 0; i < axes.size(); ++i) {
    sum += (weights.empty() ? 1.0 : weights[i]) * axes[i] * axes[i].transpose();
  }
  return decompose(sum);
}

OrientationTensor decompose(const Eigen::Matrix3d& symmetric) {
  OrientationTensor tensor;
  tensor.matrix = symmetric / symmetric.trace();
  // The iterative solver, not the closed form: it keeps full accuracy where eigenvalues nearly
  // meet.
  const Eigen::SelfAdjointEigenSolver<Eigen::Matrix3d> solver(tensor.matrix);
  for (int k = 0; k < 3; ++k) {
    const auto slot = static_cast<std::size_t>(k);
    tensor.eigenvalues[slot] = std::max(0.0, solver.eigenvalues()(2 - k));
    tensor.axes[slot] = turned_upward(solver.eigenvectors().col(2 - k));
  }
  return tensor;
}

double woodcock_shape(const std::array<double, 3>& s) {
  if (at_most(s[1], s[2])) return kInfinite;
  if (at_most(s[2], 0.0)) return 0.0;
  return std::log(s[0] / s[1]) / std::log(s[1] / s[2]);
}

double woodcock_strength(const std::array<double, 3>& s) {
  return at_most(s[2], 0.0) ? kInfinite : std::log(s[0] / s[2]);
}

}  // namespace brink
