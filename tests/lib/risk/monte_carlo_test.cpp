#include "brink/risk/monte_carlo.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <memory>
#include <random>

#include "brink/base/error.hpp"
#include "brink/orientation/intersection.hpp"
#include "reference/wedge_twin.hpp"
#include "risk/draws.hpp"
#include "risk/wedge_kernel.hpp"

namespace brink {
namespace {

WedgeSimulation uncertain_wedge() {
  WedgeSimulation s;
  s.wedge.geometry.plane1 = {50_deg, 135_deg};
  s.wedge.geometry.plane2 = {55_deg, 235_deg};
  s.wedge.geometry.face = {65_deg, 180_deg};
  s.wedge.geometry.size.value = 30;
  s.wedge.unit_weight_kN_m3 = 26;
  s.wedge.strength1 = s.wedge.strength2 = MohrCoulomb{0, 32_deg};
  s.plane1.fisher_k = s.plane2.fisher_k = 200.0;
  s.friction1 = s.friction2 = parse_distribution("", "normal(32, 3)");
  s.cohesion1 = s.cohesion2 = parse_distribution("", "uniform(0, 40)");
  s.water_fill = parse_distribution("", "uniform(0, 1)");
  s.draws = 20000;
  return s;
}

// The loop over draws against the full analysis, on wedges of every kind.
TEST(MonteCarlo, KernelEqualsTheAnalysis) {
  reference::RandomWedges random(41);
  const auto block = std::make_unique<KernelBlock>();
  int modes[5] = {};
  for (int i = 0; i < 20000; ++i) {
    WedgeCase w = random.next();
    w.geometry.crack.reset();
    w.geometry.size.measure = WedgeMeasure::height;
    w.surcharge_kPa = random.chance(0.3) ? random.number(0, 50) : 0.0;
    if (const auto* u = std::get_if<WaterPressures>(&w.water)) {
      w.water = WaterPressures{u->plane1_kPa, u->plane2_kPa, 0};
    }
    ASSERT_TRUE(kernel_covers(w));
    const Vector3 a = upward_normal(w.geometry.plane1), b = -upward_normal(w.geometry.plane2);
    block->x1[0] = a.x(), block->y1[0] = a.y(), block->z1[0] = a.z();
    block->x2[0] = b.x(), block->y2[0] = b.y(), block->z2[0] = b.z();
    const MohrCoulomb one = reference::mohr(w.strength1), two = reference::mohr(w.strength2);
    block->tan1[0] = tan(one.friction), block->tan2[0] = tan(two.friction);
    block->cohesion1_kPa[0] = one.cohesion_kPa, block->cohesion2_kPa[0] = two.cohesion_kPa;
    const auto* fill = std::get_if<WaterFill>(&w.water);
    block->fill[0] = fill ? fill->fill : 0.0;
    block->shaking[0] = w.seismic.horizontal;
    run_kernel(kernel_setup(w), *block, 1);
    const WedgeResult r = analyse_wedge(w);
    ASSERT_EQ(block->mode[0] != 0, r.forms) << i;
    ++modes[static_cast<int>(block->mode[0])];
    if (!r.forms) continue;
    ASSERT_NEAR(block->safety[0], r.factor_of_safety, 1e-8 * std::max(1.0, r.factor_of_safety))
        << i;
  }
  for (const int count : modes) EXPECT_GT(count, 100);
}

// An independent simulation: another generator, another way to draw from Fisher's distribution
// (rejection), the full analysis. The shares agree within four standard errors.
TEST(MonteCarlo, AgreesWithAnIndependentSimulation) {
  WedgeSimulation s = uncertain_wedge();
  s.target = 1.3;
  const SimulationResult r = simulate_wedge(s);
  std::mt19937_64 draw(5);
  std::uniform_real_distribution<double> unit;
  std::normal_distribution<double> friction(32, 3);
  const auto fisher = [&](const Plane& mean) {
    const Vector3 m = upward_normal(mean);
    for (;;) {
      // Uniform in the cap that holds all but nothing, kept with probability exp(k (cos - 1)).
      const double c = 1 - 0.2 * unit(draw), turn = 2 * M_PI * unit(draw), q = std::sqrt(1 - c * c);
      if (unit(draw) > std::exp(200.0 * (c - 1))) continue;
      const Vector3 e = m.cross(Vector3(1, 0, 0)).normalized();
      return plane_of_normal(c * m + q * std::cos(turn) * e + q * std::sin(turn) * m.cross(e));
    }
  };
  int n = 20000, formed = 0, fails = 0, misses = 0;
  for (int i = 0; i < n; ++i) {
    WedgeCase w = s.wedge;
    w.geometry.plane1 = fisher(s.wedge.geometry.plane1);
    w.geometry.plane2 = fisher(s.wedge.geometry.plane2);
    w.strength1 = MohrCoulomb{40 * unit(draw), Angle::degrees(friction(draw))};
    w.strength2 = MohrCoulomb{40 * unit(draw), Angle::degrees(friction(draw))};
    w.water = WaterFill{unit(draw)};
    const WedgeResult x = analyse_wedge(w);
    formed += x.forms;
    fails += x.forms && x.factor_of_safety < 1;
    misses += x.forms && x.factor_of_safety < 1.3;
  }
  const auto compare = [&](double mine, int other) {
    const double p = static_cast<double>(other) / n;
    const double error = std::sqrt(2 * std::max(p * (1 - p), 1e-4) / n);
    EXPECT_NEAR(mine, p, 4 * error);
  };
  compare(r.forms.value, formed);
  compare(r.fails.value, fails);
  compare(r.misses_target.value, misses);
  EXPECT_NEAR(r.fails.value, r.forms.value * r.below_one->value, 1e-12);
  EXPECT_NEAR(r.fails.standard_error, std::sqrt(r.fails.value * (1 - r.fails.value) / 20000),
              1e-12);
}

TEST(MonteCarlo, SameNumbersForAnyThreads) {
  WedgeSimulation s = uncertain_wedge();
  s.correlation = -0.4;
  s.threads = 1;
  const SimulationResult one = simulate_wedge(s);
  for (const unsigned threads : {2U, 7U}) {
    s.threads = threads;
    const SimulationResult other = simulate_wedge(s);
    EXPECT_EQ(other.fails.value, one.fails.value);
    EXPECT_EQ(*other.mean, *one.mean);
    for (std::size_t i = 0; i < one.quantiles.size(); ++i) {
      EXPECT_EQ(other.quantiles[i].factor_of_safety, one.quantiles[i].factor_of_safety);
    }
  }
  s.seed = 2;
  EXPECT_NE(*simulate_wedge(s).mean, *one.mean);
}

TEST(MonteCarlo, HistogramAndQuantilesHoldAllThatForms) {
  const SimulationResult r = simulate_wedge(uncertain_wedge());
  std::uint64_t sum = 0;
  for (const SafetyBin& bin : r.histogram) sum += bin.count;
  EXPECT_EQ(sum, r.formed);
  EXPECT_EQ(r.both + r.plane1 + r.plane2 + r.lifts, r.formed);
  EXPECT_NEAR(r.histogram.back().cumulative, 1, 1e-15);
  for (std::size_t i = 1; i < r.quantiles.size(); ++i) {
    EXPECT_LE(r.quantiles[i - 1].factor_of_safety, r.quantiles[i].factor_of_safety);
  }
  // The bin whose upper end is 1 closes at the share below 1.
  for (const SafetyBin& bin : r.histogram) {
    if (std::abs(bin.to - 1) < 1e-9) {
      EXPECT_NEAR(bin.cumulative, r.below_one->value, 1e-3);
    }
  }
}

// Quantiles against sorting every factor of safety.
TEST(MonteCarlo, QuantilesAreOrderStatistics) {
  WedgeSimulation s;
  s.wedge = uncertain_wedge().wedge;
  s.draws = 100;
  s.sampling = Sampling::latin_hypercube;
  s.friction1 = s.friction2 = std::nullopt;
  s.water_fill = parse_distribution("", "uniform(0, 1)");
  const SimulationResult r = simulate_wedge(s);
  std::vector<double> u(100), safeties;
  fill_uniform(s, DrawStream::water_fill, 0, u);
  for (const double fill : u) {
    WedgeCase w = s.wedge;
    w.water = WaterFill{fill};
    safeties.push_back(analyse_wedge(w).factor_of_safety);
  }
  std::sort(safeties.begin(), safeties.end());
  for (const SafetyQuantile& q : r.quantiles) {
    const auto rank = static_cast<std::size_t>(std::lround(100 * q.share)) - 1;
    EXPECT_NEAR(q.factor_of_safety, safeties[rank], 1e-9) << q.share;
  }
}

TEST(MonteCarlo, LatinHypercubeUsesEveryStratumOnce) {
  WedgeSimulation s = uncertain_wedge();
  s.sampling = Sampling::latin_hypercube;
  s.draws = 1000;
  std::vector<double> u(1000);
  fill_uniform(s, DrawStream::friction1, 0, u);
  std::vector<int> used(1000);
  for (const double x : u) ++used[static_cast<std::size_t>(x * 1000)];
  for (const int count : used) EXPECT_EQ(count, 1);
  // Less scatter than plain draws in a smooth quantity, over seeds.
  const auto scatter = [&](Sampling sampling) {
    s.sampling = sampling;
    double sum = 0, squares = 0;
    for (s.seed = 1; s.seed <= 40; ++s.seed) {
      const double mean = *simulate_wedge(s).mean;
      sum += mean;
      squares += mean * mean;
    }
    return squares / 40 - sum / 40 * sum / 40;
  };
  EXPECT_LT(scatter(Sampling::latin_hypercube), 0.7 * scatter(Sampling::plain));
}

TEST(MonteCarlo, CorrelatedStrength) {
  WedgeSimulation s = uncertain_wedge();
  s.correlation = -0.6;
  s.cohesion1 = parse_distribution("", "normal(40, 5)");
  const auto block = std::make_unique<KernelBlock>();
  double sx = 0, sy = 0, sxx = 0, syy = 0, sxy = 0;
  const int rounds = 40;
  for (std::uint64_t round = 0; round < rounds; ++round) {
    fill_block(s, round * kBlock, kBlock, *block);
    for (std::size_t i = 0; i < kBlock; ++i) {
      const double x = std::atan(block->tan1[i]), y = block->cohesion1_kPa[i];
      sx += x, sy += y, sxx += x * x, syy += y * y, sxy += x * y;
    }
  }
  const double n = rounds * static_cast<double>(kBlock);
  const double r = (n * sxy - sx * sy) / std::sqrt((n * sxx - sx * sx) * (n * syy - sy * sy));
  EXPECT_NEAR(r, -0.6, 4 * (1 - 0.36) / std::sqrt(n));
}

// Fisher's distribution: the mean of the cosine is coth k - 1/k (Mardia & Jupp 2000).
TEST(MonteCarlo, FisherDrawsHaveTheRightSpread) {
  for (const double k : {3.0, 40.0, 500.0}) {
    WedgeSimulation s = uncertain_wedge();
    const std::size_t n = 40000;
    std::vector<double> u(n), turn(n), x(n), y(n), z(n);
    fill_uniform(s, DrawStream::plane1, 0, u);
    fill_uniform(s, DrawStream::plane1_azimuth, 0, turn);
    const Vector3 mean = upward_normal({50_deg, 135_deg});
    fisher_normals(mean, k, u.data(), turn.data(), n, {x.data(), y.data(), z.data()});
    Vector3 sum = Vector3::Zero();
    for (std::size_t i = 0; i < n; ++i) {
      const Vector3 v(x[i], y[i], z[i]);
      ASSERT_NEAR(v.norm(), 1, 1e-12);
      sum += v / static_cast<double>(n);
    }
    EXPECT_NEAR(sum.dot(mean), 1 / std::tanh(k) - 1 / k, 4 / (k * std::sqrt(n)));
    EXPECT_NEAR((sum - sum.dot(mean) * mean).norm(), 0, 6 / std::sqrt(k * n));
  }
}

TEST(MonteCarlo, ReadingsWithReplacement) {
  WedgeSimulation s = uncertain_wedge();
  s.plane1 = {std::nullopt, {{50_deg, 135_deg}, {45_deg, 140_deg}, {20_deg, 330_deg}}};
  s.plane2 = {std::nullopt, {{55_deg, 235_deg}}};
  // The third reading forms no wedge with plane 2.
  EXPECT_NEAR(simulate_wedge(s).forms.value, 2.0 / 3, 4 * std::sqrt(2.0 / 9 / 20000));
}

// A crack takes the way of the full analysis; without spread every draw is the wedge itself.
TEST(MonteCarlo, CrackAndNoSpread) {
  WedgeSimulation s;
  s.wedge = uncertain_wedge().wedge;
  s.wedge.geometry.crack = TensionCrack{{85_deg, 180_deg}, 6.0};
  s.draws = 300;
  const SimulationResult r = simulate_wedge(s);
  EXPECT_EQ(r.formed, 300U);
  EXPECT_NEAR(*r.mean, analyse_wedge(s.wedge).factor_of_safety, 1e-9);
}

TEST(MonteCarlo, StopsEarlyAndSaysWhenNothingForms) {
  WedgeSimulation s = uncertain_wedge();
  s.draws = 2000000;
  s.until_error = 0.003;
  const SimulationResult r = simulate_wedge(s);
  EXPECT_TRUE(r.stopped_early);
  EXPECT_LT(r.draws, s.draws);
  EXPECT_LE(r.fails.standard_error, 0.003);
  s = uncertain_wedge();
  s.wedge.geometry.face.dip_direction = 0_deg;
  const SimulationResult none = simulate_wedge(s);
  EXPECT_EQ(none.formed, 0U);
  EXPECT_FALSE(none.below_one);
  EXPECT_EQ(none.warnings.size(), 1U);
}

TEST(MonteCarlo, Refuses) {
  WedgeSimulation s = uncertain_wedge();
  s.cohesion1 = parse_distribution("", "normal(5, 5)");
  EXPECT_THROW(simulate_wedge(s), Error);
  s = uncertain_wedge();
  s.correlation = 1.5;
  EXPECT_THROW(simulate_wedge(s), Error);
  s = uncertain_wedge();
  s.wedge.water = WaterPressures{10, 10, 0};
  EXPECT_THROW(simulate_wedge(s), Error);
  s = uncertain_wedge();
  s.sampling = Sampling::latin_hypercube;
  s.until_error = 0.01;
  EXPECT_THROW(simulate_wedge(s), Error);
}

}  // namespace
}  // namespace brink
