// How thickly axes lie on the sphere, in multiples of a uniform scatter.
//
// The kernel is the axial Fisher density of concentration k, so that an axis near the rim counts on
// both sides of the net and nothing is distorted by a projection:
//   density(x) = sum w_i k cosh(k x . x_i) / (sinh(k) sum w_i).
// Its mean over the sphere is exactly 1; one axis alone peaks at k coth(k).
// Fisher, Lewis & Embleton 1987, Statistical Analysis of Spherical Data, ch. 3 (from memory).
#pragma once

#include <array>
#include <cstddef>
#include <cstdint>
#include <memory>
#include <optional>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

struct DensitySum;

// Concentration of the kernel for `number` axes: 2 (1 + number / s^2) with s = 3, for which the
// expected value under a uniform scatter is three times its standard deviation. The rule is Kamb's
// (1959, Journal of Geophysical Research 64:1891) for a counting circle; for this kernel it is used
// by Robin & Jowett 1986, Tectonophysics 121:207 (from memory; derived again from the kernel's mean
// and variance). Without a bound the kernel would shrink to the grain of the readings, which are
// whole degrees, so it stops at kFinestKernel: the rule's value where its circle is the usual 1 %
// of the hemisphere, reached at 891 axes.
double kernel_concentration(double number);
inline constexpr double kFinestKernel = 200.0;

// How the axes are summed.
enum class DensityMethod {
  automatic,  // binned from 20,000 axes and concentration 40 up, else direct
  direct,     // every distinct axis by itself
  // Axes in cells of a fifth of the kernel's width, by their means and second moments; the
  // error is below 1e-5 of the peak. The cost hardly grows with the number of axes.
  binned,
};

// Axes with weights. For weighted readings the rule's `number` is the effective number
// (sum w)^2 / sum w^2.
class AxialDensity {
 public:
  // `axes` are unit vectors in either sense, `weights` one above 0 for each, or none for all equal.
  // `concentration` above 0, at most 10,000; by the rule where absent. At least one axis:
  // ErrorKind::argument otherwise, and for a concentration out of range.
  AxialDensity(const std::vector<Vector3>& axes, const std::vector<double>& weights,
               std::optional<double> concentration = {},
               DensityMethod method = DensityMethod::automatic);
  AxialDensity(AxialDensity&&) noexcept;
  AxialDensity& operator=(AxialDensity&&) noexcept;
  ~AxialDensity();

  double concentration() const { return concentration_; }
  // Multiples of uniform at the unit vector `x`. Error of the direct method: 3e-9 of the value and
  // 1e-12 of the peak of a single axis, in which values at x and -x, or among other places, may
  // differ.
  double at(const Vector3& x) const;
  // The same at many places, on up to `threads` threads (0: all cores); the same bits for any
  // number. Cost: an exponential for each place and each axis, or cell, near it.
  std::vector<double> at(const std::vector<Vector3>& places, unsigned threads = 0) const;
  // The local maximum uphill of `x`.
  Vector3 peak_near(const Vector3& x) const;

 private:
  std::unique_ptr<DensitySum> sum_;  // weights sum to 1
  double concentration_ = 0.0;
};

// Nodes and triangles on the lower hemisphere: rings of equal plunge, 90 / rings degrees apart, the
// r-th with 4 r nodes; straight down is the first node. Nodes on the rim come in opposite pairs,
// exactly.
struct HemisphereMesh {
  std::vector<Vector3> nodes;                           // z <= 0
  std::vector<std::array<std::uint32_t, 3>> triangles;  // anticlockwise on the net
  std::size_t first_on_rim = 0;  // the rim is the nodes from here on, anticlockwise from east
};

// `rings` at least 1. 2 rings^2 + 2 rings + 1 nodes; sides of triangles from 90 to 170 / rings
// degrees.
HemisphereMesh hemisphere_mesh(int rings);

struct DensityGrid {
  HemisphereMesh mesh;
  std::vector<double> values;  // one a node, multiples of uniform
  double concentration = 0.0;
  double peak = 0.0;  // greatest density of any place, refined beyond the nodes
  Line peak_line;     // where
};

// The density on the mesh with rings a degree apart, unless told otherwise. The peak is found from
// the highest node by mean shift (Comaniciu & Meer 2002, IEEE Trans. Pattern Anal. 24:603), which
// for this kernel sets x to the direction of sum w_i sinh(k x . x_i) x_i.
inline constexpr int kDensityRings = 90;
DensityGrid density_grid(const AxialDensity& density, int rings = kDensityRings,
                         unsigned threads = 0);

}  // namespace brink
