// A cut face, the ground above it, and what "daylights" means.
#pragma once

#include "brink/orientation/orientation.hpp"

namespace brink {

// 0 < dip < 180; past 90 the face overhangs. Its normal points out of the rock.
struct Face {
  Angle dip;
  Angle dip_direction;
  bool operator==(const Face&) const = default;
};

Vector3 outward_normal(const Face& face);

// Ground above the crest; level unless said otherwise.
inline constexpr Plane kLevelGround{};

// A downward line of unit vector `v` daylights when it leaves the rock through the face and its
// other end reaches the ground above: v . F > 0 and v . U < 0, both strictly (ties.hpp).
// `face_normal` points out of the rock, `upper_normal` up.
bool daylights(const Vector3& v, const Vector3& face_normal, const Vector3& upper_normal);

}  // namespace brink
