// The arithmetic of one EM pass over one block of axes. No log-sum-exp: the densities are bounded
// (kappa at most 2000) and the uniform part or the padding keeps their sum above 0.
#pragma once

#include <array>
#include <cstddef>
#include <vector>

#include "brink/sets/mixture.hpp"

namespace brink::detail {

// Axes are handled in lanes of 8, so that sums have the same order on every instruction set.
inline constexpr std::size_t kLanes = 8;
inline constexpr std::size_t kBlock = 256;

// A component ready for the loop. Fisher: `m` = kappa log2(e) mu and `shift` = -kappa log2(e), so
// that the density is factor (2^(m.x + shift) + 2^(shift - m.x)). Elliptical: `q` holds the upper
// triangle xx yy zz xy xz yz of A^-1 with the mixed terms doubled; density factor q^(-3/2).
struct KernelComponent {
  bool elliptical = false;
  double factor = 0.0;
  std::array<double, 3> m{};
  double shift = 0.0;
  std::array<double, 6> q{};
};
KernelComponent kernel_component(const Component& component);

// Expected sums of one component: weight, and sum r tanh(kappa mu.x) x (Fisher, 3 numbers) or sum
// (r/q) x x' (elliptical, xx yy zz xy xz yz).
struct KernelSums {
  double weight = 0.0;
  std::array<double, 6> moment{};
};

struct Axes {
  const double* x;
  const double* y;
  const double* z;
  const double* weight;
  std::size_t count;  // a multiple of kLanes, at most kBlock
};

// Room for one block: densities, signed densities, their sum.
struct KernelScratch {
  explicit KernelScratch(std::size_t components)
      : density(components * kBlock), lean(components * kBlock) {}
  std::vector<double> density;
  std::vector<double> lean;
  std::array<double, kBlock> total{};
  std::array<double, kBlock> share{};
};

// Fills scratch.density (component by component), scratch.lean and scratch.total.
void densities(const std::vector<KernelComponent>& components, double uniform, const Axes& axes,
               KernelScratch& scratch);

// Adds this block's sums to `sums`, its expected uniform weight to `uniform_sum`, and returns its
// part of the ln likelihood. Call densities() first.
double accumulate(const std::vector<KernelComponent>& components, double uniform, const Axes& axes,
                  KernelScratch& scratch, std::vector<KernelSums>& sums, double& uniform_sum);

}  // namespace brink::detail
