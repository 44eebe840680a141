#include "brink/design/centreline.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cctype>
#include <cmath>
#include <nlohmann/json.hpp>
#include <optional>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/readings/csv.hpp"

namespace brink {

namespace {

// Below this extent a line whose values all fit longitude and latitude is taken for one.
constexpr double kShortest_m = 20.0;
// Chainage and distance between points may differ by this part before a warning.
constexpr double kChainageSlack = 0.05;

constexpr const char* kProject =
    "easting and northing in metres: project the coordinates first, to the UTM zone of the site "
    "for "
    "one";

[[noreturn]] void refuse(const std::string& file, std::size_t line, std::string_view what,
                         std::string_view value, std::string_view accepted) {
  throw Error(ErrorKind::input, Place{.file = file, .line = line}, what, value, accepted);
}

std::string lower(std::string_view text) {
  std::string out;
  for (const char c : text) {
    if (c != ' ' && c != '_') out += static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
  }
  return out;
}

// A heading without its unit: "Easting (m)" and "easting_m" are "easting".
std::string plain_heading(std::string_view heading) {
  std::string_view name = trimmed(heading.substr(0, heading.find_first_of("([,")));
  for (const std::string_view unit : {"_m", " m"}) {
    if (name.ends_with(unit)) name.remove_suffix(unit.size());
  }
  return lower(name);
}

struct Columns {
  std::optional<std::size_t> chainage, easting, northing;
};

Columns find_columns(const Row& headings, const std::string& file) {
  constexpr std::array chainages = {"chainage", "station", "ch", "stationing", "distance"};
  constexpr std::array eastings = {"easting", "east", "e", "x"};
  constexpr std::array northings = {"northing", "north", "n", "y"};
  constexpr std::array geographic = {"longitude", "lon", "long", "lng", "latitude", "lat"};
  Columns columns;
  for (std::size_t i = 0; i < headings.cells.size(); ++i) {
    const std::string name = plain_heading(headings.cells[i]);
    const auto is = [&](const auto& names) {
      return std::ranges::find(names, name) != names.end();
    };
    if (is(geographic)) {
      refuse(file, headings.line, "coordinates are geographic", headings.cells[i], kProject);
    }
    if (is(chainages) && !columns.chainage) columns.chainage = i;
    if (is(eastings) && !columns.easting) columns.easting = i;
    if (is(northings) && !columns.northing) columns.northing = i;
  }
  if (!columns.easting || !columns.northing) {
    refuse(file, headings.line, "there is no column of easting and northing", headings.text,
           "headings easting and northing (or x and y), and chainage where there is one");
  }
  return columns;
}

double number_at(const Row& row, std::size_t column, const std::string& file, const char* what) {
  const std::optional<double> value = parse_decimal(trimmed(row.cell(column)));
  if (!value) {
    throw Error(ErrorKind::input,
                Place{.file = file, .line = row.line, .column = column + 1, .key = what},
                "is not a number", row.cell(column), "a number of metres");
  }
  return *value;
}

struct Raw {
  std::vector<CentrelinePoint> points;
  bool has_chainage = false;
};

Raw read_csv(std::string_view text, const std::string& file, std::vector<std::string>& warnings) {
  CsvReader reader(text, file);
  const Columns columns = find_columns(reader.headings(), file);
  Raw raw;
  raw.has_chainage = columns.chainage.has_value();
  Row row;
  while (reader.next(row)) {
    if (!row.problem.empty()) refuse(file, row.line, row.problem, row.text, "one point a line");
    CentrelinePoint point;
    point.line = row.line;
    point.easting_m = number_at(row, *columns.easting, file, "easting");
    point.northing_m = number_at(row, *columns.northing, file, "northing");
    if (columns.chainage) point.chainage_m = number_at(row, *columns.chainage, file, "chainage");
    raw.points.push_back(point);
  }
  warnings = reader.warnings();
  return raw;
}

using Json = nlohmann::json;

// Names of coordinate reference systems in degrees (the "crs" member of the 2008 format).
void check_reference_system(const Json& root, const std::string& file) {
  const auto crs = root.find("crs");
  if (crs == root.end() || !crs->is_object()) return;
  const std::string name = crs->value(Json::json_pointer("/properties/name"), std::string());
  for (const std::string_view geographic : {"CRS84", "EPSG::4326", "EPSG:4326", "EPSG::4258"}) {
    if (name.find(geographic) != std::string::npos) {
      refuse(file, 0, "the coordinate reference system is geographic", name, kProject);
    }
  }
}

void collect_lines(const Json& node, std::vector<const Json*>& lines, int depth = 0) {
  if (!node.is_object() || depth > 8) return;
  const std::string type = node.value("type", std::string());
  if (type == "LineString") {
    lines.push_back(&node);
  } else if (type == "Feature" && node.contains("geometry")) {
    collect_lines(node["geometry"], lines, depth + 1);
  } else if (type == "FeatureCollection" || type == "GeometryCollection") {
    const char* members = type == "FeatureCollection" ? "features" : "geometries";
    if (!node.contains(members) || !node[members].is_array()) return;
    for (const Json& member : node[members]) collect_lines(member, lines, depth + 1);
  }
}

Raw read_geojson(std::string_view text, const std::string& file) {
  const Json root = Json::parse(text, nullptr, false);
  if (root.is_discarded())
    refuse(file, 0, "is not valid JSON", {}, "GeoJSON with a LineString, or CSV");
  check_reference_system(root, file);
  std::vector<const Json*> lines;
  collect_lines(root, lines);
  if (lines.size() != 1) {
    refuse(file, 0,
           fmt::format("holds {} lines", lines.empty() ? "no" : std::to_string(lines.size())), {},
           "one LineString");
  }
  Raw raw;
  const auto coordinates = lines.front()->find("coordinates");
  if (coordinates == lines.front()->end() || !coordinates->is_array()) {
    refuse(file, 0, "the LineString has no coordinates", {},
           "[[easting, northing], ...] in metres");
  }
  for (const Json& position : *coordinates) {
    if (!position.is_array() || position.size() < 2 || !position[0].is_number() ||
        !position[1].is_number()) {
      refuse(file, 0, fmt::format("position {} is not a pair of numbers", raw.points.size() + 1),
             position.dump(), "[easting, northing] in metres");
    }
    raw.points.push_back({0.0, position[0].get<double>(), position[1].get<double>(), 0});
  }
  return raw;
}

double apart(const CentrelinePoint& a, const CentrelinePoint& b) {
  return std::hypot(b.easting_m - a.easting_m, b.northing_m - a.northing_m);
}

void refuse_geographic(const std::vector<CentrelinePoint>& points, const std::string& file) {
  double length = 0.0;
  for (std::size_t i = 0; i < points.size(); ++i) {
    const CentrelinePoint& p = points[i];
    if (std::abs(p.easting_m) > 180.0 || std::abs(p.northing_m) > 90.0) return;
    if (i > 0) length += apart(points[i - 1], p);
  }
  if (points.size() < 2 || length >= kShortest_m || length == 0.0) return;
  refuse(file, points.front().line, "coordinates look geographic (longitude and latitude)",
         fmt::format("{}, {}", shortest(points.front().easting_m),
                     shortest(points.front().northing_m)),
         kProject);
}

std::string name_of(const CentrelinePoint& point, std::size_t number) {
  return point.line > 0 ? fmt::format("line {}", point.line) : fmt::format("point {}", number);
}

// Drops points that repeat the one before; their chainage, where given, must not move on.
std::vector<CentrelinePoint> without_repeats(const Raw& raw, const std::string& file,
                                             std::vector<std::string>& warnings) {
  std::vector<CentrelinePoint> points;
  for (std::size_t i = 0; i < raw.points.size(); ++i) {
    const CentrelinePoint& point = raw.points[i];
    if (!points.empty() && apart(points.back(), point) == 0.0) {
      warnings.push_back(fmt::format("{}: {} repeats the point before it and is left out", file,
                                     name_of(point, i + 1)));
      continue;
    }
    points.push_back(point);
  }
  return points;
}

void settle_chainage(std::vector<CentrelinePoint>& points, bool given, const std::string& file,
                     std::vector<std::string>& warnings) {
  std::size_t off = 0;
  std::size_t worst = 0;
  double most = 0.0;
  for (std::size_t i = 1; i < points.size(); ++i) {
    const double distance = apart(points[i - 1], points[i]);
    if (!given) {
      points[i].chainage_m = points[i - 1].chainage_m + distance;
      continue;
    }
    const double step = points[i].chainage_m - points[i - 1].chainage_m;
    if (step <= 0.0) {
      refuse(file, points[i].line, "chainage does not grow along the line",
             shortest(points[i].chainage_m),
             fmt::format("more than {}", shortest(points[i - 1].chainage_m)));
    }
    const double difference = std::abs(step - distance) / distance;
    if (difference <= kChainageSlack) continue;
    ++off;
    if (difference > most) most = difference, worst = i;
  }
  if (off == 0) return;
  warnings.push_back(
      fmt::format("{}: chainage and distance differ by more than 5 % on {} of {} legs, most up to "
                  "line {}: {} m of "
                  "chainage, {:.1f} m between the points; check the units",
                  file, off, points.size() - 1, points[worst].line,
                  shortest(points[worst].chainage_m - points[worst - 1].chainage_m),
                  apart(points[worst - 1], points[worst])));
}

}  // namespace

Centreline parse_centreline(std::string_view bytes, const std::string& file) {
  const Text text(bytes, file);
  Centreline line;
  const std::string_view content = trimmed(text.view());
  const std::size_t first = content.find_first_not_of("\r\n\t ");
  const bool json = first != std::string_view::npos && content[first] == '{';
  const Raw raw =
      json ? read_geojson(text.view(), file) : read_csv(text.view(), file, line.warnings);
  line.warnings.insert(line.warnings.begin(), text.warnings().begin(), text.warnings().end());
  for (const CentrelinePoint& point : raw.points) {
    if (!std::isfinite(point.easting_m) || !std::isfinite(point.northing_m)) {
      refuse(file, point.line, "a coordinate is not finite", {}, "a number of metres");
    }
  }
  refuse_geographic(raw.points, file);
  line.points = without_repeats(raw, file, line.warnings);
  if (line.points.size() < 2) {
    refuse(file, 0,
           line.points.empty() ? "has no points" : "has one point only, which has no direction", {},
           "two different points or more");
  }
  settle_chainage(line.points, raw.has_chainage, file, line.warnings);
  line.closed = apart(line.points.front(), line.points.back()) == 0.0;
  return line;
}

}  // namespace brink
