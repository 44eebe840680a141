#include "brink/sphere/density.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"
#include "brink/sphere/contour.hpp"
#include "brink/sphere/projection.hpp"

namespace brink {
namespace {

std::vector<Vector3> scattered(std::size_t count, std::uint64_t stream) {
  std::vector<Vector3> axes;
  for (std::uint64_t i = 0; i < count; ++i) {
    axes.push_back(direction({Angle::degrees(360.0 * random_uniform(11, stream, i)),
                              asin(random_uniform(11, stream + 1, i))}));
  }
  return axes;
}

// Axes about `centre`, the more the closer.
std::vector<Vector3> clustered(const Line& centre, std::size_t count, std::uint64_t stream) {
  std::vector<Vector3> axes = scattered(count, stream);
  for (Vector3& v : axes) v = (direction(centre) + 0.15 * v).normalized();
  return axes;
}

double plain_density(const std::vector<Vector3>& axes, double k, const Vector3& x) {
  double sum = 0.0;
  for (const Vector3& a : axes) {
    sum += k * (std::exp(k * (a.dot(x) - 1.0)) + std::exp(k * (-a.dot(x) - 1.0))) /
           (1.0 - std::exp(-2.0 * k));
  }
  return sum / static_cast<double>(axes.size());
}

TEST(Density, TheRuleGivesTheTabulatedConcentrations) {
  // 2(1 + N/9), computed from the definition.
  EXPECT_NEAR(kernel_concentration(10), 4.222222, 5e-7);
  EXPECT_NEAR(kernel_concentration(50), 13.111111, 5e-7);
  EXPECT_NEAR(kernel_concentration(100), 24.222222, 5e-7);
  EXPECT_NEAR(kernel_concentration(200), 46.444444, 5e-7);
  EXPECT_EQ(kernel_concentration(891), 200.0);
  EXPECT_EQ(kernel_concentration(1e6), 200.0);
}

TEST(Density, AgreesWithThePlainSum) {
  const auto axes = scattered(300, 0);
  for (const double k : {0.5, 3.0, 39.9, 40.0, 60.0, 200.0, 3000.0}) {
    const AxialDensity density(axes, {}, k);
    const auto places = scattered(50, 4);
    const auto values = density.at(places, 2);
    for (std::size_t i = 0; i < places.size(); ++i) {
      const double plain = plain_density(axes, k, places[i]);
      EXPECT_NEAR(values[i], plain, 4e-9 * std::max(1.0, plain)) << k;
      EXPECT_NEAR(density.at(Vector3(-places[i])), values[i], 1e-8);
    }
  }
}

TEST(Density, MeanOverTheSphereIsOne) {
  const auto places = scattered(200000, 8);  // uniform over the hemisphere
  const AxialDensity density(clustered({40_deg, 20_deg}, 60, 12), {}, 8.0);
  double sum = 0.0;
  for (const double v : density.at(places)) sum += v;
  EXPECT_NEAR(sum / static_cast<double>(places.size()), 1.0, 0.02);
}

TEST(Density, OneAxisPeaksAtItself) {
  const Vector3 axis = direction({123_deg, 34_deg});
  const AxialDensity density({axis}, {}, 50.0);
  EXPECT_NEAR(density.at(axis), 50.0 / std::tanh(50.0), 2e-7);
  const DensityGrid grid = density_grid(density);
  EXPECT_NEAR(grid.peak, 50.0, 2e-7);
  EXPECT_NEAR(grid.peak_line.trend.deg(), 123.0, 1e-6);
  EXPECT_NEAR(grid.peak_line.plunge.deg(), 34.0, 1e-6);
}

TEST(Density, EqualAxesCountByTheirWeight) {
  const Vector3 a = direction({10_deg, 50_deg}), b = direction({200_deg, 10_deg});
  const AxialDensity repeated({a, b, a, -a}, {}, 30.0);
  const AxialDensity weighted({a, b}, {3.0, 1.0}, 30.0);
  for (const Vector3& x : scattered(20, 16)) EXPECT_EQ(repeated.at(x), weighted.at(x));
}

double worst_binning_error(const std::vector<Vector3>& axes, double k) {
  const HemisphereMesh mesh = hemisphere_mesh(45);
  const auto direct = AxialDensity(axes, {}, k, DensityMethod::direct).at(mesh.nodes);
  const auto binned = AxialDensity(axes, {}, k, DensityMethod::binned).at(mesh.nodes);
  double worst = 0.0;
  for (std::size_t i = 0; i < direct.size(); ++i) {
    worst = std::max(worst, std::abs(direct[i] - binned[i]));
  }
  return worst / *std::max_element(direct.begin(), direct.end());
}

TEST(Density, BinningCostsAtMostAHundredThousandthOfThePeak) {
  auto mixed = clustered({85_deg, 2_deg}, 6000, 24);
  for (const Vector3& v : clustered({200_deg, 60_deg}, 6000, 28)) mixed.push_back(v);
  for (const Vector3& v : scattered(8000, 32)) mixed.push_back(v);
  std::vector<Vector3> girdle = scattered(20000, 36);
  for (Vector3& v : girdle) v = Vector3(v.x(), 0.05 * v.y(), v.z()).normalized();
  std::vector<Vector3> whole_degrees = mixed;
  for (Vector3& v : whole_degrees) {
    const Plane p = plane_of_normal(v);
    v = normal(Angle::degrees(std::round(p.dip.deg())),
               Angle::degrees(std::round(p.dip_direction.deg())));
  }
  for (const double k : {40.0, 100.0, 200.0, 1000.0}) {
    EXPECT_LT(worst_binning_error(mixed, k), 1e-5) << k;
    EXPECT_LT(worst_binning_error(girdle, k), 1e-5) << k;
    EXPECT_LT(worst_binning_error(whole_degrees, k), 1e-5) << k;
    EXPECT_LT(worst_binning_error(scattered(20000, 44), k), 1e-5) << k;
  }
}

TEST(Density, BinnedPeakIsTheDirectOne) {
  const auto axes = clustered({85_deg, 2_deg}, 20000, 24);
  const DensityGrid direct = density_grid(AxialDensity(axes, {}, 100.0, DensityMethod::direct));
  const DensityGrid binned = density_grid(AxialDensity(axes, {}, 100.0, DensityMethod::binned));
  EXPECT_NEAR(direct.peak, binned.peak, 1e-5 * direct.peak);
  EXPECT_LT(acos(std::abs(direction(direct.peak_line).dot(direction(binned.peak_line)))).deg(),
            0.01);
}

TEST(Density, SameBitsForAnyNumberOfThreads) {
  const AxialDensity density(scattered(500, 20), {}, 40.0);
  const DensityGrid one = density_grid(density, 40, 1);
  for (const unsigned threads : {2u, 7u}) {
    const DensityGrid more = density_grid(density, 40, threads);
    EXPECT_EQ(one.values, more.values);
    EXPECT_EQ(one.peak, more.peak);
  }
}

TEST(Density, RefusesNothingAndBadConcentrations) {
  EXPECT_THROW(AxialDensity({}, {}), Error);
  EXPECT_THROW(AxialDensity({Vector3::UnitX()}, {}, 0.0), Error);
  EXPECT_THROW(AxialDensity({Vector3::UnitX()}, {}, 1e9), Error);
  EXPECT_THROW(AxialDensity({Vector3::UnitX()}, {}, std::nan("")), Error);
}

TEST(Density, BothEndsOfTheRimAgreeToTheLastBit) {
  for (const double k : {5.0, 60.0, 200.0}) {
    const DensityGrid grid = density_grid(AxialDensity(scattered(300, 0), {}, k), 60);
    const std::size_t first = grid.mesh.first_on_rim;
    const std::size_t half = (grid.values.size() - first) / 2;
    for (std::size_t i = first; i < first + half; ++i) {
      EXPECT_EQ(grid.values[i], grid.values[i + half]);
    }
  }
}

TEST(HemisphereMesh, CoversTheHemisphereOnce) {
  for (const int rings : {1, 2, 9, 90}) {
    const HemisphereMesh mesh = hemisphere_mesh(rings);
    const auto n = static_cast<std::size_t>(rings);
    EXPECT_EQ(mesh.nodes.size(), 2 * n * n + 2 * n + 1);
    double area = 0.0;
    for (const auto& t : mesh.triangles) {
      const Point2 a = project(Projection::equal_area, mesh.nodes[t[0]]);
      const Point2 b = project(Projection::equal_area, mesh.nodes[t[1]]);
      const Point2 c = project(Projection::equal_area, mesh.nodes[t[2]]);
      const double twice = (b - a).x() * (c - a).y() - (b - a).y() * (c - a).x();
      EXPECT_GT(twice, 0.0);  // anticlockwise
      area += twice / 2.0;
    }
    const double sides = 4.0 * rings;
    EXPECT_NEAR(area, sides / 2.0 * std::sin(2.0 * std::numbers::pi / sides), 1e-9);
  }
}

TEST(HemisphereMesh, RimNodesComeInOppositePairs) {
  const HemisphereMesh mesh = hemisphere_mesh(45);
  const std::size_t half = (mesh.nodes.size() - mesh.first_on_rim) / 2;
  for (std::size_t i = 0; i < half; ++i) {
    const Vector3& node = mesh.nodes[mesh.first_on_rim + i];
    EXPECT_EQ(node.z(), 0.0);
    EXPECT_EQ(mesh.nodes[mesh.first_on_rim + half + i], Vector3(-node.x(), -node.y(), 0.0));
  }
}

void expect_closed(const LevelLine& line) {
  if (line.pieces.size() == 1 && line.pieces[0].front() == line.pieces[0].back()) return;
  for (std::size_t i = 0; i < line.pieces.size(); ++i) {
    const Vector3& end = line.pieces[i].back();
    const Vector3& begin = line.pieces[(i + 1) % line.pieces.size()].front();
    EXPECT_EQ(end.z(), 0.0);
    EXPECT_LT((end + begin).norm(), 1e-12);
  }
}

TEST(Contour, LinesAreClosedAcrossTheRim) {
  // A cluster that straddles the rim, one inside, and strays.
  auto axes = clustered({85_deg, 2_deg}, 80, 24);
  for (const Vector3& v : clustered({200_deg, 60_deg}, 60, 28)) axes.push_back(v);
  for (const Vector3& v : scattered(40, 32)) axes.push_back(v);
  const DensityGrid grid = density_grid(AxialDensity(axes, {}));
  std::size_t across = 0;
  for (const double level : {0.3, 0.5, 1.0, 2.0, 4.0, 8.0}) {
    const auto lines = level_lines(grid, level);
    EXPECT_FALSE(lines.empty());
    for (const LevelLine& line : lines) {
      expect_closed(line);
      across += line.pieces.size() > 1 ? 1 : 0;
    }
  }
  EXPECT_GT(across, 0u);
}

TEST(Contour, PointsLieOnTheLevelToTheGridsResolution) {
  const AxialDensity density(clustered({85_deg, 20_deg}, 80, 24), {});
  const DensityGrid grid = density_grid(density);
  for (const double level : {2.0, 4.0, 8.0}) {
    for (const LevelLine& line : level_lines(grid, level)) {
      for (const auto& piece : line.pieces) {
        for (const Vector3& p : piece) EXPECT_NEAR(density.at(p), level, 0.01 * level);
      }
    }
  }
}

TEST(Contour, ASingleAxisHasACircle) {
  // k cosh(kt)/sinh(k) = level at t = 1 + ln(level/k)/k for large k.
  const double k = 100.0, level = 20.0;
  const Vector3 axis = direction({250_deg, 3_deg});
  const DensityGrid grid = density_grid(AxialDensity({axis}, {}, k));
  const double cosine = 1.0 + std::log(level / k) / k;
  const auto lines = level_lines(grid, level);
  ASSERT_EQ(lines.size(), 1u);
  EXPECT_EQ(lines[0].pieces.size(), 2u);
  for (const auto& piece : lines[0].pieces) {
    for (const Vector3& p : piece) {
      EXPECT_NEAR(acos(std::abs(p.dot(axis))).deg(), acos(cosine).deg(), 0.1);
    }
  }
}

double area_of(const std::vector<std::vector<Vector3>>& loops) {
  double area = 0.0;
  for (const auto& loop : loops) {
    for (std::size_t i = 0; i < loop.size(); ++i) {
      const Point2 a = project(Projection::equal_area, loop[i]);
      const Point2 b = project(Projection::equal_area, loop[(i + 1) % loop.size()]);
      area += (a.x() * b.y() - a.y() * b.x()) / 2.0;
    }
  }
  return area / std::numbers::pi;
}

TEST(Contour, AreasAgreeWithTheShareOfTheHemisphereAbove) {
  auto axes = clustered({85_deg, 2_deg}, 80, 24);
  for (const Vector3& v : clustered({200_deg, 60_deg}, 60, 28)) axes.push_back(v);
  const AxialDensity density(axes, {});
  const DensityGrid grid = density_grid(density);
  const auto places = scattered(40000, 40);
  const auto values = density.at(places);
  for (const double level : {1e-6, 0.01, 0.1, 0.5, 1.0, 2.0, 5.0, 1e6}) {
    const auto above =
        std::count_if(values.begin(), values.end(), [&](double v) { return v >= level; });
    // Anticlockwise outlines count up, holes down; holes at the rim are left out by the way along
    // it.
    EXPECT_NEAR(area_of(level_area(grid, level)),
                static_cast<double>(above) / static_cast<double>(places.size()), 0.01)
        << level;
  }
}

TEST(Contour, NothingAboveGivesNothingAndAllAboveGivesTheRim) {
  const DensityGrid grid = density_grid(AxialDensity({direction({10_deg, 40_deg})}, {}, 1.0), 20);
  EXPECT_TRUE(level_lines(grid, 5.0).empty());
  EXPECT_TRUE(level_area(grid, 5.0).empty());
  EXPECT_TRUE(level_lines(grid, 0.1).empty());
  ASSERT_EQ(level_area(grid, 0.1).size(), 1u);
  EXPECT_EQ(level_area(grid, 0.1)[0].size(), 80u);
}

TEST(Contour, UsualLevelsAreAtMostFive) {
  EXPECT_EQ(usual_levels(7.0), (std::vector<double>{2, 3, 4, 6}));
  EXPECT_EQ(usual_levels(20.0), (std::vector<double>{2, 4, 8, 16}));
  EXPECT_EQ(usual_levels(1.8), (std::vector<double>{1.5}));
  EXPECT_TRUE(usual_levels(1.2).empty());
  for (double peak = 1.0; peak < 1e5; peak *= 1.1) {
    const auto levels = usual_levels(peak);
    EXPECT_LE(levels.size(), 5u);
    for (const double level : levels) EXPECT_LT(level, peak);
  }
}

}  // namespace
}  // namespace brink
