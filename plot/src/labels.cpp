#include "brink/plot/labels.hpp"

#include <algorithm>
#include <cmath>
#include <numeric>

#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/style.hpp"

namespace brink::plot {

namespace {

constexpr double kGap_mm = 3.4;     // from the rim to a label
constexpr double kSymbol_mm = 3.4;  // room for the symbol before the text
constexpr double kNorthHalf_mm = 7.0;

double line_height(const RimLabel& label) {
  return 1.35 * label.style.size_mm;
}

double width_of(const RimLabel& label, const std::string& words) {
  return measure({{}, words, label.style, Anchor::start, 0.0, 1}).width_mm;
}

// The end of the name is left out, whole UTF-8 characters at a time, until the label fits.
std::string fitted(const RimLabel& label, double room_mm) {
  std::string name = label.name;
  std::string words = name + "  " + label.orientation;
  while (!name.empty() && width_of(label, words) > room_mm) {
    while (!name.empty() && (static_cast<unsigned char>(name.back()) & 0xC0U) == 0x80U) {
      name.pop_back();
    }
    if (!name.empty()) name.pop_back();
    words = name + "…  " + label.orientation;
  }
  return words;
}

bool on_right(Angle azimuth) {
  return wrap_360(azimuth).deg() < 180.0;
}

double wanted_y(const NetFrame& frame, Angle azimuth) {
  return beyond_rim(frame, azimuth, kGap_mm).y_mm;
}

// The end whose height is further from those already taken on its side; the first if both are free.
std::vector<Angle> chosen_ends(const NetFrame& frame, const std::vector<RimLabel>& labels) {
  std::vector<Angle> chosen;
  const auto room_at = [&](Angle end, double most) {
    double nearest = most;
    for (const Angle& taken : chosen) {
      if (on_right(taken) != on_right(end)) continue;
      nearest = std::min(nearest, std::abs(wanted_y(frame, taken) - wanted_y(frame, end)));
    }
    // The north mark stands above the rim.
    return std::min(nearest, std::abs(beyond_rim(frame, end, 0.0).x_mm - frame.centre.x_mm) +
                                 std::max(0.0, wanted_y(frame, end) - frame.centre.y_mm));
  };
  for (const RimLabel& label : labels) {
    const double enough = 2.0 * line_height(label);
    chosen.push_back(room_at(label.end, enough) >= room_at(label.other_end, enough)
                         ? label.end
                         : label.other_end);
  }
  return chosen;
}

// Beside the rim at this height: clear of it over the label's whole height, and of the north mark.
double inner_x(const NetFrame& frame, double y, double height, bool right) {
  const double off = std::abs(y - frame.centre.y_mm);
  const double nearest = std::max(0.0, off - height / 2.0);
  const double reach = frame.radius_mm + kGap_mm;
  double across = nearest < reach ? std::sqrt(reach * reach - nearest * nearest) : 0.0;
  if (y < frame.centre.y_mm) across = std::max(across, kNorthHalf_mm);
  return frame.centre.x_mm + (right ? across : -across);
}

struct Block {
  double sum = 0.0;  // of wanted places, each less its offset in the block
  std::size_t count = 0;
  double mean() const { return sum / static_cast<double>(count); }
};

}  // namespace

std::vector<double> spread_out(const std::vector<double>& wanted, double size, double low,
                               double high) {
  // With offsets i * size taken off, "at least size apart" becomes "not descending": pool adjacent
  // violators (Ayer et al. 1955, Annals of Mathematical Statistics 26:641).
  std::vector<Block> blocks;
  for (std::size_t i = 0; i < wanted.size(); ++i) {
    blocks.push_back({wanted[i] - static_cast<double>(i) * size, 1});
    while (blocks.size() > 1 && blocks[blocks.size() - 2].mean() > blocks.back().mean()) {
      const Block last = blocks.back();
      blocks.pop_back();
      blocks.back().sum += last.sum;
      blocks.back().count += last.count;
    }
  }
  const double room = high - low - static_cast<double>(wanted.size()) * size;
  std::vector<double> places;
  for (const Block& block : blocks) {
    const double base =
        std::clamp(block.mean(), low + size / 2.0, low + size / 2.0 + std::max(0.0, room));
    for (std::size_t k = 0; k < block.count; ++k) {
      places.push_back(base + static_cast<double>(places.size()) * size);
    }
  }
  return places;
}

std::vector<PlacedLabel> place_rim_labels(const NetFrame& frame,
                                          const std::vector<RimLabel>& labels, double room_left_mm,
                                          double room_right_mm, double top_mm, double bottom_mm) {
  const std::vector<Angle> chosen = chosen_ends(frame, labels);
  std::vector<PlacedLabel> placed;
  for (const bool right : {false, true}) {
    std::vector<std::size_t> here;
    double height = 0.0;
    for (std::size_t i = 0; i < labels.size(); ++i) {
      if (on_right(chosen[i]) != right) continue;
      here.push_back(i);
      height = std::max(height, line_height(labels[i]));
    }
    std::stable_sort(here.begin(), here.end(), [&](std::size_t a, std::size_t b) {
      return wanted_y(frame, chosen[a]) < wanted_y(frame, chosen[b]);
    });
    std::vector<double> wanted;
    for (const std::size_t i : here) wanted.push_back(wanted_y(frame, chosen[i]));
    const auto places = spread_out(wanted, height, top_mm, bottom_mm);
    for (std::size_t k = 0; k < here.size(); ++k) {
      const RimLabel& label = labels[here[k]];
      const double x = inner_x(frame, places[k], height, right);
      const double symbol = label.symbol ? kSymbol_mm : 0.0;
      const double edge = right ? frame.centre.x_mm + frame.radius_mm + kGap_mm + room_right_mm
                                : frame.centre.x_mm - frame.radius_mm - kGap_mm - room_left_mm;
      const double room = std::abs(edge - x) - symbol;
      const std::string words = fitted(label, room);
      placed.push_back({here[k],
                        chosen[here[k]],
                        right,
                        {x, places[k]},
                        symbol + width_of(label, words),
                        height,
                        words});
    }
  }
  return placed;
}

Group draw_rim_labels(const NetFrame& frame, const std::vector<RimLabel>& labels,
                      const std::vector<PlacedLabel>& placed) {
  Group group;
  for (const PlacedLabel& p : placed) {
    const RimLabel& label = labels[p.label];
    const Point rim = beyond_rim(frame, p.azimuth, 0.4);
    const Point inner{p.at.x_mm + (p.right ? -0.7 : 0.7), p.at.y_mm};
    const double moved = std::hypot(rim.x_mm - inner.x_mm, rim.y_mm - inner.y_mm);
    if (moved > kGap_mm + 2.0) {
      add(group, segment(rim, inner, {label.style.colour, style::kThin_mm, {}, false}));
    }
    const double left = p.right ? p.at.x_mm : p.at.x_mm - p.width_mm;
    double text_left = left;
    if (label.symbol) {
      add(group, Symbols{*label.symbol, 2.0, 0.4, label.style.colour, {{left + 1.1, p.at.y_mm}}});
      text_left += kSymbol_mm;
    }
    add(group, Text{{text_left, p.at.y_mm + 0.36 * label.style.size_mm},
                    p.text,
                    label.style,
                    Anchor::start,
                    0.0,
                    1});
  }
  return group;
}

}  // namespace brink::plot
