// Forces on a block as vectors, x east, y north, z up.
#pragma once

#include <optional>
#include <string_view>
#include <variant>

#include "brink/orientation/orientation.hpp"

namespace brink {

// A force and the way it pulls or pushes the block; a negative plunge points up. force_kN >= 0.
struct DirectedForce {
  double force_kN = 0.0;
  Line towards;
  bool operator==(const DirectedForce&) const = default;
};

Vector3 force_vector(const DirectedForce& force);

// Pseudo-static earthquake load in parts of the block's weight.
struct Seismic {
  double horizontal = 0.0;     // >= 0
  std::optional<Angle> trend;  // of the horizontal part; the analysis says what stands for "none"
  double vertical = 0.0;       // positive upwards
  bool operator==(const Seismic&) const = default;
};

// horizontal x weight along the trend, vertical x weight upwards.
Vector3 seismic_vector(const Seismic& seismic, Angle trend, double weight_kN);

enum class BoltAction {
  active,   // tensioned: part of the forces that act on the block
  passive,  // grouted, stretched by the block as it moves: adds to the resistance only
};

std::string_view to_string(BoltAction action);  // "active", "passive"

// Water by how full the wetted planes are, 0 (dry) to 1; the analysis says what full means.
struct WaterFill {
  double fill = 0.0;
  bool operator==(const WaterFill&) const = default;
};

// Mean water pressures over each plane, as measured or computed elsewhere; >= 0.
struct WaterPressures {
  double plane1_kPa = 0.0;
  double plane2_kPa = 0.0;
  double crack_kPa = 0.0;
  bool operator==(const WaterPressures&) const = default;
};

using WedgeWater = std::variant<WaterFill, WaterPressures>;

}  // namespace brink
