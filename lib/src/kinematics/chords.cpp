#include "brink/kinematics/chords.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <bit>
#include <cmath>
#include <numeric>
#include <tuple>

#include "brink/base/parallel.hpp"
#include "brink/base/random.hpp"
#include "brink/base/ties.hpp"
#include "line_zone.hpp"

namespace brink {

namespace {

constexpr std::uint32_t kNobody = static_cast<std::uint32_t>(-1);

// n or -n, whichever is upward, so that the two normals of a plane compare equal; no signed zeros.
Vector3 as_axis(const Vector3& n) {
  const bool turn = n.z() < 0.0 || (n.z() == 0.0 && (n.y() < 0.0 || (n.y() == 0.0 && n.x() < 0.0)));
  return (turn ? Vector3(-n) : n) + Vector3::Zero();
}

std::uint64_t hash_of(const Vector3& n, std::size_t group) {
  std::uint64_t hash = group;
  for (const double part : {n.x(), n.y(), n.z()}) {
    hash = mix_bits(hash ^ std::bit_cast<std::uint64_t>(part));
  }
  return hash;
}

// Sums over numbered items of which some are present: both operations in log2(items) steps.
class FenwickTree {
 public:
  explicit FenwickTree(std::size_t items) : nodes_(items + 1) {}

  void add(std::size_t item, std::uint64_t count, double weight) {
    for (std::size_t i = item + 1; i < nodes_.size(); i += i & (~i + 1)) {
      nodes_[i].count += count;
      nodes_[i].weight += weight;
    }
  }
  // Sum over the items up to and including `item`.
  PairSum up_to(std::size_t item) const {
    PairSum sum;
    for (std::size_t i = item + 1; i > 0; i &= i - 1) {
      sum.count += nodes_[i].count;
      sum.weight += nodes_[i].weight;
    }
    return sum;
  }

 private:
  std::vector<PairSum> nodes_;
};

PairSum operator-(const PairSum& a, const PairSum& b) {
  const std::uint64_t count = a.count - b.count;
  return {count, count == 0 ? 0.0 : a.weight - b.weight};
}

void subtract(PairTally& from, const PairTally& what) {
  for (std::size_t i = 0; i < from.by_groups.size(); ++i) {
    from.by_groups[i] = from.by_groups[i] - what.by_groups[i];
  }
  for (std::size_t i = 0; i < from.of_reading.size(); ++i) from.of_reading[i] -= what.of_reading[i];
}

}  // namespace

// One end of a chord.
struct ChordCounter::Event {
  double key;    // position on the border of the zone
  double other;  // of the chord's other end
  std::uint32_t plane;

