#include "wedge_options.hpp"

#include <fmt/format.h>

#include <string>

#include "brink/base/error.hpp"
#include "brink/risk/wedge_variation.hpp"

namespace brink::cli {

namespace {

Error option_error(std::string option, std::string_view what, std::string_view accepted) {
  return Error(ErrorKind::argument, Place{.key = std::move(option)}, what, {}, accepted);
}

const auto kFriction = Interval{0.0, 90.0, false, true, "degrees"};
const auto kPressure = at_least_value(0.0, "kPa");

void add_geometry_options(std::vector<Option>& options, WedgeOptions& o) {
  const std::string group = "Geometry";
  WedgeGeometry& g = o.wedge.geometry;
  options.push_back(required(plane_option("--plane1", "Plane 1 of the wedge.", g.plane1, group)));
  options.push_back(required(plane_option("--plane2", "Plane 2 of the wedge.", g.plane2, group)));
  options.push_back(required(face_option(
      "--face",
      "Cut face: dip above 0 and below 180 degrees (past 90 it overhangs) and dip direction.",
      g.face, group)));
  options.push_back(with_default(plane_option("--upper", "Ground above the crest.", g.upper, group),
                                 "level, 0/0"));
  Option crack;
  crack.name = "--crack";
  crack.value = "DIP/DIR";
  crack.help = "Tension crack that cuts off the back of the wedge; with --crack-distance.";
  crack.group = group;
  crack.take = [&o](std::string_view text) { o.crack = parse_plane("--crack", text); };
  options.push_back(std::move(crack));
  options.push_back(number_option(
      "--crack-distance", "M",
      "How far the crack lies behind the crest, along plane 1's trace on the upper ground.",
      at_least_value(0.0, "m"), o.crack_distance, group));
}

void add_size_options(std::vector<Option>& options, WedgeOptions& o) {
  const std::string group = "Size";
  options.push_back(number_option(
      "--height", "M",
      "Vertical rise from where the line of intersection leaves the face to the crest, up the "
      "face's own dip line.",
      above(0.0, "m"), o.height, group));
  options.push_back(number_option("--height-on-plane1", "M",
                                  "Instead: the vertical rise along plane 1's trace on the face.",
                                  above(0.0, "m"), o.height_on_plane1, group));
  options.push_back(number_option("--volume", "M3",
                                  "Instead: the volume of the whole wedge, before a crack cuts it.",
                                  above(0.0, "m3"), o.volume, group));
  options.push_back(number_option("--trace-length1", "M",
                                  "Instead: the length of plane 1's trace on the face.",
                                  above(0.0, "m"), o.trace_length1, group));
  options.push_back(number_option("--trace-length2", "M",
                                  "Instead: the length of plane 2's trace on the face.",
                                  above(0.0, "m"), o.trace_length2, group));
  options.push_back(number_option(
      "--persistence1", "M",
      "How far plane 1 reaches: no side of the wedge's triangle on it is longer. Alone, or with "
      "--persistence2, it sizes the largest such wedge; with another size it is a limit.",
      above(0.0, "m"), o.wedge.geometry.persistence1_m, group));
  options.push_back(number_option("--persistence2", "M", "The same for plane 2.", above(0.0, "m"),
                                  o.wedge.geometry.persistence2_m, group));
}

void add_strength_options(std::vector<Option>& options, WedgeOptions& o) {
  const std::string group = "Rock and joints";
  options.push_back(required(number_option("--unit-weight", "KN_M3", "Unit weight of the rock.",
                                           above(0.0, "kN/m3"), o.wedge.unit_weight_kN_m3, group)));
  options.push_back(uncertain_option("--friction", "DEG",
                                     "Friction angle of both planes, 0 to below 90 degrees.",
                                     kFriction, o.friction, group));
  options.push_back(with_default(uncertain_option("--cohesion", "KPA", "Cohesion of both planes.",
                                                  kPressure, o.cohesion, group),
                                 "0"));
  options.push_back(uncertain_option("--friction1", "DEG", "Friction angle of plane 1 alone.",
                                     kFriction, o.friction1, group));
  options.push_back(uncertain_option("--friction2", "DEG", "Friction angle of plane 2 alone.",
                                     kFriction, o.friction2, group));
  options.push_back(uncertain_option("--cohesion1", "KPA", "Cohesion of plane 1 alone.", kPressure,
                                     o.cohesion1, group));
  options.push_back(uncertain_option("--cohesion2", "KPA", "Cohesion of plane 2 alone.", kPressure,
                                     o.cohesion2, group));
}

void add_water_options(std::vector<Option>& options, WedgeOptions& o) {
  const std::string group = "Water";
  options.push_back(with_default(
      uncertain_option(
          "--water-fill", "F",
          "How full of water the planes and the crack are, 0 (dry) to 1 (full). Full is a "
          "mean pressure of unit weight x height / 6, or with a crack x its depth / 3.",
          from_to(0.0, 1.0), o.water_fill, group),
      "0"));
  options.push_back(number_option("--water-pressure1", "KPA",
                                  "Instead: the mean water pressure over plane 1.", kPressure,
                                  o.water_pressure1, group));
  options.push_back(number_option("--water-pressure2", "KPA", "The same over plane 2.", kPressure,
                                  o.water_pressure2, group));
  options.push_back(number_option("--water-pressure-crack", "KPA", "The same over the crack.",
                                  kPressure, o.water_pressure_crack, group));
  options.push_back(
      with_default(number_option("--water-unit-weight", "KN_M3", "Unit weight of water.",
                                 above(0.0, "kN/m3"), o.wedge.water_unit_weight_kN_m3, group),
                   "9.81"));
}

Option force_option(std::string name, std::string help, std::vector<DirectedForce>& target,
                    std::string group) {
  Option option;
  option.name = name;
  option.value = "KN@TREND/PLUNGE";
  option.help = std::move(help);
  option.group = std::move(group);
  option.repeatable = true;
  option.take = [name, &target](std::string_view text) {
    const ForceAlong force = parse_force(name, text, "KN@TREND/PLUNGE");
    target.push_back({force.magnitude, force.direction});
  };
  return option;
}

BoltAction parse_action(std::string_view text) {
  if (text == "active") return BoltAction::active;
  if (text == "passive") return BoltAction::passive;
  throw Error(ErrorKind::argument, Place{.key = "--bolt-action"}, "is not a bolt action", text,
              "active or passive");
}

// MIN..MAX in degrees.
std::pair<Angle, Angle> parse_plunges(std::string_view text) {
  const std::string option = "--bolt-plunge";
  const std::size_t dots = text.find("..");
  if (dots == std::string_view::npos) {
    throw Error(ErrorKind::argument, Place{.key = option}, "is not a range", text,
                "MIN..MAX in degrees, as in -10..30");
  }
  const auto range = from_to(-90.0, 90.0, "degrees");
  const std::pair plunges(parse_angle(option, text.substr(0, dots), range),
                          parse_angle(option, text.substr(dots + 2), range));
  if (plunges.first > plunges.second) {
    throw Error(ErrorKind::argument, Place{.key = option}, "runs from the greater to the lesser",
                text, "MIN..MAX, as in -10..30");
  }
  return plunges;
}

void add_target_options(std::vector<Option>& options, WedgeOptions& o) {
  const std::string group = "Target";
  options.push_back(number_option(
      "--target", "FS",
      "Factor of safety to reach: adds the least force of one more bolt that reaches it, and its "
      "direction, over every direction that points into the face.",
      above(0.0), o.target, group));
  Option plunge;
  plunge.name = "--bolt-plunge";
  plunge.value = "MIN..MAX";
  plunge.help = "Plunges in which that bolt can be installed, degrees; negative ones point up.";
  plunge.default_text = "-90..90";
  plunge.group = group;
  plunge.take = [&o](std::string_view text) { o.bolt_plunge = parse_plunges(text); };
  options.push_back(std::move(plunge));
  Option direction;
  direction.name = "--bolt-direction";
  direction.value = "TREND/PLUNGE";
  direction.help = "Also gives the least force in this direction.";
  direction.group = group;
  direction.take = [&o](std::string_view text) {
    o.bolt_direction = parse_line("--bolt-direction", text);
  };
  options.push_back(std::move(direction));
}

void add_load_options(std::vector<Option>& options, WedgeOptions& o) {
  const std::string group = "Loads and bolts";
  Seismic& seismic = o.wedge.seismic;
  options.push_back(with_default(
      number_option("--surcharge", "KPA", "Vertical load on the upper ground, per horizontal area.",
                    kPressure, o.wedge.surcharge_kPa, group),
      "0"));
  options.push_back(
      with_default(uncertain_option("--seismic-horizontal", "K",
                                    "Horizontal earthquake load, share of the weight.",
                                    at_least_value(0.0), o.seismic_horizontal, group),
                   "0"));
  Option trend;
  trend.name = "--seismic-trend";
  trend.value = "DEG";
  trend.help = "Direction in which the earthquake pushes the block.";
  trend.default_text = "the line of intersection's";
  trend.group = group;
  trend.take = [&seismic](std::string_view text) {
    seismic.trend = wrap_360(parse_angle("--seismic-trend", text, from_to(0.0, 360.0, "degrees")));
  };
  options.push_back(std::move(trend));
  options.push_back(
      with_default(number_option("--seismic-vertical", "K",
                                 "Vertical earthquake load, share of the weight, up positive.",
                                 any_number(), seismic.vertical, group),
                   "0"));
  options.push_back(force_option("--load",
                                 "A force and the direction in which it pushes the block; a "
                                 "negative plunge points up.",
                                 o.wedge.loads, group));
  options.push_back(force_option("--bolt",
                                 "A bolt's force and the direction in which it pulls the block.",
                                 o.wedge.bolts, group));
  Option action;
  action.name = "--bolt-action";
  action.value = "active|passive";
  action.help =
      "Active bolts are tensioned and act on the block; passive ones add to the resistance as the "
      "block moves.";
  action.default_text = "active";
  action.group = group;
  action.take = [&o](std::string_view text) { o.wedge.bolt_action = parse_action(text); };
  options.push_back(std::move(action));
}

WedgeSize size_of(const WedgeOptions& o) {
  struct Given {
    const char* option;
    WedgeMeasure measure;
    const std::optional<double>& value;
  };
  const Given sizes[] = {{"--height", WedgeMeasure::height, o.height},
                         {"--height-on-plane1", WedgeMeasure::height_on_plane1, o.height_on_plane1},
                         {"--volume", WedgeMeasure::volume, o.volume},
                         {"--trace-length1", WedgeMeasure::trace_length1, o.trace_length1},
                         {"--trace-length2", WedgeMeasure::trace_length2, o.trace_length2}};
  const Given* chosen = nullptr;
  for (const Given& size : sizes) {
    if (!size.value) continue;
    if (chosen != nullptr) {
      throw option_error(size.option, fmt::format("is given together with {}", chosen->option),
                         "one size");
    }
    chosen = &size;
  }
  if (chosen != nullptr) return {chosen->measure, *chosen->value};
  const WedgeGeometry& g = o.wedge.geometry;
  if (g.persistence1_m || g.persistence2_m) return {WedgeMeasure::persistence, 0.0};
  throw option_error("--height", "is missing",
                     "--height M, --height-on-plane1 M, --volume M3, --trace-length1 M, "
                     "--trace-length2 M or a persistence");
}

// Value of one plane: its own option, or the one for both.
Distribution for_plane(const std::optional<Distribution>& own,
                       const std::optional<Distribution>& both, const std::string& own_name,
                       const std::string& both_name, const std::optional<double>& otherwise) {
  if (own && both) {
    throw option_error(own_name, "is given together with " + both_name, "one of the two");
  }
  if (own) return *own;
  if (both) return *both;
  if (otherwise) return fixed_value(*otherwise);
  throw option_error(own_name, "is missing", both_name + " for both planes or one for each");
}

Distribution cohesion_of(const WedgeOptions& o, bool first) {
  return for_plane(first ? o.cohesion1 : o.cohesion2, o.cohesion,
                   first ? "--cohesion1" : "--cohesion2", "--cohesion", 0.0);
}

Distribution friction_of(const WedgeOptions& o, bool first) {
  return for_plane(first ? o.friction1 : o.friction2, o.friction,
                   first ? "--friction1" : "--friction2", "--friction", std::nullopt);
}

double median(const Distribution& distribution) {
  return quantile(distribution, 0.5);
}

MohrCoulomb strength_of(const WedgeOptions& o, bool first) {
  return {median(cohesion_of(o, first)), Angle::degrees(median(friction_of(o, first)))};
}

bool varies(const std::optional<Distribution>& distribution) {
  return distribution && distribution->shape != DistributionShape::fixed;
}

// What only a simulation can use.
void refuse_without_draws(const WedgeOptions& o) {
  if (o.simulation.draws) return;
  const std::pair<const std::optional<Distribution>&, const char*> inputs[] = {
      {o.friction, "--friction"},     {o.friction1, "--friction1"},
      {o.friction2, "--friction2"},   {o.cohesion, "--cohesion"},
      {o.cohesion1, "--cohesion1"},   {o.cohesion2, "--cohesion2"},
      {o.water_fill, "--water-fill"}, {o.seismic_horizontal, "--seismic-horizontal"}};
  for (const auto& [input, name] : inputs) {
    if (varies(input)) throw option_error(name, "is a distribution", "a number, or --draws N");
  }
  if (const auto lone = needs_draws(o.simulation)) {
    throw option_error(*lone, "is given without --draws", "--draws N with it");
  }
}

WedgeWater water_of(const WedgeOptions& o) {
  if (!o.water_pressure1 && !o.water_pressure2 && !o.water_pressure_crack) {
    return WaterFill{o.water_fill ? median(*o.water_fill) : 0.0};
  }
  if (o.water_fill) {
    throw option_error("--water-fill", "is given together with stated water pressures",
                       "one of the two");
  }
  return WaterPressures{o.water_pressure1.value_or(0.0), o.water_pressure2.value_or(0.0),
                        o.water_pressure_crack.value_or(0.0)};
}

std::optional<TensionCrack> crack_of(const WedgeOptions& o) {
  if (o.crack && !o.crack_distance) {
    throw option_error("--crack", "is given without --crack-distance", "both or neither");
  }
  if (o.crack_distance && !o.crack) {
    throw option_error("--crack-distance", "is given without --crack", "both or neither");
  }
  if (!o.crack) return std::nullopt;
  return TensionCrack{*o.crack, *o.crack_distance};
}

std::string variable_names() {
  std::string names;
  for (const WedgeVariable& variable : wedge_variables()) {
    names += (names.empty() ? "" : ", ") + variable.name;
  }
  return names;
}

}  // namespace

void add_wedge_options(std::vector<Option>& options, WedgeOptions& target) {
  add_geometry_options(options, target);
  add_size_options(options, target);
  add_strength_options(options, target);
  add_water_options(options, target);
  add_load_options(options, target);
  add_target_options(options, target);
  add_sensitivity_options(options, target.sensitivity, variable_names());
  add_simulation_options(options, target.simulation);
}

WedgeCase wedge_case(const WedgeOptions& o) {
  refuse_without_draws(o);
  WedgeCase w = o.wedge;
  w.geometry.size = size_of(o);
  w.geometry.crack = crack_of(o);
  w.strength1 = strength_of(o, true);
  w.strength2 = strength_of(o, false);
  w.water = water_of(o);
  w.seismic.horizontal = o.seismic_horizontal ? median(*o.seismic_horizontal) : 0.0;
  if (w.seismic.trend && !o.seismic_horizontal) {
    throw option_error("--seismic-trend", "is given without --seismic-horizontal",
                       "both or neither");
  }
  return w;
}

WedgeSimulation uncertain_wedge(const WedgeOptions& o) {
  const auto if_it_varies = [](const Distribution& d) {
    return varies(d) ? std::optional(d) : std::nullopt;
  };
  WedgeSimulation s;
  s.wedge = wedge_case(o);
  s.friction1 = if_it_varies(friction_of(o, true));
  s.friction2 = if_it_varies(friction_of(o, false));
  s.cohesion1 = if_it_varies(cohesion_of(o, true));
  s.cohesion2 = if_it_varies(cohesion_of(o, false));
  if (varies(o.water_fill)) s.water_fill = o.water_fill;
  if (varies(o.seismic_horizontal)) s.seismic = o.seismic_horizontal;
  s.target = o.target;
  return s;
}

std::optional<WedgeTarget> wedge_target(const WedgeOptions& o) {
  if (!o.target) {
    const char* lone = o.bolt_plunge ? "--bolt-plunge" : o.bolt_direction ? "--bolt-direction" : "";
    if (*lone != 0) throw option_error(lone, "is given without --target", "--target FS with it");
    return std::nullopt;
  }
  WedgeTarget target{*o.target};
  if (o.bolt_plunge) {
    target.least_plunge = o.bolt_plunge->first;
    target.greatest_plunge = o.bolt_plunge->second;
  }
  target.direction = o.bolt_direction;
  return target;
}

}  // namespace brink::cli
