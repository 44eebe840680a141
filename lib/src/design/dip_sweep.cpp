#include "brink/design/dip_sweep.hpp"

#include <algorithm>
#include <array>
#include <bit>
#include <cmath>
#include <cstdint>

#include "../base/clones.hpp"
#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/parallel.hpp"
#include "brink/base/ties.hpp"
#include "step_table.hpp"

namespace brink {

namespace {

constexpr std::size_t kLines = 512;  // lines handled at once: they stay in the cache
// Below this plunge, as a sine, the tie is no longer small beside the steps of the table.
constexpr double kFlat = 0.01;
constexpr double kLeastStep = 0.0999;  // degrees

void check(const FaceGrid& grid) {
  const auto refuse = [](const char* what, Angle value, const char* accepted) {
    throw Error(ErrorKind::argument, Place{.file = {}, .key = what}, "out of range",
                shortest(value.deg()), accepted);
  };
  double before = 0.0;
  for (const Angle dip : grid.dips) {
    if (!(dip.deg() - before > kLeastStep && dip.deg() <= 90.0)) {
      refuse("dips of the faces", dip, "0.1 to 90 degrees, ascending, 0.1 or more apart");
    }
    before = dip.deg();
  }
  before = -1.0;
  for (const Angle azimuth : grid.azimuths) {
    if (!(azimuth.deg() > before && azimuth.deg() < 360.0)) {
      refuse("azimuths of the faces", azimuth, "ascending from 0, below 360 degrees");
    }
    before = azimuth.deg();
  }
}

// One horizontal direction of the sweep: it serves the azimuth `front` and, where the grid has it,
// the opposite one.
struct Direction {
  double sin, cos;
  std::size_t front;
  std::size_t back;
};

constexpr std::size_t kNone = static_cast<std::size_t>(-1);

std::vector<Direction> pair_up(const FaceGrid& grid) {
  std::vector<Direction> directions;
  std::vector<bool> served(grid.azimuths.size());
  for (std::size_t i = 0; i < grid.azimuths.size(); ++i) {
    if (served[i]) continue;
    const SinCos at = sincos(grid.azimuths[i]);
    std::size_t back = kNone;
    for (std::size_t j = i + 1; j < grid.azimuths.size(); ++j) {
      if (grid.azimuths[j].deg() - grid.azimuths[i].deg() == 180.0) back = j;
    }
    if (back != kNone) served[back] = true;
    directions.push_back({at.sin, at.cos, i, back});
  }
  return directions;
}

// Position of a horizontal direction on the compass, growing clockwise from 0 to 4.
double compass_turn(double east, double north) {
  if (east >= 0.0) return north >= 0.0 ? east / (east + north) : 1.0 - north / (east - north);
  return north < 0.0 ? 2.0 + east / (east + north) : 3.0 + north / (north - east);
}

// The compass cut at the edges of every azimuth's window of trends. Edges carry the tie, so that no
// trend of whole degrees comes near one.
class TrendBins {
 public:
  TrendBins(const FaceGrid& grid, Angle tolerance) {
    const Angle half = tolerance + angle_tie();
    open_ = half >= Angle::degrees(180.0);
    for (const Angle azimuth : grid.azimuths) {
      const Angle middle = azimuth + Angle::degrees(180.0);
      low_.push_back(turn(middle - half));
      high_.push_back(turn(middle + half));
    }
    edges_ = low_;
    edges_.insert(edges_.end(), high_.begin(), high_.end());
    std::ranges::sort(edges_);
    for (std::size_t cell = 0; cell < start_.size(); ++cell) {
      const double from = 4.0 * static_cast<double>(cell) / static_cast<double>(start_.size());
      start_[cell] =
          static_cast<std::size_t>(std::ranges::lower_bound(edges_, from) - edges_.begin());
    }
  }

  std::size_t size() const { return edges_.size() + 1; }

  std::size_t bin(double east, double north) const {
    const double at = compass_turn(east, north);
    const auto cell = static_cast<std::size_t>(at * (static_cast<double>(start_.size()) / 4.0));
    std::size_t i = start_[std::min(cell, start_.size() - 1)];
    while (i < edges_.size() && edges_[i] <= at) ++i;
    return i;
  }

