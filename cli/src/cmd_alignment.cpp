// brink alignment: how steep the cuts along a line may be.
#include <fmt/format.h>

#include <memory>
#include <ostream>
#include <string>
#include <utility>

#include "brink/base/digest.hpp"
#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/design/alignment.hpp"
#include "brink/plot/plan.hpp"
#include "brink/record/alignment_document.hpp"
#include "brink/record/cautions.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "options.hpp"
#include "output_file.hpp"
#include "paint_pages.hpp"
#include "set_choice.hpp"
#include "steepest_options.hpp"
#include "steepest_text.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

struct AlignmentRun {
  InputOptions input;
  SetChoice sets;
  SteepestChoice choice;
  OutputOptions output;
  std::string title;
  std::string line_file;
  CutSide cut = CutSide::both;
  Angle tolerance = Angle::degrees(10.0);
};

bool draws(const AlignmentRun& run) {
  return !run.output.output.empty() &&
         known_ending("-o", run.output.output, {".csv", ".svg", ".pdf", ".png"}) != ".csv";
}

Option cut_option(AlignmentRun& run) {
  Option option;
  option.name = "--cut";
  option.value = "SIDE";
  option.help = "Side that is cut, seen along the line: left, right or both.";
  option.default_text = "both";
  option.take = [&run](std::string_view text) {
    if (text == "left") {
      run.cut = CutSide::left;
    } else if (text == "right") {
      run.cut = CutSide::right;
    } else if (text == "both") {
      run.cut = CutSide::both;
    } else {
      throw Error(ErrorKind::argument, Place{.file = {}, .key = "--cut"}, "is not known", text,
                  "left, right or both");
    }
  };
  return option;
}

std::string alignment_text(const AlignmentResult& result, const SetsResult& sets) {
  TextTable table({{"from,\nm"},
                   {"to,\nm"},
                   {"side", Align::left},
                   {"face\ntowards,\ndeg"},
                   {"steepest,\ndeg"},
                   {"governed by", Align::left}});
  for (const AlignmentSegment& segment : result.segments) {
    for (const SegmentCut& cut : segment.cuts) {
      table.add_row({fixed(segment.from_chainage_m, 1), fixed(segment.to_chainage_m, 1),
                     cut.left ? "left" : "right", fixed(cut.face.dip_direction.deg(), 1),
                     shortest(cut.face.steepest_dip.deg()), governing_in_words(cut.face, sets)});
    }
  }
  return table.text() + '\n' + paragraph(kinematic_caution()) + paragraph(practice_caution());
}

Value inputs_value(const Readings& readings, const AlignmentRun& run, const AlignmentResult& result,
                   const std::string& line_bytes, const std::optional<Site>& site) {
  Object inputs = input_record(readings, run.input, site);
  inputs.add("line", Object{{"name", run.line_file}, {"sha256", sha256_hex(line_bytes)}});
  const Object alignment = alignment_inputs(result.options);
  for (const auto& [key, value] : alignment.members()) inputs.add(key, value);
  record_set_choice(inputs, run.sets, run.input);
  inputs.add("output", run.output.output.empty() ? Value() : Value(run.output.output));
  return inputs;
}

plot::Painted output_bytes(const AlignmentResult& result, const SetsResult& sets,
                           const AlignmentRun& run) {
  if (run.output.output.empty()) return {};
  if (!draws(run)) return {alignment_csv(result, sets), {}};
  return paint_pages({plot::plan_sheet(result, {run.title, {}})}, run.output.output);
}

int run_alignment(const std::vector<std::string>& files, const AlignmentRun& run,
                  Streams& streams) {
  check_set_options(run.sets, run.input);
  draws(run);  // a wrong ending is found before anything is read
  const std::optional<Site> site = load_site(files, run.input);
  const AlignmentOptions options{run.cut, run.tolerance, steepest_options(run.choice, site)};
  const std::string line_bytes = read_bytes(run.line_file, streams);
  const Centreline line = parse_centreline(line_bytes, run.line_file);
  const Readings readings = load_readings(files, run.input, run.output, streams, 20, site);
  if (readings.size() == 0) require_usable(readings, run.input);
  const SetsResult sets =
      chosen_sets(readings, run.sets, run.input, options.search.seed, options.search.threads, site);
  const AlignmentResult result = design_alignment(line, readings, sets, options);
  const plot::Painted file = output_bytes(result, sets, run);
  std::vector<std::string> warnings = sets.warnings;
  warnings.insert(warnings.end(), result.warnings.begin(), result.warnings.end());
  warnings.insert(warnings.end(), file.warnings.begin(), file.warnings.end());
  print_warnings(warnings, run.output, streams);
  std::vector<std::string> read = files_read(files, site);
  read.push_back(run.line_file);
  if (!run.output.output.empty()) write_file(run.output.output, file.bytes, read);
  if (run.output.json) {
    warnings.insert(warnings.begin(), readings.warnings.begin(), readings.warnings.end());
    streams.out << to_json(result_document("alignment",
                                           inputs_value(readings, run, result, line_bytes, site),
                                           warnings, alignment_result(result, sets)));
  } else {
    streams.out << alignment_text(result, sets);
  }
  require_usable(readings, run.input);
  return kDone;
}

}  // namespace

Command alignment_command() {
  const auto run = std::make_shared<AlignmentRun>();
  Command command;
  command.name = "alignment";
  command.summary = "Finds the steepest cuts along a road's centreline or a quarry face";
  command.description =
      "Divides a line into segments of one direction and finds, for a cut on the left, the right "
      "or "
      "both, the steepest face dip that keeps within the limits, as brink steepest does. The line "
      "is "
      "CSV with easting and northing in metres (and chainage), or a GeoJSON LineString in "
      "projected "
      "metres.";
  command.positionals = Positionals::files;
  command.options.push_back(required(text_option(
      "--line", "FILE", "The line: CSV or GeoJSON, in projected metres.", run->line_file)));
  command.options.push_back(cut_option(*run));
  command.options.push_back(
      with_default(angle_option("--tolerance", "Greatest change of direction within a segment.",
                                Interval{0.0, 45.0, true, false, "degrees"}, run->tolerance),
                   "10"));
  add_steepest_options(command.options, run->choice, false);
  add_input_options(command.options, run->input);
  add_set_options(command.options, run->sets, run->input);
  command.options.push_back(output_option(
      "OUT", "The table by chainage (.csv), or a plan (.svg, .pdf, .png).", run->output));
  command.options.push_back(text_option("--title", "TEXT", "Heading of the drawing.", run->title));
  add_output_options(command.options, run->output);
  command.examples = {
      {"brink alignment road-cut/readings.csv --strike-rule right --line road-cut/centreline.csv "
       "--friction 30 --cut right",
       "The cut on the right of a road."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_alignment(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
