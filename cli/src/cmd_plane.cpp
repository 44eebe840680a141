#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/plot/section.hpp"
#include "brink/record/plane_document.hpp"
#include "brink/risk/plane_variation.hpp"
#include "commands.hpp"
#include "drawing_file.hpp"
#include "exit_status.hpp"
#include "mechanics_options.hpp"
#include "output_file.hpp"
#include "sensitivity_options.hpp"
#include "slide_text.hpp"

namespace brink::cli {

namespace {

struct PlaneOptions {
  PlaneSlideInput slide;
  StrengthOptions strength;
  SensitivityOptions sensitivity;
  std::string title;
  OutputOptions output;
};

void take_crack(std::string_view text, PlaneSlideInput& slide) {
  if (slide.crack != CrackChoice::none)
    throw Error(ErrorKind::argument, Place{.key = "--crack"},
                "is given together with --crack-setback", {}, "one of the two");
  if (text != "critical")
    throw Error(ErrorKind::argument, Place{.key = "--crack"}, "is not a choice of crack", text,
                "critical, or --crack-setback M");
  slide.crack = CrackChoice::critical;
}

void take_setback(std::string_view text, PlaneSlideInput& slide) {
  if (slide.crack == CrackChoice::critical)
    throw Error(ErrorKind::argument, Place{.key = "--crack-setback"},
                "is given together with --crack critical", {}, "one of the two");
  slide.crack = CrackChoice::at_setback;
  slide.crack_setback_m = parse_number("--crack-setback", text, any_number("m"));
}

void add_section_options(std::vector<Option>& options, PlaneSlideInput& s) {
  const std::string group = "Section";
  options.push_back(
      required(plane_option("--plane", "Plane on which the block slides.", s.plane, group)));
  options.push_back(one_face_option(s.face, group));
  options.push_back(with_default(plane_option("--upper", "Ground above the crest.", s.upper, group),
                                 "level, 0/0"));
  options.push_back(required(
      number_option("--height", "M", "Height from where the plane leaves the face to the crest.",
                    above(0.0, "m"), s.height_m, group)));
  Option setback;
  setback.name = "--crack-setback";
  setback.value = "M";
  setback.help =
      "Horizontal distance of a vertical tension crack behind the crest; negative: in front of it, "
      "on the face.";
  setback.group = group;
  setback.take = [&s](std::string_view text) { take_setback(text, s); };
  options.push_back(std::move(setback));
  Option crack;
  crack.name = "--crack";
  crack.value = "critical";
  crack.help = "Instead: puts the crack where the block is least safe.";
  crack.group = group;
  crack.take = [&s](std::string_view text) { take_crack(text, s); };
  options.push_back(std::move(crack));
  options.push_back(with_default(
      angle_option("--strike-tolerance",
                   "Greatest angle between the dip directions of plane and face without a warning.",
                   from_to(0.0, 180.0, "degrees"), s.strike_tolerance, group),
      shortest(s.strike_tolerance.deg())));
}

void add_water_options(std::vector<Option>& options, PlaneSlideInput& s) {
  const std::string group = "Water";
  options.push_back(with_default(
      number_option("--water-depth", "M",
                    "Depth of water in the crack, which also lifts the block from the crack to the "
                    "toe. Without a crack: height above the toe to which the plane is wet.",
                    at_least_value(0.0, "m"), s.water_depth_m, group),
      "0"));
  options.push_back(
      with_default(number_option("--water-unit-weight", "KN_M3", "Unit weight of water.",
                                 above(0.0, "kN/m3"), s.water_unit_weight_kN_m3, group),
                   "9.81"));
}

void add_force_options(std::vector<Option>& options, PlaneSlideInput& s) {
  const std::string group = "Loads and bolts, per metre of face";
  options.push_back(with_default(
      number_option("--surcharge", "KPA", "Vertical load on the upper ground, per horizontal area.",
                    at_least_value(0.0, "kPa"), s.surcharge_kPa, group),
      "0"));
  options.push_back(with_default(
      number_option("--seismic-horizontal", "K",
                    "Horizontal earthquake load out of the slope, share of the weight.",
                    any_number(), s.seismic_horizontal, group),
      "0"));
  options.push_back(
      with_default(number_option("--seismic-vertical", "K",
                                 "Vertical earthquake load, share of the weight, up positive.",
                                 any_number(), s.seismic_vertical, group),
                   "0"));
  const std::string form = "KN_M@TREND/PLUNGE";
  options.push_back(force_option("--load", form,
                                 "A force and the direction in which it pushes the block; a "
                                 "negative plunge points up.",
                                 s.loads, group));
  options.push_back(force_option("--bolt", form,
                                 "A bolt's force and the direction in which it pulls the block.",
                                 s.bolts, group));
  options.push_back(bolt_action_option(s.bolt_action, group));
  options.push_back(number_option(
      "--target", "FS",
      "Factor of safety to reach: adds the least bolt force that does, and its direction.",
      above(0.0), s.target, group));
}

const PlaneVariable& variable_of(const char* option, const std::string& name) {
  try {
    return plane_variable(name);
  } catch (const Error& error) {
    throw Error(ErrorKind::argument, Place{.key = option}, "names no input that can vary", name,
                error.accepted());
  }
}

SensitivityCurve curve_of(const PlaneSlideInput& input, const VaryRequest& request) {
  const PlaneVariable& variable = variable_of("--vary", request.name);
  for (const double end : {request.range.from, request.range.to}) {
    if (end >= variable.low && end <= variable.high) continue;
    throw Error(ErrorKind::argument, Place{.key = "--vary " + request.name}, "is out of range",
                shortest(end), from_to(variable.low, variable.high, variable.unit).text());
  }
  return sensitivity_curve(varied_plane(input, variable), request.range);
}

std::optional<BackAnalysis> back_analysis_of(const PlaneSlideInput& input, const PlaneOptions& o) {
  if (!o.sensitivity.solve) return std::nullopt;
  if (!input.target)
    throw Error(ErrorKind::argument, Place{.key = "--solve"}, "is given without --target", {},
                "--target FS with it");
  const PlaneVariable& v = variable_of("--solve", *o.sensitivity.solve);
  return BackAnalysis{v.name,
                      v.unit,
                      *input.target,
                      v.solve_low,
                      v.solve_high,
                      find_crossings(varied_plane(input, v).safety, *input.target, v.solve_low,
                                     v.solve_high, v.by_ratio)};
}

struct PlaneAnswer {
  PlaneSlideInput input;
  PlaneSlide slide;
  std::vector<SensitivityCurve> curves;
  std::optional<BackAnalysis> back_analysis;
};

PlaneAnswer answer(const PlaneOptions& o) {
  PlaneAnswer a;
  a.input = o.slide;
  a.input.strength = strength_of(o.strength);
  a.slide = analyse_plane_slide(a.input);
  for (std::string& warning : strength_warnings(o.strength))
    a.slide.warnings.push_back(std::move(warning));
  for (const VaryRequest& request : o.sensitivity.vary)
    a.curves.push_back(curve_of(a.input, request));
  a.back_analysis = back_analysis_of(a.input, o);
  return a;
}

std::string json(const PlaneAnswer& a) {
  Object result = plane_slide_value(a.slide);
  result.add("sensitivity", sensitivity_value(a.curves));
  result.add("solve", a.back_analysis ? back_analysis_value(*a.back_analysis) : Value());
  return to_json(
      result_document("plane", plane_slide_inputs(a.input), a.slide.warnings, std::move(result)));
}

std::string text(const PlaneAnswer& a) {
  std::string more = sensitivity_text(a.curves);
  if (a.back_analysis) more += back_analysis_text(*a.back_analysis);
  return plane_slide_text(a.input, a.slide, more);
}

void write_files(const PlaneAnswer& a, const PlaneOptions& o) {
  const std::string& path = o.output.output;
  if (path.empty()) return;
  if (known_ending("-o", path, {".svg", ".pdf", ".png", ".csv"}) == ".csv") {
    if (a.curves.empty())
      throw Error(ErrorKind::argument, Place{.key = "-o"}, "has no curves to write", path,
                  "--vary with it, or a drawing: .svg, .pdf or .png");
    write_file(path, sensitivity_csv(a.curves));
  } else {
    write_drawing(path, plot::plane_sheet(a.input, a.slide, o.title));
  }
}

int run(const PlaneOptions& o, Streams& streams) {
  const PlaneAnswer a = answer(o);
  write_files(a, o);
  print_warnings(a.slide.warnings, o.output, streams);
  streams.out << (o.output.json ? json(a) : text(a));
  return kDone;
}

}  // namespace

Command plane_command() {
  const auto state = std::make_shared<PlaneOptions>();
  Command command;
  command.name = "plane";
  command.summary = "Factor of safety of a planar slide, with tension crack and water.";
  command.description =
      "The block between a plane, the face, the upper ground and a vertical tension crack, per "
      "metre "
      "of face, in the section along the plane's dip direction (Hoek & Bray 1981). Face and ground "
      "enter with their apparent dips in that section. A block that does not form is a result: the "
      "program says why.";
  add_section_options(command.options, state->slide);
  command.options.push_back(required(
      number_option("--unit-weight", "KN_M3", "Unit weight of the rock.", above(0.0, "kN/m3"),
                    state->slide.unit_weight_kN_m3, "Rock and joint")));
  add_strength_options(command.options, state->strength, "Rock and joint");
  add_water_options(command.options, state->slide);
  add_force_options(command.options, state->slide);
  add_sensitivity_options(command.options, state->sensitivity,
                          "friction, cohesion, water-fill, water-depth, height, seismic, face-dip, "
                          "plane-dip, crack-setback, bolt-force, surcharge");
  add_drawing_options(command.options, state->title, state->output, true);
  add_output_options(command.options, state->output);
  command.examples = {
      {"brink plane --plane 35/150 --face 60/150 --height 12 --unit-weight 26 --friction 37 "
       "--cohesion 25 --crack-setback 4 --water-depth 3",
       "A crack behind the crest with three metres of water in it."},
      {"brink plane --plane 35/150 --face 60/150 --height 12 --unit-weight 26 --friction 37 "
       "--crack critical --seismic-horizontal 0.1 --target 1.5",
       "The worst crack, shaking, and the bolts to hold it."},
      {"brink plane --plane 35/150 --face 60/150 --height 12 --unit-weight 26 "
       "--residual-friction 28 --jrc 8 --jcs 60000 --joint-length 15",
       "Barton-Bandis strength, scaled to the length of the plane."},
      {"brink plane --plane 35/150 --face 60/150 --height 12 --unit-weight 26 --friction 37 "
       "--cohesion 10 --crack-setback 4 --water-depth 2 --vary friction=30..40:5 "
       "--vary water-fill=0..1:5 --target 1.3 --solve height",
       "What friction and water do, and the height that keeps a factor of safety of 1.3."}};
  command.run = [state](const std::vector<std::string>&, Streams& streams) {
    return run(*state, streams);
  };
  return command;
}

}  // namespace brink::cli
