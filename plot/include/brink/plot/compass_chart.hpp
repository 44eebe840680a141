// How steep a face may be cut, round the compass, and how the shares grow with dip and azimuth.
#pragma once

#include <string_view>
#include <vector>

#include "brink/design/steepest.hpp"
#include "brink/plot/sheet.hpp"

namespace brink::plot {

// Where a compass chart is drawn: dip 0 at the centre, the greatest dip tried at the rim.
struct CompassFrame {
  Point centre;
  double radius_mm = 0.0;
  Angle greatest_dip = Angle::degrees(90.0);
};

// Of a mode that governs, apart enough in lightness for a grey print.
Colour mode_colour(Mode mode);
// Of what governs a face: a mode, the factor of safety, or nothing.
Colour governing_colour(const SteepestFace& face);
// "planar sliding", "factor of safety", "nothing up to 90°".
std::string governing_name(const SteepestFace& face, Angle greatest_dip);

// A sector for each azimuth, the way the face looks, out to its steepest dip and coloured by what
// governs it; the confident dip as a line across it where there is one. Numbers outside give the
// steepest dip every 30 degrees or at each azimuth where there are fewer.
Group draw_compass_chart(const SteepestResult& result, const CompassFrame& frame);

// The colours that the chart uses, one below the other from `at`; the height taken is lines times
// kKeyLine_mm.
Group draw_compass_key(const SteepestResult& result, Point at);
inline constexpr double kKeyLine_mm = 5.0;

// One mode's share against azimuth (across) and face dip (up) in steps from nothing to more than
// four times the limit, with the line where the limit is passed. The result must hold its map.
Group draw_share_map(const SteepestResult& result, Mode mode, Point top_left, double width_mm,
                     double height_mm);

// A4 across: the compass chart beside the net with a caption; and, where the result holds its map,
// a second sheet with a map for each mode.
std::vector<Picture> steepest_sheets(const SteepestResult& result, const NetContent& content,
                                     Projection projection, const SheetText& text);

}  // namespace brink::plot
