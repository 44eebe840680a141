// Where EM starts: new components where the model misses readings, components split, merged and
// changed in shape, and spread-out random starts. All deterministic.
#pragma once

#include <cstdint>
#include <vector>

#include "brink/sets/mixture.hpp"

namespace brink::detail {

// The same component with the other shape, of about the same spread.
Component with_shape(const Component& component, Shape shape);

// `mixture` with one component more at `axis`; the others give way in proportion.
Mixture with_added(const Mixture& mixture, const Vector3& axis, double kappa, Shape shape);

// One component in place of components i and j.
Mixture with_merged(const Mixture& mixture, std::size_t i, std::size_t j, Shape shape);

// Component i in two halves, one spread to either side along its longest tangent as `sample` shows
// it.
Mixture with_split(const Mixture& mixture, std::size_t i, const AxisSample& sample);

// Axes where a small new component would raise the likelihood fastest, and its kappa: the peaks of
// the gradient sum w f(x; axis, kappa) / f(x; mixture) (Lindsay 1983, Ann. Statist. 11), at least
// `apart` from each other, best first.
struct Peak {
  Vector3 axis;
  double kappa;
};
std::vector<Peak> peaks(const Mixture& mixture, const AxisSample& sample, std::size_t count,
                        Angle apart);

// `count` equal components at readings drawn far from each other with probability proportional to
// the squared sine to the nearest one drawn before (Arthur & Vassilvitskii 2007, SODA).
Mixture spread_start(const AxisSample& sample, std::size_t count, Shape shape, std::uint64_t seed,
                     std::uint64_t stream);

// Equal round components at the centres.
Mixture centred_start(const std::vector<Vector3>& centres);

}  // namespace brink::detail
