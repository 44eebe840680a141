#include "density_kernel.hpp"

#include <algorithm>
#include <bit>
#include <cmath>
#include <cstdint>
#include <numbers>
#include <numeric>

#include "base/clones.hpp"
#include "brink/base/parallel.hpp"
#include "brink/sphere/projection.hpp"

namespace brink {

namespace {

// Places handled together: enough to fill vector units, few enough to lie close to each other.
constexpr std::size_t kBlock = 64;

// Terms further from a block than this share of their peak, as a power of two, are passed over.
constexpr double kNothing = 40.0;

using Lanes = std::array<double, kBlock>;

struct Block {
  Lanes x, y, z;
  Lanes xx, yy, xy, xz, yz;  // products, for cells
  Lanes sum;
  Vector3 centre;
  double reach = 1.0;  // an axis with |axis . centre| below this adds nothing; see nothing_below
};

// 2^x to a relative error of 3e-9 for -1000 <= x <= 1000, and 2^-1000 below. A shorter polynomial
// than fast_math's (interpolation at Chebyshev nodes of [-1/2, 1/2]): a density needs no more.
[[gnu::always_inline]] inline double rough_exp2(double x) {
  constexpr double lowest = -1000.0;
  constexpr double magic = 6755399441055744.0;  // 1.5 * 2^52: adding it rounds to a whole number
  const double bounded = x < lowest ? lowest : x;
  const double shifted = bounded + magic;
  const double f = bounded - (shifted - magic);
  double p = 1.546144469856913e-4;
  p = p * f + 1.3400428177615838e-3;
  p = p * f + 9.618056678524637e-3;
  p = p * f + 5.550327226670302e-2;
  p = p * f + 0.24022650922288757;
  p = p * f + 0.6931472067028326;
  p = p * f + 1.0;
  const auto exponent = std::bit_cast<std::uint64_t>(shifted) << 52;
  return std::bit_cast<double>(std::bit_cast<std::uint64_t>(p) + exponent);
}

struct Axis {
  double x, y, z;  // scaled by k / ln 2
  double offset;   // log2 of the weight, less k / ln 2
};

BRINK_CLONES void add_axis(const Axis& axis, Block& block) {
  for (std::size_t j = 0; j < kBlock; ++j) {
    const double t = axis.x * block.x[j] + axis.y * block.y[j] + axis.z * block.z[j];
    block.sum[j] += rough_exp2(std::abs(t) + axis.offset);
  }
}

BRINK_CLONES void add_axis_both_sides(const Axis& axis, double far_offset, Block& block) {
  for (std::size_t j = 0; j < kBlock; ++j) {
    const double t = std::abs(axis.x * block.x[j] + axis.y * block.y[j] + axis.z * block.z[j]);
    block.sum[j] += rough_exp2(t + axis.offset) + rough_exp2(far_offset - t);
  }
}

struct Cell {
  Axis mean;
  double xx, yy, xy, xz, yz;  // of the quadratic form with z^2 = 1 - x^2 - y^2 put in; its constant
                              // is in the mean's offset
};

BRINK_CLONES void add_cell(const Cell& cell, Block& block) {
  const Axis& mean = cell.mean;
  for (std::size_t j = 0; j < kBlock; ++j) {
    const double t = mean.x * block.x[j] + mean.y * block.y[j] + mean.z * block.z[j];
    const double spread = cell.xx * block.xx[j] + cell.yy * block.yy[j] + cell.xy * block.xy[j] +
                          cell.xz * block.xz[j] + cell.yz * block.yz[j];
    block.sum[j] += rough_exp2(std::abs(t) + (spread + mean.offset));
  }
}

Axis scaled(const DensityTerms& terms, std::size_t i, double exponent) {
  return {exponent * terms.x[i], exponent * terms.y[i], exponent * terms.z[i],
          std::log2(terms.weight[i]) - exponent};
}

std::vector<Axis> scaled(const DensityTerms& terms, double exponent) {
  std::vector<Axis> all(terms.size());
  for (std::size_t i = 0; i < all.size(); ++i) all[i] = scaled(terms, i, exponent);
  return all;
}

std::vector<Cell> scaled_cells(const DensitySum& sum, double k, double exponent) {
  const DensityMoments& m = sum.moments;
  const double half = 0.5 * k * exponent;
  std::vector<Cell> all(sum.cells.size());
  for (std::size_t i = 0; i < all.size(); ++i) {
    Axis mean = scaled(sum.cells, i, exponent);
    mean.offset += half * m.zz[i];
    all[i] = {mean,
              half * (m.xx[i] - m.zz[i]),
              half * (m.yy[i] - m.zz[i]),
              2.0 * half * m.xy[i],
              2.0 * half * m.xz[i],
              2.0 * half * m.yz[i]};
  }
  return all;
}

// Interleaves the bits of two numbers below 2^16: neighbours in the plane stay neighbours in order.
std::uint32_t interleaved(std::uint32_t a, std::uint32_t b) {
  const auto spread = [](std::uint32_t v) {
    v = (v | (v << 8)) & 0x00FF00FFU;
    v = (v | (v << 4)) & 0x0F0F0F0FU;
    v = (v | (v << 2)) & 0x33333333U;
    return (v | (v << 1)) & 0x55555555U;
  };
  return spread(a) | (spread(b) << 1);
}

// The order in which places are taken, so that each block covers a small patch of the sphere.
std::vector<std::size_t> compact_order(const std::vector<Vector3>& places) {
  std::vector<std::uint32_t> keys;
  for (const Vector3& place : places) {
    const Point2 p = project(Projection::equal_area, lower_end(place));
    const auto bits = [](double v) {
      return static_cast<std::uint32_t>(std::clamp((v + 1.0) * 127.5, 0.0, 255.0));
    };
    keys.push_back(interleaved(bits(p.x()), bits(p.y())));
  }
  std::vector<std::size_t> order(places.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  std::stable_sort(order.begin(), order.end(),
                   [&](std::size_t a, std::size_t b) { return keys[a] < keys[b]; });
  return order;
}

// An axis whose kernel is below 2^-kNothing all over the block has a cosine to the block's centre
// below this: the angle at which the kernel gets there and the block's radius, added.
double nothing_below(double k, double block_cosine) {
  const double cut = 1.0 - kNothing * std::numbers::ln2 / k;
  if (cut <= 0.0) return -1.0;
  const double angle = std::acos(cut) + std::acos(std::clamp(block_cosine, -1.0, 1.0));
  return angle < std::numbers::pi / 2.0 ? std::cos(angle) : -1.0;
}

Block block_of(const std::vector<Vector3>& places, const std::vector<std::size_t>& order,
               std::size_t begin, std::size_t end, double k) {
  Block block{};
  Vector3 sum = Vector3::Zero();
  for (std::size_t i = begin; i < end; ++i) {
    const Vector3 v = lower_end(places[order[i]]);
    const std::size_t j = i - begin;
    block.x[j] = v.x();
    block.y[j] = v.y();
    block.z[j] = v.z();
    block.xx[j] = v.x() * v.x();
    block.yy[j] = v.y() * v.y();
    block.xy[j] = v.x() * v.y();
    block.xz[j] = v.x() * v.z();
    block.yz[j] = v.y() * v.z();
    sum += v;
  }
  block.centre = sum.norm() > 0.0 ? Vector3(sum.normalized()) : Vector3(-Vector3::UnitZ());
  double cosine = 1.0;
  for (std::size_t j = 0; j < end - begin; ++j) {
    cosine = std::min(cosine, block.centre.dot(Vector3(block.x[j], block.y[j], block.z[j])));
  }
  block.reach = nothing_below(k, cosine);
  return block;
}

bool reaches(const DensityTerms& terms, std::size_t i, const Block& block) {
  return std::abs(terms.x[i] * block.centre.x() + terms.y[i] * block.centre.y() +
                  terms.z[i] * block.centre.z()) >= block.reach;
}

}  // namespace

std::vector<double> sum_at(const DensitySum& sum, double k, bool both_sides,
                           const std::vector<Vector3>& places, unsigned threads) {
  const double exponent = k * std::numbers::log2e;
  const std::vector<Axis> axes = scaled(sum.axes, exponent);
  const std::vector<Cell> cells = scaled_cells(sum, k, exponent);
  const std::vector<std::size_t> order = compact_order(places);
  std::vector<double> values(places.size());
  for_each_chunk(places.size(), kBlock, threads,
                 [&](std::size_t, std::size_t begin, std::size_t end) {
                   Block block = block_of(places, order, begin, end, k);
                   for (std::size_t i = 0; i < axes.size(); ++i) {
                     if (!reaches(sum.axes, i, block)) continue;
                     if (both_sides) {
                       add_axis_both_sides(axes[i], axes[i].offset, block);
                     } else {
                       add_axis(axes[i], block);
                     }
                   }
                   for (std::size_t i = 0; i < cells.size(); ++i) {
                     if (reaches(sum.cells, i, block)) add_cell(cells[i], block);
                   }
                   for (std::size_t i = begin; i < end; ++i)
                     values[order[i]] = block.sum[i - begin];
                 });
  return values;
}

}  // namespace brink
