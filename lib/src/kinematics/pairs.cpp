#include "brink/kinematics/pairs.hpp"

#include <algorithm>
#include <array>
#include <atomic>
#include <cmath>
#include <string>
#include <string_view>
#include <utility>

#include "../base/clones.hpp"
#include "brink/base/error.hpp"
#include "brink/base/parallel.hpp"
#include "brink/mechanics/dry_wedge.hpp"
#include "line_tests.hpp"

namespace brink {

namespace {

constexpr std::size_t kRows = 64;      // rows of a block share one set
constexpr std::size_t kColumns = 256;  // columns and their sums stay in the first-level cache

// Sums over the rows of a block, one a column. Whole numbers are kept as doubles, which has the
// loops work on one kind of number. Adding column by column fixes the order of every sum, however
// many columns the machine handles at once.
struct ColumnSums {
  std::array<double, kColumns> count{};
  std::array<double, kColumns> weight{};
};

using RowCounts = std::array<std::int64_t, kRows>;

// The pairs of rows [row, row_end) with columns [column, column_end), where the column is past the
// row.
struct Block {
  std::size_t row, row_end;
  std::size_t column, column_end;
  std::size_t columns() const { return column_end - column; }
  // First column past row i, counted from the block's first.
  std::size_t first(std::size_t i) const { return std::max(column, i + 1) - column; }
};

struct LineSums {
  ColumnSums columns;
  RowCounts rows{};
};

BRINK_ALWAYS_INLINE line_tests::Trial line_of(const Vector3& n, double x, double y, double z) {
  return line_tests::make_trial(n.y() * z - n.z() * y, n.z() * x - n.x() * z,
                                n.x() * y - n.y() * x);
}

BRINK_ALWAYS_INLINE double squared_length(const line_tests::Trial& v) {
  return v.across_squared + v.z * v.z;
}

// For unit normals the cross product's length is the sine of the angle between the axes, equal to
// the angle when this small.
BRINK_ALWAYS_INLINE bool is_line(const line_tests::Trial& v) {
  return squared_length(v) > kParallel * kParallel;
}

// Adds the pairs of a block whose line passes `test`. One test a loop: the compiler vectorises
// these, and gives up on a loop that holds two.
template <typename Test>
BRINK_ALWAYS_INLINE void sum_where(const PairReadings& r, const Block& block, LineSums& sums,
                                   const Test& test) {
  const double* __restrict x = r.x.data() + block.column;
  const double* __restrict y = r.y.data() + block.column;
  const double* __restrict z = r.z.data() + block.column;
  double* __restrict count = sums.columns.count.data();
  double* __restrict weight = sums.columns.weight.data();
  for (std::size_t i = block.row; i < block.row_end; ++i) {
    const Vector3 n = {r.x[i], r.y[i], r.z[i]};
    const double w = r.weight[i];
    std::int64_t in_row = 0;
    for (std::size_t k = block.first(i); k < block.columns(); ++k) {
      const line_tests::Trial v = line_of(n, x[k], y[k], z[k]);
      const bool yes = is_line(v) & test(v);
      count[k] += yes ? 1.0 : 0.0;
      weight[k] += yes ? w : 0.0;
      in_row += yes ? 1 : 0;
    }
    sums.rows[i - block.row] += in_row;
  }
}

BRINK_CLONES void sum_lines(const PairReadings& r, const Block& block, LineSums& sums) {
  sum_where(r, block, sums, [](const line_tests::Trial&) { return true; });
}

BRINK_CLONES void sum_sliding(const PairReadings& r, const FaceLimits& limits, const Block& block,
                              LineSums& sums) {
  const FaceLimits local = limits;
  sum_where(r, block, sums,
            [&local](const line_tests::Trial& v) { return line_tests::slides(local, v); });
}

BRINK_CLONES void sum_toppling(const PairReadings& r, const FaceLimits& limits, const Block& block,
                               LineSums& sums) {
  const FaceLimits local = limits;
  sum_where(r, block, sums,
            [&local](const line_tests::Trial& v) { return line_tests::topples(local, v); });
}

struct DryWedges {
  const FaceLimits& limits;
  double tan_friction;
};

// What the factor of safety of a pair needs of each reading alone, for one face: see
// mechanics/dry_wedge.hpp for the meaning.
struct SafetyColumns {
  std::vector<double> climb;  // sign of (normal x face) . upper; 0: bounds no block
  std::vector<double> alone;  // 1 where a block sliding on this plane alone is unstable, else 0
};

SafetyColumns prepare_safety(const PairReadings& r, const DryWedges& dry) {
  SafetyColumns out;
  out.climb.reserve(r.size());
  out.alone.reserve(r.size());
  for (std::size_t i = 0; i < r.size(); ++i) {
    const Vector3 n = {r.x[i], r.y[i], r.z[i]};
    const double climb = n.cross(dry.limits.face_normal).dot(dry.limits.upper_normal);
    out.climb.push_back(std::abs(climb) <= kTie ? 0.0 : std::copysign(1.0, climb));
    const double drive = std::hypot(n.x(), n.y());
    const bool slips =
        drive > 1e-12 && strictly_below(std::abs(n.z()) * dry.tan_friction / drive, 1.0);
    out.alone.push_back(slips ? 1.0 : 0.0);
  }
  return out;
}

// Pairs that daylight and whose dry_factor_of_safety() is strictly below 1, decided by the same
// comparisons cleared of divisions; tests hold the two to each other.
BRINK_CLONES std::int64_t count_unstable(const PairReadings& r, const SafetyColumns& safety,
                                         const DryWedges& dry, const Block& block) {
  const double* __restrict x = r.x.data() + block.column;
  const double* __restrict y = r.y.data() + block.column;
  const double* __restrict z = r.z.data() + block.column;
  const double* __restrict climb = safety.climb.data() + block.column;
  const double* __restrict alone = safety.alone.data() + block.column;
  const FaceLimits local = dry.limits;
  const double tan_friction = dry.tan_friction;
  std::int64_t unstable = 0;
  for (std::size_t i = block.row; i < block.row_end; ++i) {
    const Vector3 n = {r.x[i], r.y[i], r.z[i]};
    const double climb_i = safety.climb[i];
    const double alone_i = safety.alone[i];
    for (std::size_t k = block.first(i); k < block.columns(); ++k) {
      const line_tests::Trial v = line_of(n, x[k], y[k], z[k]);
      const double square = squared_length(v);
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
      const bool block_bounded = (climb_i * climb[k] != 0.0) & is_line(v);
      unstable += (fails & block_bounded & line_tests::daylights(local, v)) ? 1 : 0;
    }
  }
  return unstable;
}

// Rows of one group: the unit of work handed to a thread.
struct RowBlock {
  std::size_t group, begin, end;
};

std::vector<RowBlock> row_blocks(const PairReadings& r) {
  std::vector<RowBlock> blocks;
  for (std::size_t g = 0; g < r.groups(); ++g) {
    const std::size_t end = r.group_begin[g + 1];
    for (std::size_t i = r.group_begin[g]; i < end; i += kRows) {
      blocks.push_back({g, i, std::min(i + kRows, end)});
    }
  }
  return blocks;
}

// Collects the tally of one property over all blocks. Counts of readings are whole numbers that
// threads add in any order; weights are kept by block and added in the order of the blocks.
class TallyBuilder {
 public:
  TallyBuilder(const PairReadings& readings, const std::vector<RowBlock>& blocks)
      : readings_(readings),
        blocks_(blocks),
        of_reading_(readings.size()),
        sums_(blocks.size() * readings.groups()) {}

