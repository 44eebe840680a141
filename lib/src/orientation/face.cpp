#include "brink/orientation/face.hpp"

#include "brink/base/ties.hpp"

namespace brink {

Vector3 outward_normal(const Face& face) {
  return normal(face.dip, face.dip_direction);
}

bool daylights(const Vector3& v, const Vector3& face_normal, const Vector3& upper_normal) {
  return strictly_above(v.dot(face_normal), 0.0) && strictly_below(v.dot(upper_normal), 0.0);
}

}  // namespace brink
