// Pairs of readings whose wedge, dry and without cohesion, has a factor of safety below 1: counted
// one by one, or estimated from a sample where there are too many.
#pragma once

#include <cstdint>
#include <optional>
#include <span>

#include "brink/kinematics/modes.hpp"
#include "brink/kinematics/pairs.hpp"

namespace brink {

// Whether the pair daylights, whatever its plunge, and its factor of safety
// (mechanics/dry_wedge.hpp) is strictly below 1. `face_rises` as rises_to_crest() says; no wedge
// forms on a face that does not.
bool is_unstable_dry(const FaceLimits& limits, double tan_friction, bool face_rises,
                     const Vector3& normal1, const Vector3& normal2);

// Counts them among all pairs. Reading i stands for copies[i] equal ones; no span, one each. The
// same for any number of threads. 2 to 4 ns a pair on one core.
std::uint64_t count_unstable_dry(const PairReadings& readings, std::span<const std::int64_t> copies,
                                 const FaceLimits& limits, Angle friction, unsigned threads);

struct UnstableDry {
  std::uint64_t count = 0;               // rounded where it is an estimate
  std::optional<double> standard_error;  // of the count; absent where every pair was tested
  std::uint64_t sampled = 0;             // pairs looked at for an estimate
};

// Estimates the count from about `pairs` random pairs. Readings are divided by orientation into 32
// parts of equal size and each pair of parts is a stratum with a number of draws, at least two, in
// proportion to its pairs (Cochran 1977, Sampling Techniques, ch. 5): pairs of like orientation
// mostly agree, so that strata leave little variance. Draws are with replacement. The same for any
// number of threads.
UnstableDry sample_unstable_dry(const PairReadings& readings, const FaceLimits& limits,
                                Angle friction, std::uint64_t pairs, std::uint64_t seed,
                                unsigned threads);

}  // namespace brink