  void add(std::size_t index, const Block& block, const ColumnSums& columns) {
    for (std::size_t g = blocks_[index].group; g < readings_.groups(); ++g) {
      PairSum& sum = sums_[index * readings_.groups() + g];
      const std::size_t begin = std::max(block.column, readings_.group_begin[g]);
      const std::size_t end = std::min(block.column_end, readings_.group_begin[g + 1]);
      for (std::size_t j = begin; j < end; ++j) {
        const std::size_t k = j - block.column;
        sum.count += static_cast<std::uint64_t>(columns.count[k]);
        sum.weight += columns.weight[k] * readings_.weight[j];
        add_to_reading(j, static_cast<std::uint64_t>(columns.count[k]));
      }
    }
  }

  void add_rows(const RowBlock& rows, const RowCounts& counts) {
    for (std::size_t i = rows.begin; i < rows.end; ++i) {
      add_to_reading(i, static_cast<std::uint64_t>(counts[i - rows.begin]));
    }
  }

  PairTally finish() {
    const std::size_t groups = readings_.groups();
    PairTally tally;
    tally.by_groups.resize(groups * (groups + 1) / 2);
    for (std::size_t b = 0; b < blocks_.size(); ++b) {
      for (std::size_t g = blocks_[b].group; g < groups; ++g) {
        PairSum& sum = tally.by_groups[pair_slot(blocks_[b].group, g, groups)];
        sum.count += sums_[b * groups + g].count;
        sum.weight += sums_[b * groups + g].weight;
      }
    }
    tally.of_reading = std::move(of_reading_);
    return tally;
  }

