#include <memory>
#include <ostream>

#include "brink/record/wedge_document.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "wedge_options.hpp"
#include "wedge_text.hpp"

namespace brink::cli {

namespace {

int run(const WedgeOptions& o, Streams& streams) {
  const WedgeCase wedge = wedge_case(o);
  const std::optional<WedgeTarget> target = wedge_target(o);
  const WedgeResult result = analyse_wedge(wedge);
  std::optional<WedgeSupport> support;
  if (target && result.forms) support = support_wedge(wedge, result, *target);
  print_warnings(result.warnings, o.output, streams);
  if (o.output.json) {
    streams.out << to_json(result_document("wedge", wedge_inputs(wedge, result, target),
                                           result.warnings, wedge_value(result, support)));
  } else {
    streams.out << wedge_text(wedge, result, support);
  }
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
  add_output_options(command.options, state->output);
  command.examples = {
      {"brink wedge --plane1 45/105 --plane2 70/235 --face 65/185 --height 30 --unit-weight 26 "
       "--friction 30 --cohesion 20",
       "A dry wedge of two joints."},
      {"brink wedge --plane1 45/105 --plane2 70/235 --face 65/185 --upper 12/195 --height 30 "
       "--unit-weight 26 --friction1 20 --friction2 30 --cohesion 25 --crack 70/165 "
       "--crack-distance 12 --water-fill 1",
       "With a tension crack full of water."}};
  command.run = [state](const std::vector<std::string>&, Streams& streams) {
    return run(*state, streams);
  };
  return command;
}

}  // namespace brink::cli
