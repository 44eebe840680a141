// Kernel density at 10,000 places (sphere/density.hpp): axis by axis and in cells, beside a plain
// loop with the standard library's exponential and a loop of nothing but multiplications and
// additions: what the machine can do at best without passing anything over. Compare by ratios, on
// one thread; run with --benchmark_repetitions=5.
#include <benchmark/benchmark.h>

#include <cmath>
#include <numbers>
#include <vector>

#include "../../lib/src/base/clones.hpp"
#include "brink/base/random.hpp"
#include "brink/sphere/density.hpp"

namespace {

using namespace brink;

constexpr double kConcentration = 100.0;
constexpr std::size_t kPlaces = 10000;

// Four clusters of 22 % each about these dips and directions, the rest uniform; full precision.
std::vector<Vector3> clustered_axes(std::size_t count) {
  const Plane means[] = {{60_deg, 110_deg}, {70_deg, 220_deg}, {35_deg, 300_deg}, {80_deg, 20_deg}};
  std::vector<Vector3> axes;
  for (std::size_t i = 0; i < count; ++i) {
    const double azimuth = 2.0 * std::numbers::pi * random_uniform(1, 0, i);
    const double z = 2.0 * random_uniform(1, 1, i) - 1.0;
    const double across = std::sqrt(1.0 - z * z);
    const Vector3 uniform(across * std::cos(azimuth), across * std::sin(azimuth), z);
    const double choice = random_uniform(1, 2, i) / 0.22;
    axes.push_back(choice >= 4.0 ? uniform
                                 : Vector3((upward_normal(means[static_cast<std::size_t>(choice)]) +
                                            0.2 * uniform)
                                               .normalized()));
  }
  return axes;
}

// Even over the lower hemisphere: a spiral of equal steps in z.
std::vector<Vector3> places() {
  std::vector<Vector3> all;
  for (std::size_t i = 0; i < kPlaces; ++i) {
    const double z = -(static_cast<double>(i) + 0.5) / static_cast<double>(kPlaces);
    const double turn = std::numbers::pi * (1.0 + std::sqrt(5.0)) * static_cast<double>(i);
    const double across = std::sqrt(1.0 - z * z);
    all.emplace_back(across * std::cos(turn), across * std::sin(turn), z);
  }
  return all;
}

void report(benchmark::State& state) {
  state.counters["kernels/s"] =
      benchmark::Counter(static_cast<double>(state.range(0)) * static_cast<double>(kPlaces),
                         benchmark::Counter::kIsIterationInvariantRate);
}

void density_with(benchmark::State& state, DensityMethod method) {
  const auto axes = clustered_axes(static_cast<std::size_t>(state.range(0)));
  const auto where = places();
  for (auto _ : state) {
    const AxialDensity density(axes, {}, kConcentration, method);
    benchmark::DoNotOptimize(density.at(where, 1));
  }
  report(state);
}
void density_direct(benchmark::State& state) {
  density_with(state, DensityMethod::direct);
}
BENCHMARK(density_direct)->Arg(10000)->Arg(100000)->Unit(benchmark::kMillisecond);
void density_binned(benchmark::State& state) {
  density_with(state, DensityMethod::binned);
}
BENCHMARK(density_binned)->Arg(100000)->Arg(1000000)->Unit(benchmark::kMillisecond);

void density_plain(benchmark::State& state) {
  const auto axes = clustered_axes(static_cast<std::size_t>(state.range(0)));
  const auto where = places();
  std::vector<double> values(where.size());
  for (auto _ : state) {
    for (std::size_t j = 0; j < where.size(); ++j) {
      double sum = 0.0;
      for (const Vector3& a : axes) {
        sum += std::exp(kConcentration * (std::abs(a.dot(where[j])) - 1.0));
      }
      values[j] = sum;
    }
    benchmark::DoNotOptimize(values.data());
  }
  report(state);
}
BENCHMARK(density_plain)->Arg(10000)->Unit(benchmark::kMillisecond);

// Twelve products and twelve sums a kernel, as the direct method's loop has, on numbers in
// registers.
BRINK_CLONES void only_arithmetic(std::size_t kernels, double* lanes) {
  for (std::size_t i = 0; i < kernels / 64; ++i) {
    for (std::size_t j = 0; j < 64; ++j) {
      double v = lanes[j];
      for (int k = 0; k < 12; ++k) v = v * 0.999 + 0.001;
      lanes[j] = v;
    }
  }
}
void density_arithmetic_limit(benchmark::State& state) {
  std::vector<double> lanes(64, 0.5);
  for (auto _ : state) {
    only_arithmetic(static_cast<std::size_t>(state.range(0)) * kPlaces, lanes.data());
    benchmark::DoNotOptimize(lanes.data());
  }
  report(state);
}
BENCHMARK(density_arithmetic_limit)->Arg(10000)->Unit(benchmark::kMillisecond);

}  // namespace
