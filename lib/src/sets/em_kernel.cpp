#include "em_kernel.hpp"

#include <Eigen/Dense>
#include <cmath>
#include <numbers>

#include "../base/fast_math.hpp"

namespace brink::detail {

namespace {

// Eight doubles that the compiler splits into whatever registers the machine has.
using Lanes = double __attribute__((vector_size(64), aligned(8), may_alias));

[[gnu::always_inline]] inline const Lanes& lanes(const double* p) {
  return *reinterpret_cast<const Lanes*>(p);
}

[[gnu::always_inline]] inline double sum(const Lanes& v) {
  return ((v[0] + v[1]) + (v[2] + v[3])) + ((v[4] + v[5]) + (v[6] + v[7]));
}

BRINK_CLONES
void fisher_densities(const KernelComponent& c, const Axes& axes, double* __restrict density,
                      double* __restrict lean, double* __restrict total) {
  const double mx = c.m[0];
  const double my = c.m[1];
  const double mz = c.m[2];
  for (std::size_t i = 0; i < axes.count; ++i) {
    const double t = mx * axes.x[i] + my * axes.y[i] + mz * axes.z[i];
    const double towards = c.factor * fast_exp2(c.shift + t);
    const double away = c.factor * fast_exp2(c.shift - t);
    density[i] = towards + away;
    lean[i] = towards - away;
    total[i] += towards + away;
  }
}

BRINK_CLONES
void elliptical_densities(const KernelComponent& c, const Axes& axes, double* __restrict density,
                          double* __restrict lean, double* __restrict total) {
  const auto& q = c.q;
  for (std::size_t i = 0; i < axes.count; ++i) {
    const double x = axes.x[i];
    const double y = axes.y[i];
    const double z = axes.z[i];
    const double form =
        x * (q[0] * x + q[3] * y + q[4] * z) + y * (q[1] * y + q[5] * z) + q[2] * z * z;
    const double inverse = 1.0 / form;
    const double f = c.factor * inverse * std::sqrt(inverse);
    density[i] = f;
    lean[i] = f * inverse;
    total[i] += f;
  }
}

// share = weight / total; returns the block's ln likelihood.
BRINK_CLONES
double shares(const Axes& axes, const double* __restrict total, double* __restrict share,
              double* __restrict terms) {
  for (std::size_t i = 0; i < axes.count; ++i) {
    share[i] = axes.weight[i] / total[i];
    terms[i] = axes.weight[i] * fast_log(total[i]);
  }
  Lanes ln{};
  for (std::size_t i = 0; i < axes.count; i += kLanes) ln += lanes(terms + i);
  return sum(ln);
}

BRINK_CLONES
double weighted_sum(const double* values, std::size_t count) {
  Lanes total{};
  for (std::size_t i = 0; i < count; i += kLanes) total += lanes(values + i);
  return sum(total);
}

BRINK_CLONES
void fisher_sums(const Axes& axes, const double* density, const double* lean, const double* share,
                 KernelSums& sums) {
  Lanes weight{};
  Lanes vx{};
  Lanes vy{};
  Lanes vz{};
  for (std::size_t i = 0; i < axes.count; i += kLanes) {
    const Lanes s = lanes(share + i);
    const Lanes g = s * lanes(lean + i);
    weight += s * lanes(density + i);
    vx += g * lanes(axes.x + i);
    vy += g * lanes(axes.y + i);
    vz += g * lanes(axes.z + i);
  }
  sums.weight += sum(weight);
  sums.moment[0] += sum(vx);
  sums.moment[1] += sum(vy);
  sums.moment[2] += sum(vz);
}

BRINK_CLONES
void elliptical_sums(const Axes& axes, const double* density, const double* lean,
                     const double* share, KernelSums& sums) {
  Lanes weight{};
  Lanes m[6] = {};
  for (std::size_t i = 0; i < axes.count; i += kLanes) {
    const Lanes s = lanes(share + i);
    const Lanes g = s * lanes(lean + i);
    const Lanes x = lanes(axes.x + i);
    const Lanes y = lanes(axes.y + i);
    const Lanes z = lanes(axes.z + i);
    const Lanes gx = g * x;
    const Lanes gy = g * y;
    weight += s * lanes(density + i);
    m[0] += gx * x;
    m[1] += gy * y;
    m[2] += g * z * z;
    m[3] += gx * y;
    m[4] += gx * z;
    m[5] += gy * z;
  }
  sums.weight += sum(weight);
  for (std::size_t k = 0; k < 6; ++k) sums.moment[k] += sum(m[k]);
}

}  // namespace

KernelComponent kernel_component(const Component& component) {
  KernelComponent k;
  if (component.shape == Shape::fisher) {
    const double kappa = component.kappa;
    k.factor = component.weight * kappa / (4.0 * std::numbers::pi * -std::expm1(-2.0 * kappa));
    const Vector3 m = kappa * std::numbers::log2e * component.mean;
    k.m = {m.x(), m.y(), m.z()};
    k.shift = -kappa * std::numbers::log2e;
    return k;
  }
  const Eigen::Matrix3d inverse = component.scatter.inverse();
  k.elliptical = true;
  k.factor =
      component.weight / (4.0 * std::numbers::pi * std::sqrt(component.scatter.determinant()));
  k.q = {inverse(0, 0),       inverse(1, 1),       inverse(2, 2),
         2.0 * inverse(0, 1), 2.0 * inverse(0, 2), 2.0 * inverse(1, 2)};
  return k;
}

void densities(const std::vector<KernelComponent>& components, double uniform, const Axes& axes,
               KernelScratch& scratch) {
  scratch.total.fill(uniform);
  for (std::size_t j = 0; j < components.size(); ++j) {
    double* const density = scratch.density.data() + j * kBlock;
    double* const lean = scratch.lean.data() + j * kBlock;
    const auto run = components[j].elliptical ? elliptical_densities : fisher_densities;
    run(components[j], axes, density, lean, scratch.total.data());
  }
}

double accumulate(const std::vector<KernelComponent>& components, double uniform, const Axes& axes,
                  KernelScratch& scratch, std::vector<KernelSums>& sums, double& uniform_sum) {
  std::array<double, kBlock> terms;
  const double ln = shares(axes, scratch.total.data(), scratch.share.data(), terms.data());
  uniform_sum += uniform * weighted_sum(scratch.share.data(), axes.count);
  for (std::size_t j = 0; j < components.size(); ++j) {
    const double* const density = scratch.density.data() + j * kBlock;
    const double* const lean = scratch.lean.data() + j * kBlock;
    const auto run = components[j].elliptical ? elliptical_sums : fisher_sums;
    run(axes, density, lean, scratch.share.data(), sums[j]);
  }
  return ln;
}

}  // namespace brink::detail
