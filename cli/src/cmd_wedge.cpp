#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/record/simulation_document.hpp"
#include "brink/record/wedge_document.hpp"
#include "brink/risk/wedge_variation.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "output_file.hpp"
#include "wedge_options.hpp"
#include "wedge_text.hpp"

namespace brink::cli {

namespace {

// A name that cannot vary, or a range beyond what it may be, is a wrong command line.
const WedgeVariable& variable_of(const char* option, const std::string& name) {
  try {
    return wedge_variable(name);
  } catch (const Error& error) {
    throw Error(ErrorKind::argument, Place{.key = option}, "names no input that can vary", name,
                error.accepted());
  }
}

SensitivityCurve curve_of(const WedgeCase& wedge, const VaryRequest& request) {
  const WedgeVariable& variable = variable_of("--vary", request.name);
  for (const double end : {request.range.from, request.range.to}) {
    if (end >= variable.low && end <= variable.high) continue;
    throw Error(ErrorKind::argument, Place{.key = "--vary " + request.name}, "is out of range",
                shortest(end), from_to(variable.low, variable.high, variable.unit).text());
  }
  return sensitivity_curve(varied_wedge(wedge, variable), request.range);
}

std::vector<SensitivityCurve> curves_of(const WedgeCase& wedge, const WedgeOptions& o) {
  std::vector<SensitivityCurve> curves;
  for (const VaryRequest& request : o.sensitivity.vary) {
    curves.push_back(curve_of(wedge, request));
  }
  return curves;
}

std::optional<BackAnalysis> back_analysis_of(const WedgeCase& wedge, const WedgeOptions& o) {
  if (!o.sensitivity.solve) return std::nullopt;
  if (!o.target) {
    throw Error(ErrorKind::argument, Place{.key = "--solve"}, "is given without --target", {},
                "--target FS with it");
  }
  const WedgeVariable& v = variable_of("--solve", *o.sensitivity.solve);
  return BackAnalysis{v.name,
                      v.unit,
                      *o.target,
                      v.solve_low,
                      v.solve_high,
                      find_crossings(varied_wedge(wedge, v).safety, *o.target, v.solve_low,
                                     v.solve_high, v.by_ratio)};
}

struct WedgeAnswer {
  WedgeCase wedge;
  std::optional<WedgeTarget> target;
  WedgeResult result;
  std::optional<WedgeSupport> support;
  std::vector<SensitivityCurve> curves;
  std::optional<BackAnalysis> back_analysis;
  std::optional<WedgeSimulation> simulation;
  std::optional<SimulationResult> simulated;
  std::vector<std::string> warnings;
};

WedgeAnswer answer(const WedgeOptions& o, Streams& streams) {
  WedgeAnswer a;
  a.wedge = wedge_case(o);
  a.target = wedge_target(o);
  a.result = analyse_wedge(a.wedge);
  if (a.target && a.result.forms) a.support = support_wedge(a.wedge, a.result, *a.target);
  a.curves = curves_of(a.wedge, o);
  a.back_analysis = back_analysis_of(a.wedge, o);
  a.warnings = a.result.warnings;
  if (o.simulation.draws) {
    a.simulation = simulation_of(uncertain_wedge(o), o.simulation, o.output, streams);
    a.simulated = simulate_wedge(*a.simulation);
    a.warnings.insert(a.warnings.end(), a.simulated->warnings.begin(), a.simulated->warnings.end());
  }
  return a;
}

std::string json(const WedgeAnswer& a) {
  Object inputs = wedge_inputs(a.wedge, a.result, a.target);
  inputs.add("simulation", a.simulation ? simulation_inputs(*a.simulation) : Value());
  Object result = wedge_value(a.result, a.support);
  result.add("sensitivity", sensitivity_value(a.curves));
  result.add("solve", a.back_analysis ? back_analysis_value(*a.back_analysis) : Value());
  result.add("simulation", a.simulated
                               ? simulation_value(*a.simulated, a.simulation->target.has_value())
                               : Value());
  return to_json(result_document("wedge", std::move(inputs), a.warnings, std::move(result)));
}

std::string text(const WedgeAnswer& a) {
  std::string more = sensitivity_text(a.curves);
  if (a.back_analysis) more += back_analysis_text(*a.back_analysis);
  if (a.simulated) more += simulation_text(*a.simulation, *a.simulated);
  return wedge_text(a.wedge, a.result, a.support, more);
}

void check_output(const WedgeOptions& o) {
  if (o.output.output.empty()) return;
  known_ending("--output", o.output.output, {".csv"});
  if (o.sensitivity.vary.empty() != o.simulation.draws.has_value()) {
    throw Error(ErrorKind::argument, Place{.key = "--output"},
                "writes the curves of --vary or the histogram of --draws", {}, "one of the two");
  }
}

int run(const WedgeOptions& o, Streams& streams) {
  check_output(o);
  const WedgeAnswer a = answer(o, streams);
  print_warnings(a.warnings, o.output, streams);
  if (!o.output.output.empty()) {
    write_file(o.output.output,
               a.simulated ? histogram_csv(*a.simulated) : sensitivity_csv(a.curves),
               o.simulation.readings);
  }
  streams.out << (o.output.json ? json(a) : text(a));
  return kDone;
}

}  // namespace

Command wedge_command() {
  const auto state = std::make_shared<WedgeOptions>();
  Command command;
  command.name = "wedge";
  command.summary = "Factor of safety of one wedge.";
  command.description =
      "The block that two planes, the face and the upper ground cut out, as one rigid body in "
      "equilibrium: it slides on both planes, on one, or lifts, whichever the forces ask for. A "
      "wedge that does not form is a result: the program says why.";
  add_wedge_options(command.options, *state);
  command.options.push_back(output_option(
      "OUT.csv", "Writes the curves of --vary, or the histogram of --draws, as a table.",
      state->output));
  add_output_options(command.options, state->output);
  command.examples = {
      {"brink wedge --plane1 45/105 --plane2 70/235 --face 65/185 --height 30 --unit-weight 26 "
       "--friction 30 --cohesion 20",
       "A dry wedge of two joints."},
      {"brink wedge --plane1 45/105 --plane2 70/235 --face 65/185 --upper 12/195 --height 30 "
       "--unit-weight 26 --friction1 20 --friction2 30 --cohesion 25 --crack 70/165 "
       "--crack-distance 12 --water-fill 1",
       "With a tension crack full of water."},
      {"brink wedge --plane1 45/105 --plane2 70/235 --face 65/185 --height 30 --unit-weight 26 "
       "--friction 25 --cohesion 20 --target 1.5 --bolt-plunge -10..20 --vary friction=20..35 "
       "--vary water-fill=0..1 --solve height",
       "The least bolt for a target, what friction and water do, and the height that reaches the "
       "target."},
      {"brink wedge --plane1 45/105 --plane2 70/235 --face 65/185 --height 30 --unit-weight 26 "
       "--friction 'normal(30,3)' --cohesion 'uniform(0,40)' --fisher-k1 80 --fisher-k2 60 "
       "--water-fill 'uniform(0,1)' --draws 10000",
       "How likely the wedge forms and fails."}};
  command.run = [state](const std::vector<std::string>&, Streams& streams) {
    return run(*state, streams);
  };
  return command;
}

}  // namespace brink::cli
