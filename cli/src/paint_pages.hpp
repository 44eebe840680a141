// Pages to the bytes of a drawing, by the ending of the file's name.
#pragma once

#include <string>
#include <vector>

#include "brink/plot/cairo_painter.hpp"

namespace brink::cli {

// ".pdf": a page each; ".svg" and ".png" hold one picture, so several pages stand one below the
// other. `path` must end in one of these (known_ending).
plot::Painted paint_pages(const std::vector<plot::Picture>& pages, const std::string& path);

}  // namespace brink::cli
