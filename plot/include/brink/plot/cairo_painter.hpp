// Pictures to files in memory: SVG, PDF, PNG. cairo_painter.cpp is the only source that includes
// Cairo and Pango. The same picture gives the same bytes on one machine, whatever was drawn before.
//
// Every function throws ErrorKind::argument for a picture that check() refuses or the drawing
// library fails on.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "brink/plot/picture.hpp"

namespace brink::plot {

struct Painted {
  std::string bytes;
  std::vector<std::string> warnings;  // texts that no installed font can show whole, each named
};

// One user unit is one millimetre. Text becomes outlines, with an invisible layer of real text on
// top so that it can be searched and copied; <title> and <desc> come from the groups. `id_prefix`
// starts every id, so that several figures can stand in one HTML page: a letter, then letters,
// digits or hyphens.
Painted paint_svg(const Picture& picture, std::string_view id_prefix = "figure");

// One page a picture; with several pages, an outline that names them. `seconds` since 1970 (UTC)
// is the date written into the file.
Painted paint_pdf(const std::vector<Picture>& pages, std::int64_t seconds = 0);

// `dots_per_mm` 8 is 203 dots an inch. Refused where the image would exceed 20,000 dots a side.
Painted paint_png(const Picture& picture, double dots_per_mm = 8.0);

struct TextSize {
  double width_mm = 0.0;
  double height_mm = 0.0;  // of all lines
  double ascent_mm = 0.0;  // from the top to the first baseline
  int lines = 1;
  bool cut = false;  // an ellipsis stands for the rest
};

// The room a text takes, laid out exactly as it will be painted.
TextSize measure(const Text& text);

}  // namespace brink::plot
