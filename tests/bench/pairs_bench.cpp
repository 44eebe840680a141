// All pairs of readings on one face (kinematics/pairs.hpp), beside a plain loop of the same work
// and a loop of nothing but multiplications and additions: what the machine can do at best.
// Compare by ratios, on one thread; run with --benchmark_repetitions=5.
#include <benchmark/benchmark.h>

#include <Eigen/Geometry>
#include <cmath>
#include <vector>

#include "../../lib/src/base/clones.hpp"
#include "brink/base/random.hpp"
#include "brink/base/ties.hpp"
#include "brink/kinematics/kinematics.hpp"
#include "brink/kinematics/pairs.hpp"

namespace {

using namespace brink;

const Face kFace{65_deg, 120_deg};
const ModeSettings kSettings{.friction = 30_deg};

Readings uniform_readings(std::size_t count) {
  Readings readings;
  for (std::size_t i = 0; i < count; ++i) {
    const Angle dip = brink::acos(random_uniform(1, 0, i));
    const Plane plane{Angle::degrees(std::round(dip.deg())),
                      Angle::degrees(std::floor(360.0 * random_uniform(1, 1, i)))};
    readings.planes.push_back(plane);
    readings.normals.push_back(upward_normal(plane));
    readings.weights.push_back(1.0);
  }
  return readings;
}

PairReadings arranged(const benchmark::State& state) {
  const auto count = static_cast<std::size_t>(state.range(0));
  return arrange_by_set(uniform_readings(count), std::vector<int>(count, 0), 0);
}

void report_pairs(benchmark::State& state) {
  const auto n = static_cast<double>(state.range(0));
  state.counters["pairs/s"] =
      benchmark::Counter(n * (n - 1.0) / 2.0, benchmark::Counter::kIsIterationInvariantRate);
}

// Wedge sliding, block toppling and dry factors of safety of every pair, by set and by reading.
void all_pairs(benchmark::State& state) {
  const PairReadings readings = arranged(state);
  const FaceLimits limits = prepare_limits(kFace, kSettings);
  for (auto _ : state) {
    benchmark::DoNotOptimize(count_pairs(readings, limits, kSettings.friction, 1));
  }
  report_pairs(state);
}
BENCHMARK(all_pairs)->Arg(2000)->Arg(10000)->Unit(benchmark::kMillisecond);

// Pairs that have a line at all: the least that a pass over pairs costs.
void pairs_with_a_line(benchmark::State& state) {
  const PairReadings readings = arranged(state);
  for (auto _ : state) benchmark::DoNotOptimize(count_lines(readings, 1));
  report_pairs(state);
}
BENCHMARK(pairs_with_a_line)->Arg(2000)->Arg(10000)->Unit(benchmark::kMillisecond);

// The plain twin of the wedge count alone: unit vectors, one pair at a time.
void plain_wedge_loop(benchmark::State& state) {
  const Readings readings = uniform_readings(static_cast<std::size_t>(state.range(0)));
  const FaceLimits limits = prepare_limits(kFace, kSettings);
  for (auto _ : state) {
    std::size_t count = 0;
    for (std::size_t i = 0; i < readings.size(); ++i) {
      for (std::size_t j = 0; j < i; ++j) {
        const Vector3 line = readings.normals[i].cross(readings.normals[j]);
        const double length = line.norm();
        if (length > kParallel && wedge_sliding(limits, line / length)) ++count;
      }
    }
    benchmark::DoNotOptimize(count);
  }
  report_pairs(state);
}
BENCHMARK(plain_wedge_loop)->Arg(2000)->Unit(benchmark::kMillisecond);

// 12 products and 12 sums on each of 256 numbers.
BRINK_CLONES void multiply_and_add(double* __restrict numbers) {
  for (int k = 0; k < 12; ++k) {
    for (int i = 0; i < 256; ++i) numbers[i] = numbers[i] * 0.999 + 0.001;
  }
}

// As much arithmetic a pair, and nothing else.
void multiply_and_add_only(benchmark::State& state) {
  const auto n = static_cast<std::size_t>(state.range(0));
  const std::size_t pairs = n * (n - 1) / 2;
  std::vector<double> numbers(256, 1.0);
  for (auto _ : state) {
    for (std::size_t pair = 0; pair < pairs; pair += numbers.size()) {
      multiply_and_add(numbers.data());
      benchmark::ClobberMemory();
    }
  }
  report_pairs(state);
}
BENCHMARK(multiply_and_add_only)->Arg(2000)->Arg(10000)->Unit(benchmark::kMillisecond);

// The command's whole work on one face, intervals included, on all cores.
void kinematics_of_one_face(benchmark::State& state) {
  const auto count = static_cast<std::size_t>(state.range(0));
  const Readings readings = uniform_readings(count);
  KinematicsOptions options;
  options.faces = {kFace};
  options.friction = kSettings.friction;
  const std::vector<int> no_sets(count, 0);
  for (auto _ : state) {
    benchmark::DoNotOptimize(test_kinematics(readings, no_sets, 0, options));
  }
  report_pairs(state);
}
BENCHMARK(kinematics_of_one_face)->Arg(2000)->Unit(benchmark::kMillisecond)->UseRealTime();

}  // namespace
