// Drawings to files, the format by the ending.
#pragma once

#include <string>
#include <vector>

#include "brink/plot/picture.hpp"
#include "options.hpp"

namespace brink::cli {

// --title TEXT and -o OUT.svg; `curves`: -o takes OUT.csv for the curves of --vary too.
void add_drawing_options(std::vector<Option>& options, std::string& title, OutputOptions& target,
                         bool curves = false);

// Writes a .svg, .pdf or .png, whole or not at all. Throws ErrorKind::argument for another ending,
// ErrorKind::file where it can't be written.
void write_drawing(const std::string& path, const plot::Picture& picture,
                   const std::vector<std::string>& inputs = {});

}  // namespace brink::cli
