#include "plane_section.hpp"

#include <fmt/format.h>

#include <cmath>

#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"

namespace brink {
namespace {

Vector3 horizontal(Angle azimuth) {
  const SinCos a = sincos(azimuth);
  return {a.sin, a.cos, 0.0};
}

// A horizontal plane dips every way, a vertical one both ways: the face decides.
Angle slide_azimuth(const Plane& plane, const Face& face) {
  if (at_most(plane.dip, Angle{})) return face.dip_direction;
  const bool vertical = at_least(plane.dip, 90_deg);
  const bool behind =
      strictly_above(azimuth_difference(plane.dip_direction, face.dip_direction), 90_deg);
  return wrap_360(vertical && behind ? plane.dip_direction + 180_deg : plane.dip_direction);
}

// Angle of a surface's trace in the section, from its normal.
Angle trace_dip(const Vector3& surface_normal, Angle azimuth) {
  return atan2(surface_normal.dot(horizontal(azimuth)), surface_normal.z());
}

std::string one_decimal(Angle angle) {
  return fixed(angle.deg(), 1);
}

std::string why_no_block(const SectionShape& shape, const Vector3& slide, const Vector3& face,
                         const Vector3& upper) {
  if (!strictly_above(face.dot(horizontal(shape.azimuth)), 0.0))
    return fmt::format("the plane dips into the slope: towards {}, away from the face",
                       one_decimal(shape.azimuth));
  if (!strictly_above(slide.dot(face), 0.0))
    return fmt::format(
        "the plane does not daylight: it dips {} degrees, the face {} in the section towards {}",
        one_decimal(shape.plane_dip), one_decimal(shape.face_dip), one_decimal(shape.azimuth));
  if (!strictly_below(slide.dot(upper), 0.0))
    return fmt::format(
        "the plane never reaches the upper ground, which rises {} degrees behind the crest where "
        "the plane rises {}",
        one_decimal(shape.upper_dip), one_decimal(shape.plane_dip));
  return {};
}

double twice_area(const CutBlock& block) {
  double sum = 0.0;
  for (std::size_t i = 0; i < block.corner_count; ++i) {
    const Vector2& a = block.corners[i];
    const Vector2& b = block.corners[(i + 1) % block.corner_count];
    sum += a.x() * b.y() - a.y() * b.x();
  }
  return std::abs(sum);
}

}  // namespace

Vector2 in_section(const Vector3& v, Angle azimuth) {
  return {-v.dot(horizontal(azimuth)), v.z()};
}

SectionShape section_shape(const Plane& plane, const Face& face, const Plane& upper,
                           double height_m) {
  SectionShape shape;
  shape.azimuth = slide_azimuth(plane, face);
  const Vector3 face_normal = outward_normal(face);
  const Vector3 ground_normal = upward_normal(upper);
  const Vector3 slide = dip_vector(plane.dip, shape.azimuth);
  shape.plane_dip = plane.dip;
  // Square to the face nothing is apparent: the dip stays as it was typed.
  const bool square = shape.azimuth == wrap_360(face.dip_direction);
  shape.face_dip = square ? face.dip : trace_dip(face_normal, shape.azimuth);
  shape.upper_dip = trace_dip(ground_normal, shape.azimuth);
  shape.height_m = height_m;
  shape.reason = why_no_block(shape, slide, face_normal, ground_normal);
  if (!shape.reason.empty()) return shape;

  const SinCos p = sincos(shape.plane_dip);
  const SinCos f = sincos(shape.face_dip);
  shape.up_plane = {p.cos, p.sin};
  shape.up_normal = {-p.sin, p.cos};
  shape.crest = {height_m * f.cos / f.sin, height_m};
  const double exit_m = height_m * sin(shape.face_dip - shape.upper_dip) /
                        (f.sin * sin(shape.plane_dip - shape.upper_dip));
  shape.exit = exit_m * shape.up_plane;
  if (exit_m <= 0.0) shape.reason = "the face and the upper ground close below the crest";
  return shape;
}

double crack_depth_m(const SectionShape& shape, double x_m) {
  const double plane_z_m = x_m * shape.up_plane.y() / shape.up_plane.x();
  if (x_m < shape.crest.x()) return x_m * shape.height_m / shape.crest.x() - plane_z_m;
  return shape.height_m + (x_m - shape.crest.x()) * tan(shape.upper_dip) - plane_z_m;
}

CutBlock whole_block(const SectionShape& shape) {
  CutBlock block;
  block.corners = {Vector2::Zero(), shape.crest, shape.exit};
  block.corner_count = 3;
  block.area_m2 = twice_area(block) / 2.0;
  block.ground_m = shape.exit.x() - shape.crest.x();
  block.sliding_length_m = shape.exit.norm();
  return block;
}

CutBlock block_before_crack(const SectionShape& shape, double x_m) {
  CutBlock block;
  const Vector2 foot(x_m, x_m * shape.up_plane.y() / shape.up_plane.x());
  block.crack_depth_m = crack_depth_m(shape, x_m);
  const Vector2 top(x_m, foot.y() + block.crack_depth_m);
  const bool on_face = x_m < shape.crest.x();
  block.corner_count = on_face ? 3 : 4;
  if (on_face)
    block.corners = {Vector2::Zero(), top, foot};
  else
    block.corners = {Vector2::Zero(), shape.crest, top, foot};
  block.area_m2 = twice_area(block) / 2.0;
  block.ground_m = on_face ? 0.0 : x_m - shape.crest.x();
  block.sliding_length_m = foot.norm();
  return block;
}

}  // namespace brink
