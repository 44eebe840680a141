#include "brink/mechanics/plane_slide.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "plane_equilibrium.hpp"
#include "require.hpp"

namespace brink {
namespace {

void check_face_dip(double deg) {
  if (deg > 0.0 && deg < 180.0) return;
  require_finite("face dip", deg);
  throw Error(ErrorKind::argument, Place{{}, 0, 0, "face dip"}, "is out of range", shortest(deg),
              "above 0 and below 180 degrees");
}

void check_forces(const char* name, const std::vector<DirectedForce>& forces) {
  for (const DirectedForce& f : forces) {
    require_not_negative(name, f.force_kN);
    require_finite(name, f.towards.trend.deg());
    require_between(name, f.towards.plunge.deg(), -90.0, 90.0);
  }
}

void check_input(const PlaneSlideInput& in) {
  require_between("plane dip", in.plane.dip.deg(), 0.0, 90.0);
  require_between("upper dip", in.upper.dip.deg(), 0.0, 90.0);
  check_face_dip(in.face.dip.deg());
  for (const Angle a : {in.plane.dip_direction, in.face.dip_direction, in.upper.dip_direction})
    require_finite("dip direction", a.deg());
  require_positive("height", in.height_m);
  require_positive("unit weight", in.unit_weight_kN_m3);
  check_strength(in.strength);
  require_finite("crack setback", in.crack_setback_m);
  require_not_negative("water depth", in.water_depth_m);
  require_positive("water unit weight", in.water_unit_weight_kN_m3);
  require_not_negative("surcharge", in.surcharge_kPa);
  require_finite("seismic horizontal", in.seismic_horizontal);
  require_finite("seismic vertical", in.seismic_vertical);
  check_forces("load", in.loads);
  check_forces("bolt", in.bolts);
  if (in.target) require_positive("target", *in.target);
}

[[noreturn]] void refuse_water(double depth_m, const std::string& what,
                               const std::string& accepted) {
  throw Error(ErrorKind::argument, Place{{}, 0, 0, "water depth"}, what, shortest(depth_m),
              accepted);
}

// Lengths are compared as shares of the height.
bool longer(double a_m, double b_m, const SectionShape& shape) {
  return strictly_above(a_m / shape.height_m, b_m / shape.height_m);
}

struct Crack {
  bool cuts = false;
  double x_m = 0.0;
};

bool has_closed_form(const PlaneSlideInput& in, const SectionShape& shape) {
  return in.water_depth_m == 0.0 && in.surcharge_kPa == 0.0 && in.loads.empty() &&
         in.bolts.empty() && std::holds_alternative<MohrCoulomb>(in.strength) &&
         shape.upper_dip == Angle{} && shape.plane_dip > Angle{} && shape.face_dip < 90_deg;
}

Crack critical_crack(const PlaneSlideInput& in, const SectionShape& shape, PlaneSlide& out) {
  if (has_closed_form(in, shape)) {
    const CriticalCrack best = dry_critical_crack(shape.plane_dip, shape.face_dip);
    return {true, shape.crest.x() + best.setback_share * in.height_m};
  }
  const CrackSearch found = search_critical_crack(in, shape);
  out.least_behind_crest = found.least_behind_crest;
  if (found.flat)
    out.warnings.emplace_back("the factor of safety is the same wherever the crack lies");
  else if (found.at_edge)
    out.warnings.emplace_back(
        in.water_depth_m > 0.0
            ? "the critical crack is the shallowest that holds this depth of water"
            : "the factor of safety keeps falling as the crack nears the end of the block, so no "
              "position is critical: the value is for the last one tried");
  return {true, found.x_m};
}

Crack given_crack(const PlaneSlideInput& in, const SectionShape& shape, PlaneSlide& out) {
  const double x_m = shape.crest.x() + in.crack_setback_m;
  out.crack_setback_m = in.crack_setback_m;
  const bool in_the_air = in.crack_setback_m < 0.0 && shape.face_dip >= 90_deg;
  if (in_the_air || !longer(x_m, 0.0, shape)) {
    out.reason = fmt::format(
        "the crack comes out in the face in front of the plane's toe: no block is left between it "
        "and the face (the toe is {} m {} the crest)",
        fixed(std::abs(shape.crest.x()), 3), shape.crest.x() < 0.0 ? "behind" : "in front of");
    return {};
  }
  if (longer(shape.exit.x(), x_m, shape)) return {true, x_m};
  out.crack_depth_m = 0.0;
  out.warnings.push_back(fmt::format(
      "the crack does not reach the block, whose plane comes out {} m behind the crest: it is left "
      "out",
      fixed(shape.exit.x() - shape.crest.x(), 3)));
  return {};
}

Crack place_crack(const PlaneSlideInput& in, const SectionShape& shape, PlaneSlide& out) {
  switch (in.crack) {
    case CrackChoice::none:
      return {};
    case CrackChoice::at_setback:
      return given_crack(in, shape, out);
    case CrackChoice::critical:
      break;
  }
  return critical_crack(in, shape, out);
}

void check_water(const PlaneSlideInput& in, const SectionShape& shape, const CutBlock& block,
                 bool cracked) {
  const double depth_m = in.water_depth_m;
  if (depth_m == 0.0) return;
  if (in.crack == CrackChoice::at_setback && !cracked)
    refuse_water(depth_m, "has no crack to stand in, since the crack does not reach the block",
                 "0, or no crack, the depth then measured above the toe");
  const double most_m = cracked ? block.crack_depth_m : shape.exit.y();
  if (!longer(depth_m, most_m, shape)) return;
  const std::string accepted = "0 to " + fixed(most_m, 3) + " m";
  if (cracked) refuse_water(depth_m, "is deeper than the crack", accepted);
  refuse_water(depth_m, "is above the ground where the plane comes out", accepted);
}

void warn_of_strike(const PlaneSlideInput& in, const SectionShape& shape, PlaneSlide& out) {
  const Angle apart = azimuth_difference(shape.azimuth, in.face.dip_direction);
  if (at_most(apart, in.strike_tolerance)) return;
  out.warnings.push_back(fmt::format(
      "the dip directions of plane and face are {} degrees apart, more than {}: a block open at "
      "its sides is assumed, and a slide along this plane may be held there",
      shortest(apart.deg()), shortest(in.strike_tolerance.deg())));
}

void warn_of_bolts(const PlaneSlideInput& in, const SectionShape& shape, PlaneSlide& out) {
  const Vector3 outward = outward_normal(in.face);
  for (std::size_t i = 0; i < in.bolts.size(); ++i) {
    const Vector3 pull = direction(in.bolts[i].towards);
    const std::string name = fmt::format("bolt {}", i + 1);
    if (!strictly_below(pull.dot(outward), 0.0))
      out.warnings.push_back(name + " does not point into the face");
    if (in_section(pull, shape.azimuth).dot(shape.up_plane) < 0.0)
      out.warnings.push_back(name + " pulls the block down the plane");
  }
}

void warn_of_upward(PlaneSlide& out) {
  if (out.mode == PlaneSlideMode::slides && out.driving_kN_m < 0.0)
    out.warnings.emplace_back(
        "the forces push the block up the plane: the factor of safety is against that, and the "
        "block would leave upward");
}

void describe_section(const SectionShape& shape, PlaneSection& section) {
  section.azimuth = shape.azimuth;
  section.plane_dip = shape.plane_dip;
  section.face_dip = shape.face_dip;
  section.upper_dip = shape.upper_dip;
}

void add_bolt_for_target(const PlaneSlideInput& in, const SectionShape& shape,
                         const SlideForces& forces, PlaneSlide& out) {
  if (!in.target) return;
  out.bolt_for_target = least_bolt(in, shape, forces, out.sliding_length_m);
  if (!out.bolt_for_target)
    out.warnings.emplace_back("no bolt pulling into the face brings the block to the target");
}

void balance(const PlaneSlideInput& in, const SectionShape& shape, const CutBlock& block,
             bool cracked, PlaneSlide& out) {
  const SlideForces f = slide_forces(in, shape, section_loads(in, shape.azimuth), block, cracked);
  const SlideBalance b = slide_balance(in.strength, f, block.sliding_length_m);
  for (std::size_t i = 0; i < block.corner_count; ++i)
    out.section.outline.push_back({block.corners[i].x(), block.corners[i].y()});
  out.mode = b.mode;
  out.weight_kN_m = f.weight_kN_m;
  out.surcharge_kN_m = f.surcharge_kN_m;
  out.sliding_length_m = block.sliding_length_m;
  out.normal_kN_m = f.normal_kN_m;
  out.uplift_kN_m = f.uplift_kN_m;
  out.crack_water_kN_m = f.crack_water_kN_m;
  out.driving_kN_m = f.driving_kN_m;
  out.resisting_kN_m = b.resisting_kN_m;
  out.factor_of_safety = b.factor_of_safety;
  out.strength = b.strength;
  add_bolt_for_target(in, shape, f, out);
}

}  // namespace

CriticalCrack dry_critical_crack(Angle plane_dip, Angle face_dip) {
  const SinCos p = sincos(plane_dip);
  const SinCos f = sincos(face_dip);
  const double cot_face = f.cos / f.sin;
  return {std::sqrt(cot_face * p.cos / p.sin) - cot_face,
          1.0 - std::sqrt(cot_face * p.sin / p.cos)};
}

PlaneSlide analyse_plane_slide(const PlaneSlideInput& input) {
  check_input(input);
  PlaneSlide out;
  const SectionShape shape = section_shape(input.plane, input.face, input.upper, input.height_m);
  describe_section(shape, out.section);
  out.reason = shape.reason;
  if (!out.reason.empty()) return out;
  const Crack crack = place_crack(input, shape, out);
  if (!out.reason.empty()) return out;
  const CutBlock block = crack.cuts ? block_before_crack(shape, crack.x_m) : whole_block(shape);
  check_water(input, shape, block, crack.cuts);
  out.forms = true;
  if (crack.cuts) {
    out.crack_depth_m = block.crack_depth_m;
    out.crack_setback_m = crack.x_m - shape.crest.x();
  }
  warn_of_strike(input, shape, out);
  warn_of_bolts(input, shape, out);
  balance(input, shape, block, crack.cuts, out);
  warn_of_upward(out);
  return out;
}

double greatest_water_depth_m(const PlaneSlideInput& input) {
  PlaneSlideInput dry = input;
  dry.water_depth_m = 0.0;
  check_input(dry);
  const SectionShape shape = section_shape(input.plane, input.face, input.upper, input.height_m);
  if (!shape.reason.empty()) return 0.0;
  if (input.crack == CrackChoice::none) return shape.exit.y();
  const double x_m = input.crack == CrackChoice::critical ? std::max(shape.crest.x(), 0.0)
                                                          : shape.crest.x() + input.crack_setback_m;
  const bool in_the_air = x_m < shape.crest.x() && shape.face_dip >= 90_deg;
  return in_the_air || x_m <= 0.0 ? 0.0 : std::max(crack_depth_m(shape, x_m), 0.0);
}

PlaneSlide dry_plane_slide(const Plane& plane, const Face& face, double height_m,
                           double unit_weight_kN_m3, Angle friction, double cohesion_kPa) {
  PlaneSlideInput input;
  input.plane = plane;
  input.face = face;
  input.height_m = height_m;
  input.unit_weight_kN_m3 = unit_weight_kN_m3;
  input.strength = MohrCoulomb{cohesion_kPa, friction};
  return analyse_plane_slide(input);
}

}  // namespace brink
