// Wedges: one, and a million drawn. Beside the simulation its plain twin: one draw after another
// by the full analysis, with the standard library's generators.
#include <benchmark/benchmark.h>

#include <Eigen/Geometry>
#include <cmath>
#include <numbers>
#include <random>

#include "brink/risk/monte_carlo.hpp"

namespace brink {
namespace {

WedgeSimulation uncertain_wedge(std::uint64_t draws) {
  WedgeSimulation s;
  s.wedge.geometry.plane1 = {50_deg, 135_deg};
  s.wedge.geometry.plane2 = {55_deg, 235_deg};
  s.wedge.geometry.face = {65_deg, 180_deg};
  s.wedge.geometry.size.value = 30.0;
  s.wedge.unit_weight_kN_m3 = 26.0;
  s.plane1.fisher_k = s.plane2.fisher_k = 200.0;
  s.friction1 = s.friction2 = parse_distribution("", "normal(32, 3)");
  s.cohesion1 = s.cohesion2 = parse_distribution("", "uniform(0, 40)");
  s.water_fill = parse_distribution("", "uniform(0, 1)");
  s.draws = draws;
  s.threads = 1;
  return s;
}

void simulation(benchmark::State& state) {
  const WedgeSimulation s = uncertain_wedge(static_cast<std::uint64_t>(state.range(0)));
  for (auto _ : state) benchmark::DoNotOptimize(simulate_wedge(s).fails.value);
  state.SetItemsProcessed(state.iterations() * state.range(0));
}
BENCHMARK(simulation)->Arg(1'000'000)->Unit(benchmark::kMillisecond);

void simulation_plain_twin(benchmark::State& state) {
  const WedgeSimulation s = uncertain_wedge(1);
  std::mt19937_64 draw(7);
  std::uniform_real_distribution<double> unit;
  std::normal_distribution<double> friction(32.0, 3.0);
  const auto fisher = [&](const Plane& mean, double k) {
    const Vector3 m = upward_normal(mean);
    const double u = unit(draw), turn = 2.0 * std::numbers::pi * unit(draw);
    const double c = 1.0 + std::log(u + (1.0 - u) * std::exp(-2.0 * k)) / k;
    const Vector3 e = m.cross(Vector3(0, 0, 1)).normalized();
    return plane_of_normal(c * m + std::sqrt(1.0 - c * c) *
                                       (std::cos(turn) * e + std::sin(turn) * m.cross(e)));
  };
  for (auto _ : state) {
    std::int64_t fails = 0;
    for (std::int64_t i = 0; i < state.range(0); ++i) {
      WedgeCase w = s.wedge;
      w.geometry.plane1 = fisher(s.wedge.geometry.plane1, 200.0);
      w.geometry.plane2 = fisher(s.wedge.geometry.plane2, 200.0);
      w.strength1 = MohrCoulomb{40.0 * unit(draw), Angle::degrees(friction(draw))};
      w.strength2 = MohrCoulomb{40.0 * unit(draw), Angle::degrees(friction(draw))};
      w.water = WaterFill{unit(draw)};
      const WedgeResult r = analyse_wedge(w);
      fails += r.forms && r.factor_of_safety < 1.0;
    }
    benchmark::DoNotOptimize(fails);
  }
  state.SetItemsProcessed(state.iterations() * state.range(0));
}
BENCHMARK(simulation_plain_twin)->Arg(10'000)->Unit(benchmark::kMillisecond);

void one_wedge(benchmark::State& state) {
  const WedgeSimulation s = uncertain_wedge(1);
  for (auto _ : state) benchmark::DoNotOptimize(analyse_wedge(s.wedge).factor_of_safety);
}
BENCHMARK(one_wedge);

}  // namespace
}  // namespace brink