  // Whether the bins of azimuth `a`'s window are [from, to), or, where from > to, all but [to,
  // from).
  struct Window {
    std::size_t from, to;
  };
  Window window(std::size_t a) const {
    if (open_) return {0, size()};
    return {after(low_[a]), after(high_[a])};
  }

 private:
  static double turn(Angle azimuth) {
    const SinCos at = sincos(azimuth);
    return compass_turn(at.sin, at.cos);
  }
  std::size_t after(double edge) const {
    return static_cast<std::size_t>(std::ranges::upper_bound(edges_, edge) - edges_.begin());
  }

  std::vector<double> low_, high_, edges_;
  std::array<std::size_t, 2048> start_{};
  bool open_ = false;
};

// What the sweep compares with, prepared once.
struct Prepared {
  std::vector<Direction> directions;
  std::vector<SinCos> dips;
  StepTable sliding;   // ratios (v . a) / |v_z|: cot of the dips, flattest face last
  StepTable toppling;  // (horizontal part)^2 / v_z^2 of the line: tan^2 of the dips
  TrendBins trends;
  Vector3 upper_normal;
  SlopeLimit friction;
};

std::vector<double> sliding_thresholds(const FaceGrid& grid) {
  std::vector<double> cotangents;
  for (const Angle dip : grid.dips) {
    const SinCos at = sincos(dip);
    cotangents.push_back(at.cos / at.sin);
  }
  std::ranges::reverse(cotangents);
  return cotangents;
}

// A line topples on faces steeper than 90 degrees less its plunge, strictly.
std::vector<double> toppling_thresholds(const FaceGrid& grid) {
  std::vector<double> squares;
  for (const Angle dip : grid.dips) {
    const double tangent = tan(dip - angle_tie());
    squares.push_back(tangent * tangent);
  }
  return squares;
}

Prepared prepare(const FaceGrid& grid, const ModeSettings& settings) {
  const FaceLimits limits =
      prepare_limits({Angle::degrees(45.0), Angle{}}, settings);  // what no face changes
  Prepared out{pair_up(grid),
               {},
               StepTable(sliding_thresholds(grid)),
               StepTable(toppling_thresholds(grid)),
               TrendBins(grid, settings.toppling_tolerance),
               limits.upper_normal,
               limits.friction};
  std::vector<double> cosecants;
  for (const Angle dip : grid.dips) {
    out.dips.push_back(sincos(dip));
    cosecants.push_back(1.0 / out.dips.back().sin);
  }
  std::ranges::reverse(cosecants);
  out.sliding.set_companions(cosecants);
  return out;
}

// Lines that slide where they daylight, divided by their downward part.
struct SlidingLines {
  std::array<double, kLines> east, north;
  std::array<double, kLines> margin;  // the tie, divided too
  std::array<double, kLines> factor;
  std::size_t size = 0;
};

// Cross products of one reading with a stretch of others.
struct Crosses {
  std::array<double, kLines> x, y, z;
};

BRINK_CLONES void cross_with(const Vector3& n, const double* __restrict x,
                             const double* __restrict y, const double* __restrict z,
                             std::size_t count, Crosses& out) {
  for (std::size_t j = 0; j < count; ++j) {
    out.x[j] = n.y() * z[j] - n.z() * y[j];
    out.y[j] = n.z() * x[j] - n.x() * z[j];
    out.z[j] = n.x() * y[j] - n.y() * x[j];
  }
}

// For each line the place in a row of bins where it starts to slide: the dip's number, and `back`
// more where it is the opposite azimuth that it daylights towards.
BRINK_CLONES void find_slots(const SlidingLines& lines, double sin_azimuth, double cos_azimuth,
                             const StepTable::View& table, std::int32_t dips,
                             std::int32_t* __restrict slots) {
  for (std::size_t l = 0; l < lines.size; ++l) {
    const double ratio = lines.east[l] * sin_azimuth + lines.north[l] * cos_azimuth;
    const double size = std::abs(ratio);
    const auto word = static_cast<std::int32_t>(std::bit_cast<std::int64_t>(size) >> 32);
    const std::int32_t cell =
        std::min(std::max((word >> table.shift) - table.first, 0), table.last);
    const bool beyond = size - table.threshold[cell] > lines.margin[l] * table.companion[cell];
    slots[l] = dips - table.below[cell] - (beyond ? 1 : 0) + (ratio < 0.0 ? dips + 1 : 0);
  }
}

// The sums of one part of the pairs: a row of bins for each direction, front and back, and one of
// bins by trend and plunge.
class Sweep {
 public:
  Sweep(const Prepared& prepared)
      : p_(prepared),
        width_(prepared.dips.size() + 1),
        sliding_(prepared.directions.size() * 2 * width_),
        toppling_(prepared.trends.size() * width_) {}

