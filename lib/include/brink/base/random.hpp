// Counter-based random numbers: each is a pure function of (seed, stream, index), so the order of
// the work and the number of threads never change a draw.
#pragma once

#include <cstdint>

namespace brink {

// 64 well-mixed bits. The mixer is the finaliser of SplitMix64 (Steele, Lea & Flood 2014, OOPSLA),
// applied in turn to seed, stream and index; good for simulation, not for secrets.
constexpr std::uint64_t mix_bits(std::uint64_t x) {
  x = (x ^ (x >> 30)) * 0xBF58476D1CE4E5B9ULL;
  x = (x ^ (x >> 27)) * 0x94D049BB133111EBULL;
  return x ^ (x >> 31);
}

constexpr std::uint64_t random_bits(std::uint64_t seed, std::uint64_t stream, std::uint64_t index) {
  constexpr std::uint64_t golden = 0x9E3779B97F4A7C15ULL;
  std::uint64_t x = mix_bits(seed + golden);
  x = mix_bits(x ^ (stream + golden));
  return mix_bits(x + (index + 1) * golden);
}

// Uniform in the open interval (0, 1): 52 random bits and a half, so that logarithms of it and of
// its complement are finite.
constexpr double random_uniform(std::uint64_t seed, std::uint64_t stream, std::uint64_t index) {
  return (static_cast<double>(random_bits(seed, stream, index) >> 12) + 0.5) * 0x1p-52;
}

// Uniform in 0 .. count - 1; count > 0. The bias is below count / 2^64.
constexpr std::uint64_t random_index(std::uint64_t seed, std::uint64_t stream, std::uint64_t index,
                                     std::uint64_t count) {
  __extension__ using Wide = unsigned __int128;
  return static_cast<std::uint64_t>((static_cast<Wide>(random_bits(seed, stream, index)) * count) >>
                                    64);
}

}  // namespace brink
