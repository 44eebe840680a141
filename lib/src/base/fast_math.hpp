// Branch-free exp2 and log that a compiler can vectorise; the standard functions are calls and stop
// vectorisation. Functions that use them are marked for several instruction sets by clones.hpp.
//
// Results are the same bits on every instruction set, because contraction is off (CMakeLists.txt)
// and every operation is a plain IEEE one.
#pragma once

#include <bit>
#include <cstdint>

#include "clones.hpp"

namespace brink {

// 2^x to a relative error of 3e-16 for -1000 <= x <= 1000; below that range it returns 2^-1000,
// which is nothing beside a density. Polynomial: interpolation of 2^f at Chebyshev nodes of
// [-1/2, 1/2], truncation error 4e-18.
[[gnu::always_inline]] inline double fast_exp2(double x) {
  constexpr double lowest = -1000.0;
  constexpr double magic = 6755399441055744.0;  // 1.5 * 2^52: adding it rounds to a whole number
  const double bounded = x < lowest ? lowest : x;
  const double shifted = bounded + magic;
  const double f = bounded - (shifted - magic);
  double p = 4.4558179083360645e-10;
  p = p * f + 7.074194297288521e-09;
  p = p * f + 1.0178057087733941e-07;
  p = p * f + 1.3215432535912375e-06;
  p = p * f + 1.5252733841556773e-05;
  p = p * f + 1.5403530463724353e-04;
  p = p * f + 1.333355814640647e-03;
  p = p * f + 9.618129107587256e-03;
  p = p * f + 5.5504108664821625e-02;
  p = p * f + 0.24022650695910158;
  p = p * f + 0.6931471805599453;
  p = p * f + 1.0;
  const auto exponent = std::bit_cast<std::uint64_t>(shifted) << 52;
  return std::bit_cast<double>(std::bit_cast<std::uint64_t>(p) + exponent);
}

// ln x to a relative error of 4e-16 (absolute near 1) for normal x > 0. With x = 2^e m,
// sqrt(1/2) <= m < sqrt 2 and s = (m-1)/(m+1): ln m = 2 s + s^3 P(s^2), P by interpolation at
// Chebyshev nodes, truncation error 3e-20.
[[gnu::always_inline]] inline double fast_log(double x) {
  constexpr std::uint64_t root_half = 0x3FE6A09E667F3BCDULL;  // bits of sqrt(1/2)
  constexpr std::uint64_t mantissa = 0x000FFFFFFFFFFFFFULL;
  const std::uint64_t bits = std::bit_cast<std::uint64_t>(x);
  const std::uint64_t offset = bits - root_half;
  const double m = std::bit_cast<double>((offset & mantissa) + root_half);
  // The exponent as a double without a conversion instruction: biased by 2^11 into the mantissa of
  // 2^52.
  const std::uint64_t biased = ((offset >> 52) ^ 0x800ULL) | 0x4330000000000000ULL;
  const double e = std::bit_cast<double>(biased) - (4503599627370496.0 + 2048.0);
  const double s = (m - 1.0) / (m + 1.0);
  const double z = s * s;
  double p = 0.13086626147840102;
  p = p * z + 0.13268773138656886;
  p = p * z + 0.15386239702814658;
  p = p * z + 0.18181795640132906;
  p = p * z + 0.22222222391713917;
  p = p * z + 0.28571428570803614;
  p = p * z + 0.4000000000000088;
  p = p * z + 0.6666666666666666;
  constexpr double ln2_high = 0.693147180369123816490;  // 32 bits, so that e * ln2_high is exact
  constexpr double ln2_low = 1.90821492927058770002e-10;
  return e * ln2_high + (2.0 * s + (s * z * p + e * ln2_low));
}

struct FastSinCos {
  double sin;
  double cos;
};

// Sine and cosine of x radians, |x| < 10^5, to an absolute error of 3e-16. Cody & Waite reduction
// by multiples of pi/2 in two parts, then Taylor polynomials on [-pi/4, pi/4], truncation error
// below 1e-17.
[[gnu::always_inline]] inline FastSinCos fast_sincos(double x) {
  constexpr double magic = 6755399441055744.0;  // 1.5 * 2^52: adding it rounds to a whole number
  constexpr double half_pi_high = 1.57079632673412561417e+00;  // 33 bits
  constexpr double half_pi_low = 6.07710050650619224932e-11;
  const double shifted = x * 0.63661977236758134308 + magic;
  const double k = shifted - magic;
  const double r = (x - k * half_pi_high) - k * half_pi_low;
  const double z = r * r;
  double s = 1.0 / 355687428096000.0;
  s = s * z - 1.0 / 1307674368000.0;
  s = s * z + 1.0 / 6227020800.0;
  s = s * z - 1.0 / 39916800.0;
  s = s * z + 1.0 / 362880.0;
  s = s * z - 1.0 / 5040.0;
  s = s * z + 1.0 / 120.0;
  s = s * z - 1.0 / 6.0;
  s = r + r * z * s;
  double c = 1.0 / 20922789888000.0;
  c = c * z - 1.0 / 87178291200.0;
  c = c * z + 1.0 / 479001600.0;
  c = c * z - 1.0 / 3628800.0;
  c = c * z + 1.0 / 40320.0;
  c = c * z - 1.0 / 720.0;
  c = c * z + 1.0 / 24.0;
  c = 1.0 - z * 0.5 + z * z * c;
  const std::uint64_t quarter = std::bit_cast<std::uint64_t>(shifted);
  const bool odd = (quarter & 1U) != 0;
  const std::uint64_t sine_sign = (quarter & 2U) << 62;
  const std::uint64_t cosine_sign = ((quarter + 1U) & 2U) << 62;
  const double first = odd ? c : s;
  const double second = odd ? s : c;
  return {std::bit_cast<double>(std::bit_cast<std::uint64_t>(first) ^ sine_sign),
          std::bit_cast<double>(std::bit_cast<std::uint64_t>(second) ^ cosine_sign)};
}

}  // namespace brink
