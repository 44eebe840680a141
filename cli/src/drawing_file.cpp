#include "drawing_file.hpp"

#include "brink/plot/cairo_painter.hpp"
#include "output_file.hpp"
#include "source_date.hpp"

namespace brink::cli {

namespace {

const std::vector<std::string> kEndings{".svg", ".pdf", ".png"};

}  // namespace

void add_drawing_options(std::vector<Option>& options, std::string& title, OutputOptions& target,
                         bool curves) {
  options.push_back(text_option("--title", "TEXT", "Heads the drawing.", title, "Output"));
  std::vector<std::string> endings = kEndings;
  std::string help = "Draws the section to scale: .svg, .pdf or .png by ending.";
  if (curves) {
    endings.emplace_back(".csv");
    help += " As .csv: writes the curves of --vary as a table.";
  }
  Option output = output_option("OUT.svg", std::move(help), target);
  output.take = [&target, endings](std::string_view text) {
    known_ending("-o", std::string(text), endings);
    target.output = text;
  };
  options.push_back(std::move(output));
}

void write_drawing(const std::string& path, const plot::Picture& picture,
                   const std::vector<std::string>& inputs) {
  const std::string ending = known_ending("-o", path, kEndings);
  const plot::Painted painted = ending == ".svg"   ? plot::paint_svg(picture)
                                : ending == ".pdf" ? plot::paint_pdf({picture}, source_date())
                                                   : plot::paint_png(picture);
  write_file(path, painted.bytes, inputs);
}

}  // namespace brink::cli