  void add_row(const PairReadings& r, std::span<const double> factors, std::size_t i) {
    const Vector3 n{r.x[i], r.y[i], r.z[i]};
    for (std::size_t j = i + 1; j < r.size(); j += kLines) {
      const std::size_t count = std::min(kLines, r.size() - j);
      cross_with(n, &r.x[j], &r.y[j], &r.z[j], count, crosses_);
      for (std::size_t k = 0; k < count; ++k) {
        add_line({crosses_.x[k], crosses_.y[k], crosses_.z[k]}, factors[i] * factors[j + k]);
      }
    }
  }

  void finish() { flush(); }
  const std::vector<double>& sliding() const { return sliding_; }
  const std::vector<double>& toppling() const { return toppling_; }

 private:
  void add_line(Vector3 v, double factor) {
    const double across = v.x() * v.x() + v.y() * v.y();
    const double down = v.z() * v.z();
    const double square = across + down;
    if (square <= kParallel * kParallel) return;
    const double tie = kTie * kTie * square;
    if (v.z() > 0.0) v = -v;
    if (down > tie && across > tie) add_toppling(v, across / down, factor);
    if (down * p_.friction.cos_squared < across * p_.friction.signed_sin_squared) return;
    double upper = v.dot(p_.upper_normal);
    if (down <= tie && upper > 0.0) {  // a horizontal line, from its other end
      v = -v;
      upper = -upper;
    }
    if (!(upper < 0.0 && upper * upper > tie)) return;
    const double length = std::sqrt(square);
    if (-v.z() < kFlat * length) {
      add_flat(v / length, factor);
    } else {
      add_sliding(v, length, factor);
    }
  }

  void add_toppling(const Vector3& v, double ratio, double factor) {
    const StepTable::View table = p_.toppling.view();
    const auto word = static_cast<std::int32_t>(std::bit_cast<std::int64_t>(ratio) >> 32);
    const std::int32_t cell =
        std::min(std::max((word >> table.shift) - table.first, 0), table.last);
    const std::int32_t dip = table.below[cell] + (ratio >= table.threshold[cell] ? 1 : 0);
    toppling_[p_.trends.bin(v.x(), v.y()) * width_ + static_cast<std::size_t>(dip)] += factor;
  }

  void add_sliding(const Vector3& v, double length, double factor) {
    const double scale = -1.0 / v.z();
    lines_.east[lines_.size] = v.x() * scale;
    lines_.north[lines_.size] = v.y() * scale;
    lines_.margin[lines_.size] = kTie * length * scale;
    lines_.factor[lines_.size] = factor;
    if (++lines_.size == kLines) flush();
  }

  // A nearly horizontal line, the plain way.
  void add_flat(const Vector3& v, double factor) {
    for (std::size_t d = 0; d < p_.directions.size(); ++d) {
      const double along = v.x() * p_.directions[d].sin + v.y() * p_.directions[d].cos;
      for (const bool back : {false, true}) {
        const double out = back ? -along : along;
        const auto first = std::ranges::partition_point(p_.dips, [&](const SinCos& dip) {
          return !strictly_above(dip.sin * out + dip.cos * v.z(), 0.0);
        });
        const auto slot = static_cast<std::size_t>(first - p_.dips.begin());
        sliding_[(2 * d + (back ? 1 : 0)) * width_ + slot] += factor;
      }
    }
  }

  void flush() {
    const auto dips = static_cast<std::int32_t>(p_.dips.size());
    for (std::size_t d = 0; d < p_.directions.size(); ++d) {
      find_slots(lines_, p_.directions[d].sin, p_.directions[d].cos, p_.sliding.view(), dips,
                 slots_.data());
      double* row = &sliding_[2 * d * width_];
      for (std::size_t l = 0; l < lines_.size; ++l) row[slots_[l]] += lines_.factor[l];
    }
    lines_.size = 0;
  }

