// The numbers of a simulation, block by block.
#pragma once

#include <cstdint>
#include <span>

#include "brink/risk/monte_carlo.hpp"
#include "risk/wedge_kernel.hpp"

namespace brink {

// One stream of random numbers an input; a plane takes two.
enum class DrawStream : std::uint64_t {
  plane1,
  plane1_azimuth,
  plane2,
  plane2_azimuth,
  friction1,
  friction2,
  cohesion1,
  cohesion2,
  water_fill,
  seismic,
};

// Uniform numbers of draws first, first + 1, ...; with a Latin hypercube each of the `draws` strata
// of a stream is used once.
void fill_uniform(const WedgeSimulation& simulation, DrawStream stream, std::uint64_t first,
                  std::span<double> out);

// Turns uniform numbers into unit vectors about `mean` by Fisher's distribution: cos(theta) = 1 +
// ln(u + (1 - u) exp(-2 k)) / k.
struct NormalLanes {
  double* x;
  double* y;
  double* z;
};
void fisher_normals(const Vector3& mean, double fisher_k, const double* u, const double* turn,
                    std::size_t count, const NormalLanes& out);

// Everything the kernel reads, for draws first .. first + count - 1; friction as its tangent.
void fill_block(const WedgeSimulation& simulation, std::uint64_t first, std::size_t count,
                KernelBlock& block);

}  // namespace brink
