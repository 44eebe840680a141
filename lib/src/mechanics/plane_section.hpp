// The section of a planar slide: apparent dips, and the block that a crack leaves. Coordinates as
// in plane_slide.hpp.
#pragma once

#include <Eigen/Core>
#include <array>
#include <cstddef>
#include <optional>
#include <string>

#include "brink/mechanics/plane_slide.hpp"

namespace brink {

using Vector2 = Eigen::Vector2d;

struct SectionShape {
  Angle azimuth;
  Angle plane_dip;
  Angle face_dip;
  Angle upper_dip;
  Vector2 up_plane;   // unit vector up the plane, into the slope
  Vector2 up_normal;  // unit normal of the plane, towards the block
  double height_m = 0.0;
  Vector2 crest;
  Vector2 exit;        // where the plane reaches the upper ground
  std::string reason;  // why there is no block; the points are unset then
};

SectionShape section_shape(const Plane& plane, const Face& face, const Plane& upper,
                           double height_m);

// A direction of space as it shows in the section; its part along strike is dropped.
Vector2 in_section(const Vector3& v, Angle azimuth);

// Depth of a vertical crack at `x_m` from the ground (or the face, in front of the crest) down to
// the plane; below 0 behind the exit.
double crack_depth_m(const SectionShape& shape, double x_m);

struct CutBlock {
  std::array<Vector2, 4> corners;  // the order of PlaneSection::outline
  std::size_t corner_count = 0;
  double area_m2 = 0.0;
  double ground_m = 0.0;  // upper ground on the block, measured horizontally
  double sliding_length_m = 0.0;
  double crack_depth_m = 0.0;
};

CutBlock whole_block(const SectionShape& shape);
// The block in front of a crack at 0 < x_m < exit.
CutBlock block_before_crack(const SectionShape& shape, double x_m);

}  // namespace brink
