#include "brink/mechanics/wedge_geometry.hpp"

#include <fmt/format.h>

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "brink/mechanics/dry_wedge.hpp"
#include "brink/orientation/intersection.hpp"
#include "require.hpp"

namespace brink {

namespace {

// Unit normals of everything that bounds the block.
struct Bounds {
  Vector3 plane1;
  Vector3 plane2;
  Vector3 face;
  Vector3 upper;
};

// Corners of the tetrahedron other than the toe, for a crest one metre above the toe.
struct Corners {
  Vector3 on_crest1;  // plane 1, face, upper ground
  Vector3 on_crest2;
  Vector3 back;  // plane 1, plane 2, upper ground
  double rise;   // distance of the upper ground from the toe, along its normal
};

void check(const WedgeGeometry& g) {
  require_between("dip of plane 1", g.plane1.dip.deg(), 0.0, 90.0);
  require_between("dip of plane 2", g.plane2.dip.deg(), 0.0, 90.0);
  require_below("dip of the upper ground", g.upper.dip.deg(), 0.0, 90.0);
  require_positive("dip of the face", g.face.dip.deg());
  require_below("dip of the face", g.face.dip.deg(), 0.0, 180.0);
  if (g.size.measure != WedgeMeasure::persistence) {
    require_positive("size of the wedge", g.size.value);
  } else if (!g.persistence1_m && !g.persistence2_m) {
    throw Error(ErrorKind::argument, Place{.key = "size of the wedge"},
                "is left to the planes' persistence, which is not given", {},
                "the persistence of plane 1 or 2");
  }
  if (g.persistence1_m) require_positive("persistence of plane 1", *g.persistence1_m);
  if (g.persistence2_m) require_positive("persistence of plane 2", *g.persistence2_m);
  if (!g.crack) return;
  require_between("dip of the tension crack", g.crack->plane.dip.deg(), 0.0, 90.0);
  require_not_negative("crack distance", g.crack->distance_m);
}

std::string line_text(const Vector3& v) {
  const Line line = line_with_sense(v);
  return fmt::format("{:03.1f}/{:02.1f}", line.trend.deg(), line.plunge.deg());
}

// A level line runs both ways: it is taken in the sense that leaves through the face, and level it
// is.
Vector3 towards_face(const Vector3& v, const Vector3& face) {
  if (strictly_above(std::abs(v.z()), 0.0)) return v;
  const Vector3 level = Vector3(v.x(), v.y(), 0.0).normalized();
  return level.dot(face) < 0.0 ? Vector3(-level) : level;
}

// Which condition of daylighting fails; empty where none does.
std::string why_it_does_not_daylight(const Vector3& v, const Bounds& n) {
  const double out = v.dot(n.face);
  const std::string name =
      fmt::format("the planes' line of intersection (trend/plunge {})", line_text(v));
  if (strictly_below(out, 0.0)) {
    return name + " does not daylight: it plunges into the rock behind the face";
  }
  if (at_most(out, 0.0)) return name + " does not daylight: it lies in the face";
  if (at_least(v.dot(n.upper), 0.0)) {
    return name + " does not daylight: going up, it never reaches the upper ground";
  }
  return {};
}

Corners corners_at_unit_height(const Bounds& n, const Vector3& v) {
  const double level = std::hypot(n.face.x(), n.face.y());
  const Vector3 crest(-n.face.x() * n.face.z() / (level * level),
                      -n.face.y() * n.face.z() / (level * level), 1.0);
  const double rise = n.upper.dot(crest);
  const Vector3 trace1 = n.plane1.cross(n.face);
  const Vector3 trace2 = n.plane2.cross(n.face);
  return {trace1 * (rise / trace1.dot(n.upper)), trace2 * (rise / trace2.dot(n.upper)),
          v * (rise / v.dot(n.upper)), rise};
}

double height_of(const WedgeSize& size, const Corners& unit) {
  switch (size.measure) {
    case WedgeMeasure::height:
      break;
    case WedgeMeasure::height_on_plane1:
      if (strictly_above(unit.on_crest1.z(), 0.0)) return size.value / unit.on_crest1.z();
      throw Error(ErrorKind::argument, Place{.key = "height on plane 1"},
                  "cannot size this wedge: plane 1's trace on the face does not rise to the crest",
                  shortest(size.value), "the height up the face's dip line");
    case WedgeMeasure::volume: {
      const double unit_m3 = std::abs(unit.back.dot(unit.on_crest1.cross(unit.on_crest2))) / 6.0;
      return std::cbrt(size.value / unit_m3);
    }
    case WedgeMeasure::trace_length1:
      return size.value / unit.on_crest1.norm();
    case WedgeMeasure::trace_length2:
      return size.value / unit.on_crest2.norm();
    case WedgeMeasure::persistence:
      return std::numeric_limits<double>::infinity();
  }
  return size.value;
}

// Longest side of the triangle toe, corner on the crest, back.
double longest_side(const Vector3& on_crest, const Vector3& back) {
  return std::max({on_crest.norm(), back.norm(), (back - on_crest).norm()});
}

// The height, scaled down where a plane does not reach that far.
double limited_height(WedgeBlock& block, const WedgeGeometry& g, const Corners& unit) {
  const double wanted = height_of(g.size, unit);
  double height = wanted;
  int limit = 0;
  const auto cap = [&](int plane, const std::optional<double>& persistence, const Vector3& corner) {
    if (!persistence) return;
    const double reach = *persistence / longest_side(corner, unit.back);
    if (reach < height) {
      height = reach;
      limit = plane;
    }
  };
  cap(1, g.persistence1_m, unit.on_crest1);
  cap(2, g.persistence2_m, unit.on_crest2);
  if (limit != 0 && std::isfinite(wanted)) {
    block.warnings.push_back(
        fmt::format("plane {} reaches only {} m: the wedge is {:.4g} m high, not {:.4g} m", limit,
                    shortest(limit == 1 ? *g.persistence1_m : *g.persistence2_m), height, wanted));
  }
  return height;
}

enum class CrackVerdict { misses, cuts, hides_toe };

// Plane of the crack: its normal into the block (towards the crest) and a point on it.
struct CrackPlane {
  Vector3 into;
  Vector3 point;
};

CrackPlane place_crack(const TensionCrack& crack, const Corners& c) {
  const Vector3 trace = (c.back - c.on_crest1).normalized();
  const Vector3 n = upward_normal(crack.plane);
  const double crossing = n.dot(trace);
  if (at_most(std::abs(crossing), 0.0)) {
    throw Error(ErrorKind::argument, {},
                "the tension crack runs along plane 1's trace on the upper ground, so a distance "
                "along that trace does not place it",
                fmt::format("{}/{}", shortest(crack.plane.dip.deg()),
                            shortest(crack.plane.dip_direction.deg())),
                "a crack that crosses the trace");
  }
  return {crossing > 0.0 ? Vector3(-n) : n, c.on_crest1 + crack.distance_m * trace};
}

CrackVerdict judge(const CrackPlane& crack, const Corners& c) {
  const auto ahead = [&](const Vector3& x) { return crack.into.dot(x - crack.point); };
  const double size = c.back.norm();
  if (at_most(ahead(Vector3::Zero()) / size, 0.0)) return CrackVerdict::hides_toe;
  const double least = std::min({ahead(c.on_crest1), ahead(c.on_crest2), ahead(c.back)});
  return at_least(least / size, 0.0) ? CrackVerdict::misses : CrackVerdict::cuts;
}

// Depth of a point below the upper ground, measured vertically.
double depth_below(const Vector3& x, const Bounds& n, double rise) {
  return (rise - n.upper.dot(x)) / n.upper.z();
}

// Takes areas, volume and surfaces from the solid.
void fill_block(WedgeBlock& block, Solid solid) {
  block.volume_m3 = solid.volume_m3;
  block.surfaces = std::move(solid.faces);
  block.surfaces.resize(5);
  const auto area = [&](WedgeSurface s) {
    return block.surfaces[static_cast<std::size_t>(s)].area_m2;
  };
  block.areas = {area(WedgeSurface::plane1), area(WedgeSurface::plane2), area(WedgeSurface::face),
                 area(WedgeSurface::upper), area(WedgeSurface::crack)};
  block.forms = true;
}

void no_wedge(WedgeBlock& block, std::string reason) {
  block.forms = false;
  block.reason = std::move(reason);
}

// Line, sense and sides; false (with the reason) where no wedge forms.
bool place_block(WedgeBlock& block, const Bounds& n) {
  const auto line = intersection_vector(n.plane1, n.plane2);
  if (!line) {
    no_wedge(block, "the planes are parallel: they meet in no line");
    return false;
  }
  const Vector3 v = towards_face(*line, n.face);
  block.line = v;
  std::string why = why_it_does_not_daylight(v, n);
  if (why.empty() && !rises_to_crest(n.face, n.upper)) {
    why = "the upper ground falls as steeply as the face or more: the face rises to no crest";
  }
  const WedgeSides side =
      wedge_sides(n.plane1, n.plane2, n.plane1.cross(n.plane2), n.face, n.upper);
  if (why.empty() && side.plane1 == 0.0) {
    const bool first = std::abs(n.plane1.cross(n.face).dot(n.upper)) <= kTie;
    why = fmt::format(
        "plane {}'s trace on the face runs parallel to the upper ground: the block has no end and "
        "no volume can be given",
        first ? 1 : 2);
  }
  if (!why.empty()) {
    no_wedge(block, std::move(why));
    return false;
  }
  block.into1 = side.plane1 * n.plane1;
  block.into2 = side.plane2 * n.plane2;
  return true;
}

Corners scaled(Corners c, double factor) {
  return {c.on_crest1 * factor, c.on_crest2 * factor, c.back * factor, c.rise * factor};
}

// Adds the crack's half-space; false (with the reason) where it leaves no wedge.
bool cut_block(WedgeBlock& block, const TensionCrack& tension_crack, const Corners& c,
               std::vector<HalfSpace>& spaces) {
  const CrackPlane crack = place_crack(tension_crack, c);
  switch (judge(crack, c)) {
    case CrackVerdict::hides_toe:
      no_wedge(block,
               "the tension crack comes out in the face: the toe, where the line of intersection "
               "leaves the face, lies behind it");
      return false;
    case CrackVerdict::misses:
      block.warnings.push_back(
          fmt::format("the tension crack, {} m behind the crest along plane 1's trace, does not "
                      "reach the wedge: it is left whole",
                      shortest(tension_crack.distance_m)));
      return true;
    case CrackVerdict::cuts:
      break;
  }
  block.cut = true;
  block.into_from_crack = crack.into;
  spaces.push_back({-crack.into, -crack.into.dot(crack.point)});
  return true;
}

}  // namespace

WedgeBlock wedge_block(const WedgeGeometry& g) {
  check(g);
  WedgeBlock block;
  const Bounds n{upward_normal(g.plane1), upward_normal(g.plane2), outward_normal(g.face),
                 upward_normal(g.upper)};
  if (!place_block(block, n)) return block;
  const Corners unit = corners_at_unit_height(n, *block.line);
  block.height_m = limited_height(block, g, unit);
  const Corners c = scaled(unit, block.height_m);
  block.total_height_m = c.back.z();
  std::vector<HalfSpace> spaces{
      {-block.into1, 0.0}, {-block.into2, 0.0}, {n.face, 0.0}, {n.upper, c.rise}};
  if (g.crack && !cut_block(block, *g.crack, c, spaces)) return block;
  Solid solid = common_solid(spaces);
  if (solid.state != SolidState::solid) {
    no_wedge(block, "planes, face and upper ground have no volume in common");
    return block;
  }
  fill_block(block, std::move(solid));
  for (const Vector3& corner : block.surfaces.back().corners) {
    block.crack_depth_m = std::max(block.crack_depth_m, depth_below(corner, n, c.rise));
  }
  return block;
}

}  // namespace brink
