#include "brink/design/steepest.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <functional>
#include <string_view>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/parallel.hpp"
#include "brink/base/ties.hpp"
#include "confidence.hpp"
#include "face_shares.hpp"

namespace brink {

namespace {

void require(bool ok, std::string_view key, double value, std::string_view accepted) {
  if (ok) return;
  throw Error(ErrorKind::argument, Place{.file = {}, .key = std::string(key)}, "out of range",
              fmt::format("{}", value), accepted);
}

void check(const SteepestOptions& o) {
  const auto between = [](double low, double value, double high) {
    return low <= value && value <= high;
  };
  require(o.every.deg() > 0.0 && o.every.deg() <= 180.0, "--every", o.every.deg(),
          "above 0, at most 180 degrees");
  require(between(0.1, o.resolution.deg(), 45.0), "--resolution", o.resolution.deg(),
          "0.1 to 45 degrees");
  require(o.greatest_dip >= o.resolution && o.greatest_dip.deg() < 180.0, "--greatest-dip",
          o.greatest_dip.deg(), "the resolution or more, below 180 degrees");
  for (const double limit : o.limits) {
    require(between(0.0, limit, 1.0), "--limit", limit * 100.0, "0 to 100 percent");
  }
  if (o.confident) {
    require(between(0.5, *o.confident, 0.99), "--confident", *o.confident, "0.5 to 0.99");
    if (o.weighted) {
      throw Error(ErrorKind::argument, Place{.file = {}, .key = "--confident"},
                  "is given together with --weighted", {}, "one of the two");
    }
  }
  const Angle friction = o.settings.friction;
  require(between(0.0, friction.deg(), 90.0) && friction.deg() < 90.0, "friction", friction.deg(),
          "0 or more and below 90 degrees");
  if (o.safety) {
    require(o.safety->factor_of_safety > 0.0, "--target", o.safety->factor_of_safety, "above 0");
  }
}

// All that the search at one azimuth looks at.
struct Search {
  const PairReadings& readings;
  const ChordCounter& pairs;
  const FaceShares& shares;
  const SetsResult& sets;
  const SteepestOptions& options;
  std::optional<Resampler> resampler;
};

bool within(const ModeShares& shares, const ModeShares& limits) {
  for (std::size_t m = 0; m < kModes; ++m) {
    if (!at_most(shares[m], limits[m])) return false;
  }
  return true;
}

// Number of dips, from the flattest, that pass; `test` never passes again once it failed.
template <typename Test>
std::size_t count_leading(std::size_t dips, const Test& test) {
  std::size_t low = 0;
  std::size_t high = dips;
  while (low < high) {
    const std::size_t middle = (low + high) / 2;
    if (test(middle)) {
      low = middle + 1;
    } else {
      high = middle;
    }
  }
  return low;
}

// The wedge of two set means with the least factor of safety on a face; nothing where none forms.
std::optional<WeakestWedge> weakest_wedge(const Search& s, const Face& face) {
  std::optional<WeakestWedge> weakest;
  for (std::size_t a = 0; a < s.sets.sets.size(); ++a) {
    for (std::size_t b = a + 1; b < s.sets.sets.size(); ++b) {
      WedgeCase wedge = s.options.safety->wedge;
      wedge.geometry.plane1 = s.sets.sets[a].mean;
      wedge.geometry.plane2 = s.sets.sets[b].mean;
      wedge.geometry.face = face;
      wedge.geometry.upper = s.options.settings.upper;
      const WedgeResult result = analyse_wedge(wedge);
      if (!result.forms) continue;
      if (!weakest || result.factor_of_safety < weakest->factor_of_safety) {
        weakest = {static_cast<int>(a + 1), static_cast<int>(b + 1), result.factor_of_safety};
      }
    }
  }
  return weakest;
}

bool safe(const std::optional<WeakestWedge>& wedge, const SafetyTarget& target) {
  return !wedge || at_least(wedge->factor_of_safety, target.factor_of_safety);
}

// From the steepest dip that the shares allow down to the first at which every wedge is safe.
std::size_t lower_to_target(const Search& s, std::size_t azimuth, std::size_t steps) {
  const FaceGrid& grid = s.shares.grid();
  while (steps > 0 && !safe(weakest_wedge(s, {grid.dips[steps - 1], grid.azimuths[azimuth]}),
                            *s.options.safety)) {
    --steps;
  }
  return steps;
}

// Sets by what they add to a mode on a face, the largest first, those under a twentieth left out.
std::vector<GoverningSets> leading_sets(const Search& s, Mode mode, const FaceLimits& face) {
  const std::size_t groups = s.readings.groups();
  const auto number = [&](std::size_t g) { return g + 1 == groups ? 0 : static_cast<int>(g + 1); };
  std::vector<GoverningSets> found;
  const auto add = [&](std::size_t a, int b, double amount) {
    if (amount > 0.0) found.push_back({number(a), b, amount});
  };
  if (mode == Mode::planar_sliding || mode == Mode::flexural_toppling) {
    const auto passes = mode == Mode::planar_sliding ? planar_sliding : flexural_toppling;
    for (std::size_t g = 0; g < groups; ++g) {
      double amount = 0.0;
      for (std::size_t i = s.readings.group_begin[g]; i < s.readings.group_begin[g + 1]; ++i) {
        const Vector3 n{s.readings.x[i], s.readings.y[i], s.readings.z[i]};
        if (passes(face, n)) amount += s.options.weighted ? s.readings.weight[i] : 1.0;
      }
      add(g, 0, amount);
    }
  } else {
    const PairTally tally = mode == Mode::wedge_sliding ? s.pairs.wedge_sliding(face, 1)
                                                        : s.pairs.block_toppling(face, 1);
    for (std::size_t a = 0; a < groups; ++a) {
      for (std::size_t b = a; b < groups; ++b) {
        const PairSum& sum = tally.by_groups[pair_slot(a, b, groups)];
        add(a, number(b), s.options.weighted ? sum.weight : static_cast<double>(sum.count));
      }
    }
  }
  double all = 0.0;
  for (const GoverningSets& sets : found) all += sets.part;
  for (GoverningSets& sets : found) sets.part /= all;
  std::ranges::stable_sort(found, std::greater<>(), &GoverningSets::part);
  std::erase_if(found, [](const GoverningSets& sets) { return sets.part < 0.05; });
  return found;
}

// What stands in the way of one step more.
void find_governing(const Search& s, std::size_t azimuth, std::size_t steps, SteepestFace& face) {
  if (!face.shares_one_step_steeper) return;
  for (std::size_t m = 0; m < kModes; ++m) {
    if (at_most((*face.shares_one_step_steeper)[m], s.options.limits[m])) continue;
    face.governs = Governs::share;
    face.governing_mode = static_cast<Mode>(m);
    face.governing_sets = leading_sets(s, *face.governing_mode, s.shares.limits(azimuth, steps));
    return;
  }
  if (s.options.safety) face.governs = Governs::factor_of_safety;
}

void add_wedges(const Search& s, std::size_t steps, SteepestFace& face) {
  const FaceGrid& grid = s.shares.grid();
  if (steps > 0) face.weakest_wedge = weakest_wedge(s, {grid.dips[steps - 1], face.dip_direction});
  if (steps < grid.dips.size()) {
    face.weakest_wedge_one_step_steeper = weakest_wedge(s, {grid.dips[steps], face.dip_direction});
  }
}

SteepestFace search_azimuth(const Search& s, std::size_t azimuth) {
  const FaceGrid& grid = s.shares.grid();
  const std::size_t dips = grid.dips.size();
  std::size_t steps = count_leading(
      dips, [&](std::size_t k) { return within(s.shares.at(azimuth, k), s.options.limits); });
  if (s.options.safety) steps = lower_to_target(s, azimuth, steps);
  SteepestFace face;
  face.dip_direction = grid.azimuths[azimuth];
  if (steps > 0) {
    face.steepest_dip = grid.dips[steps - 1];
    face.shares = s.shares.at(azimuth, steps - 1);
  }
  if (steps < dips) face.shares_one_step_steeper = s.shares.at(azimuth, steps);
  const auto five =
      static_cast<std::size_t>(std::max(1.0, std::round(5.0 / s.options.resolution.deg())));
  if (steps + five <= dips) {
    face.shares_five_degrees_steeper = s.shares.at(azimuth, steps + five - 1);
  }
  find_governing(s, azimuth, steps, face);
  if (s.options.safety) add_wedges(s, steps, face);
  if (s.resampler) {
    const std::size_t held = count_leading(dips, [&](std::size_t k) {
      return s.resampler->holds(s.shares.limits(azimuth, k), s.options.limits) >=
             *s.options.confident;
    });
    const std::size_t both = std::min(held, steps);
    face.confident_dip = both > 0 ? grid.dips[both - 1] : Angle{};
  }
  return face;
}

void warn(SteepestResult& result) {
  std::size_t none = 0;
  for (const SteepestFace& face : result.azimuths) none += face.steepest_dip.deg() == 0.0 ? 1 : 0;
  if (none == 0) return;
  result.warnings.push_back(
      fmt::format("at {} of {} azimuths no face is within the limits: even {} degrees, the "
                  "flattest tried, is too "
                  "steep",
                  none == result.azimuths.size() ? "all" : std::to_string(none),
                  result.azimuths.size(), shortest(result.dips.front().deg())));
}

}  // namespace

std::vector<Angle> dips_tried(const SteepestOptions& options) {
  std::vector<Angle> dips;
  for (double k = 1.0; at_most(options.resolution * k, options.greatest_dip); k += 1.0) {
    dips.push_back(options.resolution * k);
  }
  return dips;
}

std::vector<Angle> azimuths_tried(const SteepestOptions& options) {
  if (!options.azimuths.empty()) return options.azimuths;
  std::vector<Angle> azimuths;
  for (double k = 0.0; strictly_below(options.every * k, Angle::degrees(360.0)); k += 1.0) {
    azimuths.push_back(options.every * k);
  }
  return azimuths;
}

SteepestResult find_steepest(const Readings& readings, const SetsResult& sets,
                             const SteepestOptions& options) {
  check(options);
  SteepestResult result;
  result.options = options;
  const FaceGrid grid{azimuths_tried(options), dips_tried(options)};
  result.dips = grid.dips;
  const PairReadings arranged = arrange_by_set(readings, sets.assignment, sets.sets.size());
  const ChordCounter pairs(arranged);
  const FaceShares shares(arranged, pairs, grid, options);
  Search search{arranged, pairs, shares, sets, options, std::nullopt};
  if (options.confident) search.resampler.emplace(arranged, pairs, options.seed);
  result.azimuths.resize(grid.azimuths.size());
  for_each_chunk(grid.azimuths.size(), 1, options.threads,
                 [&](std::size_t azimuth, std::size_t, std::size_t) {
                   result.azimuths[azimuth] = search_azimuth(search, azimuth);
                 });
  if (options.map) {
    result.map.resize(grid.azimuths.size() * grid.dips.size());
    for_each_chunk(grid.azimuths.size(), 1, options.threads,
                   [&](std::size_t azimuth, std::size_t, std::size_t) {
                     for (std::size_t k = 0; k < grid.dips.size(); ++k) {
                       result.map[azimuth * grid.dips.size() + k] = shares.at(azimuth, k);
                     }
                   });
  }
  warn(result);
  return result;
}

}  // namespace brink
