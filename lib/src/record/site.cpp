#include "brink/record/site.hpp"

#include <fmt/format.h>

#include <cerrno>
#include <cstring>
#include <filesystem>
#include <fstream>
#include <iterator>

#include "brink/base/digest.hpp"
#include "brink/base/near_name.hpp"
#include "site_table.hpp"

namespace brink {

namespace {

const Interval kDip = from_to(0.0, 90.0, "degrees");
const Interval kFaceDip = between(0.0, 180.0, "degrees");
const Interval kAzimuth = from_to(0.0, 360.0, "degrees");
const Interval kTolerance = from_to(0.0, 180.0, "degrees");
const Interval kFriction{0.0, 90.0, false, true, "degrees"};
constexpr std::size_t kMostSets = 99;

Plane plane_of(Angle dip, Angle direction) {
  return {dip, dip == Angle() ? Angle() : wrap_360(direction)};
}

Plane required_plane(const SiteTable& table, const std::string& dip_key,
                     const std::string& direction_key) {
  const double dip = table.required_number(dip_key, kDip);
  const double direction = table.required_number(direction_key, kAzimuth);
  return plane_of(Angle::degrees(dip), Angle::degrees(direction));
}

// A dip and a dip direction that come together or not at all.
std::optional<Plane> optional_plane(const SiteTable& table, const std::string& dip_key,
                                    const std::string& direction_key) {
  if (!table.has(dip_key) && !table.has(direction_key)) return {};
  return required_plane(table, dip_key, direction_key);
}

std::optional<MohrCoulomb> optional_strength(const SiteTable& table) {
  if (!table.has("friction_deg") && !table.has("cohesion_kPa")) return {};
  return MohrCoulomb{table.number("cohesion_kPa", at_least_value(0.0, "kPa")).value_or(0.0),
                     Angle::degrees(table.required_number("friction_deg", kFriction))};
}

std::optional<Notation> notation_of(const SiteTable& table) {
  const auto name = table.text("notation");
  if (!name) return {};
  const auto notation = notation_named(*name);
  if (!notation) throw table.wrong("notation", "is not a notation", notation_names());
  return notation;
}

std::optional<StrikeRule> strike_rule_of(const SiteTable& table) {
  const auto name = table.text("strike_rule");
  if (!name) return {};
  if (*name == "right") return StrikeRule::right;
  if (*name == "left") return StrikeRule::left;
  throw table.wrong("strike_rule", "is not a strike rule", "right, left");
}

std::vector<Filter> filters_of(const SiteTable& table) {
  std::vector<Filter> filters;
  for (const std::string& text : table.texts("only")) {
    try {
      filters.push_back(parse_filter(text));
    } catch (const Error& error) {
      throw table.wrong("only", fmt::format("'{}' is not a filter", printable(text)),
                        error.accepted());
    }
  }
  return filters;
}

ReadingOptions reading_options_of(const SiteTable& table) {
  ReadingOptions options;
  options.notation = notation_of(table);
  options.strike_rule = strike_rule_of(table);
  options.declination = table.angle("declination_deg", from_to(-180.0, 180.0, "degrees"))
                            .value_or(options.declination);
  options.only = filters_of(table);
  return options;
}

std::string beside(const std::string& site_file, const std::string& path) {
  return (std::filesystem::path(site_file).parent_path() / path).lexically_normal().string();
}

std::vector<SiteReadings> readings_of(const SiteTable& root, const std::string& site_file) {
  std::vector<SiteReadings> result;
  for (const SiteTable& table :
       root.tables("readings", {"file", "notation", "strike_rule", "declination_deg", "only"})) {
    SiteReadings readings;
    readings.file = beside(site_file, table.required_text("file"));
    readings.options = reading_options_of(table);
    result.push_back(std::move(readings));
  }
  if (result.empty()) throw root.missing("readings", "[[readings]] with a file");
  return result;
}

Traverse traverse_of(const SiteTable& table) {
  Traverse traverse;
  traverse.name = table.text("name").value_or("");
  const std::string kind = table.required_text("kind");
  if (kind == name_of(TraverseKind::window)) {
    traverse.kind = TraverseKind::window;
    traverse.window = required_plane(table, "dip_deg", "dip_direction_deg");
    return traverse;
  }
  const bool borehole = kind == name_of(TraverseKind::borehole);
  if (!borehole && kind != name_of(TraverseKind::scanline)) {
    throw table.wrong("kind", "is not a kind of traverse", "scanline, borehole, window");
  }
  traverse.kind = borehole ? TraverseKind::borehole : TraverseKind::scanline;
  traverse.line.plunge =
      Angle::degrees(table.required_number("plunge_deg", from_to(-90.0, 90.0, "degrees")));
  traverse.line.trend = wrap_360(Angle::degrees(table.required_number("trend_deg", kAzimuth)));
  return traverse;
}

BiasOptions bias_of(const SiteTable& root) {
  BiasOptions bias;
  for (const SiteTable& table : root.tables("traverse", {"name", "kind", "trend_deg", "plunge_deg",
                                                         "dip_deg", "dip_direction_deg"})) {
    bias.traverses.push_back(traverse_of(table));
  }
  const SiteTable table = root.table("bias", {"traverse_column", "blind_angle_deg"});
  bias.column = table.text("traverse_column").value_or(bias.column);
  bias.blind_angle = table.angle("blind_angle_deg", {0.0, 90.0, true, false, "degrees"})
                         .value_or(bias.blind_angle);
  return bias;
}

SiteSet set_of(const SiteTable& table, bool named_by_column) {
  SiteSet set;
  set.name = table.required_text("name");
  set.near = optional_plane(table, "dip_deg", "dip_direction_deg");
  if (!set.near && !named_by_column) throw table.missing("dip_deg", kDip.text());
  set.strength = optional_strength(table);
  set.line = table.line();
  return set;
}

SiteSets sets_of(const SiteTable& root) {
  const SiteTable table = root.table("sets", {"count", "column"});
  SiteSets sets;
  sets.count = table.whole("count", 1, kMostSets);
  sets.column = table.text("column");
  if (sets.count && sets.column) {
    throw table.wrong("count", "stands beside a column that names the sets", "one of the two");
  }
  for (const SiteTable& known : root.tables(
           "set", {"name", "dip_deg", "dip_direction_deg", "friction_deg", "cohesion_kPa"})) {
    SiteSet set = set_of(known, sets.column.has_value());
    for (const SiteSet& other : sets.known) {
      if (other.name == set.name) throw known.wrong("name", "is the name of two sets", "another");
    }
    sets.known.push_back(std::move(set));
  }
  return sets;
}

std::vector<SiteFace> faces_of(const SiteTable& root) {
  std::vector<SiteFace> result;
  for (const SiteTable& table :
       root.tables("face", {"name", "dip_deg", "dip_direction_deg", "height_m", "upper_dip_deg",
                            "upper_dip_direction_deg"})) {
    SiteFace face;
    face.name = table.text("name").value_or(fmt::format("face {}", result.size() + 1));
    face.face.dip = Angle::degrees(table.required_number("dip_deg", kFaceDip));
    face.face.dip_direction =
        wrap_360(Angle::degrees(table.required_number("dip_direction_deg", kAzimuth)));
    face.height_m = table.number("height_m", above(0.0, "m"));
    face.upper =
        optional_plane(table, "upper_dip_deg", "upper_dip_direction_deg").value_or(kLevelGround);
    for (const SiteFace& other : result) {
      if (other.name == face.name) throw table.wrong("name", "is the name of two faces", "another");
    }
    result.push_back(std::move(face));
  }
  if (result.empty()) {
    throw root.missing("face", "[[face]] with dip_deg and dip_direction_deg");
  }
  return result;
}

SiteWater water_of(const SiteTable& root) {
  const SiteTable table = root.table("water", {"fill", "unit_weight_kN_m3"});
  SiteWater water;
  water.fill = table.number("fill", from_to(0.0, 1.0)).value_or(water.fill);
  water.unit_weight_kN_m3 =
      table.number("unit_weight_kN_m3", above(0.0, "kN/m3")).value_or(water.unit_weight_kN_m3);
  return water;
}

Seismic seismic_of(const SiteTable& root) {
  const SiteTable table = root.table("seismic", {"horizontal", "vertical", "trend_deg"});
  Seismic seismic;
  seismic.horizontal = table.number("horizontal", at_least_value(0.0)).value_or(0.0);
  seismic.vertical = table.number("vertical", any_number()).value_or(0.0);
  if (const auto trend = table.angle("trend_deg", kAzimuth)) seismic.trend = wrap_360(*trend);
  return seismic;
}

SiteKinematics kinematics_of(const SiteTable& root) {
  const SiteTable table =
      root.table("kinematics", {"friction_deg", "strike_tolerance_deg", "toppling_tolerance_deg"});
  SiteKinematics kinematics;
  kinematics.friction = table.angle("friction_deg", kFriction);
  kinematics.strike_tolerance =
      table.angle("strike_tolerance_deg", kTolerance).value_or(kinematics.strike_tolerance);
  kinematics.toppling_tolerance =
      table.angle("toppling_tolerance_deg", kTolerance).value_or(kinematics.toppling_tolerance);
  return kinematics;
}

std::string bytes_of(const std::string& file) {
  const auto failure = [&file](const std::string& why) {
    return Error(ErrorKind::file, Place{file}, "cannot be read: " + why);
  };
  if (std::filesystem::is_directory(file)) throw failure("it is a folder; a site file is wanted");
  errno = 0;
  std::ifstream stream(file, std::ios::binary);
  if (!stream) throw failure(std::strerror(errno));
  std::string bytes(std::istreambuf_iterator<char>(stream), {});
  if (stream.bad()) throw failure(std::strerror(errno));
  return bytes;
}

}  // namespace

Site parse_site(std::string_view text, const std::string& file) {
  const TomlTable tree = parse_toml(text, file);
  const SiteTable root(tree, file, "", 0,
                       {"title", "readings", "traverse", "bias", "sets", "set", "face", "strength",
                        "rock", "water", "seismic", "kinematics", "target"});
  Site site;
  site.source = {file, sha256_hex(text)};
  site.title = root.text("title").value_or(std::filesystem::path(file).stem().string());
  site.readings = readings_of(root, file);
  site.bias = bias_of(root);
  site.sets = sets_of(root);
  site.faces = faces_of(root);
  site.strength = optional_strength(root.table("strength", {"friction_deg", "cohesion_kPa"}));
  site.unit_weight_kN_m3 =
      root.table("rock", {"unit_weight_kN_m3"}).number("unit_weight_kN_m3", above(0.0, "kN/m3"));
  site.water = water_of(root);
  site.seismic = seismic_of(root);
  site.kinematics = kinematics_of(root);
  site.target_factor_of_safety =
      root.table("target", {"factor_of_safety"}).number("factor_of_safety", above(0.0));
  return site;
}

Site read_site(const std::string& file) {
  return parse_site(bytes_of(file), file);
}

std::optional<Angle> kinematic_friction(const Site& site) {
  if (site.kinematics.friction) return site.kinematics.friction;
  if (site.strength) return site.strength->friction;
  return {};
}

std::optional<bool> meets_target(const Site& site, double factor_of_safety) {
  if (!site.target_factor_of_safety) return {};
  return factor_of_safety >= *site.target_factor_of_safety;
}

}  // namespace brink
