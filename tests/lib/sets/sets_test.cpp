#include "brink/sets/sets.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"
#include "support/partition.hpp"

namespace brink {
namespace {

void add(Readings& readings, const Vector3& axis) {
  readings.planes.push_back(plane_of_normal(axis));
  readings.normals.push_back(upward_normal(readings.planes.back()));
  readings.weights.push_back(1.0);
}

void add_set(Readings& readings, const Vector3& mean, double kappa, std::size_t count) {
  const std::uint64_t stream = readings.size();
  for (std::size_t i = 0; i < count; ++i) add(readings, draw_fisher(mean, kappa, 21, stream, i));
}

void add_strays(Readings& readings, std::size_t count) {
  for (std::uint64_t i = 0; i < count; ++i) {
    add(readings, draw_uniform(random_uniform(9, 1, i), random_uniform(9, 2, i)));
  }
}

// A bedding set and two joint sets, one of them astride the rim of the net.
Readings three_sets() {
  Readings readings;
  add_set(readings, normal(89_deg, 40_deg), 40.0, 60);
  add_set(readings, normal(10_deg, 130_deg), 30.0, 90);
  add_set(readings, normal(75_deg, 130_deg), 40.0, 40);
  add_strays(readings, 15);
  return readings;
}

void name_sets(Readings& readings, const std::vector<std::string>& cells) {
  ExtraColumn column{"Set", {}};
  for (const std::string& cell : cells) column.cells.push_back(cell);
  readings.extra.push_back(std::move(column));
}

TEST(Sets, FindsThreeSetsHeaviestFirst) {
  const SetsResult result = find_sets(three_sets(), {});
  ASSERT_EQ(result.sets.size(), 3U);
  EXPECT_EQ(result.sets[0].name, "J1");
  EXPECT_LT(axis_angle(upward_normal(result.sets[0].mean), normal(10_deg, 130_deg)).deg(), 4.0);
  EXPECT_LT(axis_angle(upward_normal(result.sets[1].mean), normal(89_deg, 40_deg)).deg(), 4.0);
  EXPECT_LT(axis_angle(upward_normal(result.sets[2].mean), normal(75_deg, 130_deg)).deg(), 4.0);
  EXPECT_GE(result.sets[0].weight, result.sets[1].weight);
  EXPECT_FALSE(result.undecided);
  std::size_t counted = result.unassigned;
  for (const SetStatistics& s : result.sets) counted += s.count;
  EXPECT_EQ(counted, 205U);
}

TEST(Sets, AssignmentAndStatisticsAgree) {
  const Readings readings = three_sets();
  const SetsResult result = find_sets(readings, {});
  for (std::size_t k = 0; k < result.sets.size(); ++k) {
    std::vector<Vector3> axes;
    for (std::size_t i = 0; i < readings.size(); ++i) {
      if (result.assignment[i] == static_cast<int>(k) + 1) axes.push_back(readings.normals[i]);
    }
    const Resultant r = axial_resultant(axes);
    EXPECT_EQ(axes.size(), result.sets[k].count);
    EXPECT_NEAR(r.length, result.sets[k].resultant_length, 1e-12);
    EXPECT_EQ(plane_of_normal(r.mean), result.sets[k].mean);
    // The component beside the set is the one that its readings belong to.
    EXPECT_LT(axis_angle(result.mixture->components[k].mean, r.mean).deg(), 5.0);
  }
}

TEST(Sets, OrderOfReadingsAndThreadsChangeNothing) {
  Readings readings = three_sets();
  const SetsResult one = find_sets(readings, {std::nullopt, 1, 1});
  const SetsResult many = find_sets(readings, {std::nullopt, 1, 3});
  EXPECT_EQ(one.assignment, many.assignment);
  EXPECT_EQ(*one.bic, *many.bic);
  std::reverse(readings.planes.begin(), readings.planes.end());
  std::reverse(readings.normals.begin(), readings.normals.end());
  std::vector<int> reversed = find_sets(readings, {}).assignment;
  std::reverse(reversed.begin(), reversed.end());
  EXPECT_EQ(one.assignment, reversed);
}

TEST(Sets, TurningTheWholeNetChangesNoMembership) {
  const Readings readings = three_sets();
  Readings turned;
  for (const Plane& plane : readings.planes) {
    add(turned, normal(plane.dip, plane.dip_direction + 77_deg));
  }
  const SetsResult a = find_sets(readings, {});
  const SetsResult b = find_sets(turned, {});
  EXPECT_GT(test::adjusted_rand_index(a.assignment, b.assignment), 0.98);
  EXPECT_NEAR(*a.bic, *b.bic, 1e-3);
}

TEST(Sets, UniformReadingsHaveNoSet) {
  Readings readings;
  add_strays(readings, 300);
  const SetsResult result = find_sets(readings, {});
  EXPECT_TRUE(result.sets.empty());
  EXPECT_EQ(result.unassigned, 300U);
  EXPECT_NEAR(*result.bic, 2.0 * 300.0 * std::log(4.0 * 3.14159265358979), 1e-9);
}

TEST(Sets, FixedCountIsKept) {
  for (const std::size_t count : {0U, 1U, 2U, 4U}) {
    const SetsResult result = find_sets(three_sets(), {count, 1, 0});
    EXPECT_EQ(result.sets.size(), count);
    EXPECT_FALSE(result.runner_up);
  }
}

TEST(Sets, OneReadingIsNoSet) {
  Readings readings;
  add(readings, normal(40_deg, 50_deg));
  const SetsResult result = find_sets(readings, {});
  EXPECT_TRUE(result.sets.empty());
  EXPECT_EQ(result.assignment, std::vector<int>{0});
}

TEST(Sets, IdenticalReadingsAreOneSet) {
  Readings readings;
  for (int i = 0; i < 40; ++i) add(readings, normal(40_deg, 50_deg));
  const SetsResult result = find_sets(readings, {});
  ASSERT_EQ(result.sets.size(), 1U);
  EXPECT_TRUE(std::isinf(*result.sets[0].fisher_k));
  EXPECT_EQ(result.sets[0].confidence_cone->deg(), 0.0);
  EXPECT_FALSE(result.sets[0].fisher_fit);
}

TEST(Sets, AnEllipticalSetStaysOne) {
  Readings readings;
  const Component shape{Shape::elliptical, 1.0, Vector3::UnitZ(), 1.0, {}};
  const Vector3 mean = normal(85_deg, 60_deg);
  const Tangents t = tangents(mean);
  // Angular central Gaussian: the direction of a normal vector with spreads 1, 0.35 and 0.08.
  const auto gauss = [](std::uint64_t stream, std::uint64_t i) {
    return std::sqrt(-2.0 * std::log(random_uniform(4, stream, i))) *
           std::cos(2.0 * 3.14159265358979 * random_uniform(4, stream + 10, i));
  };
  for (std::uint64_t i = 0; i < 400; ++i) {
    add(readings,
        (gauss(1, i) * mean + 0.35 * gauss(2, i) * t.across + 0.08 * gauss(3, i) * t.along)
            .normalized());
  }
  const SetsResult result = find_sets(readings, {});
  ASSERT_EQ(result.sets.size(), 1U);
  EXPECT_EQ(result.sets[0].shape, shape.shape);
}

TEST(Sets, ByColumnNamesAndOrder) {
  Readings readings;
  for (const int dip : {40, 42, 44, 80, 82}) add(readings, normal(Angle::degrees(dip), 50_deg));
  name_sets(readings, {"B", "B ", "0", "A", ""});
  const SetsResult result = sets_by_column(readings, "set");
  ASSERT_EQ(result.sets.size(), 2U);
  EXPECT_EQ(result.sets[0].name, "B");
  EXPECT_EQ(result.sets[0].count, 2U);
  EXPECT_NEAR(result.sets[0].mean.dip.deg(), 41.0, 1e-10);
  EXPECT_EQ(result.sets[1].name, "A");
  EXPECT_FALSE(result.sets[1].fisher_k);
  EXPECT_EQ(result.assignment, (std::vector<int>{1, 1, 0, 2, 0}));
  EXPECT_EQ(result.unassigned, 2U);
  EXPECT_FALSE(result.log_likelihood);
}

TEST(Sets, EqualWeightsOrderByFirstAppearance) {
  Readings readings;
  for (const int dip : {40, 42, 80, 82}) add(readings, normal(Angle::degrees(dip), 50_deg));
  name_sets(readings, {"late", "early", "early", "late"});
  const SetsResult result = sets_by_column(readings, "set");
  EXPECT_EQ(result.sets[0].name, "late");
  EXPECT_EQ(result.sets[1].name, "early");
}

TEST(Sets, UnknownColumnIsAnArgumentError) {
  Readings readings;
  add(readings, normal(40_deg, 50_deg));
  name_sets(readings, {"A"});
  try {
    sets_by_column(readings, "sett");
    FAIL();
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::argument);
    EXPECT_NE(std::string(error.what()).find("did you mean 'Set'"), std::string::npos);
  }
}

// Hubert & Arabie 1985; values computed with scikit-learn.
TEST(Partition, AdjustedRandIndex) {
  const auto index = [](std::vector<int> a, std::vector<int> b) {
    return test::adjusted_rand_index(a, b);
  };
  EXPECT_NEAR(index({0, 0, 1, 1}, {0, 0, 1, 2}), 0.571428571, 1e-9);
  EXPECT_NEAR(index({1, 1, 2, 2, 0, 0}, {1, 1, 2, 0, 0, 0}), 0.444444444, 1e-9);
  EXPECT_NEAR(index({0, 0, 0, 1, 1, 1}, {0, 0, 1, 1, 2, 2}), 0.242424242, 1e-9);
  EXPECT_EQ(index({0, 0, 0}, {1, 1, 1}), 1.0);
}

}  // namespace
}  // namespace brink
