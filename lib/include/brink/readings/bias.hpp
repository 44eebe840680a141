// Orientation bias: readings weighed by how rarely their traverse meets such planes.
//
// Terzaghi 1965, Geotechnique 15:287: a scanline or borehole meets a plane with a probability
// proportional to the sine of the angle between them, so the reading weighs one over it; a mapping
// window meets traces in the same way by the angle between plane and window. The weight grows
// without bound for planes along the traverse, so angles below the blind angle weigh as at it:
// at 15 degrees 3.8637.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "brink/readings/readings.hpp"
#include "brink/readings/traverse.hpp"

namespace brink {

struct BiasOptions {
  std::vector<Traverse> traverses;           // none: weights stay as they are
  std::string column = "traverse";           // heading of the column that names them
  Angle blind_angle = Angle::degrees(15.0);  // above 0 to 90 degrees
  bool unweighted = false;                   // every reading weighs 1, the user's weights too
};

// 1 / sin(angle at which the plane meets the traverse), the angle at least `blind_angle`. From 1
// up.
double bias_weight(const Traverse& traverse, const Vector3& n, Angle blind_angle);

// The number of equally weighted readings that carry as much: (sum w)^2 / sum w^2 (Kish 1965,
// Survey Sampling). From 1 to the number of readings; 0 for none.
double effective_number(std::span<const double> weights);

// Which traverse each reading was taken on, an index into the traverses or nothing.
using TraverseOfReading = std::vector<std::optional<std::size_t>>;

// By the named column, or the one traverse without a name for all. Error(argument) where traverses
// with a name have no column to go by, two have the same name, or one without a name is not alone.
TraverseOfReading traverses_of(const Readings& readings, const BiasOptions& options);

// Multiplies each reading's weight by its bias weight and scales the weights to sum to the number
// of readings again. A reading on no known traverse keeps a bias weight of 1. Adds to
// readings.warnings: readings whose traverse is not known, and readings in a blind zone, by line.
void weigh_readings(Readings& readings, const BiasOptions& options);

}  // namespace brink
