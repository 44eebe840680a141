#include "paint_pages.hpp"

#include "brink/plot/sheet.hpp"
#include "output_file.hpp"
#include "source_date.hpp"

namespace brink::cli {

plot::Painted paint_pages(const std::vector<plot::Picture>& pages, const std::string& path) {
  const std::string ending = known_ending("-o", path, {".svg", ".pdf", ".png"});
  if (ending == ".pdf") return plot::paint_pdf(pages, source_date());
  const plot::Picture one = pages.size() == 1 ? pages.front() : plot::stacked(pages);
  return ending == ".svg" ? plot::paint_svg(one) : plot::paint_png(one);
}

}  // namespace brink::cli
