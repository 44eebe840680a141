// Where on the sphere a line must point to be admissible, as an intersection of caps, and where the
// great circle of a reading crosses the border of it. Private to kinematics and design.
#pragma once

#include <optional>
#include <vector>

#include "brink/kinematics/modes.hpp"

namespace brink {

// Unit vectors v with v . axis >= least; 0 <= least, so that the cap is convex on the sphere.
struct Cap {
  Vector3 axis;
  double least;
};

// The unit vectors inside every cap; without caps, every line. The comparison margins
// (base/ties.hpp) are part of the caps: inclusive limits lie outwards by the tie, strict ones
// inwards, so that no line of whole-degree readings comes nearer to the border than about the tie
// and it does not matter whether the border itself belongs to the zone.
struct LineZone {
  std::vector<Cap> caps;
  // The last two caps are the vertical sides of a sector of trends narrower than 180 degrees. The
  // vertical line at its apex has no trend and is outside.
  bool sector = false;
};

// Downward lines, horizontal ones in either sense, that daylight and plunge at the friction angle
// or more.
LineZone sliding_zone(const FaceLimits& limits);

// Lines that block_toppling() admits are those in `inside`, less the vertical ones where
// `vertical_too`, less those in `outside` where there is one. (A window of trends wider than 180
// degrees is no convex zone; what it leaves out is one.)
struct TopplingZones {
  bool none = false;  // no line at all: a face within the tie of level
  LineZone inside;
  bool vertical_too = false;
  std::optional<LineZone> outside;
};
TopplingZones toppling_zones(const FaceLimits& limits);

// Where a great circle enters and leaves a zone: positions along the border, counted from an
// arbitrary point, in no order.
struct Chord {
  double from;
  double to;
};

// The border of a zone, prepared once, cut by many great circles. Properties: two great circles
// meet inside the zone exactly when their chords interleave; planes that touch the apex of a sector
// share one position there.
class ZoneBorder {
 public:
  // The zone must have at least one cap.
  explicit ZoneBorder(const LineZone& zone);
  // True where no line is inside.
  bool empty() const { return edges_.empty(); }
  // The chord of the plane of unit normal `n` (either sense); nothing where it misses the zone.
  std::optional<Chord> cut(const Vector3& n) const;
  // A direction well inside; meaningless where empty.
  const Vector3& centre() const { return centre_; }

 private:
  // One stretch of a cap's circle that borders the zone.
  struct Piece {
    double begin;   // turn (0..4 round the circle, from the edge's own start)
    double length;  // in turns
    double split;   // turns up to here belong to this piece
    double index;   // place in the order round the zone
    Vector3 first, middle;
  };
  struct Edge {
    Vector3 axis;
    double least;
    Vector3 e1, e2;  // with the axis right-handed; turn 0 lies at e1, outside the zone
    std::vector<Piece> pieces;
  };
  struct Stretch {
    double begin, end;  // angles
    Vector3 first, middle;
  };
  struct Bounds;

  Edge make_edge(std::size_t cap, const std::vector<Cap>& caps);
  void number_pieces();
  void place_apex();
  double position(std::size_t edge, const Vector3& point) const;
  bool bound_by_apex(const Vector3& n, Bounds& bounds) const;

  std::vector<Edge> edges_;
  Vector3 centre_ = Vector3::Zero();
  bool sector_ = false;
  double apex_ = 0.0;
};

}  // namespace brink
