#include "brink/kinematics/pairs.hpp"

#include <algorithm>
#include <array>
#include <atomic>
#include <cmath>
#include <string>
#include <string_view>
#include <utility>

#include "base/clones.hpp"
#include "brink/base/error.hpp"
#include "brink/base/parallel.hpp"
#include "brink/kinematics/unstable.hpp"
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
      const line_tests::Trial v = line_tests::line_of(n, x[k], y[k], z[k]);
      const bool yes = line_tests::is_line(v) & test(v);
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
    }
    wedge.add_rows(rows[index], sliding.rows);
    topple.add_rows(rows[index], toppling.rows);
  });
  return {wedge.finish(), topple.finish(),
          count_unstable_dry(readings, {}, limits, friction, threads)};
}

}  // namespace brink
