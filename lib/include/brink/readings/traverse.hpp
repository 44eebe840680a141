// Where readings were taken: along a scanline or a borehole, or over a mapping window. Each sees
// some planes more often than others and is blind to those that it runs along.
#pragma once

#include <string>
#include <string_view>

#include "brink/orientation/orientation.hpp"

namespace brink {

enum class TraverseKind { scanline, borehole, window };

std::string_view name_of(TraverseKind kind);

struct Traverse {
  std::string name;  // as the readings' column names it; empty: all readings were taken on it
  TraverseKind kind = TraverseKind::scanline;
  Line line;     // of a scanline or borehole, in either sense
  Plane window;  // the exposure that was mapped
};

// "NAME=KIND@TREND/PLUNGE" or "NAME=window@DIP/DIR", the name and '=' left out where one traverse
// holds all readings: "SL1=scanline@062/2", "window@80/215". Error(argument) otherwise; `option` is
// named in the message.
Traverse parse_traverse(std::string_view text, const std::string& option);

// Sine of the angle at which a plane of unit normal `n` (either sense) meets the traverse: of the
// angle between line and plane, or between plane and window. 0 for a plane along it, 1 for a plane
// across it: the share of such planes that it meets (Terzaghi 1965, Geotechnique 15:287).
double meeting_sine(const Traverse& traverse, const Vector3& n);

// The plane meets the traverse at less than `angle` (strictly, ties.hpp): hardly ever seen from it.
bool in_blind_zone(const Traverse& traverse, const Vector3& n, Angle angle);

// "scanline SL1 (062/02)", "window (80/215)".
std::string in_words(const Traverse& traverse);

}  // namespace brink
