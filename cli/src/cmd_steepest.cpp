// brink steepest: how steep a face may be cut at each azimuth.
#include <fmt/format.h>

#include <memory>
#include <ostream>
#include <string>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/design/steepest.hpp"
#include "brink/plot/compass_chart.hpp"
#include "brink/record/steepest_document.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "options.hpp"
#include "output_file.hpp"
#include "paint_pages.hpp"
#include "set_choice.hpp"
#include "steepest_options.hpp"
#include "steepest_text.hpp"

namespace brink::cli {

namespace {

struct SteepestRun {
  InputOptions input;
  SetChoice sets;
  SteepestChoice choice;
  OutputOptions output;
  std::string title;
};

bool draws(const SteepestRun& run) {
  return !run.output.output.empty() &&
         known_ending("-o", run.output.output, {".csv", ".svg", ".pdf", ".png"}) != ".csv";
}

Value inputs_value(const Readings& readings, const SteepestRun& run, const SteepestOptions& options,
                   const std::optional<Site>& site) {
  Object inputs = input_record(readings, run.input, site);
  const Object search = steepest_inputs(options);
  for (const auto& [key, value] : search.members()) inputs.add(key, value);
  record_set_choice(inputs, run.sets, run.input);
  inputs.add("output", run.output.output.empty() ? Value() : Value(run.output.output));
  return inputs;
}

// The table or the drawing, by the file's ending; nothing without a file.
plot::Painted output_bytes(const SteepestResult& result, const Readings& readings,
                           const SetsResult& sets, const SteepestRun& run) {
  if (run.output.output.empty()) return {};
  if (!draws(run)) return {steepest_csv(result, sets), {}};
  const plot::NetContent net{readings, sets, nullptr, {}, {}, {}};
  return paint_pages(plot::steepest_sheets(result, net, Projection::equal_angle, {run.title, {}}),
                     run.output.output);
}

int run_steepest(const std::vector<std::string>& files, const SteepestRun& run, Streams& streams) {
  check_set_options(run.sets, run.input);
  const std::optional<Site> site = load_site(files, run.input);
  SteepestOptions options = steepest_options(run.choice, site);
  options.map = draws(run);
  const Readings readings = load_readings(files, run.input, run.output, streams, 20, site);
  if (readings.size() == 0) require_usable(readings, run.input);
  const SetsResult sets =
      chosen_sets(readings, run.sets, run.input, options.seed, options.threads, site);
  const SteepestResult result = find_steepest(readings, sets, options);
  std::vector<std::string> warnings = sets.warnings;
  warnings.insert(warnings.end(), result.warnings.begin(), result.warnings.end());
  const plot::Painted file = output_bytes(result, readings, sets, run);
  warnings.insert(warnings.end(), file.warnings.begin(), file.warnings.end());
  print_warnings(warnings, run.output, streams);
  if (!run.output.output.empty())
    write_file(run.output.output, file.bytes, files_read(files, site));
  if (run.output.json) {
    warnings.insert(warnings.begin(), readings.warnings.begin(), readings.warnings.end());
    streams.out << to_json(result_document("steepest", inputs_value(readings, run, options, site),
                                           warnings, steepest_result(result, sets)));
  } else {
    streams.out << steepest_text(result, sets);
  }
  require_usable(readings, run.input);
  return kDone;
}

}  // namespace

Command steepest_command() {
  const auto run = std::make_shared<SteepestRun>();
  Command command;
  command.name = "steepest";
  command.summary = "Finds the steepest face at each azimuth that keeps within limits";
  command.description =
      "For each azimuth the greatest face dip at which the share of every mode stays within its "
      "limit, which mode and which sets govern, and what a steeper face would cost. With --target, "
      "--height and --unit-weight no wedge between the means of two sets may have a lower factor "
      "of "
      "safety either.";
  command.positionals = Positionals::files;
  add_steepest_options(command.options, run->choice);
  add_input_options(command.options, run->input);
  add_set_options(command.options, run->sets, run->input);
  command.options.push_back(output_option(
      "OUT",
      "The table (.csv), or the chart round the compass and maps of the shares (.svg, .pdf, "
      ".png).",
      run->output));
  command.options.push_back(text_option("--title", "TEXT", "Heading of the drawing.", run->title));
  add_output_options(command.options, run->output);
  command.examples = {
      {"brink steepest quarry/readings.csv --friction 32", "Every 5 degrees round the compass."},
      {"brink steepest quarry/readings.csv --friction 32 --limit planar=2 --limit wedge=3 "
       "--confident "
       "0.9",
       "Tighter limits, and the dip that still holds in 90 % of resamples."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_steepest(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
