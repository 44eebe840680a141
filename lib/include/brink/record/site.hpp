// The site file: one TOML file that names the readings, the faces and what is known of the rock.
//
// Keys carry their unit. A key that is not known, a value of the wrong type or out of its range is
// an error with file, line, column, key, value and what would be accepted; nothing is ignored.
#pragma once

#include <cstddef>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/mechanics/loads.hpp"
#include "brink/mechanics/strength.hpp"
#include "brink/orientation/face.hpp"
#include "brink/readings/bias.hpp"
#include "brink/readings/readings.hpp"

namespace brink {

// [[readings]]: one file and how it is written. Without `notation` the headings decide.
struct SiteReadings {
  std::string file;  // as the program opens it: the site file's folder and the path written there
  ReadingOptions options;
};

// [[set]]: a name, and a strength where it differs from [strength], for one set. Found sets are
// numbered by weight, which changes with the readings, so a set is recognised by its orientation:
// the found set whose mean plane lies nearest takes the name. Where a column names the sets
// ([sets] column), the name is that of the column and no orientation is needed.
struct SiteSet {
  std::string name;
  std::optional<Plane> near;
  std::optional<MohrCoulomb> strength;
  std::size_t line = 0;
};

// [sets]: how many sets there are (chosen by the program where absent), or the column that names
// them; never both.
struct SiteSets {
  std::optional<std::size_t> count;
  std::optional<std::string> column;
  std::vector<SiteSet> known;
};

// [[face]]
struct SiteFace {
  std::string name;  // "face 1" and so on where not given
  Face face;
  std::optional<double> height_m;  // above 0; without it wedges and slides have no size
  Plane upper = kLevelGround;
};

// [water]
struct SiteWater {
  double fill = 0.0;  // 0 dry .. 1 full
  double unit_weight_kN_m3 = 9.81;
};

// [kinematics]
struct SiteKinematics {
  std::optional<Angle> friction;  // that of [strength] where absent
  Angle strike_tolerance = Angle::degrees(20.0);
  Angle toppling_tolerance = Angle::degrees(30.0);
};

struct Site {
  InputFile source;  // the site file itself
  std::string title;
  std::vector<SiteReadings> readings;  // one or more
  BiasOptions bias;                    // [[traverse]] and [bias]
  SiteSets sets;
  std::vector<SiteFace> faces;              // one or more
  std::optional<MohrCoulomb> strength;      // [strength], of every set that has none of its own
  std::optional<double> unit_weight_kN_m3;  // [rock], above 0
  SiteWater water;
  Seismic seismic;  // [seismic], in parts of the weight; trend: down the line of intersection
  SiteKinematics kinematics;
  std::optional<double> target_factor_of_safety;  // [target], above 0
};

// Reads the text of a site file. `file` is its path, for messages and for paths written in it.
// Throws ErrorKind::input.
Site parse_site(std::string_view text, const std::string& file);

// The same from the file itself. Throws ErrorKind::file too where it cannot be read.
Site read_site(const std::string& file);

// The friction angle of the kinematic tests: [kinematics], else [strength], else nothing.
std::optional<Angle> kinematic_friction(const Site& site);

// Whether a factor of safety reaches the site's target; nothing where there is none.
std::optional<bool> meets_target(const Site& site, double factor_of_safety);

}  // namespace brink
