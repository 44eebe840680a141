// The checks that ask where the other readings lie.
//
// Both rest on one bound: if x is drawn from the density f, and g is any other density, then
// g(x)/f(x) exceeds R with a chance of at most 1/R, whatever f and g are, because its mean is 1
// (Markov's inequality). f is a kernel density of the other readings with one reading's worth of
// uniform density mixed in.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "brink/base/error.hpp"
#include "brink/readings/checks.hpp"
#include "check_support.hpp"
#include "lines_in_words.hpp"

namespace brink {

namespace {

// Bounds on the expected false alarms a file. The bound is far from reached where strays are few; a
// tighter one would hide real slips, because among many strays an exchanged reading is one more
// stray and no test can tell.
constexpr double kSwapAlarms = 0.5;
constexpr double kTurnAlarms = 0.05;

bool could_be_swapped(const Plane& plane) {
  const double dip = plane.dip.deg();
  const double direction = plane.dip_direction.deg();
  return dip > 0.0 && direction > 0.0 && direction <= 90.0 && dip != direction;
}

// How many times better the reading fits, with its numbers exchanged, to the readings of group 0.
// Dip and direction keep their measure when they are exchanged; on the sphere it is the density
// times sin(dip).
double swap_ratio(const GroupedDensity& density, const Plane& plane, bool in_group_0) {
  const Plane swapped{plane.dip_direction, plane.dip};
  const auto without_own = [&](const Plane& at) {
    const double own = in_group_0 ? density.own_kernel(plane, at) : 0.0;
    return std::max(0.0, density.sums_at(at)[0] - own) + 1.0;
  };
  return without_own(swapped) * sin(swapped.dip) / (without_own(plane) * sin(plane.dip));
}

// 1 for readings that already look exchanged when judged by all others. Several slips in one set
// lie together and would vouch for each other, so the judgement leaves them out.
std::vector<std::size_t> mark_suspects(const Readings& readings) {
  constexpr double kSuspect = 20.0;
  std::vector<std::size_t> suspect(readings.size(), 0);
  const GroupedDensity density(readings, suspect, 1);
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const Plane& plane = readings.planes[i];
    if (could_be_swapped(plane) && swap_ratio(density, plane, true) > kSuspect) suspect[i] = 1;
  }
  return suspect;
}

struct Groups {
  std::vector<std::size_t> of;  // one a reading
  std::vector<std::string> names;
};

Groups group_readings(const Readings& readings) {
  Groups groups;
  const ExtraColumn* column = readings.find_column("observer");
  if (column == nullptr) column = readings.find_column("traverse");
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const std::string name = column == nullptr ? readings.files[readings.places[i].file].name
                                               : std::string(column->cells[i]);
    const auto known = std::find(groups.names.begin(), groups.names.end(), name);
    groups.of.push_back(static_cast<std::size_t>(known - groups.names.begin()));
    if (known == groups.names.end()) groups.names.push_back(name);
  }
  return groups;
}

// How the readings of one group fit those of the others, as they stand and turned about.
struct TurnEvidence {
  double turned_over_straight = 0.0;  // logarithm of the ratio of likelihoods
  double turned_over_uniform = 0.0;
  std::size_t prefer_turned = 0;
  std::size_t readings = 0;
};

// One reading counts for at most a factor of ten, so that a stray whose turned plane happens to lie
// in a set can't speak for its observer; cutting a ratio from above keeps its mean below 1 and the
// bound valid.
constexpr double kMostFromOne = 10.0;

double fit_to_others(const GroupedDensity& density, const Plane& plane, std::size_t group,
                     std::size_t all) {
  const std::vector<double> sums = density.sums_at(plane);
  const double total = std::accumulate(sums.begin(), sums.end(), 0.0);
  const auto others = static_cast<double>(all - density.size(group));
  return (total - sums[group] + 1.0) / (others + 1.0);
}

std::vector<TurnEvidence> weigh_turns(const Readings& readings, const Groups& groups) {
  const GroupedDensity density(readings, groups.of, groups.names.size());
  std::vector<TurnEvidence> evidence(groups.names.size());
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const Plane& plane = readings.planes[i];
    const Plane turned{plane.dip, wrap_360(plane.dip_direction + Angle::degrees(180.0))};
    const std::size_t group = groups.of[i];
    const double straight_fit = fit_to_others(density, plane, group, readings.size());
    const double turned_fit = fit_to_others(density, turned, group, readings.size());
    TurnEvidence& e = evidence[group];
    e.turned_over_straight += std::log(std::min(kMostFromOne, turned_fit / straight_fit));
    e.turned_over_uniform += std::log(std::min(kMostFromOne, turned_fit));
    if (turned_fit > straight_fit) ++e.prefer_turned;
    ++e.readings;
  }
  return evidence;
}

}  // namespace

std::vector<std::string> check_swapped(const Readings& readings) {
  if (readings.size() > kMostByHand) return {};
  const auto candidates = static_cast<double>(
      std::count_if(readings.planes.begin(), readings.planes.end(), could_be_swapped));
  if (candidates == 0.0) return {};
  const std::vector<std::size_t> suspects = mark_suspects(readings);
  const GroupedDensity density(readings, suspects, 2);
  std::vector<std::string> warnings;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const Plane& plane = readings.planes[i];
    if (suspects[i] == 0 || swap_ratio(density, plane, false) < candidates / kSwapAlarms) continue;
    warnings.push_back(fmt::format(
        "{}: {} lies far from all others, {} would lie among them: are dip and dip direction "
        "swapped?",
        lines_in_words(readings, {i}), print_plane(plane, Notation::dip_direction),
        print_plane({plane.dip_direction, plane.dip}, Notation::dip_direction)));
  }
  return warnings;
}

std::vector<std::string> check_reversed(const Readings& readings) {
  if (readings.size() > kMostByHand) return {};
  const Groups groups = group_readings(readings);
  constexpr std::size_t kMostGroups = 200;
  if (groups.names.size() < 2 || groups.names.size() > kMostGroups) return {};
  const double needed = std::log(static_cast<double>(groups.names.size()) / kTurnAlarms);
  const std::vector<TurnEvidence> evidence = weigh_turns(readings, groups);
  std::vector<std::string> warnings;
  for (std::size_t g = 0; g < evidence.size(); ++g) {
    const TurnEvidence& e = evidence[g];
    const bool reversed = e.turned_over_straight > needed && e.turned_over_uniform > needed &&
                          2 * e.prefer_turned > e.readings;
    if (!reversed) continue;
    std::vector<std::size_t> members;
    for (std::size_t i = 0; i < readings.size(); ++i) {
      if (groups.of[i] == g) members.push_back(i);
    }
    warnings.push_back(fmt::format(
        "{}: the directions of {} fit the other readings only when turned by 180 degrees ({} of {} "
        "fit better so)",
        lines_in_words(readings, members), printable(groups.names[g]), e.prefer_turned,
        e.readings));
  }
  return warnings;
}

}  // namespace brink
