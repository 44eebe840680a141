// Many wedges at once: the factor of safety of a tetrahedron under weight, water, shaking, loads
// and bolts, in a loop that vectorises. Fast twin of analyse_wedge for wedges without a crack,
// sized by their height, of Mohr-Coulomb strength.
#pragma once

#include <array>
#include <cstddef>

#include "brink/mechanics/wedge_equilibrium.hpp"

namespace brink {

// What is the same in every draw.
struct KernelSetup {
  std::array<double, 3> face{};
  std::array<double, 3> upper{};
  double rise_m = 0.0;  // of the upper ground above the toe, along its normal; 0 or less: no crest
  double unit_weight_kN_m3 = 0.0;
  double water_factor = 0.0;   // pressure for a fill of 1 and a height of 1 m
  double pressure1_kPa = 0.0;  // stated pressures, beside the fill's
  double pressure2_kPa = 0.0;
  double surcharge_kPa = 0.0;  // vertical, per area of the sloping ground
  double seismic_vertical = 0.0;
  bool along_line = true;              // the horizontal shaking follows the line of intersection
  std::array<double, 2> shaking{};     // else along this level unit vector
  std::array<double, 3> force_kN{};    // loads and active bolts
  std::array<double, 3> passive_kN{};  // passive bolts
};

// Whether the kernel covers the case.
bool kernel_covers(const WedgeCase& wedge);
KernelSetup kernel_setup(const WedgeCase& wedge);

inline constexpr std::size_t kBlock = 512;
using Lane = std::array<double, kBlock>;

// One entry a draw. Normals are unit vectors in either sense.
struct KernelBlock {
  Lane x1, y1, z1, x2, y2, z2;
  Lane tan1, tan2, cohesion1_kPa, cohesion2_kPa, fill, shaking;
  // Results: factor of safety, not-a-number where no wedge forms; and 0 no wedge, 1 both planes, 2
  // plane 1, 3 plane 2, 4 lifts.
  Lane safety, mode;
};

void run_kernel(const KernelSetup& setup, KernelBlock& block, std::size_t count);

}  // namespace brink
