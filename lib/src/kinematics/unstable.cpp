#include "brink/kinematics/unstable.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <numeric>
#include <vector>

#include "../base/clones.hpp"
#include "brink/base/parallel.hpp"
#include "brink/base/random.hpp"
#include "brink/base/ties.hpp"
#include "brink/mechanics/dry_wedge.hpp"
#include "line_tests.hpp"

namespace brink {

namespace {

constexpr std::size_t kRows = 64;
constexpr std::size_t kColumns = 512;  // what the loop reads stays in the cache nearest the core

// The pairs of rows [row, row_end) with columns [column, column_end), where the column is past the
// row.
struct Block {
  std::size_t row, row_end;
  std::size_t column, column_end;
  std::size_t columns() const { return column_end - column; }
  std::size_t first(std::size_t i) const { return std::max(column, i + 1) - column; }
};

// What the factor of safety of a pair needs of each reading alone, for one face: see
// mechanics/dry_wedge.hpp for the meaning.
struct SafetyColumns {
  std::vector<double> climb;  // sign of (normal x face) . upper; 0: bounds no block
  std::vector<double> alone;  // 1 where a block sliding on this plane alone is unstable, else 0
  std::vector<std::int64_t> copies;
};

SafetyColumns prepare_safety(const PairReadings& r, std::span<const std::int64_t> copies,
                             const FaceLimits& limits, double tan_friction) {
  SafetyColumns out;
  out.climb.reserve(r.size());
  out.alone.reserve(r.size());
  for (std::size_t i = 0; i < r.size(); ++i) {
    const Vector3 n = {r.x[i], r.y[i], r.z[i]};
    const double climb = n.cross(limits.face_normal).dot(limits.upper_normal);
    out.climb.push_back(std::abs(climb) <= kTie ? 0.0 : std::copysign(1.0, climb));
    const double drive = std::hypot(n.x(), n.y());
    const bool slips = drive > 1e-12 && strictly_below(std::abs(n.z()) * tan_friction / drive, 1.0);
    out.alone.push_back(slips ? 1.0 : 0.0);
  }
  out.copies.assign(copies.begin(), copies.end());
  if (copies.empty()) out.copies.assign(r.size(), 1);
  return out;
}

// Pairs that daylight and whose dry_factor_of_safety() is strictly below 1, decided by the same
// comparisons cleared of divisions; tests hold the two to each other.
BRINK_CLONES std::int64_t count_block(const PairReadings& r, const SafetyColumns& safety,
                                      const FaceLimits& limits, double tan_friction,
                                      const Block& block) {
  const double* __restrict x = r.x.data() + block.column;
  const double* __restrict y = r.y.data() + block.column;
  const double* __restrict z = r.z.data() + block.column;
  const double* __restrict climb = safety.climb.data() + block.column;
  const double* __restrict alone = safety.alone.data() + block.column;
  const std::int64_t* __restrict copies = safety.copies.data() + block.column;
  const FaceLimits local = limits;
  std::int64_t unstable = 0;
  for (std::size_t i = block.row; i < block.row_end; ++i) {
    const Vector3 n = {r.x[i], r.y[i], r.z[i]};
    const double climb_i = safety.climb[i];
    const double alone_i = safety.alone[i];
    std::int64_t in_row = 0;
    for (std::size_t k = block.first(i); k < block.columns(); ++k) {
      const line_tests::Trial v = line_tests::line_of(n, x[k], y[k], z[k]);
      const double square = line_tests::squared_length(v);
      const double turn = line_tests::dot(v, local.face_normal) < 0.0 ? -1.0 : 1.0;
      const double side_i = turn * climb[k];
      const double side_j = -turn * climb_i;
      const double press_i = side_i * (v.y * x[k] - v.x * y[k]);
      const double press_j = side_j * (v.x * n.y() - v.y * n.x());
      const double slack = -kTie * square;
      const bool held_i = press_i >= slack;
      const bool held_j = press_j >= slack;
      const double drive = (v.z < 0.0 ? -v.z : v.z) * std::sqrt(square);
      const double hold =
          ((press_i > 0.0 ? press_i : 0.0) + (press_j > 0.0 ? press_j : 0.0)) * tan_friction;
      const bool slips = (drive > 1e-12 * square) & (hold < (1.0 - kTie) * drive);
      const bool on_i = !held_j & (side_i * n.z() > 0.0);
      const bool on_j = !held_i & (side_j * z[k] > 0.0);
      const bool one = (!on_i | (alone_i > 0.0)) & (on_i | !on_j | (alone[k] > 0.0));
      const bool both = held_i & held_j;
      const bool fails = (both & slips) | (!both & one);
      const bool block_bounded = (climb_i * climb[k] != 0.0) & line_tests::is_line(v);
      in_row += (fails & block_bounded & line_tests::daylights(local, v)) ? copies[k] : 0;
    }
    unstable += in_row * safety.copies[i];
  }
  return unstable;
}

// Strata of the sample: parts of the readings, alike in orientation.

constexpr std::size_t kHalvings = 5;
constexpr std::size_t kParts = std::size_t{1} << kHalvings;

struct Parts {
  std::vector<std::size_t> order;  // readings, part by part
  std::array<std::size_t, kParts + 1> begin{};
};

// Halves each part at the median of its longest side, five times over. Normals are
// axes: taken upward.
Parts divide(const PairReadings& r) {
  std::array<std::vector<double>, 3> sides;
  for (std::size_t i = 0; i < r.size(); ++i) {
    const double sign = r.z[i] < 0.0 ? -1.0 : 1.0;
    sides[0].push_back(sign * r.x[i]);
    sides[1].push_back(sign * r.y[i]);
    sides[2].push_back(sign * r.z[i]);
  }
  Parts parts;
  parts.order.resize(r.size());
  std::iota(parts.order.begin(), parts.order.end(), std::size_t{0});
  for (std::size_t p = 0; p <= kParts; ++p) parts.begin[p] = p * r.size() / kParts;
  for (std::size_t width = kParts; width > 1; width /= 2) {
    for (std::size_t p = 0; p < kParts; p += width) {
      const auto at = [&](std::size_t part) {
        return parts.order.begin() + static_cast<std::ptrdiff_t>(parts.begin[part]);
      };
      const auto longest = std::ranges::max_element(sides, {}, [&](const auto& side) {
        double low = 2.0;
        double high = -2.0;
        for (auto i = at(p); i != at(p + width); ++i) {
          low = std::min(low, side[*i]);
          high = std::max(high, side[*i]);
        }
        return high - low;
      });
      std::nth_element(at(p), at(p + width / 2), at(p + width), [&](std::size_t a, std::size_t b) {
        return std::pair((*longest)[a], a) < std::pair((*longest)[b], b);
      });
    }
  }
  return parts;
}

struct Stratum {
  std::size_t a, b;  // parts
  double pairs;
  std::uint64_t draws;
  std::uint64_t hits = 0;
};

std::vector<Stratum> plan_strata(const Parts& parts, std::uint64_t pairs) {
  const auto size = [&](std::size_t p) {
    return static_cast<double>(parts.begin[p + 1] - parts.begin[p]);
  };
  const auto all = static_cast<double>(parts.order.size());
  const double per_pair = static_cast<double>(pairs) / std::max(all * (all - 1.0) / 2.0, 1.0);
  std::vector<Stratum> strata;
  for (std::size_t a = 0; a < kParts; ++a) {
    for (std::size_t b = a; b < kParts; ++b) {
      const double count = a == b ? size(a) * (size(a) - 1.0) / 2.0 : size(a) * size(b);
      if (count <= 0.0) continue;
      const double draws = std::max(2.0, std::round(count * per_pair));
      strata.push_back({a, b, count, static_cast<std::uint64_t>(draws)});
    }
  }
  return strata;
}

// The i-th random pair of a stratum, as readings.
std::pair<std::size_t, std::size_t> draw_pair(const Parts& parts, const Stratum& stratum,
                                              std::uint64_t seed, std::uint64_t stream,
                                              std::uint64_t i) {
  const auto pick = [&](std::uint64_t index, std::size_t count) {
    return static_cast<std::size_t>(random_index(seed, stream, index, count));
  };
  const std::size_t size_a = parts.begin[stratum.a + 1] - parts.begin[stratum.a];
  const std::size_t size_b = parts.begin[stratum.b + 1] - parts.begin[stratum.b];
  const std::size_t first = pick(2 * i, size_a);
  std::size_t second = pick(2 * i + 1, stratum.a == stratum.b ? size_b - 1 : size_b);
  if (stratum.a == stratum.b && second >= first) ++second;  // two different readings
  return {parts.order[parts.begin[stratum.a] + first],
          parts.order[parts.begin[stratum.b] + second]};
}

Vector3 normal_at(const PairReadings& r, std::size_t i) {
  return {r.x[i], r.y[i], r.z[i]};
}

UnstableDry summarise(const std::vector<Stratum>& strata) {
  double count = 0.0;
  double variance = 0.0;
  UnstableDry result;
  for (const Stratum& s : strata) {
    const auto draws = static_cast<double>(s.draws);
    const double share = static_cast<double>(s.hits) / draws;
    count += s.pairs * share;
    variance += s.pairs * s.pairs * share * (1.0 - share) / (draws - 1.0);
    result.sampled += s.draws;
  }
  result.count = static_cast<std::uint64_t>(std::llround(count));
  result.standard_error = std::sqrt(variance);
  return result;
}

}  // namespace

bool is_unstable_dry(const FaceLimits& limits, double tan_friction, bool face_rises,
                     const Vector3& normal1, const Vector3& normal2) {
  const line_tests::Trial v = line_tests::line_of(normal1, normal2.x(), normal2.y(), normal2.z());
  return face_rises && line_tests::is_line(v) && line_tests::daylights(limits, v) &&
         strictly_below(dry_factor_of_safety(normal1, normal2, tan_friction, tan_friction,
                                             limits.face_normal, limits.upper_normal),
                        1.0);
}

std::uint64_t count_unstable_dry(const PairReadings& readings, std::span<const std::int64_t> copies,
                                 const FaceLimits& limits, Angle friction, unsigned threads) {
  if (!rises_to_crest(limits.face_normal, limits.upper_normal)) return 0;
  const double tan_friction = tan(friction);
  const SafetyColumns safety = prepare_safety(readings, copies, limits, tan_friction);
  std::vector<std::int64_t> counts(chunk_total(readings.size(), kRows));
  for_each_chunk(readings.size(), kRows, threads,
                 [&](std::size_t chunk, std::size_t begin, std::size_t end) {
                   for (std::size_t j = begin; j < readings.size(); j += kColumns) {
                     const Block block{begin, end, j, std::min(j + kColumns, readings.size())};
                     counts[chunk] += count_block(readings, safety, limits, tan_friction, block);
                   }
                 });
  return static_cast<std::uint64_t>(std::reduce(counts.begin(), counts.end()));
}

UnstableDry sample_unstable_dry(const PairReadings& readings, const FaceLimits& limits,
                                Angle friction, std::uint64_t pairs, std::uint64_t seed,
                                unsigned threads) {
  const bool rises = rises_to_crest(limits.face_normal, limits.upper_normal);
  const double tan_friction = tan(friction);
  const Parts parts = divide(readings);
  std::vector<Stratum> strata = plan_strata(parts, pairs);
  for_each_chunk(strata.size(), 1, threads, [&](std::size_t s, std::size_t, std::size_t) {
    Stratum& stratum = strata[s];
    for (std::uint64_t i = 0; i < stratum.draws; ++i) {
      const auto [a, b] = draw_pair(parts, stratum, seed, s, i);
      stratum.hits += is_unstable_dry(limits, tan_friction, rises, normal_at(readings, a),
                                      normal_at(readings, b))
                          ? 1U
                          : 0U;
    }
  });
  return summarise(strata);
}

}  // namespace brink
