#include "brink/plot/words.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/number.hpp"

namespace brink::plot {

namespace {

bool of_pairs(Mode mode) {
  return mode == Mode::wedge_sliding || mode == Mode::block_toppling;
}

// "25 %"; a small share keeps a decimal, so that it doesn't read as none.
std::string percent(double share) {
  const double value = 100.0 * share;
  if (value > 0.0 && value < 0.1) return "below 0.1 %";
  return fixed(value, value < 9.95 ? 1 : 0) + " %";
}

std::string set_name(const SetsResult& sets, int set) {
  if (set == 0) return "strays";
  return sets.sets[static_cast<std::size_t>(set) - 1].name;
}

std::string source_name(const SetsResult& sets, const SetCount& count, bool pairs) {
  if (!pairs) return set_name(sets, count.set_a);
  // Pairs name the set before the strays that it meets.
  const int first = count.set_a == 0 ? count.set_b : count.set_a;
  const int second = count.set_a == 0 ? 0 : count.set_b;
  return set_name(sets, first) + " with " + set_name(sets, second);
}

std::string leading_sets(const ModeCount& counts, const SetsResult& sets, bool pairs) {
  if (sets.sets.empty()) return {};
  std::vector<SetCount> by_set;
  for (const SetCount& c : counts.by_set) {
    if (c.admissible > 0) by_set.push_back(c);
  }
  if (by_set.empty()) return {};
  std::stable_sort(by_set.begin(), by_set.end(), [](const SetCount& a, const SetCount& b) {
    return a.admissible > b.admissible;
  });
  if (by_set.size() == 1) return "all from " + source_name(sets, by_set[0], pairs);
  const auto part = [&](const SetCount& count) {
    const bool one_stray = !pairs && count.set_a == 0 && count.admissible == 1;
    return one_stray ? "1 stray"
                     : grouped(count.admissible) + " " + source_name(sets, count, pairs);
  };
  return part(by_set[0]) + ", then " + part(by_set[1]);
}

}  // namespace

std::string grouped(std::uint64_t number) {
  const std::string digits = std::to_string(number);
  if (digits.size() < 5) return digits;
  std::string out;
  for (std::size_t i = 0; i < digits.size(); ++i) {
    if (i > 0 && (digits.size() - i) % 3 == 0) out += "\u202F";
    out += digits[i];
  }
  return out;
}

std::string dip_and_direction(Angle dip, Angle dip_direction) {
  return fmt::format("{:02.0f}/{:03d}", dip.deg(),
                     static_cast<int>(std::lround(wrap_360(dip_direction).deg())) % 360);
}

std::string degrees(Angle angle) {
  std::string text = fixed(angle.deg(), 1);
  if (text.ends_with(".0")) text.resize(text.size() - 2);
  return text + "°";
}

std::string_view mode_name(Mode mode) {
  switch (mode) {
    case Mode::planar_sliding:
      return "Planar sliding";
    case Mode::wedge_sliding:
      return "Wedge sliding";
    case Mode::flexural_toppling:
      return "Flexural toppling";
    case Mode::block_toppling:
      return "Block toppling";
  }
  return {};
}

std::string_view projection_name(Projection projection) {
  return projection == Projection::equal_angle ? "Equal-angle" : "Equal-area";
}

CountInWords count_in_words(Mode mode, const ModeCount& counts, const SetsResult& sets,
                            bool region_is_empty) {
  const bool pairs = of_pairs(mode);
  if (counts.tested == 0) {
    return {pairs ? "no pair of readings" : "no reading", "there is nothing to test", false};
  }
  const std::string what =
      std::string(pairs ? "pair" : "reading") + (counts.tested == 1 ? "" : "s");
  if (counts.admissible == 0) {
    return {fmt::format("none of {} {}", grouped(counts.tested), what),
            region_is_empty ? "no direction is free to move on this face"
                            : "nothing falls in the hatched region",
            false};
  }
  return {fmt::format("{} of {} {}, {}", grouped(counts.admissible), grouped(counts.tested), what,
                      percent(counts.share.value_or(0.0))),
          leading_sets(counts, sets, pairs), true};
}

}  // namespace brink::plot
