// Finding sets: one step of expectation-maximisation beside a plain loop of the same work, and the
// whole search with the number of sets chosen. Compare by ratios, on one thread; run with
// --benchmark_repetitions=5.
#include <benchmark/benchmark.h>

#include <array>
#include <cmath>
#include <numbers>
#include <vector>

#include "brink/sets/mixture.hpp"
#include "brink/sets/sets.hpp"
#include "scenario.hpp"

namespace {

using namespace brink;

constexpr std::size_t kSets = 5;

Readings five_sets(std::size_t count) {
  const bench::Recipe recipe{.readings = count, .sets = kSets, .noise_share = 0.1};
  return bench::simulate(recipe, 7).readings;
}

Mixture even_start(const Readings& readings) {
  Mixture start{.uniform_weight = 0.1, .components = {}};
  for (std::size_t k = 0; k < kSets; ++k) {
    Component component;
    component.weight = 0.9 / static_cast<double>(kSets);
    component.mean = readings.normals[7 * k];
    component.kappa = 10.0;
    start.components.push_back(component);
  }
  return start;
}

void step(benchmark::State& state) {
  const Readings readings = five_sets(static_cast<std::size_t>(state.range(0)));
  const AxisSample sample = merge_equal_axes(readings.normals);
  const Mixture start = even_start(readings);
  for (auto _ : state) benchmark::DoNotOptimize(em_step(start, sample));
}
BENCHMARK(step)->Arg(100'000)->Unit(benchmark::kMicrosecond);

// What one writes first: the standard library's functions, reading by reading.
double plain_pass(const Readings& readings, const Mixture& mixture) {
  std::array<Vector3, kSets> sums;
  sums.fill(Vector3::Zero());
  std::array<double, kSets> shares{};
  double log_likelihood = 0.0;
  for (const Vector3& x : readings.normals) {
    std::array<double, kSets> density{};
    double total = mixture.uniform_weight / (4.0 * std::numbers::pi);
    for (std::size_t k = 0; k < kSets; ++k) {
      const Component& c = mixture.components[k];
      density[k] = c.weight * c.kappa / (4.0 * std::numbers::pi * std::sinh(c.kappa)) *
                   std::cosh(c.kappa * c.mean.dot(x));
      total += density[k];
    }
    for (std::size_t k = 0; k < kSets; ++k) {
      const Component& c = mixture.components[k];
      const double share = density[k] / total;
      shares[k] += share;
      sums[k] += share * std::tanh(c.kappa * c.mean.dot(x)) * x;
    }
    log_likelihood += std::log(total);
  }
  benchmark::DoNotOptimize(sums);
  benchmark::DoNotOptimize(shares);
  return log_likelihood;
}

void step_plain(benchmark::State& state) {
  const Readings readings = five_sets(static_cast<std::size_t>(state.range(0)));
  const Mixture start = even_start(readings);
  for (auto _ : state) benchmark::DoNotOptimize(plain_pass(readings, start));
}
BENCHMARK(step_plain)->Arg(100'000)->Unit(benchmark::kMicrosecond);

void whole_search(benchmark::State& state) {
  const Readings readings = five_sets(static_cast<std::size_t>(state.range(0)));
  FindSetsOptions options;
  options.threads = 1;
  for (auto _ : state) benchmark::DoNotOptimize(find_sets(readings, options));
}
BENCHMARK(whole_search)->Arg(500)->Arg(5'000)->Arg(100'000)->Unit(benchmark::kMillisecond);

}  // namespace
