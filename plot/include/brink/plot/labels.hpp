// Labels round a net, moved apart so that none overlap.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/plot/net_frame.hpp"

namespace brink::plot {

// What wants a label, and where its curve meets the rim: at either of two ends.
struct RimLabel {
  std::string name;         // cut where there is no room for it
  std::string orientation;  // after the name, never cut
  TextStyle style;
  Angle end;
  Angle other_end;
  std::optional<Shape> symbol;  // drawn before the text
};

struct PlacedLabel {
  std::size_t label = 0;  // index of the request
  Angle azimuth;          // the end that was taken
  bool right = true;      // beside the right half of the net; text then starts at `at`, else ends
  Point at;               // inner end of the text's box, half-way up
  double width_mm = 0.0;  // of the box, symbol included
  double height_mm = 0.0;
  std::string first;   // name and orientation, or the name alone
  std::string second;  // the orientation, where both don't fit on one line
};

// Each label takes the end with more room, then stands beside the rim as near to its end as the
// others on its side let it: on each side the least total of squared moves. `room_left_mm` and
// `room_right_mm` are the widest a label may be there, `top_mm` and `bottom_mm` the page's edges
// for them.
std::vector<PlacedLabel> place_rim_labels(const NetFrame& frame,
                                          const std::vector<RimLabel>& labels, double room_left_mm,
                                          double room_right_mm, double top_mm, double bottom_mm);

// The labels as marks, with a line to the rim for each that had to move.
Group draw_rim_labels(const NetFrame& frame, const std::vector<RimLabel>& labels,
                      const std::vector<PlacedLabel>& placed);

// Centres of intervals of length `size`, in the order of `wanted` (ascending), at least `size`
// apart and within low..high where they fit, with the least sum of squared moves.
std::vector<double> spread_out(const std::vector<double>& wanted, double size, double low,
                               double high);

}  // namespace brink::plot
