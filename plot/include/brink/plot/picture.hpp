// A picture as plain data: marks in millimetres, painted later by cairo_painter.
//
// The page's origin is its top left corner, x to the right, y down. Angles of arcs run from the x
// axis towards y, which is clockwise on the page. Later marks cover earlier ones; the page is
// white.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <variant>
#include <vector>

#include "brink/base/angle.hpp"

namespace brink::plot {

struct Point {
  double x_mm = 0.0;
  double y_mm = 0.0;
  bool operator==(const Point&) const = default;
};

struct Colour {
  std::uint8_t red = 0;
  std::uint8_t green = 0;
  std::uint8_t blue = 0;
  bool operator==(const Colour&) const = default;
};

struct Stroke {
  Colour colour;
  double width_mm = 0.2;
  std::vector<double> dash_mm;  // on, off, ...; empty: solid
  bool round_caps = false;
};

// Steps of an outline. An arc is joined to the point before it by a straight line, or begins the
// outline.
struct MoveTo {
  Point to;
};
struct LineTo {
  Point to;
};
struct ArcTo {
  Point centre;
  double radius_mm = 0.0;
  Angle start;
  Angle sweep;  // positive clockwise on the page, -360..360 degrees
};
struct ClosePath {};
using Step = std::variant<MoveTo, LineTo, ArcTo, ClosePath>;

// A line, an area (filled by the even-odd rule) or both.
struct Path {
  std::vector<Step> steps;
  std::optional<Stroke> stroke;
  std::optional<Colour> fill;
};

enum class Shape { disc, square, triangle, diamond, wedge, cross, saltire, ring };

// Many equal symbols at once. `size_mm` is the diameter of a disc of about the same visual weight.
// cross and saltire are lines, ring is an open circle; their lines are `line_mm` wide.
struct Symbols {
  Shape shape = Shape::disc;
  double size_mm = 1.0;
  double line_mm = 0.2;
  Colour colour;
  std::vector<Point> centres;
};

enum class Anchor { start, middle, end };

struct TextStyle {
  double size_mm = 3.0;  // height of the em square
  bool bold = false;
  Colour colour;
};

// One paragraph in any script; `at` is on the baseline of its first line. With a width it wraps to
// at most `most_lines` lines, the last of them cut with an ellipsis where the text is longer still.
struct Text {
  Point at;
  std::string text;
  TextStyle style;
  Anchor anchor = Anchor::start;
  double width_mm = 0.0;  // 0: one line, as long as it is
  int most_lines = 1;
};

struct Mark;

// Marks that belong together. Title and description are for people who can't see the picture.
struct Group {
  std::string title;
  std::string description;
  std::vector<Mark> marks;
};

struct Mark {
  std::variant<Path, Symbols, Text, Group> content;
};

struct Picture {
  double width_mm = 0.0;
  double height_mm = 0.0;
  Group content;  // its title names the picture
};

void add(Group& group, Path mark);
void add(Group& group, Symbols mark);
void add(Group& group, Text mark);
void add(Group& group, Group mark);

// An open line through the points; a closed one.
Path polyline(const std::vector<Point>& points, Stroke stroke);
Path polygon(const std::vector<Point>& points);
Path segment(Point from, Point to, Stroke stroke);
Path circle(Point centre, double radius_mm);

// The same marks moved, for placing a finished figure on a larger page.
Group moved(Group group, double right_mm, double down_mm);

// Throws ErrorKind::argument where any coordinate, width or size is not a finite number or the page
// has no area: drawing libraries draw such marks in the wrong place without a word.
void check(const Picture& picture);

// What the picture says, for the description of a file: titles and descriptions of its groups, in
// order.
std::string description_of(const Picture& picture);

}  // namespace brink::plot
