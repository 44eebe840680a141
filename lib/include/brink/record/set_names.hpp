// Giving the sets that were found the names, and so the strengths, of a site file.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/record/site.hpp"
#include "brink/sets/sets.hpp"

namespace brink {

// A set that lies further than this from every [[set]] keeps a number for a name.
inline constexpr Angle kFarthestNamed = Angle::degrees(30.0);

// Names each set and returns, one a set, its entry in site_sets.known or nothing. Where a column
// names the sets the names are compared letter by letter. Otherwise the nearest pair of a set found
// and a [[set]] (angle between their normals as axes) is matched first, then the next, up to
// kFarthestNamed; sets without a match are called J1, J2 .. by weight, names in use left out. A
// [[set]] that matches none gives a warning in `sets`.
std::vector<std::optional<std::size_t>> name_sets(SetsResult& sets, const SiteSets& site_sets);

struct NamedSets {
  SetsResult sets;
  std::vector<std::optional<std::size_t>> known;  // as name_sets() returns
};

// The sets of a site: as its column names them, or found, with its names. `options.count` is used
// where the site has neither count nor column. Throws ErrorKind::input where the readings lack the
// column.
NamedSets sets_of_site(const Site& site, const Readings& readings, FindSetsOptions options);

}  // namespace brink
