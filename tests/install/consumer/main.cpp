// Reads a site from text, takes the intersection of two planes and tests it on the site's face: the
// library's stages from the first to the last, without the program.
#include <brink/orientation/face.hpp>
#include <brink/orientation/intersection.hpp>
#include <brink/record/document.hpp>
#include <brink/record/site.hpp>
#include <cstdio>

int main() {
  const brink::Site site = brink::parse_site(
      "[[readings]]\nfile = \"a.csv\"\n[[face]]\ndip_deg = 70\ndip_direction_deg = 180\n",
      "s.toml");
  const brink::Plane east{brink::Angle::degrees(60), brink::Angle::degrees(120)};
  const brink::Plane west{brink::Angle::degrees(60), brink::Angle::degrees(240)};
  const auto line = brink::intersection(east, west);
  if (!line) return 1;
  const bool out = brink::daylights(brink::direction(*line), outward_normal(site.faces[0].face),
                                    upward_normal(site.faces[0].upper));
  std::fputs(brink::to_json(brink::line_value(*line)).c_str(), stdout);
  return out ? 0 : 1;
}