 private:
  void add_to_reading(std::size_t i, std::uint64_t count) {
    std::atomic_ref(of_reading_[i]).fetch_add(count, std::memory_order_relaxed);
  }

  const PairReadings& readings_;
  const std::vector<RowBlock>& blocks_;
  std::vector<std::uint64_t> of_reading_;
  std::vector<PairSum> sums_;  // [block][group of the column]
};

// The blocks of columns that meet some rows, in order.
std::vector<Block> column_blocks(const RowBlock& rows, std::size_t size) {
  std::vector<Block> blocks;
  for (std::size_t column = rows.begin; column < size; column += kColumns) {
    blocks.push_back({rows.begin, rows.end, column, std::min(column + kColumns, size)});
  }
  return blocks;
}

[[noreturn]] void refuse_assignment(std::string_view what, std::size_t value) {
  throw Error(ErrorKind::argument, Place{.file = {}, .key = "assignment"}, what,
              std::to_string(value), "one number a reading, from 0 (no set) to the number of sets");
}

}  // namespace

PairReadings arrange_by_set(const Readings& readings, const std::vector<int>& assignment,
                            std::size_t set_count) {
  if (assignment.size() != readings.size()) {
    refuse_assignment("its length is not the number of readings", assignment.size());
  }
  std::vector<std::vector<std::size_t>> members(set_count + 1);
  for (std::size_t i = 0; i < assignment.size(); ++i) {
    const auto set = static_cast<std::size_t>(assignment[i]);
    if (assignment[i] < 0 || set > set_count) refuse_assignment("there is no such set", set);
    members[set == 0 ? set_count : set - 1].push_back(i);
  }
  PairReadings out;
  out.group_begin.push_back(0);
  for (const auto& group : members) {
    for (const std::size_t i : group) {
      const Vector3& n = readings.normals[i];
      out.x.push_back(n.x());
      out.y.push_back(n.y());
      out.z.push_back(n.z());
      out.weight.push_back(readings.weights[i]);
      out.source.push_back(i);
    }
    out.group_begin.push_back(out.size());
  }
  return out;
}

PairSum PairTally::total() const {
  PairSum total;
  for (const PairSum& sum : by_groups) {
    total.count += sum.count;
    total.weight += sum.weight;
  }
  return total;
}

PairTally count_lines(const PairReadings& readings, unsigned threads) {
  const std::vector<RowBlock> rows = row_blocks(readings);
  TallyBuilder lines(readings, rows);
  for_each_chunk(rows.size(), 1, threads, [&](std::size_t index, std::size_t, std::size_t) {
    LineSums sums;
    for (const Block& block : column_blocks(rows[index], readings.size())) {
      sums.columns = {};
      sum_lines(readings, block, sums);
      lines.add(index, block, sums.columns);
    }
    lines.add_rows(rows[index], sums.rows);
  });
  return lines.finish();
}

PairCounts count_pairs(const PairReadings& readings, const FaceLimits& limits, Angle friction,
                       unsigned threads) {
  const std::vector<RowBlock> rows = row_blocks(readings);
  TallyBuilder wedge(readings, rows);
  TallyBuilder topple(readings, rows);
  std::vector<std::int64_t> unstable(rows.size());
  const bool rises = rises_to_crest(limits.face_normal, limits.upper_normal);
  const DryWedges dry{limits, tan(friction)};
  const SafetyColumns safety = prepare_safety(readings, dry);
  for_each_chunk(rows.size(), 1, threads, [&](std::size_t index, std::size_t, std::size_t) {
    LineSums sliding;
    LineSums toppling;
    for (const Block& block : column_blocks(rows[index], readings.size())) {
      sliding.columns = {};
      sum_sliding(readings, limits, block, sliding);
      wedge.add(index, block, sliding.columns);
      toppling.columns = {};
      sum_toppling(readings, limits, block, toppling);
      topple.add(index, block, toppling.columns);
      if (rises) unstable[index] += count_unstable(readings, safety, dry, block);
    }
    wedge.add_rows(rows[index], sliding.rows);
    topple.add_rows(rows[index], toppling.rows);
  });
  PairCounts counts{wedge.finish(), topple.finish(), 0};
  for (const std::int64_t some : unstable) counts.unstable_dry += static_cast<std::uint64_t>(some);
  return counts;
}

}  // namespace brink
