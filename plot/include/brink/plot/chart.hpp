// Charts: axes, curves, histograms, cumulative curves, ranked bars. Values come from results; only
// their places on the page are worked out here.
#pragma once

#include <optional>
#include <string>
#include <utility>
#include <vector>

#include "brink/plot/picture.hpp"

namespace brink::plot {

// A linear axis from `low` to `high`, low < high; `ticks` lie within.
struct Axis {
  std::string title;  // with the unit
  double low = 0.0;
  double high = 1.0;
  std::vector<double> ticks;
  int decimals = 0;  // of the ticks' numbers
};

// An axis that holds low..high, widened to whole ticks; ticks are 1, 2 or 5 times a power of ten
// apart, at most `most_ticks` (at least 2) steps. Equal or unordered limits get an axis around
// them; ones that are no numbers are taken as 0 and 1.
Axis axis_for(std::string title, double low, double high, int most_ticks = 6);

// Where a chart's plotting area is and what its axes are.
struct ChartFrame {
  Point top_left;
  double width_mm = 0.0;
  double height_mm = 0.0;
  Axis x;
  Axis y;
};

struct XY {
  double x = 0.0;
  double y = 0.0;
};

Point on_page(const ChartFrame& frame, const XY& value);

// Room that numbers and titles take outside the plotting area.
inline constexpr double kAxisLeft_mm = 15.0;
inline constexpr double kAxisBelow_mm = 11.0;

// Axis lines, ticks with numbers, titles, faint lines across. An empty y title leaves out the
// numbers of that axis too.
Group draw_axes(const ChartFrame& frame);

// A line through the values, cut at the plotting area and broken where a value is no finite number.
Path curve(const ChartFrame& frame, const std::vector<XY>& values, Stroke stroke);

// A line across the plotting area at an x or a y value, with words at its end; nothing outside the
// axis.
Group vertical_line(const ChartFrame& frame, double x, const std::string& words, Stroke stroke);
Group level_line(const ChartFrame& frame, double y, const std::string& words, Stroke stroke);

// Counts of values in equal bins: bin i holds low + i width <= value < low + (i+1) width, the last
// one its upper end too. What is outside, or no number, is counted apart.
struct Histogram {
  double low = 0.0;
  double width = 1.0;
  std::vector<std::size_t> counts;
  std::size_t below = 0;
  std::size_t above = 0;
  std::size_t total() const;  // all values, outside ones included
};
Histogram histogram(const std::vector<double>& values, double low, double high, std::size_t bins);

// Bars whose height is the share of all values in percent. Bins that end at or below `limit` are
// in the warm colour.
Group draw_histogram(const ChartFrame& frame, const Histogram& bars,
                     std::optional<double> limit = {});

// Share of the values at or below x, in percent, as steps; `sorted` ascending. Thinned to what a
// page can show.
Path cumulative_curve(const ChartFrame& frame, const std::vector<double>& sorted, Stroke stroke);

// How far one input moves the result over its range.
struct RankedBar {
  std::string name;       // "friction of plane 1"
  std::string low_words;  // the input's value at `at_low`: "25°"
  std::string high_words;
  double at_low = 0.0;
  double at_high = 0.0;
};
// Bars from `at_low` to `at_high` on a shared x axis, widest first, split at `base` where it lies
// within; `frame.y` isn't used. Names stand to the left, in `names_mm`.
Group draw_ranked_bars(const ChartFrame& frame, std::vector<RankedBar> bars, double base,
                       double names_mm);

}  // namespace brink::plot
