#include "brink/sets/mixture.hpp"

#include <Eigen/Dense>
#include <Eigen/Eigenvalues>
#include <algorithm>
#include <array>
#include <cassert>
#include <cmath>
#include <numbers>

#include "brink/base/parallel.hpp"
#include "brink/sphere/fisher.hpp"
#include "em_kernel.hpp"

namespace brink {

namespace {

using detail::Axes;
using detail::kBlock;
using detail::KernelComponent;
using detail::KernelScratch;
using detail::KernelSums;

constexpr double kUniformDensity = 1.0 / (4.0 * std::numbers::pi);
// Axes a chunk of the pass: enough work to hide the cost of handing it to a thread.
constexpr std::size_t kChunk = 16 * kBlock;

std::vector<KernelComponent> kernel_components(const Mixture& mixture) {
  std::vector<KernelComponent> components;
  components.reserve(mixture.components.size());
  for (const Component& c : mixture.components) {
    components.push_back(detail::kernel_component(c));
  }
  return components;
}

Axes block_of(const AxisSample& sample, std::size_t begin, std::size_t end) {
  return {sample.x.data() + begin, sample.y.data() + begin, sample.z.data() + begin,
          sample.weight.data() + begin, end - begin};
}

struct ChunkSums {
  std::vector<KernelSums> components;
  double uniform = 0.0;
  double log_likelihood = 0.0;
};

ChunkSums chunk_sums(const std::vector<KernelComponent>& components, double uniform,
                     const AxisSample& sample, std::size_t begin, std::size_t end) {
  ChunkSums sums{std::vector<KernelSums>(components.size()), 0.0, 0.0};
  KernelScratch scratch(components.size());
  for (std::size_t at = begin; at < end; at += kBlock) {
    const Axes axes = block_of(sample, at, std::min(end, at + kBlock));
    detail::densities(components, uniform, axes, scratch);
    sums.log_likelihood +=
        detail::accumulate(components, uniform, axes, scratch, sums.components, sums.uniform);
  }
  return sums;
}

void add(ChunkSums& total, const ChunkSums& part) {
  total.uniform += part.uniform;
  total.log_likelihood += part.log_likelihood;
  for (std::size_t j = 0; j < total.components.size(); ++j) {
    total.components[j].weight += part.components[j].weight;
    for (std::size_t k = 0; k < 6; ++k) {
      total.components[j].moment[k] += part.components[j].moment[k];
    }
  }
}

ChunkSums expectation(const Mixture& mixture, const AxisSample& sample, unsigned threads) {
  const std::vector<KernelComponent> components = kernel_components(mixture);
  const double uniform = mixture.uniform_weight * kUniformDensity;
  const std::size_t padded = sample.x.size();
  if (padded <= kChunk) return chunk_sums(components, uniform, sample, 0, padded);
  std::vector<ChunkSums> parts(chunk_total(padded, kChunk));
  for_each_chunk(padded, kChunk, threads,
                 [&](std::size_t chunk, std::size_t begin, std::size_t end) {
                   parts[chunk] = chunk_sums(components, uniform, sample, begin, end);
                 });
  ChunkSums total = std::move(parts.front());
  for (std::size_t i = 1; i < parts.size(); ++i) add(total, parts[i]);
  return total;
}

Component next_fisher(const Component& old, const KernelSums& sums) {
  Component next = old;
  const Vector3 v(sums.moment[0], sums.moment[1], sums.moment[2]);
  const double length = v.norm();
  if (length > 0.0) next.mean = v / length;
  next.kappa = std::clamp(kappa_of_mean_cosine(length / sums.weight), kLeastKappa, kGreatestKappa);
  return next;
}

// Where sum (ln a + s/a) is least with the smallest a at least 1/kGreatestKappa of the largest,
// given descending s. Where the bound binds, the smallest follows the largest, and the middle one
// joins whichever of the two it would pass.
Vector3 bounded_variances(const Vector3& s) {
  constexpr double k = kGreatestKappa;
  if (s(2) * k >= s(0)) return s;
  const double free = (s(0) + k * s(2)) / 2.0;
  if (s(1) > free) {
    const double tied = (s(0) + s(1) + k * s(2)) / 3.0;
    return {tied, tied, tied / k};
  }
  if (s(1) * k >= free) return {free, s(1), free / k};
  const double tied = (s(0) + k * (s(1) + s(2))) / 3.0;
  return {tied, tied / k, tied / k};
}

Component next_elliptical(const Component& old, const KernelSums& sums) {
  const auto& m = sums.moment;
  Eigen::Matrix3d scatter;
  scatter << m[0], m[3], m[4], m[3], m[1], m[5], m[4], m[5], m[2];
  const Eigen::SelfAdjointEigenSolver<Eigen::Matrix3d> solver(scatter * (3.0 / sums.weight));
  const Vector3 ascending = solver.eigenvalues().cwiseMax(0.0);
  const Vector3 bounded = bounded_variances(ascending.reverse());
  const Eigen::Matrix3d& axes = solver.eigenvectors();
  Component next = old;
  const Eigen::Matrix3d a = axes * bounded.reverse().asDiagonal() * axes.transpose();
  next.scatter = a * (3.0 / a.trace());
  next.mean = axes.col(2);
  return next;
}

Mixture maximised(const Mixture& old, const ChunkSums& sums) {
  Mixture next;
  double total = sums.uniform;
  for (const KernelSums& s : sums.components) total += s.weight;
  next.uniform_weight = sums.uniform / total;
  for (std::size_t j = 0; j < old.components.size(); ++j) {
    const KernelSums& s = sums.components[j];
    Component component = old.components[j];
    // A component that nothing belongs to any more stays where it was.
    if (s.weight > 1e-200) {
      component = component.shape == Shape::fisher ? next_fisher(component, s)
                                                   : next_elliptical(component, s);
    }
    component.weight = s.weight / total;
    next.components.push_back(component);
  }
  return next;
}

// The likeliest part at place i of a block; ties go to the lowest number.
int likeliest(const KernelScratch& scratch, std::size_t components, double uniform, std::size_t i) {
  int best = 0;
  double greatest = uniform;
  for (std::size_t j = 0; j < components; ++j) {
    const double density = scratch.density[j * kBlock + i];
    if (density > greatest) {
      greatest = density;
      best = static_cast<int>(j) + 1;
    }
  }
  return best;
}

}  // namespace

double log_density(const Component& component, const Vector3& axis) {
  if (component.shape == Shape::fisher) {
    return log_axial_density(component.kappa, component.mean.dot(axis));
  }
  const double form = axis.dot(component.scatter.inverse() * axis);
  return -1.5 * std::log(form) - 0.5 * std::log(component.scatter.determinant()) +
         std::log(kUniformDensity);
}

EmStep em_step(const Mixture& mixture, const AxisSample& sample, unsigned threads) {
  const ChunkSums sums = expectation(mixture, sample, threads);
  return {maximised(mixture, sums), sums.log_likelihood};
}

MixtureFit fit_mixture(const Mixture& start, const AxisSample& sample, const FitLimits& limits,
                       unsigned threads) {
  MixtureFit fit{start, 0.0, false, {}};
  const double least_gain = limits.tolerance * sample.total_weight;
  for (std::size_t i = 0;; ++i) {
    EmStep step = em_step(fit.mixture, sample, threads);
    // Rounding of a sum of that many terms is all that the likelihood may lose.
    assert(fit.trace.empty() ||
           step.log_likelihood >= fit.trace.back() - 1e-9 * sample.total_weight);
    fit.converged = !fit.trace.empty() && step.log_likelihood - fit.trace.back() <= least_gain;
    fit.trace.push_back(step.log_likelihood);
    fit.log_likelihood = step.log_likelihood;
    if (fit.converged || i >= limits.iterations) return fit;
    fit.mixture = std::move(step.next);
  }
}

std::size_t parameter_count(Shape shape) {
  return shape == Shape::fisher ? 4 : 6;
}

std::size_t parameter_count(const Mixture& mixture) {
  std::size_t count = 0;
  for (const Component& c : mixture.components) count += parameter_count(c.shape);
  return count;
}

double bic(const Mixture& mixture, double log_likelihood, double count) {
  return -2.0 * log_likelihood + static_cast<double>(parameter_count(mixture)) * std::log(count);
}

std::vector<int> classify(const Mixture& mixture, const AxisSample& sample) {
  const std::vector<KernelComponent> components = kernel_components(mixture);
  const double uniform = mixture.uniform_weight * kUniformDensity;
  KernelScratch scratch(components.size());
  std::vector<int> labels(sample.size);
  for (std::size_t at = 0; at < sample.size; at += kBlock) {
    const Axes axes = block_of(sample, at, std::min(sample.x.size(), at + kBlock));
    detail::densities(components, uniform, axes, scratch);
    for (std::size_t i = 0; i < axes.count && at + i < sample.size; ++i) {
      labels[at + i] = likeliest(scratch, components.size(), uniform, i);
    }
  }
  return labels;
}

}  // namespace brink
