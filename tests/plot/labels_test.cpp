#include "brink/plot/labels.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"

namespace brink::plot {
namespace {

const NetFrame kFrame{{100.0, 100.0}, 60.0, Projection::equal_angle};

RimLabel label(const std::string& name, double dip_direction) {
  const auto [end, other] = trace_ends(Angle::degrees(dip_direction));
  return {name, "45/123", {3.2, true, {}}, end, other, Shape::disc};
}

struct Box {
  double left, right, top, bottom;
};

Box box_of(const PlacedLabel& p) {
  const double left = p.right ? p.at.x_mm : p.at.x_mm - p.width_mm;
  return {left, left + p.width_mm, p.at.y_mm - p.height_mm / 2.0, p.at.y_mm + p.height_mm / 2.0};
}

bool overlap(const Box& a, const Box& b) {
  constexpr double rounding = 1e-9;
  return a.left < b.right - rounding && b.left < a.right - rounding &&
         a.top < b.bottom - rounding && b.top < a.bottom - rounding;
}

std::vector<PlacedLabel> placed(const std::vector<RimLabel>& labels) {
  return place_rim_labels(kFrame, labels, 25.0, 25.0, 30.0, 175.0);
}

void expect_clear(const std::vector<PlacedLabel>& labels) {
  for (std::size_t i = 0; i < labels.size(); ++i) {
    const Box a = box_of(labels[i]);
    for (std::size_t j = 0; j < i; ++j) EXPECT_FALSE(overlap(a, box_of(labels[j])));
    // No corner inside the rim, nothing over the north mark, nothing off the page.
    for (const double x : {a.left, a.right}) {
      for (const double y : {a.top, a.bottom}) EXPECT_GT(std::hypot(x - 100.0, y - 100.0), 60.0);
    }
    EXPECT_FALSE(overlap(a, {96.0, 106.0, 30.0, 40.0}));
    EXPECT_GE(a.left, 100.0 - 60.0 - 3.4 - 25.0 - 1e-9);
    EXPECT_LE(a.right, 100.0 + 60.0 + 3.4 + 25.0 + 1e-9);
  }
}

TEST(Labels, RandomPlanesNeverOverlap) {
  for (std::uint64_t trial = 0; trial < 40; ++trial) {
    std::vector<RimLabel> labels;
    for (std::uint64_t i = 0; i < 2 + trial; ++i) {
      labels.push_back(label("J" + std::to_string(i), 360.0 * random_uniform(trial, 0, i)));
    }
    expect_clear(placed(labels));
  }
}

TEST(Labels, PlanesOfOneStrikeAreSpread) {
  std::vector<RimLabel> labels;
  for (int i = 0; i < 12; ++i) labels.push_back(label("J" + std::to_string(i), 90.0));
  expect_clear(placed(labels));  // all of them at north and south
}

TEST(Labels, ALoneLabelStandsAtItsEnd) {
  const auto result = placed({label("J1", 30.0)});
  ASSERT_EQ(result.size(), 1u);
  EXPECT_EQ(result[0].azimuth.deg(), 120.0);
  EXPECT_NEAR(result[0].at.y_mm, 100.0 + 63.4 * 0.5, 1e-9);
}

TEST(Labels, LongNamesLoseTheirEndButKeepTheOrientation) {
  const auto result = placed({label("the long joints behind the weighbridge Ä", 180.0)});
  EXPECT_TRUE(result[0].first.starts_with("the long")) << result[0].first;
  EXPECT_TRUE(result[0].first.ends_with("…"));
  EXPECT_EQ(result[0].second, "45/123");
  expect_clear(result);
}

TEST(Labels, SpreadOutKeepsOrderAndDistanceAndMovesLeast) {
  EXPECT_EQ(spread_out({1.0, 10.0, 20.0}, 2.0, 0.0, 30.0), (std::vector<double>{1.0, 10.0, 20.0}));
  // Two that want one place share the move.
  EXPECT_EQ(spread_out({5.0, 5.0}, 2.0, 0.0, 30.0), (std::vector<double>{4.0, 6.0}));
  // Against the edge the first can't go further.
  EXPECT_EQ(spread_out({0.0, 0.0}, 2.0, 0.0, 30.0), (std::vector<double>{1.0, 3.0}));
  EXPECT_EQ(spread_out({30.0, 30.0}, 2.0, 0.0, 30.0), (std::vector<double>{27.0, 29.0}));
  EXPECT_TRUE(spread_out({}, 2.0, 0.0, 30.0).empty());
}

}  // namespace
}  // namespace brink::plot
