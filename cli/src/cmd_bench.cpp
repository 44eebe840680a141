// brink bench: how far a bench breaks back, and what is left of its berm.
#include <fmt/format.h>

#include <memory>
#include <ostream>
#include <string>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/design/bench.hpp"
#include "brink/plot/bench_sheet.hpp"
#include "brink/record/bench_document.hpp"
#include "brink/record/cautions.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "mechanics_options.hpp"
#include "options.hpp"
#include "output_file.hpp"
#include "paint_pages.hpp"
#include "steepest_options.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

struct BenchRun {
  InputOptions input;
  KinematicsOptions tests;
  Typed typed;
  BenchOptions bench;
  std::optional<double> berm;
  std::optional<double> inter_ramp_deg;
  std::vector<double> percentiles;
  OutputOptions output;
  std::string title;
};

bool draws(const BenchRun& run) {
  return !run.output.output.empty() &&
         known_ending("-o", run.output.output, {".csv", ".svg", ".pdf", ".png"}) != ".csv";
}

Option percentile_option(BenchRun& run) {
  Option option;
  option.name = "--percentile";
  option.value = "P";
  option.help = "Percentile of the back-break to report, above 0 and below 100.";
  option.repeatable = true;
  option.default_text = "50, 80 and 95";
  option.take = [&run](std::string_view text) {
    run.percentiles.push_back(parse_number("--percentile", text, between(0.0, 100.0)));
  };
  return option;
}

// The berm as given, or what the inter-ramp angle leaves.
double berm_of(const BenchRun& run) {
  if (run.berm.has_value() == run.inter_ramp_deg.has_value()) {
    throw Error(ErrorKind::argument, Place{.file = {}, .key = "--berm"},
                run.berm ? "is given together with --inter-ramp" : "is missing", {},
                "one of --berm M and --inter-ramp DEG");
  }
  if (run.berm) return *run.berm;
  const double berm =
      berm_width_m(run.bench.height_m, Angle::degrees(*run.inter_ramp_deg), run.bench.face.dip);
  if (berm > 0.0) return berm;
  throw Error(ErrorKind::argument, Place{.file = {}, .key = "--inter-ramp"},
              "leaves no berm below a face of this dip", shortest(*run.inter_ramp_deg),
              fmt::format("below {} degrees", shortest(run.bench.face.dip.deg())));
}

BenchOptions bench_options(const BenchRun& run, const std::optional<Site>& site) {
  BenchOptions options = run.bench;
  options.settings = test_settings(run.tests, run.typed, site);
  options.berm_m = berm_of(run);
  options.threads = run.tests.threads;
  if (!run.percentiles.empty()) options.percentiles = run.percentiles;
  return options;
}

std::string joints_text(const char* name, const char* of, const BreakingJoints& joints) {
  if (joints.breaking <= 0.0) return paragraph(fmt::format("No {} breaks back.", of));
  return paragraph(fmt::format("{}: {} of {} {}s break back, {} % of the crest.", name,
                               shortest(joints.breaking), shortest(joints.tested), of,
                               fixed(joints.share * 100.0, 1)));
}

void add_rows(TextTable& table, const char* name, const std::vector<BackBreak>& percentiles) {
  for (const BackBreak& p : percentiles) {
    table.add_row({name, shortest(p.percentile), fixed(p.back_break_m, 2),
                   fixed(p.effective_face.deg(), 1), fixed(p.berm_left_m, 2),
                   p.keeps_ritchie ? "yes" : "no", fixed(p.inter_ramp_to_keep.deg(), 1)});
  }
}

std::string bench_text(const BenchResult& result) {
  const BenchOptions& o = result.options;
  std::string text = paragraph(fmt::format(
      "Bench {} m high, face {}/{:0>3}, berm {} m: inter-ramp angle {} degrees. Width to keep, 0.2 "
      "H + "
      "4.5 m (modified Ritchie, common practice): {} m.",
      shortest(o.height_m), shortest(o.face.dip.deg()), shortest(o.face.dip_direction.deg()),
      fixed(o.berm_m, 2), fixed(result.inter_ramp.deg(), 1), fixed(result.ritchie_width_m, 2)));
  text += joints_text("Planes", "reading", result.planes);
  text += joints_text("Wedges", "pair", result.wedges);
  if (!result.governing.empty()) {
    TextTable table({{"of what\nbreaks back", Align::left},
                     {"per-\ncentile"},
                     {"back-break,\nm"},
                     {"effective\nface, deg"},
                     {"berm\nleft, m"},
                     {"keeps\nwidth", Align::left},
                     {"inter-ramp to\nkeep it, deg"}});
    add_rows(table, "planes", result.planes.percentiles);
    add_rows(table, "wedges", result.wedges.percentiles);
    text += '\n' + table.text();
  }
  return text + '\n' +
         paragraph(
             "Every break is taken to run from the toe to the full height of the bench: how far "
             "joints reach is not known here.") +
         paragraph(kinematic_caution()) + paragraph(practice_caution());
}

