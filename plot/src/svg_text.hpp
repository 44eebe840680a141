// What is done to the drawing library's SVG before it is handed out: text only, no drawing.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "brink/plot/picture.hpp"

namespace brink::plot {

// One line of text as it was painted.
struct PaintedLine {
  std::string text;
  double x_mm = 0.0;  // its left end
  double baseline_mm = 0.0;
  double width_mm = 0.0;
  double size_mm = 0.0;
};

// `text` with & < > " ' as entities, and control bytes, which XML can't hold, left out.
std::string xml_escaped(std::string_view text);

// Every id="..." renamed to `prefix` and a number in order of appearance, and every reference to
// it. The library counts its ids over the whole process, so without this a figure's bytes depend on
// what was drawn before.
std::string with_own_ids(std::string_view svg, std::string_view prefix);

// `svg` with role, title, description and an invisible layer of selectable text.
std::string with_words(std::string_view svg, std::string_view prefix, std::string_view title,
                       std::string_view description, const std::vector<PaintedLine>& lines);

}  // namespace brink::plot