  bool opens() const { return key < other; }
  // Chords that share an end do not cross: at one position those that close come before those that
  // open, the later opened closes first, and the one that reaches farther opens first.
  bool operator<(const Event& e) const {
    if (key != e.key) return key < e.key;
    return std::tuple(opens(), e.other, plane) < std::tuple(e.opens(), other, e.plane);
  }
};

ChordCounter::ChordCounter(const PairReadings& readings) : groups_(readings.groups()) {
  merge(readings);
  find_parallel();
}

// Equal readings of a group become one; planes stay in the order of their first reading.
void ChordCounter::merge(const PairReadings& readings) {
  const std::size_t size = readings.size();
  const std::size_t mask = std::bit_ceil(2 * size + 1) - 1;
  std::vector<std::uint32_t> table(mask + 1, kNobody);
  merged_of_.reserve(size);
  for (std::size_t g = 0; g < groups_; ++g) {
    for (std::size_t i = readings.group_begin[g]; i < readings.group_begin[g + 1]; ++i) {
      const Vector3 n = as_axis({readings.x[i], readings.y[i], readings.z[i]});
      std::size_t slot = hash_of(n, g) & mask;
      while (table[slot] != kNobody &&
             (planes_[table[slot]].group != g || planes_[table[slot]].normal != n)) {
        slot = (slot + 1) & mask;
      }
      if (table[slot] == kNobody) {
        table[slot] = static_cast<std::uint32_t>(planes_.size());
        planes_.push_back({n, 0, 0.0, g});
      }
      planes_[table[slot]].count += 1;
      planes_[table[slot]].weight += readings.weight[i];
      merged_of_.push_back(table[slot]);
    }
  }
}

// Near-parallel planes lie close together along any direction: sorted along one that is no likely
// symmetry of data, each is compared with its few neighbours.
void ChordCounter::find_parallel() {
  const Vector3 along = Vector3(0.3961, 0.5473, 0.7372).normalized();
  struct Place {
    double key;
    std::uint32_t plane;
  };
  std::vector<Place> places;
  places.reserve(planes_.size());
  for (std::uint32_t i = 0; i < planes_.size(); ++i) {
    const Vector3& n = planes_[i].normal;
    places.push_back({n.dot(along), i});
    // Axes near the rim have a neighbour on the far side.
    if (n.z() <= 2.0 * kParallel) places.push_back({-n.dot(along), i});
  }
  std::ranges::sort(places, {}, [](const Place& p) { return std::pair(p.key, p.plane); });
  for (std::size_t i = 0; i < places.size(); ++i) {
    for (std::size_t j = i + 1; j < places.size(); ++j) {
      if (places[j].key - places[i].key > 2.0 * kParallel) break;
      const auto [a, b] = std::minmax(places[i].plane, places[j].plane);
      const Vector3 cross = planes_[a].normal.cross(planes_[b].normal);
      if (a != b && cross.squaredNorm() <= kParallel * kParallel) parallel_.emplace_back(a, b);
    }
  }
  std::ranges::sort(parallel_);
  const auto repeated = std::ranges::unique(parallel_);
  parallel_.erase(repeated.begin(), repeated.end());
}

DistinctPlanes ChordCounter::distinct_planes() const {
  DistinctPlanes out;
  for (const Merged& plane : planes_) {
    out.planes.x.push_back(plane.normal.x());
    out.planes.y.push_back(plane.normal.y());
    out.planes.z.push_back(plane.normal.z());
    out.planes.weight.push_back(plane.weight);
    out.copies.push_back(static_cast<std::int64_t>(plane.count));
  }
  out.planes.group_begin = {0, planes_.size()};
  return out;
}

PairTally ChordCounter::empty_tally() const {
  PairTally tally;
  tally.by_groups.resize(groups_ * (groups_ + 1) / 2);
  tally.of_reading.resize(merged_of_.size());
  return tally;
}

// Every pair with a line among the planes taken.
PairTally ChordCounter::all_pairs(const std::vector<bool>& taken) const {
  std::vector<PairSum> sums(groups_);
  std::vector<PairSum> squares(groups_);
  std::uint64_t all = 0;
  for (std::size_t i = 0; i < planes_.size(); ++i) {
    if (!taken[i]) continue;
    const Merged& p = planes_[i];
    sums[p.group].count += p.count;
    sums[p.group].weight += p.weight;
    squares[p.group].count += p.count * p.count;
    squares[p.group].weight += p.weight * p.weight;
    all += p.count;
  }
  PairTally tally = empty_tally();
  for (std::size_t a = 0; a < groups_; ++a) {
    for (std::size_t b = a; b < groups_; ++b) {
      PairSum& sum = tally.by_groups[pair_slot(a, b, groups_)];
      sum = {sums[a].count * sums[b].count, sums[a].weight * sums[b].weight};
      if (a == b) {
        sum = sum - squares[a];
        sum = {sum.count / 2, sum.weight / 2.0};
      }
    }
  }
  std::vector<std::uint64_t> degrees(planes_.size());
  for (std::size_t i = 0; i < planes_.size(); ++i) {
    if (taken[i]) degrees[i] = all - planes_[i].count;
  }
  for (const auto& [i, j] : parallel_) {
    if (!taken[i] || !taken[j]) continue;
    const Merged& p = planes_[i];
    const Merged& q = planes_[j];
    const auto [a, b] = std::minmax(p.group, q.group);
    PairSum& sum = tally.by_groups[pair_slot(a, b, groups_)];
    sum = sum - PairSum{p.count * q.count, p.weight * q.weight};
    degrees[i] -= q.count;
    degrees[j] -= p.count;
  }
  spread(degrees, tally);
  return tally;
}

void ChordCounter::spread(const std::vector<std::uint64_t>& degrees, PairTally& tally) const {
  for (std::size_t i = 0; i < merged_of_.size(); ++i) tally.of_reading[i] = degrees[merged_of_[i]];
}

std::vector<bool> ChordCounter::vertical_planes() const {
  std::vector<bool> vertical(planes_.size());
  for (std::size_t i = 0; i < planes_.size(); ++i) {
    vertical[i] = at_most(planes_[i].normal.z(), 0.0);
  }
  return vertical;
}

PairTally ChordCounter::lines() const {
  return all_pairs(std::vector<bool>(planes_.size(), true));
}

// The ends of all chords, in order round the border.
std::vector<ChordCounter::Event> ChordCounter::events(const LineZone& zone) const {
  std::vector<Event> events;
  const ZoneBorder border(zone);
  if (border.empty()) return events;
  events.reserve(2 * planes_.size());
  for (std::uint32_t i = 0; i < planes_.size(); ++i) {
    const std::optional<Chord> chord = border.cut(planes_[i].normal);
    if (!chord || chord->from == chord->to) continue;
    events.push_back({chord->from, chord->to, i});
    events.push_back({chord->to, chord->from, i});
  }
  std::sort(events.begin(), events.end());
  return events;
}

// Counts crossings among the chords of the groups taken. A chord crosses those with one end between
// its own: all ends between, less both ends of each chord that lies between whole. Every crossing
// is seen from both of its chords. `degrees`, where wanted, receives the crossings of each plane.
PairSum ChordCounter::interleaving(const std::vector<Event>& events,
                                   const std::vector<bool>& groups,
                                   std::vector<std::uint64_t>* degrees) const {
  struct Open {
    std::size_t rank;  // in the order of opening
    PairSum before;    // ends passed so far, its own included
  };
  std::vector<Open> open(planes_.size());
  FenwickTree closed(events.size() / 2);
  PairSum all_closed;
  PairSum passed;
  PairSum twice;
  std::size_t opened = 0;
  for (const Event& event : events) {
    const Merged& plane = planes_[event.plane];
    if (!groups[plane.group]) continue;
    const PairSum between = passed;
    passed.count += plane.count;
    passed.weight += plane.weight;
    if (event.opens()) {
      open[event.plane] = {opened++, passed};
      continue;
    }
    const Open& own = open[event.plane];
    const PairSum up_to = closed.up_to(own.rank);
    const std::uint64_t degree =
        between.count - own.before.count - 2 * (all_closed.count - up_to.count);
    const double weight =
        between.weight - own.before.weight - 2.0 * (all_closed.weight - up_to.weight);
    twice.count += plane.count * degree;
    if (degree > 0) twice.weight += plane.weight * weight;
    if (degrees != nullptr) (*degrees)[event.plane] = degree;
    closed.add(own.rank, plane.count, plane.weight);
    all_closed.count += plane.count;
    all_closed.weight += plane.weight;
  }
  return {twice.count / 2, twice.weight / 2.0};
}

// The near-parallel pairs whose chords were counted as crossing: where the planes are alike only
// rounding decides, so the very order of the ends is asked.
std::vector<std::pair<std::uint32_t, std::uint32_t>> ChordCounter::parallel_inside(
    const std::vector<Event>& events) const {
  std::vector<std::pair<std::uint32_t, std::uint32_t>> found;
  if (parallel_.empty()) return found;
  struct Ends {
    std::size_t open = 0;
    std::size_t close = 0;  // 0: no chord
  };
  std::vector<Ends> ends(planes_.size());
  for (std::size_t i = 0; i < events.size(); ++i) {
    (events[i].opens() ? ends[events[i].plane].open : ends[events[i].plane].close) = i;
  }
  for (const auto& [i, j] : parallel_) {
    const Ends& p = ends[i].open < ends[j].open ? ends[i] : ends[j];
    const Ends& q = ends[i].open < ends[j].open ? ends[j] : ends[i];
    if (p.close > 0 && q.close > 0 && q.open < p.close && p.close < q.close) {
      found.emplace_back(i, j);
    }
  }
  return found;
}

PairSum ChordCounter::total_inside(const LineZone& zone) const {
  const std::vector<Event> sorted = events(zone);
  PairSum sum = interleaving(sorted, std::vector<bool>(groups_, true), nullptr);
  for (const auto& [i, j] : parallel_inside(sorted)) {
    sum = sum - PairSum{planes_[i].count * planes_[j].count, planes_[i].weight * planes_[j].weight};
  }
  return sum;
}

// Pairs of groups by inclusion and exclusion: those of a and b together, less those within each.
PairTally ChordCounter::inside(const LineZone& zone, unsigned threads) const {
  const std::vector<Event> sorted = events(zone);
  PairTally tally = empty_tally();
  std::vector<std::uint64_t> degrees(planes_.size());
  std::vector<std::pair<std::size_t, std::size_t>> slots;
  for (std::size_t a = 0; a < groups_; ++a) {
    for (std::size_t b = a; b < groups_; ++b) slots.emplace_back(a, b);
  }
  // The last piece of work is all groups at once, for the pairs of each reading.
  for_each_chunk(slots.size() + 1, 1, threads, [&](std::size_t k, std::size_t, std::size_t) {
    std::vector<bool> taken(groups_, k == slots.size());
    if (k == slots.size()) {
      interleaving(sorted, taken, &degrees);
      return;
    }
    taken[slots[k].first] = taken[slots[k].second] = true;
    tally.by_groups[pair_slot(slots[k].first, slots[k].second, groups_)] =
        interleaving(sorted, taken, nullptr);
  });
  for (const auto& [a, b] : slots) {
    if (a == b) continue;
    PairSum& sum = tally.by_groups[pair_slot(a, b, groups_)];
    sum = sum - tally.by_groups[pair_slot(a, a, groups_)];
    sum = sum - tally.by_groups[pair_slot(b, b, groups_)];
  }
  for (const auto& [i, j] : parallel_inside(sorted)) {
    const Merged& p = planes_[i];
    const Merged& q = planes_[j];
    const auto [a, b] = std::minmax(p.group, q.group);
    PairSum& sum = tally.by_groups[pair_slot(a, b, groups_)];
    sum = sum - PairSum{p.count * q.count, p.weight * q.weight};
    degrees[i] -= q.count;
    degrees[j] -= p.count;
  }
  spread(degrees, tally);
  return tally;
}

PairTally ChordCounter::wedge_sliding(const FaceLimits& limits, unsigned threads) const {
  return inside(sliding_zone(limits), threads);
}

PairTally ChordCounter::block_toppling(const FaceLimits& limits, unsigned threads) const {
  const TopplingZones zones = toppling_zones(limits);
  if (zones.none) return empty_tally();
  PairTally tally = zones.inside.caps.empty() ? lines() : inside(zones.inside, threads);
  if (zones.vertical_too) subtract(tally, all_pairs(vertical_planes()));
  if (zones.outside) subtract(tally, inside(*zones.outside, threads));
  return tally;
}

PairSum ChordCounter::wedge_sliding_total(const FaceLimits& limits) const {
  return total_inside(sliding_zone(limits));
}

PairSum ChordCounter::block_toppling_total(const FaceLimits& limits) const {
  const TopplingZones zones = toppling_zones(limits);
  if (zones.none) return {};
  PairSum sum = zones.inside.caps.empty() ? lines().total() : total_inside(zones.inside);
  if (zones.vertical_too) sum = sum - all_pairs(vertical_planes()).total();
  if (zones.outside) sum = sum - total_inside(*zones.outside);
  return sum;
}

}  // namespace brink
