// The block between two planes, a face and the ground above it, and a tension crack behind.
//
// The origin is the toe, where the line of intersection of the planes leaves the face. The crest
// lies `height` above it, up the face's dip line; the upper ground passes through the crest. With
// that, planes 1 and 2, face and upper ground bound one tetrahedron (Hoek & Bray, Rock Slope
// Engineering, 3rd ed. 1981, appendix; Goodman & Shi 1985, Block Theory).
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/mechanics/half_spaces.hpp"
#include "brink/orientation/face.hpp"

namespace brink {

enum class WedgeMeasure {
  height,            // of the crest above the toe, up the face's dip line
  height_on_plane1,  // of the crest above the toe along plane 1's trace on the face
  volume,            // of the whole wedge, before a crack cuts it
  trace_length1,     // of plane 1's trace on the face, from the toe to the crest
  trace_length2,
  persistence,  // as large as the planes' persistence allows; no value
};

// What fixes the size of the wedge; value > 0, in m (m3 for a volume).
struct WedgeSize {
  WedgeMeasure measure = WedgeMeasure::height;
  double value = 0.0;
  bool operator==(const WedgeSize&) const = default;
};

struct TensionCrack {
  Plane plane;
  double distance_m = 0.0;  // >= 0, behind the crest along plane 1's trace on the upper ground
  bool operator==(const TensionCrack&) const = default;
};

struct WedgeGeometry {
  Plane plane1;
  Plane plane2;
  Face face;
  Plane upper = kLevelGround;  // dip below 90
  WedgeSize size;
  std::optional<TensionCrack> crack;
  // The joints' greatest length, > 0: no side of the wedge's triangle on that plane is longer (the
  // whole wedge, before a crack cuts it). A wedge that its size would make larger is scaled down.
  std::optional<double> persistence1_m;
  std::optional<double> persistence2_m;
};

struct WedgeAreas {
  double plane1_m2 = 0.0;
  double plane2_m2 = 0.0;
  double face_m2 = 0.0;
  double upper_m2 = 0.0;
  double crack_m2 = 0.0;
};

// Index of each bounding plane in WedgeBlock::surfaces.
enum class WedgeSurface : std::size_t { plane1, plane2, face, upper, crack };

// The block, or why there is none. Unless `forms`, only `line` may be there.
struct WedgeBlock {
  bool forms = false;
  std::string reason;                 // in words, empty where it forms
  std::vector<std::string> warnings;  // crack that misses, size that persistence limits
  std::optional<Vector3> line;        // unit vector down the line of intersection; absent: parallel
  Vector3 into1 = Vector3::Zero();    // unit normals of the planes, into the block
  Vector3 into2 = Vector3::Zero();
  Vector3 into_from_crack = Vector3::Zero();  // of the crack, into the block: towards the face
  double height_m = 0.0;
  double total_height_m = 0.0;  // of the line's upper end above the toe
  double volume_m3 = 0.0;
  WedgeAreas areas;
  bool cut = false;            // a crack takes its back off
  double crack_depth_m = 0.0;  // of the crack's lowest corner, vertically below the upper ground
  std::vector<SolidFace> surfaces;  // by WedgeSurface; for drawing
};

// The block's side of plane 1 is the one that holds the corner (plane 2, face, upper ground), and
// so for plane 2: a plane may overhang the block. No wedge forms where the planes are parallel,
// their line does not daylight (face.hpp), the face rises to no crest, or a plane's trace on the
// face never reaches the upper ground.
// A crack that comes out in the face, so that the toe lies behind it, leaves no wedge either; one
// that does not reach the wedge leaves it whole, with a warning.
// Throws ErrorKind::argument where a value is out of its range, or where the size or the crack
// cannot be placed: plane 1's trace on the face does not rise (height_on_plane1), or its trace on
// the upper ground never meets the crack.
WedgeBlock wedge_block(const WedgeGeometry& geometry);

}  // namespace brink
