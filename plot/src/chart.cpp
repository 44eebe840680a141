#include "brink/plot/chart.hpp"

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"
#include "brink/plot/style.hpp"

namespace brink::plot {

namespace {

constexpr double kTick_mm = 1.2;

// 1, 2 or 5 times a power of ten, the least that cuts `range` into at most `most` steps.
double tick_step(double range, int most) {
  const double rough = range / most;
  const double power = std::pow(10.0, std::floor(std::log10(rough)));
  for (const double factor : {1.0, 2.0, 5.0}) {
    // The last digit of a quotient must not cost a whole step.
    if (factor * power >= rough * (1.0 - 1e-9)) return factor * power;
  }
  return 10.0 * power;
}

std::pair<double, double> usable(double low, double high) {
  if (!std::isfinite(low) || !std::isfinite(high)) return {0.0, 1.0};
  if (low > high) std::swap(low, high);
  if (low == high) {
    const double room = low == 0.0 ? 0.5 : 0.1 * std::abs(low);
    return {low - room, high + room};
  }
  return {low, high};
}

bool inside(const Axis& axis, double value) {
  return value >= axis.low && value <= axis.high;
}

Text number_text(Point at, double value, int decimals, Anchor anchor) {
  return {at, fixed(value, decimals), style::text(style::kNote_mm, style::kMuted), anchor, 0.0, 1};
}

void add_x_axis(Group& group, const ChartFrame& frame) {
  Path ticks{{}, Stroke{style::kInk, style::kThin_mm, {}, false}, {}};
  const double foot = frame.top_left.y_mm + frame.height_mm;
  for (const double tick : frame.x.ticks) {
    const double x = on_page(frame, {tick, frame.y.low}).x_mm;
    ticks.steps.emplace_back(MoveTo{{x, foot}});
    ticks.steps.emplace_back(LineTo{{x, foot + kTick_mm}});
    add(group, number_text({x, foot + 4.2}, tick, frame.x.decimals, Anchor::middle));
  }
  add(group, std::move(ticks));
  add(group, Text{{frame.top_left.x_mm + frame.width_mm / 2.0, foot + 9.0},
                  frame.x.title,
                  style::text(style::kText_mm),
                  Anchor::middle,
                  0.0,
                  1});
}

void add_y_axis(Group& group, const ChartFrame& frame) {
  const double left = frame.top_left.x_mm;
  Path across{{}, Stroke{style::kFaint, style::kHairline_mm, {}, false}, {}};
  for (const double tick : frame.y.ticks) {
    const double y = on_page(frame, {frame.x.low, tick}).y_mm;
    across.steps.emplace_back(MoveTo{{left, y}});
    across.steps.emplace_back(LineTo{{left + frame.width_mm, y}});
    if (frame.y.title.empty()) continue;
    add(group,
        number_text({left - 1.8, y + 0.36 * style::kNote_mm}, tick, frame.y.decimals, Anchor::end));
  }
  add(group, std::move(across));
  // The title stands above the axis, where it can be read without turning the page.
  add(group, Text{{left - kAxisLeft_mm + 4.0, frame.top_left.y_mm - 3.2},
                  frame.y.title,
                  style::text(style::kText_mm),
                  Anchor::start,
                  0.0,
                  1});
}

// The part of the segment a..b inside the axes (Liang & Barsky 1984, ACM Trans. Graphics 3:1).
std::optional<std::pair<XY, XY>> clipped(const ChartFrame& frame, const XY& a, const XY& b) {
  double from = 0.0, to = 1.0;
  const auto cut = [&](double start, double step, double low, double high) {
    if (step == 0.0) return start >= low && start <= high;
    const double first = (low - start) / step, second = (high - start) / step;
    from = std::max(from, std::min(first, second));
    to = std::min(to, std::max(first, second));
    return from <= to;
  };
  const double dx = b.x - a.x, dy = b.y - a.y;
  if (!cut(a.x, dx, frame.x.low, frame.x.high) || !cut(a.y, dy, frame.y.low, frame.y.high)) {
    return std::nullopt;
  }
  return std::pair{XY{a.x + from * dx, a.y + from * dy}, XY{a.x + to * dx, a.y + to * dy}};
}

bool finite(const XY& value) {
  return std::isfinite(value.x) && std::isfinite(value.y);
}

Path rectangle(Point a, Point b, Colour fill) {
  Path path = polygon({a, {b.x_mm, a.y_mm}, b, {a.x_mm, b.y_mm}});
  path.fill = fill;
  return path;
}

}  // namespace

Axis axis_for(std::string title, double low, double high, int most_ticks) {
  const auto [from, to] = usable(low, high);
  const double step = tick_step(to - from, std::max(2, most_ticks));
  const double first = std::floor(from / step + 1e-9), last = std::ceil(to / step - 1e-9);
  Axis axis{std::move(title), first * step, last * step, {}, 0};
  for (double i = first; i <= last; i += 1.0) axis.ticks.push_back(i * step + 0.0);
  axis.decimals = std::clamp(static_cast<int>(-std::floor(std::log10(step) + 1e-9)), 0, 12);
  return axis;
}

Point on_page(const ChartFrame& frame, const XY& value) {
  return {
      frame.top_left.x_mm + frame.width_mm * (value.x - frame.x.low) / (frame.x.high - frame.x.low),
      frame.top_left.y_mm +
          frame.height_mm * (frame.y.high - value.y) / (frame.y.high - frame.y.low)};
}

Group draw_axes(const ChartFrame& frame) {
  Group group;
  add_y_axis(group, frame);
  const double foot = frame.top_left.y_mm + frame.height_mm;
  add(group, polyline({{frame.top_left.x_mm, frame.top_left.y_mm},
                       {frame.top_left.x_mm, foot},
                       {frame.top_left.x_mm + frame.width_mm, foot}},
                      {style::kInk, style::kThin_mm, {}, false}));
  add_x_axis(group, frame);
  return group;
}

Path curve(const ChartFrame& frame, const std::vector<XY>& values, Stroke stroke) {
  Path path{{}, std::move(stroke), {}};
  std::optional<Point> at;
  for (std::size_t i = 1; i < values.size(); ++i) {
    if (!finite(values[i - 1]) || !finite(values[i])) continue;
    const auto part = clipped(frame, values[i - 1], values[i]);
    if (!part) continue;
    const Point from = on_page(frame, part->first), to = on_page(frame, part->second);
    if (at != from) path.steps.emplace_back(MoveTo{from});
    path.steps.emplace_back(LineTo{to});
    at = to;
  }
  return path;
}

Group vertical_line(const ChartFrame& frame, double x, const std::string& words, Stroke stroke) {
  Group group;
  if (!inside(frame.x, x)) return group;
  const Colour colour = stroke.colour;
  const Point top = on_page(frame, {x, frame.y.high});
  add(group, segment(top, on_page(frame, {x, frame.y.low}), std::move(stroke)));
  add(group, Text{{top.x_mm + 1.2, top.y_mm + style::kNote_mm},
                  words,
                  style::text(style::kNote_mm, colour, true),
                  Anchor::start,
                  0.0,
                  1});
  return group;
}

Group level_line(const ChartFrame& frame, double y, const std::string& words, Stroke stroke) {
  Group group;
  if (!inside(frame.y, y)) return group;
  const Colour colour = stroke.colour;
  const Point right = on_page(frame, {frame.x.high, y});
  add(group, segment(on_page(frame, {frame.x.low, y}), right, std::move(stroke)));
  add(group, Text{{right.x_mm - 1.0, right.y_mm - 1.2},
                  words,
                  style::text(style::kNote_mm, colour, true),
                  Anchor::end,
                  0.0,
                  1});
  return group;
}

std::size_t Histogram::total() const {
  std::size_t sum = below + above;
  for (const std::size_t count : counts) sum += count;
  return sum;
}

Histogram histogram(const std::vector<double>& values, double low, double high, std::size_t bins) {
  Histogram result{low, (high - low) / static_cast<double>(bins), std::vector<std::size_t>(bins), 0,
                   0};
  for (const double value : values) {
    if (value < low) {
      ++result.below;
    } else if (!(value <= high)) {
      ++result.above;  // infinite factors of safety too
    } else {
      const auto bin = static_cast<std::size_t>((value - low) / result.width);
      ++result.counts[std::min(bin, bins - 1)];
    }
  }
  return result;
}

Group draw_histogram(const ChartFrame& frame, const Histogram& bars, std::optional<double> limit) {
  Group group;
  const double total = static_cast<double>(std::max<std::size_t>(bars.total(), 1));
  for (std::size_t i = 0; i < bars.counts.size(); ++i) {
    if (bars.counts[i] == 0) continue;
    const double from = bars.low + bars.width * static_cast<double>(i);
    const double to = from + bars.width;
    if (!inside(frame.x, from) || !inside(frame.x, to)) continue;
    const double share = 100.0 * static_cast<double>(bars.counts[i]) / total;
    const bool warm = limit && to <= *limit + 1e-9 * bars.width;
    Path bar = rectangle(on_page(frame, {from, std::min(share, frame.y.high)}),
                         on_page(frame, {to, frame.y.low}), warm ? style::kHazard : style::kPale);
    bar.stroke = Stroke{style::kWhite, 0.15, {}, false};
    add(group, std::move(bar));
  }
  return group;
}

Path cumulative_curve(const ChartFrame& frame, const std::vector<double>& sorted, Stroke stroke) {
  constexpr std::size_t kMostSteps = 1000;
  const std::size_t every = std::max<std::size_t>(1, sorted.size() / kMostSteps);
  std::vector<XY> steps;
  double share = 0.0;
  for (std::size_t i = 0; i < sorted.size(); i += every) {
    if (!std::isfinite(sorted[i])) break;
    if (steps.empty()) steps.push_back({std::min(frame.x.low, sorted[i]), 0.0});
    steps.push_back({sorted[i], share});
    share = 100.0 * static_cast<double>(std::min(i + every, sorted.size())) /
            static_cast<double>(sorted.size());
    steps.push_back({sorted[i], share});
  }
  if (!steps.empty()) steps.push_back({std::max(frame.x.high, steps.back().x), share});
  return curve(frame, steps, std::move(stroke));
}

Group draw_ranked_bars(const ChartFrame& frame, std::vector<RankedBar> bars, double base,
                       double names_mm) {
  const auto width = [](const RankedBar& bar) { return std::abs(bar.at_high - bar.at_low); };
  std::stable_sort(bars.begin(), bars.end(),
                   [&](const RankedBar& a, const RankedBar& b) { return width(a) > width(b); });
  Group group;
  add_x_axis(group, frame);
  const double row = frame.height_mm / static_cast<double>(std::max<std::size_t>(bars.size(), 1));
  const auto x_of = [&](double value) {
    return on_page(frame, {std::clamp(value, frame.x.low, frame.x.high), frame.y.low}).x_mm;
  };
  const TextStyle small = style::text(style::kNote_mm, style::kMuted);
  for (std::size_t i = 0; i < bars.size(); ++i) {
    const RankedBar& bar = bars[i];
    const double middle = frame.top_left.y_mm + row * (static_cast<double>(i) + 0.5);
    const double half = std::min(2.2, 0.32 * row);
    const double foot = middle + 0.36 * style::kNote_mm;
    add(group, Text{{frame.top_left.x_mm - names_mm, middle + 0.36 * style::kText_mm},
                    bar.name,
                    style::text(style::kText_mm),
                    Anchor::start,
                    names_mm - 2.0,
                    1});
    if (!std::isfinite(bar.at_low) || !std::isfinite(bar.at_high)) continue;
    const double from = x_of(bar.at_low), to = x_of(bar.at_high);
    // The half on the input's high side is darker.
    add(group, rectangle({x_of(base), middle - half}, {from, middle + half}, style::kPale));
    add(group, rectangle({x_of(base), middle - half}, {to, middle + half}, style::kMuted));
    const bool rising = to >= from;
    add(group, Text{{from + (rising ? -1.0 : 1.0), foot},
                    bar.low_words,
                    small,
                    rising ? Anchor::end : Anchor::start,
                    0.0,
                    1});
    add(group, Text{{to + (rising ? 1.0 : -1.0), foot},
                    bar.high_words,
                    small,
                    rising ? Anchor::start : Anchor::end,
                    0.0,
                    1});
  }
  add(group,
      segment({x_of(base), frame.top_left.y_mm},
              {x_of(base), frame.top_left.y_mm + frame.height_mm}, {style::kInk, 0.3, {}, false}));
  return group;
}

}  // namespace brink::plot