Value inputs_value(const Readings& readings, const BenchRun& run, const BenchResult& result,
                   const std::optional<Site>& site) {
  Object inputs = input_record(readings, run.input, site);
  const Object bench = bench_inputs(result.options);
  for (const auto& [key, value] : bench.members()) inputs.add(key, value);
  inputs.add("output", run.output.output.empty() ? Value() : Value(run.output.output));
  return inputs;
}

int run_bench(const std::vector<std::string>& files, const BenchRun& run, Streams& streams) {
  draws(run);  // a wrong ending is found before anything is read
  const std::optional<Site> site = load_site(files, run.input);
  const BenchOptions options = bench_options(run, site);
  const Readings readings = load_readings(files, run.input, run.output, streams, 20, site);
  if (readings.size() == 0) require_usable(readings, run.input);
  const BenchResult result = design_bench(readings, options);
  plot::Painted file;
  if (draws(run)) {
    file = paint_pages({plot::bench_sheet(result, {run.title, {}})}, run.output.output);
  } else if (!run.output.output.empty()) {
    file.bytes = bench_csv(result);
  }
  std::vector<std::string> warnings = result.warnings;
  warnings.insert(warnings.end(), file.warnings.begin(), file.warnings.end());
  print_warnings(warnings, run.output, streams);
  if (!run.output.output.empty()) {
    write_file(run.output.output, file.bytes, files_read(files, site));
  }
  if (run.output.json) {
    warnings.insert(warnings.begin(), readings.warnings.begin(), readings.warnings.end());
    streams.out << to_json(result_document("bench", inputs_value(readings, run, result, site),
                                           warnings, bench_result(result)));
  } else {
    streams.out << bench_text(result);
  }
  require_usable(readings, run.input);
  return kDone;
}

void add_bench_options(std::vector<Option>& options, BenchRun& run) {
  options.push_back(required(one_face_option(run.bench.face, "Bench")));
  options.push_back(required(number_option("--height", "M", "Height of the bench, in m.",
                                           above(0.0, "m"), run.bench.height_m, "Bench")));
  options.push_back(
      number_option("--berm", "M", "Width of the berm, in m.", above(0.0, "m"), run.berm, "Bench"));
  options.push_back(number_option("--inter-ramp", "DEG",
                                  "In place of --berm: the slope from toe to toe of the benches.",
                                  between(0.0, 90.0, "degrees"), run.inter_ramp_deg, "Bench"));
  options.push_back(percentile_option(run));
  options.push_back(flag_option(
      "--weighted", "Counts the readings' weight in place of their number.", run.bench.weighted));
}

}  // namespace

Command bench_command() {
  const auto run = std::make_shared<BenchRun>();
  Command command;
  command.name = "bench";
  command.summary = "Finds how far a bench breaks back and what is left of its berm";
  command.description =
      "Planes and wedges that slide out of the bench face take the crest back. The percentiles of "
      "that back-break, the effective face, the berm left, whether it keeps the modified Ritchie "
      "width, and the inter-ramp angle that would.";
  command.positionals = Positionals::files;
  add_bench_options(command.options, *run);
  add_test_options(command.options, run->tests, run->typed);
  add_input_options(command.options, run->input);
  command.options.push_back(threads_option(run->tests.threads));
  command.options.push_back(output_option(
      "OUT", "The percentiles (.csv), or a section with the distribution (.svg, .pdf, .png).",
      run->output));
  command.options.push_back(text_option("--title", "TEXT", "Heading of the drawing.", run->title));
  add_output_options(command.options, run->output);
  command.examples = {
      {"brink bench quarry/readings.csv --face 75/225 --friction 32 --height 12 --berm 8",
       "A bench of the quarry's south-west side."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_bench(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
