// brink kinematics: which readings and pairs of readings can move on each face.
#include <memory>
#include <ostream>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/kinematics/kinematics.hpp"
#include "brink/record/kinematics_document.hpp"
#include "brink/sets/sets.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "kinematics_text.hpp"
#include "options.hpp"
#include "site_tests.hpp"

namespace brink::cli {

namespace {

struct KinematicsRun {
  InputOptions input;
  KinematicsOptions tests;
  OutputOptions output;
  bool no_sets = false;
  Typed typed;
};

SetsResult sets_of(const Readings& readings, const KinematicsRun& run,
                   const std::optional<Site>& site) {
  if (run.no_sets) {
    SetsResult none;
    none.assignment.assign(readings.size(), 0);
    none.unassigned = readings.size();
    return none;
  }
  return sets_with_site(readings, run.input.set_column,
                        {std::nullopt, run.tests.seed, run.tests.threads}, site);
}

Value inputs_value(const Readings& readings, const KinematicsRun& run,
                   const KinematicsOptions& options, const std::optional<Site>& site) {
  Object inputs = input_record(readings, run.input, site);
  const Object tests = kinematics_inputs(options);
  for (const auto& [key, value] : tests.members()) inputs.add(key, value);
  inputs.add("set_column", run.input.set_column.empty() ? Value() : Value(run.input.set_column));
  inputs.add("find_sets", !run.no_sets && run.input.set_column.empty());
  return inputs;
}

int run_kinematics(const std::vector<std::string>& files, const KinematicsRun& run,
                   Streams& streams) {
  if (run.no_sets && !run.input.set_column.empty()) {
    throw Error(ErrorKind::argument, Place{.file = {}, .key = "--no-sets"},
                "is given together with --set-column", {}, "one of the two");
  }
  const std::optional<Site> site = load_site(files, run.input);
  const std::vector<KinematicsOptions> tests = tests_with_site(run.tests, run.typed, site);
  require_face_and_friction(tests, run.typed, site);
  const Readings readings = load_readings(files, run.input, run.output, streams, 20, site);
  if (readings.size() == 0) require_usable(readings, run.input);
  const SetsResult sets = sets_of(readings, run, site);
  const KinematicsResult result = run_tests(readings, sets, tests);
  std::vector<std::string> warnings = sets.warnings;
  warnings.insert(warnings.end(), result.warnings.begin(), result.warnings.end());
  print_warnings(warnings, run.output, streams);
  if (run.output.json) {
    warnings.insert(warnings.begin(), readings.warnings.begin(), readings.warnings.end());
    streams.out << to_json(result_document("kinematics",
                                           inputs_value(readings, run, result.options, site),
                                           warnings, kinematics_result(result, sets)));
  } else {
    streams.out << kinematics_text(result, sets, readings.weights);
  }
  require_usable(readings, run.input);
  return kDone;
}

Option pairs_option(std::uint64_t& target) {
  Option option;
  option.name = "--pairs";
  option.value = "N";
  option.help =
      "Pairs sampled for the number that are unstable dry, where more than 20,000 different "
      "readings "
      "leave too many to look at each: 1000 to 10^10. All other counts are exact at any size.";
  option.take = [&target](std::string_view text) {
    target = parse_whole("--pairs", text, 1000, 10'000'000'000U);
  };
  option.default_text = "4000000";
  return option;
}

}  // namespace

Command kinematics_command() {
  const auto run = std::make_shared<KinematicsRun>();
  Command command;
  command.name = "kinematics";
  command.summary = "Tests which readings and pairs can slide or topple on a face";
  command.description =
      "Every reading is tested for planar sliding and flexural toppling, every pair of readings "
      "for "
      "wedge sliding and block toppling, on every face. Counts are given for all, for each set and "
      "for each pair of sets, with an interval that shows how far they could have come out "
      "otherwise had other joints been logged.";
  command.positionals = Positionals::files;
  add_kinematic_options(command.options, run->tests, false);
  note_typed(command.options, run->typed);
  add_input_options(command.options, run->input);
  command.options.push_back(set_column_option(run->input));
  command.options.push_back(flag_option(
      "--no-sets", "Looks for no sets: counts for all readings together.", run->no_sets));
  command.options.push_back(pairs_option(run->tests.pairs));
  command.options.push_back(seed_option(run->tests.seed));
  command.options.push_back(threads_option(run->tests.threads));
  add_output_options(command.options, run->output);
  command.examples = {
      {"brink kinematics quarry/readings.csv --face 70/135 --friction 32",
       "One face, sets found by the program."},
      {"brink kinematics quarry/readings.csv --face 60/135 --face 75/135 --friction 32 --upper "
       "10/315 --json",
       "Two slopes of the same face, the ground above falling away behind it."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_kinematics(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
