#include "risk/draws.hpp"

#include <algorithm>
#include <bit>
#include <cmath>
#include <numbers>

#include "base/clones.hpp"
#include "base/fast_math.hpp"
#include "brink/base/random.hpp"

namespace brink {

namespace {

// random_uniform without a conversion instruction: the same bits.
[[gnu::always_inline]] inline double uniform_of(std::uint64_t bits) {
  const double one_to_two = std::bit_cast<double>((bits >> 12) | 0x3FF0000000000000ULL);
  return (one_to_two - 1.0) + 0x1p-53;
}

BRINK_CLONES void plain_uniform(std::uint64_t seed, std::uint64_t stream, std::uint64_t first,
                                double* out, std::size_t count) {
  for (std::size_t i = 0; i < count; ++i) {
    out[i] = uniform_of(random_bits(seed, stream, first + i));
  }
}

// A permutation of 0 .. count - 1 that needs no table: four Feistel rounds on the least even number
// of bits that holds count, walked on until the value falls below it.
std::uint64_t permuted(std::uint64_t value, std::uint64_t count, std::uint64_t key) {
  const unsigned half = (static_cast<unsigned>(std::bit_width(count - 1)) + 1U) / 2U;
  const std::uint64_t mask = (std::uint64_t{1} << half) - 1U;
  do {
    std::uint64_t left = value >> half;
    std::uint64_t right = value & mask;
    for (std::uint64_t round = 0; round < 4; ++round) {
      const std::uint64_t next = left ^ (mix_bits(right + mix_bits(key + round)) & mask);
      left = right;
      right = next;
    }
    value = (left << half) | right;
  } while (value >= count);
  return value;
}

void stratified(const WedgeSimulation& s, std::uint64_t stream, std::uint64_t first,
                std::span<double> out) {
  if (s.draws < 2) return;
  const std::uint64_t key = random_bits(s.seed, stream, ~std::uint64_t{0});
  for (std::size_t i = 0; i < out.size(); ++i) {
    const auto stratum = static_cast<double>(permuted(first + i, s.draws, key));
    out[i] = (stratum + out[i]) / static_cast<double>(s.draws);
  }
}

struct Frame {
  Vector3 first;
  Vector3 second;
};

Frame frame_about(const Vector3& mean) {
  const Vector3 off = std::abs(mean.z()) < 0.9 ? Vector3(0, 0, 1) : Vector3(1, 0, 0);
  const Vector3 first = (off - off.dot(mean) * mean).normalized();
  return {first,
          {mean.y() * first.z() - mean.z() * first.y(), mean.z() * first.x() - mean.x() * first.z(),
           mean.x() * first.y() - mean.y() * first.x()}};
}

struct FisherAbout {
  double mean[3];
  double first[3];
  double second[3];
  double fisher_k;
  double rest;  // exp(-2 k)
};

BRINK_CLONES void fisher_loop(const FisherAbout& about, const double* __restrict u,
                              const double* __restrict turn, std::size_t count,
                              double* __restrict x, double* __restrict y, double* __restrict z) {
  constexpr double whole = 2.0 * std::numbers::pi;
  const FisherAbout a = about;
  for (std::size_t i = 0; i < count; ++i) {
    const double c = 1.0 + fast_log(u[i] + (1.0 - u[i]) * a.rest) / a.fisher_k;
    // The argument falls below 0 by rounding only.
    const double s = std::sqrt(std::fabs(1.0 - c * c));
    const FastSinCos azimuth = fast_sincos(whole * turn[i]);
    const double p = s * azimuth.cos;
    const double q = s * azimuth.sin;
    x[i] = c * a.mean[0] + p * a.first[0] + q * a.second[0];
    y[i] = c * a.mean[1] + p * a.first[1] + q * a.second[1];
    z[i] = c * a.mean[2] + p * a.first[2] + q * a.second[2];
  }
}

BRINK_CLONES void tangents(double* __restrict degrees, std::size_t count) {
  constexpr double greatest = 89.999;
  constexpr double radian = std::numbers::pi / 180.0;
  for (std::size_t i = 0; i < count; ++i) {
    const double above = degrees[i] > 0.0 ? degrees[i] : 0.0;
    const FastSinCos t = fast_sincos((above < greatest ? above : greatest) * radian);
    degrees[i] = t.sin / t.cos;
  }
}

void fill_plane(const WedgeSimulation& s, const DrawnPlane& drawn, const Plane& plane,
                DrawStream stream, DrawStream turn_stream, std::uint64_t first, std::size_t count,
                const NormalLanes& out) {
  Lane u;
  if (!drawn.readings.empty()) {
    fill_uniform(s, stream, first, {u.data(), count});
    const std::size_t readings = drawn.readings.size();
    for (std::size_t i = 0; i < count; ++i) {
      const auto chosen = static_cast<std::size_t>(u[i] * static_cast<double>(readings));
      const Vector3 n = upward_normal(drawn.readings[std::min(chosen, readings - 1)]);
      out.x[i] = n.x();
      out.y[i] = n.y();
      out.z[i] = n.z();
    }
    return;
  }
  const Vector3 mean = upward_normal(plane);
  if (drawn.fisher_k) {
    Lane turn;
    fill_uniform(s, stream, first, {u.data(), count});
    fill_uniform(s, turn_stream, first, {turn.data(), count});
    fisher_normals(mean, *drawn.fisher_k, u.data(), turn.data(), count, out);
    return;
  }
  std::fill_n(out.x, count, mean.x());
  std::fill_n(out.y, count, mean.y());
  std::fill_n(out.z, count, mean.z());
}

double own_friction(const Strength& strength) {
  const auto* law = std::get_if<MohrCoulomb>(&strength);
  return law ? law->friction.deg() : 0.0;
}

double own_cohesion(const Strength& strength) {
  const auto* law = std::get_if<MohrCoulomb>(&strength);
  return law ? law->cohesion_kPa : 0.0;
}

// Draws one input, or repeats the case's own value.
void fill_input(const WedgeSimulation& s, const std::optional<Distribution>& distribution,
                double own, DrawStream stream, std::uint64_t first, std::span<double> out) {
  if (!distribution) {
    std::fill(out.begin(), out.end(), own);
    return;
  }
  Lane u;
  fill_uniform(s, stream, first, {u.data(), out.size()});
  quantiles(*distribution, {u.data(), out.size()}, out);
}

// Cohesion whose normal score has the stated correlation with that of friction.
void fill_correlated(const WedgeSimulation& s, const Distribution& cohesion,
                     DrawStream friction_stream, DrawStream cohesion_stream, std::uint64_t first,
                     std::span<double> out) {
  constexpr double least = 0x1p-53;
  const Distribution score{DistributionShape::normal, 0.0, 1.0};
  Lane u, z1, z2;
  const std::size_t count = out.size();
  fill_uniform(s, friction_stream, first, {u.data(), count});
  quantiles(score, {u.data(), count}, {z1.data(), count});
  fill_uniform(s, cohesion_stream, first, {u.data(), count});
  quantiles(score, {u.data(), count}, {z2.data(), count});
  const double rest = std::sqrt(1.0 - s.correlation * s.correlation);
  for (std::size_t i = 0; i < count; ++i) {
    const double z = s.correlation * z1[i] + rest * z2[i];
    u[i] = std::clamp(0.5 * std::erfc(-z / std::numbers::sqrt2), least, 1.0 - least);
  }
  quantiles(cohesion, {u.data(), count}, out);
}

struct StrengthStreams {
  DrawStream friction;
  DrawStream cohesion;
};

void fill_strength(const WedgeSimulation& s, const Strength& own,
                   const std::optional<Distribution>& friction,
                   const std::optional<Distribution>& cohesion, const StrengthStreams& streams,
                   std::uint64_t first, std::span<double> tangent_out,
                   std::span<double> cohesion_out) {
  fill_input(s, friction, own_friction(own), streams.friction, first, tangent_out);
  tangents(tangent_out.data(), tangent_out.size());
  if (friction && cohesion && s.correlation != 0.0) {
    fill_correlated(s, *cohesion, streams.friction, streams.cohesion, first, cohesion_out);
  } else {
    fill_input(s, cohesion, own_cohesion(own), streams.cohesion, first, cohesion_out);
  }
  for (double& c : cohesion_out) c = std::max(c, 0.0);
}

}  // namespace

void fill_uniform(const WedgeSimulation& s, DrawStream stream, std::uint64_t first,
                  std::span<double> out) {
  const auto number = static_cast<std::uint64_t>(stream);
  plain_uniform(s.seed, number, first, out.data(), out.size());
  if (s.sampling == Sampling::latin_hypercube) stratified(s, number, first, out);
}

void fisher_normals(const Vector3& mean, double fisher_k, const double* u, const double* turn,
                    std::size_t count, const NormalLanes& out) {
  const auto [first, second] = frame_about(mean);
  const FisherAbout about{{mean.x(), mean.y(), mean.z()},
                          {first.x(), first.y(), first.z()},
                          {second.x(), second.y(), second.z()},
                          fisher_k,
                          std::exp(-2.0 * fisher_k)};
  fisher_loop(about, u, turn, count, out.x, out.y, out.z);
}

void fill_block(const WedgeSimulation& s, std::uint64_t first, std::size_t count,
                KernelBlock& block) {
  const WedgeCase& w = s.wedge;
  fill_plane(s, s.plane1, w.geometry.plane1, DrawStream::plane1, DrawStream::plane1_azimuth, first,
             count, {block.x1.data(), block.y1.data(), block.z1.data()});
  fill_plane(s, s.plane2, w.geometry.plane2, DrawStream::plane2, DrawStream::plane2_azimuth, first,
             count, {block.x2.data(), block.y2.data(), block.z2.data()});
  fill_strength(s, w.strength1, s.friction1, s.cohesion1,
                {DrawStream::friction1, DrawStream::cohesion1}, first, {block.tan1.data(), count},
                {block.cohesion1_kPa.data(), count});
  fill_strength(s, w.strength2, s.friction2, s.cohesion2,
                {DrawStream::friction2, DrawStream::cohesion2}, first, {block.tan2.data(), count},
                {block.cohesion2_kPa.data(), count});
  const auto* fill = std::get_if<WaterFill>(&w.water);
  fill_input(s, s.water_fill, fill ? fill->fill : 0.0, DrawStream::water_fill, first,
             {block.fill.data(), count});
  fill_input(s, s.seismic, w.seismic.horizontal, DrawStream::seismic, first,
             {block.shaking.data(), count});
  for (std::size_t i = 0; i < count; ++i) {
    block.fill[i] = std::clamp(block.fill[i], 0.0, 1.0);
    block.shaking[i] = std::max(block.shaking[i], 0.0);
  }
}

}  // namespace brink