  const Prepared& p_;
  std::size_t width_;  // bins of a row: the dips, and one for lines that never start
  std::vector<double> sliding_;
  std::vector<double> toppling_;
  Crosses crosses_;
  SlidingLines lines_;
  std::array<std::int32_t, kLines> slots_;
};

// Rows of about equal work: row i holds size - 1 - i pairs.
std::vector<std::size_t> split_rows(std::size_t size) {
  constexpr std::size_t parts = 32;
  std::vector<std::size_t> begin{0};
  const double all = static_cast<double>(size) * static_cast<double>(size);
  double done = 0.0;
  for (std::size_t i = 0; i < size; ++i) {
    done += 2.0 * static_cast<double>(size - i);
    if (done * parts >= all * static_cast<double>(begin.size())) begin.push_back(i + 1);
  }
  if (begin.back() < size) begin.push_back(size);
  return begin;
}

void add_to(std::vector<double>& sums, const std::vector<double>& part) {
  if (sums.empty()) sums.resize(part.size());
  for (std::size_t i = 0; i < part.size(); ++i) sums[i] += part[i];
}

std::vector<double> sum_over_dips(const std::vector<double>& rows, const Prepared& p,
                                  std::size_t azimuths) {
  const std::size_t dips = p.dips.size();
  std::vector<double> out(azimuths * dips);
  for (std::size_t d = 0; d < p.directions.size(); ++d) {
    for (const bool back : {false, true}) {
      const std::size_t azimuth = back ? p.directions[d].back : p.directions[d].front;
      if (azimuth == kNone) continue;
      double sum = 0.0;
      for (std::size_t k = 0; k < dips; ++k) {
        sum += rows[(2 * d + (back ? 1 : 0)) * (dips + 1) + k];
        out[azimuth * dips + k] = sum;
      }
    }
  }
  return out;
}

std::vector<double> sum_over_trends(const std::vector<double>& bins, const Prepared& p,
                                    std::size_t azimuths) {
  const std::size_t dips = p.dips.size();
  std::vector<double> out(azimuths * dips);
  for (std::size_t a = 0; a < azimuths; ++a) {
    const TrendBins::Window window = p.trends.window(a);
    const bool wraps = window.from > window.to;
    for (std::size_t b = 0; b < p.trends.size(); ++b) {
      const bool inside =
          wraps ? (b >= window.from || b < window.to) : (b >= window.from && b < window.to);
      if (!inside) continue;
      for (std::size_t k = 0; k < dips; ++k) out[a * dips + k] += bins[b * (dips + 1) + k];
    }
    for (std::size_t k = 1; k < dips; ++k) out[a * dips + k] += out[a * dips + k - 1];
  }
  return out;
}

}  // namespace

SweepSums sweep_pairs(const PairReadings& planes, std::span<const double> factors,
                      const FaceGrid& grid, const ModeSettings& settings, unsigned threads) {
  check(grid);
  const Prepared prepared = prepare(grid, settings);
  const std::vector<std::size_t> rows = split_rows(planes.size());
  std::vector<std::vector<double>> sliding(rows.size() - 1);
  std::vector<std::vector<double>> toppling(rows.size() - 1);
  for_each_chunk(rows.size() - 1, 1, threads, [&](std::size_t part, std::size_t, std::size_t) {
    Sweep sweep(prepared);
    for (std::size_t i = rows[part]; i < rows[part + 1]; ++i) sweep.add_row(planes, factors, i);
    sweep.finish();
    sliding[part] = sweep.sliding();
    toppling[part] = sweep.toppling();
  });
  std::vector<double> sliding_sum(prepared.directions.size() * 2 * (grid.dips.size() + 1));
  std::vector<double> toppling_sum(prepared.trends.size() * (grid.dips.size() + 1));
  for (const auto& part : sliding) add_to(sliding_sum, part);
  for (const auto& part : toppling) add_to(toppling_sum, part);
  return {sum_over_dips(sliding_sum, prepared, grid.azimuths.size()),
          sum_over_trends(toppling_sum, prepared, grid.azimuths.size())};
}

}  // namespace brink
