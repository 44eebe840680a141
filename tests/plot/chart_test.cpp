#include "brink/plot/chart.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "brink/plot/cairo_painter.hpp"

namespace brink::plot {
namespace {

constexpr double kInfinity = std::numeric_limits<double>::infinity();
const double kNan = std::nan("");

ChartFrame frame() {
  return {{20.0, 10.0}, 100.0, 50.0, {"x", 0.0, 10.0, {0, 5, 10}, 0}, {"y", 0.0, 5.0, {0, 5}, 0}};
}

TEST(Chart, AxesHoldTheirRangeWithRoundTicks) {
  const Axis axis = axis_for("FS", 0.83, 2.17);
  EXPECT_LE(axis.low, 0.83);
  EXPECT_GE(axis.high, 2.17);
  EXPECT_EQ(axis.ticks.size(), 5u);
  EXPECT_NEAR(axis.ticks[1] - axis.ticks[0], 0.5, 1e-12);
  EXPECT_EQ(axis.decimals, 1);
  EXPECT_EQ(axis_for("", 0.0, 100.0).ticks.size(), 6u);
  EXPECT_EQ(axis_for("", 0.0, 100.0).decimals, 0);
  EXPECT_EQ(axis_for("", -3.0, 3.0, 6).low, -3.0);
}

TEST(Chart, AxesOfBadRangesAreUsable) {
  for (const auto& [low, high] : std::vector<std::pair<double, double>>{
           {1.0, 1.0}, {0.0, 0.0}, {5.0, 2.0}, {kNan, 1.0}, {0.0, kInfinity}, {1e-9, 2e-9}}) {
    const Axis axis = axis_for("", low, high);
    EXPECT_LT(axis.low, axis.high);
    EXPECT_TRUE(std::isfinite(axis.low) && std::isfinite(axis.high));
    EXPECT_GE(axis.ticks.size(), 2u);
    EXPECT_LE(axis.ticks.size(), 10u);
  }
}

TEST(Chart, CurvesAreCutAtThePlottingAreaAndBrokenAtNonNumbers) {
  const Path path = curve(frame(), {{-5, -2.5}, {15, 7.5}}, {});
  ASSERT_EQ(path.steps.size(), 2u);
  EXPECT_EQ(std::get<MoveTo>(path.steps[0]).to, (Point{20.0, 60.0}));
  EXPECT_EQ(std::get<LineTo>(path.steps[1]).to, (Point{120.0, 10.0}));
  const Path broken =
      curve(frame(), {{0, 1}, {1, 1}, {2, kNan}, {3, 1}, {4, 1}, {5, kInfinity}}, {});
  EXPECT_EQ(broken.steps.size(), 4u);
  EXPECT_TRUE(curve(frame(), {{20, 1}, {30, 1}}, {}).steps.empty());
  EXPECT_TRUE(curve(frame(), {}, {}).steps.empty());
}

TEST(Chart, HistogramCountsEveryValueOnce) {
  const Histogram h =
      histogram({0.0, 0.5, 1.0, 1.99, 2.0, -1.0, 3.0, kInfinity, kNan}, 0.0, 2.0, 2);
  EXPECT_EQ(h.counts, (std::vector<std::size_t>{2, 3}));
  EXPECT_EQ(h.below, 1u);
  EXPECT_EQ(h.above, 3u);
  EXPECT_EQ(h.total(), 9u);
}

TEST(Chart, BarsBelowTheLimitAreWarm) {
  ChartFrame f = frame();
  f.y = axis_for("%", 0, 100);
  const Group bars = draw_histogram(f, histogram({0.5, 1.5, 1.6, 2.5}, 0.0, 3.0, 3), 1.0);
  ASSERT_EQ(bars.marks.size(), 3u);
  const auto fill = [&](std::size_t i) { return std::get<Path>(bars.marks[i].content).fill; };
  EXPECT_NE(fill(0), fill(1));
  EXPECT_EQ(fill(1), fill(2));
}

TEST(Chart, CumulativeCurveEndsAtTheShareThatIsFinite) {
  ChartFrame f = frame();
  f.y = axis_for("%", 0, 100);
  const Path path = cumulative_curve(f, {1.0, 2.0, 3.0, kInfinity}, {});
  const Point last = std::get<LineTo>(path.steps.back()).to;
  EXPECT_EQ(last.x_mm, 120.0);
  EXPECT_NEAR(last.y_mm, 10.0 + 50.0 * 0.25, 1e-12);
}

TEST(Chart, RankedBarsStandWidestFirst) {
  const Group bars = draw_ranked_bars(
      frame(), {{"thin", "a", "b", 4.9, 5.1}, {"wide", "c", "d", 2.0, 8.0}}, 5.0, 18.0);
  std::vector<std::string> names;
  for (const Mark& mark : bars.marks) {
    if (const auto* text = std::get_if<Text>(&mark.content)) {
      if (text->text == "thin" || text->text == "wide") names.push_back(text->text);
    }
  }
  EXPECT_EQ(names, (std::vector<std::string>{"wide", "thin"}));
}

TEST(Chart, Paints) {
  Picture page{140.0, 80.0, {"chart", {}, {}}};
  add(page.content, draw_axes(frame()));
  add(page.content, level_line(frame(), 2.0, "target", {{}, 0.2, {}, false}));
  add(page.content, vertical_line(frame(), 2.0, "now", {{}, 0.2, {}, false}));
  EXPECT_TRUE(level_line(frame(), 20.0, "out", {}).marks.empty());
  EXPECT_TRUE(paint_svg(page).warnings.empty());
}

}  // namespace
}  // namespace brink::plot
