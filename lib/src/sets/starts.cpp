#include "starts.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"
#include "brink/sphere/fisher.hpp"
#include "brink/sphere/tensor.hpp"
#include "em_kernel.hpp"

namespace brink::detail {

namespace {

// Spread of a new component: about 14 degrees, the middle of what joint sets show; EM finds its
// own from there.
constexpr double kStartKappa = 20.0;
// Widths tried for a new component: 21 and 9 degrees.
constexpr std::array kPeakKappas = {8.0, 40.0};
// Axes tried for a new component. With 200, some stand within a typical set's spread of any place
// where readings crowd.
constexpr std::size_t kPeakTrials = 200;

constexpr double kLeastStartUniform = 0.02;

// A with variances 1 along the mean and 1/kappa across.
Eigen::Matrix3d round_scatter(const Vector3& mean, double kappa) {
  const Eigen::Matrix3d along = mean * mean.transpose();
  return along + (Eigen::Matrix3d::Identity() - along) / kappa;
}

Component component_at(const Vector3& axis, double kappa, Shape shape, double weight) {
  Component c{shape, weight, axis, kappa, Eigen::Matrix3d::Identity()};
  if (shape == Shape::elliptical) c.scatter = round_scatter(axis, kappa);
  return c;
}

// About the second moment of the component, trace 1.
Eigen::Matrix3d moment_of(const Component& c) {
  const Eigen::Matrix3d m =
      c.shape == Shape::elliptical ? c.scatter : round_scatter(c.mean, c.kappa);
  return m / m.trace();
}

double kappa_of_moment(const OrientationTensor& t) {
  const double across = (t.eigenvalues[1] + t.eigenvalues[2]) / 2.0;
  return std::clamp(t.eigenvalues[0] / std::max(across, 1e-12), kLeastKappa, kGreatestKappa);
}

Component component_of_moment(const Eigen::Matrix3d& moment, Shape shape, double weight) {
  const OrientationTensor t = decompose(moment);
  Component c{shape, weight, t.axes[0], kappa_of_moment(t), moment};
  return c;
}

// Densities of the axes of the sample under one mixture, block by block into one array.
std::vector<double> total_densities(const Mixture& mixture, const AxisSample& sample) {
  std::vector<KernelComponent> components;
  for (const Component& c : mixture.components) components.push_back(kernel_component(c));
  KernelScratch scratch(components.size());
  std::vector<double> total(sample.x.size());
  const double uniform = mixture.uniform_weight / (4.0 * std::numbers::pi);
  for (std::size_t at = 0; at < total.size(); at += kBlock) {
    const std::size_t n = std::min(kBlock, total.size() - at);
    densities(components, uniform,
              {&sample.x[at], &sample.y[at], &sample.z[at], &sample.weight[at], n}, scratch);
    std::copy_n(scratch.total.begin(), n, total.begin() + static_cast<std::ptrdiff_t>(at));
  }
  return total;
}

double nearest_squared_sine(const Vector3& axis, const Vector3& centre, double before) {
  const double cosine = axis.dot(centre);
  return std::min(before, std::max(0.0, 1.0 - cosine * cosine));
}

}  // namespace

Component with_shape(const Component& component, Shape shape) {
  if (component.shape == shape) return component;
  if (shape == Shape::elliptical) {
    return component_at(component.mean, component.kappa, shape, component.weight);
  }
  return component_of_moment(component.scatter, shape, component.weight);
}

Mixture with_added(const Mixture& mixture, const Vector3& axis, double kappa, Shape shape) {
  const double share = 1.0 / (static_cast<double>(mixture.components.size()) + 2.0);
  // EM can't revive a uniform part of weight 0, so it starts with a little.
  const double uniform = std::max(mixture.uniform_weight, kLeastStartUniform);
  const double scale = (1.0 - share) / (1.0 - mixture.uniform_weight + uniform);
  Mixture result = mixture;
  result.uniform_weight = uniform * scale;
  for (Component& c : result.components) c.weight *= scale;
  result.components.push_back(component_at(axis, kappa, shape, share));
  return result;
}

Mixture with_merged(const Mixture& mixture, std::size_t i, std::size_t j, Shape shape) {
  const Component& a = mixture.components[i];
  const Component& b = mixture.components[j];
  Mixture result = mixture;
  const double weight = a.weight + b.weight;
  result.components[i] = component_of_moment(
      (a.weight * moment_of(a) + b.weight * moment_of(b)) / weight, shape, weight);
  result.components.erase(result.components.begin() + static_cast<std::ptrdiff_t>(j));
  return result;
}

Mixture with_split(const Mixture& mixture, std::size_t i, const AxisSample& sample) {
  const std::vector<int> labels = classify(mixture, sample);
  Eigen::Matrix3d moment = 1e-6 * moment_of(mixture.components[i]);
  for (std::size_t k = 0; k < sample.size; ++k) {
    if (labels[k] != static_cast<int>(i) + 1) continue;
    moment += sample.weight[k] * sample.axis(k) * sample.axis(k).transpose();
  }
  const OrientationTensor t = decompose(moment);
  const double kappa = std::min(2.0 * kappa_of_moment(t), kGreatestKappa);
  const Vector3 aside = std::sqrt(t.eigenvalues[1]) * t.axes[1];
  const Component old = mixture.components[i];
  Mixture result = mixture;
  result.components[i] =
      component_at((t.axes[0] + aside).normalized(), kappa, old.shape, old.weight / 2.0);
  result.components.push_back(
      component_at((t.axes[0] - aside).normalized(), kappa, old.shape, old.weight / 2.0));
  return result;
}

std::vector<Peak> peaks(const Mixture& mixture, const AxisSample& sample, std::size_t count,
                        Angle apart) {
  std::vector<double> worth = total_densities(mixture, sample);
  for (std::size_t i = 0; i < worth.size(); ++i) worth[i] = sample.weight[i] / worth[i];
  struct Trial {
    Peak peak;
    double gradient;
  };
  std::vector<Trial> trials;
  const std::size_t step = std::max<std::size_t>(1, sample.size / kPeakTrials);
  for (std::size_t i = 0; i < sample.size; i += step) {
    for (const double kappa : kPeakKappas) {
      const Mixture alone{0.0, {component_at(sample.axis(i), kappa, Shape::fisher, 1.0)}};
      const std::vector<double> density = total_densities(alone, sample);
      double gradient = 0.0;
      for (std::size_t k = 0; k < sample.size; ++k) gradient += worth[k] * density[k];
      trials.push_back({{sample.axis(i), kappa}, gradient});
    }
  }
  std::stable_sort(trials.begin(), trials.end(),
                   [](const Trial& a, const Trial& b) { return a.gradient > b.gradient; });
  std::vector<Peak> best;
  const double limit = cos(apart);
  for (const Trial& trial : trials) {
    if (best.size() == count) break;
    const bool taken = std::any_of(best.begin(), best.end(), [&](const Peak& p) {
      return std::abs(p.axis.dot(trial.peak.axis)) > limit;
    });
    if (!taken) best.push_back(trial.peak);
  }
  return best;
}

Mixture spread_start(const AxisSample& sample, std::size_t count, Shape shape, std::uint64_t seed,
                     std::uint64_t stream) {
  const double share = 1.0 / (static_cast<double>(count) + 1.0);
  Mixture start{share, {}};
  std::vector<double> distance(sample.size, 1.0);
  for (std::size_t k = 0; k < count; ++k) {
    double total = 0.0;
    for (std::size_t i = 0; i < sample.size; ++i) total += sample.weight[i] * distance[i];
    double left = random_uniform(seed, stream, k) * total;
    std::size_t drawn = 0;
    while (drawn + 1 < sample.size && left > sample.weight[drawn] * distance[drawn]) {
      left -= sample.weight[drawn] * distance[drawn];
      ++drawn;
    }
    const Vector3 centre = sample.axis(drawn);
    start.components.push_back(component_at(centre, kStartKappa, shape, share));
    for (std::size_t i = 0; i < sample.size; ++i) {
      distance[i] = nearest_squared_sine(sample.axis(i), centre, distance[i]);
    }
  }
  return start;
}

Mixture centred_start(const std::vector<Vector3>& centres) {
  const double share = 1.0 / (static_cast<double>(centres.size()) + 1.0);
  Mixture start{share, {}};
  for (const Vector3& centre : centres) {
    start.components.push_back(component_at(centre, kStartKappa, Shape::fisher, share));
  }
  return start;
}

}  // namespace brink::detail
