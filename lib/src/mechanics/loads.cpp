#include "brink/mechanics/loads.hpp"

namespace brink {

Vector3 force_vector(const DirectedForce& force) {
  return force.force_kN * direction(force.towards);
}

std::string_view to_string(BoltAction action) {
  return action == BoltAction::active ? "active" : "passive";
}

Vector3 seismic_vector(const Seismic& seismic, Angle trend, double weight_kN) {
  const Vector3 level = direction({trend, Angle{}});
  return weight_kN * (seismic.horizontal * level + Vector3(0.0, 0.0, seismic.vertical));
}

}  // namespace brink
