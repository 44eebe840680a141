// What the sections share: scale and frame, arrows, the sheet round the drawing.
#pragma once

#include <string>
#include <utility>
#include <vector>

#include "brink/mechanics/section_point.hpp"
#include "brink/plot/picture.hpp"
#include "brink/plot/section.hpp"

namespace brink::plot {

// What a section shows, in metres.
struct SectionExtent {
  double left_m = 0.0, right_m = 0.0, low_m = 0.0, high_m = 0.0;
  void include(const SectionPoint& p);
};

class SectionFrame {
 public:
  // The largest round scale at which the extent fits into the box above its scale bar.
  SectionFrame(const SectionExtent& extent, const SectionBox& box);

  Point at(const SectionPoint& p) const;
  // A direction of the section (x into the slope, z up) on the page, not scaled.
  static Point towards(double x, double z) { return {x, -z}; }
  double mm(double length_m) const { return length_m * mm_per_m_; }
  double metres(double length_mm) const { return length_mm / mm_per_m_; }
  const SectionExtent& extent() const { return extent_; }  // widened to the whole drawing area
  const SectionBox& box() const { return box_; }
  std::string scale() const;  // "1:250"

 private:
  SectionExtent extent_;
  SectionBox box_;
  double mm_per_m_ = 1.0;
};

Point moved_by(Point p, Point direction, double length_mm);
Point between(Point a, Point b, double share);

// A line with a filled head at `tip`.
Group arrow(Point tail, Point tip, Colour colour, double width_mm = 0.3);
Text label(Point at, std::string words, Anchor anchor = Anchor::start);
Text label(Point at, std::string words, Colour colour, Anchor anchor = Anchor::start);

// The bar at the foot of the frame's box, with the scale in words.
Group scale_bar(const SectionFrame& frame);

// What stands round a section on its sheet: title, facts, and a key at the right (name and value a
// line).
struct SheetWords {
  std::string title;
  std::string facts;
  std::string verdict;  // heads the key
  bool hazard = false;  // verdict in the colour of what can move
  std::vector<std::pair<std::string, std::string>> key;
};
inline constexpr SectionBox kSheetBox{{14.0, 34.0}, 192.0, 160.0};
Picture section_sheet(const SheetWords& words, Group drawing);

// Where the key ends, for what a section adds under it; and the left edge of that column.
double key_foot_mm(const SheetWords& words);
inline constexpr double kKeyLeft_mm = 214.0;

// "1242" or "44.1": kilonewtons with the digits worth drawing.
std::string force_words(double kN_m);
std::string safety_words(double factor_of_safety);

}  // namespace brink::plot
