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

// `words` without its end, whole UTF-8 characters at a time, so that they fit.
std::string cut_to(const RimLabel& label, const std::string& words, double room_mm) {
  if (width_of(label, words) <= room_mm) return words;
  std::string kept = words;
  while (!kept.empty()) {
    while (!kept.empty() && (static_cast<unsigned char>(kept.back()) & 0xC0U) == 0x80U) {
      kept.pop_back();
    }
    if (!kept.empty()) kept.pop_back();
    if (width_of(label, kept + "…") <= room_mm) break;
  }
  return kept + "…";
}

std::string one_line(const RimLabel& label) {
  return label.name + "  " + label.orientation;
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

// The labels of one side, from the top down.
struct Side {
  const NetFrame& frame;
  const std::vector<RimLabel>& labels;
  const std::vector<Angle>& chosen;
  const std::vector<std::size_t>& here;
  bool right;
  double edge_mm;
  double top_mm, bottom_mm;

  double symbol(std::size_t k) const { return labels[here[k]].symbol ? kSymbol_mm : 0.0; }
  double room(std::size_t k, double x) const { return std::abs(edge_mm - x) - symbol(k); }
};

std::vector<double> heights_of(const Side& side, double size) {
  std::vector<double> wanted;
  for (const std::size_t i : side.here) wanted.push_back(wanted_y(side.frame, side.chosen[i]));
  return spread_out(wanted, size, side.top_mm, side.bottom_mm);
}

// All of them in boxes of `lines` lines; nothing where one needs more.
std::optional<std::vector<PlacedLabel>> place_in(const Side& side, int lines) {
  double size = 0.0;
  for (const std::size_t i : side.here) size = std::max(size, lines * line_height(side.labels[i]));
  const auto places = heights_of(side, size);
  std::vector<PlacedLabel> placed;
  for (std::size_t k = 0; k < side.here.size(); ++k) {
    const RimLabel& label = side.labels[side.here[k]];
    const double x = inner_x(side.frame, places[k], size, side.right);
    const double room = side.room(k, x);
    PlacedLabel p{side.here[k], side.chosen[side.here[k]], side.right, {x, places[k]}, 0.0,
                  size,         one_line(label),           {}};
    if (width_of(label, p.first) > room) {
      if (lines == 1) return std::nullopt;
      p.first = cut_to(label, label.name, room);
      p.second = label.orientation;
    }
    p.width_mm = side.symbol(k) + std::max(width_of(label, p.first), width_of(label, p.second));
    placed.push_back(std::move(p));
  }
  return placed;
}

std::vector<PlacedLabel> place_side(const Side& side) {
  if (auto placed = place_in(side, 1)) return *std::move(placed);
  return *place_in(side, 2);
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
    for (std::size_t i = 0; i < labels.size(); ++i) {
      if (on_right(chosen[i]) == right) here.push_back(i);
    }
    std::stable_sort(here.begin(), here.end(), [&](std::size_t a, std::size_t b) {
      return wanted_y(frame, chosen[a]) < wanted_y(frame, chosen[b]);
    });
    const double edge = right ? frame.centre.x_mm + frame.radius_mm + kGap_mm + room_right_mm
                              : frame.centre.x_mm - frame.radius_mm - kGap_mm - room_left_mm;
    for (PlacedLabel& label :
         place_side({frame, labels, chosen, here, right, edge, top_mm, bottom_mm})) {
      placed.push_back(std::move(label));
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
    if (std::hypot(rim.x_mm - inner.x_mm, rim.y_mm - inner.y_mm) > kGap_mm + 2.0) {
      add(group, segment(rim, inner, {label.style.colour, style::kThin_mm, {}, false}));
    }
    const double first_y = p.at.y_mm - (p.second.empty() ? 0.0 : 0.5 * line_height(label));
    const double symbol = label.symbol ? kSymbol_mm : 0.0;
    const double drop = 0.36 * label.style.size_mm;
    const Anchor anchor = p.right ? Anchor::start : Anchor::end;
    const double text_x = p.right ? p.at.x_mm + symbol : p.at.x_mm;
    if (label.symbol) {
      const double left = p.right ? p.at.x_mm : p.at.x_mm - symbol - width_of(label, p.first);
      add(group, Symbols{*label.symbol, 2.0, 0.4, label.style.colour, {{left + 1.1, first_y}}});
    }
    add(group, Text{{text_x, first_y + drop}, p.first, label.style, anchor, 0.0, 1});
    if (p.second.empty()) continue;
    add(group,
        Text{{text_x, first_y + line_height(label) + drop}, p.second, label.style, anchor, 0.0, 1});
  }
  return group;
}

}  // namespace brink::plot
