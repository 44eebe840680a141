// brink sets: finds the discontinuity sets, or describes those given.
#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/record/readings_document.hpp"
#include "brink/record/sets_document.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "output_file.hpp"
#include "sets_text.hpp"
#include "site_tests.hpp"
#include "spacing_text.hpp"

namespace brink::cli {

namespace {

constexpr std::uint64_t kMostSets = 30;

struct SetsRun {
  InputOptions input;
  OutputOptions output;
  FindSetsOptions find;
};

Option count_option(SetsRun& run) {
  Option option;
  option.name = "--count";
  option.value = "K";
  option.help = "Number of sets, 0 to 30; chosen by the criterion where it is not given.";
  option.take = [&run](std::string_view text) {
    run.find.count = static_cast<std::size_t>(parse_whole("--count", text, 0, kMostSets));
  };
  return option;
}

// DIP/DIR or DIP/DIR:WITHIN.
Centre parse_centre(std::string_view text) {
  const std::size_t colon = text.find(':');
  Centre centre{parse_plane("--centre", text.substr(0, colon)), std::nullopt};
  if (colon == std::string_view::npos) return centre;
  Interval reach = above(0.0, "degrees");
  reach.high = 90.0;
  reach.high_open = false;
  centre.within = parse_angle("--centre", text.substr(colon + 1), reach);
  return centre;
}

Option centre_option(SetsRun& run) {
  Option option;
  option.name = "--centre";
  option.value = "DIP/DIR[:WITHIN]";
  option.help =
      "A set lies here, and there are no others. With WITHIN, in degrees up to 90, the set is the "
      "readings inside that angle of the centre (the nearest centre, where several reach a "
      "reading); without it the set is found from there.";
  option.repeatable = true;
  option.take = [&run](std::string_view text) { run.find.centres.push_back(parse_centre(text)); };
  return option;
}

Option least_share_option(SetsRun& run) {
  Option option;
  option.name = "--least-share";
  option.value = "PCT";
  option.help = "Share of the readings that a set has to hold, 0 up to below 100.";
  option.default_text = "0";
  option.take = [&run](std::string_view text) {
    Interval share = from_to(0.0, 100.0, "per cent");
    share.high_open = true;
    run.find.least_share = parse_number("--least-share", text, share) / 100.0;
  };
  return option;
}

Option least_size_option(SetsRun& run) {
  Option option;
  option.name = "--least-size";
  option.value = "N";
  option.help =
      "Number of readings that a set has to hold. A round set needs 5 and an elliptical one 7 in "
      "any case.";
  option.default_text = "0";
  option.take = [&run](std::string_view text) {
    run.find.least_size =
        static_cast<std::size_t>(parse_whole("--least-size", text, 0, 1000000000));
  };
  return option;
}

Option stability_option(SetsRun& run) {
  Option option;
  option.name = "--resamples";
  option.value = "N";
  option.help =
      "Number of times that the readings are drawn anew, with replacement, to see which sets come "
      "back with their mean within its 95 % cone; 0 to leave that out, at most 10,000.";
  option.default_text = "100";
  option.take = [&run](std::string_view text) {
    run.find.resamples = static_cast<std::size_t>(parse_whole("--resamples", text, 0, 10000));
  };
  return option;
}

Option containment_option(SetsRun& run) {
  Option option;
  option.name = "--containment";
  option.value = "PCT";
  option.help =
      "Adds the half angle of the cone that holds this share of a Fisher distribution of the "
      "set's kappa; above 0 and below 100.";
  option.repeatable = true;
  option.take = [&run](std::string_view text) {
    const double percent = parse_number("--containment", text, between(0.0, 100.0, "per cent"));
    run.find.containment_shares.push_back(percent / 100.0);
  };
  return option;
}

void check(const SetsRun& run) {
  const bool asked = run.find.count || !run.find.centres.empty();
  if (asked && !run.input.set_column.empty()) {
    throw Error(ErrorKind::argument,
                Place{.file = {}, .key = run.find.count ? "--count" : "--centre"},
                "is given together with --set-column, which says which sets there are", {},
                "one of the two");
  }
  if (run.output.output.empty()) return;
  if (run.output.output == "-" && run.output.json) {
    throw Error(ErrorKind::argument, Place{.file = {}, .key = "-o"},
                "would put a table where --json puts its document", "-", "a file, or no --json");
  }
  if (run.output.output != "-") known_ending("-o", run.output.output, {".csv"});
}

Value inputs_value(const Readings& readings, const SetsRun& run, const std::optional<Site>& site) {
  Object inputs = input_record(readings, run.input, site);
  const Object asked = sets_inputs(run.find);
  for (const auto& [key, value] : asked.members()) inputs.add(key, value);
  inputs.add("set_column", run.input.set_column.empty() ? Value() : Value(run.input.set_column));
  return inputs;
}

// Spacing, persistence and aperture, where the readings have columns for them.
JointLengths lengths_of(const Readings& readings, const SetsResult& sets,
                        const BiasOptions& traverses) {
  std::vector<SetPlane> planes;
  for (const SetStatistics& set : sets.sets) {
    planes.push_back({set.name, upward_normal(set.mean)});
  }
  return measure_joints(readings, sets.assignment, planes, traverses);
}

std::string text_of(const Readings& readings, const SetsResult& sets, const JointLengths& lengths) {
  std::vector<std::string> names;
  for (const SetStatistics& set : sets.sets) names.push_back(set.name);
  const std::string measured = spacing_text(lengths, names);
  return sets_text(sets, readings) + (measured.empty() ? "" : "\n") + measured;
}

int run_sets(const std::vector<std::string>& files, const SetsRun& run, Streams& streams) {
  check(run);
  const std::optional<Site> site = load_site(files, run.input);
  const Readings readings = load_readings(files, run.input, run.output, streams, 20, site);
  SetsResult result;
  JointLengths lengths;
  if (readings.size() > 0) {
    result = sets_with_site(readings, run.input.set_column, run.find, site);
    lengths = lengths_of(readings, result, site ? site->bias : run.input.bias);
  }
  std::vector<std::string> warnings = result.warnings;
  const std::vector<std::string>& more = lengths.spacing.warnings;
  warnings.insert(warnings.end(), more.begin(), more.end());
  print_warnings(warnings, run.output, streams);
  if (!run.output.output.empty() && readings.size() > 0) {
    write_output(run.output.output, readings_csv(with_set_column(readings, result), {}),
                 streams.out, files_read(files, site));
  }
  if (run.output.json) {
    warnings.insert(warnings.begin(), readings.warnings.begin(), readings.warnings.end());
    streams.out << to_json(result_document("sets", inputs_value(readings, run, site), warnings,
                                           sets_result(result, lengths)));
  } else if (readings.size() > 0 && run.output.output != "-") {
    streams.out << text_of(readings, result, lengths);
  }
  require_usable(readings, run.input);
  return kDone;
}

}  // namespace

Command sets_command() {
  const auto run = std::make_shared<SetsRun>();
  run->find.resamples = 100;
  Command command;
  command.name = "sets";
  command.summary = "Finds the discontinuity sets, or describes those given";
  command.description =
      "Divides the readings into sets and strays, as axes: a set that straddles the rim of the net "
      "is one set. The number of sets is the one with the least Bayesian criterion; round and "
      "elliptical sets compete. Every set gets its Fisher statistics, its 95 % cone and a test of "
      "how well a Fisher distribution fits. Where a column gives positions along scanlines or "
      "boreholes (--traverse), the true spacing of each set and an estimate of RQD follow; columns "
      "of persistence (or trace length) and aperture are described too.";
  command.positionals = Positionals::files;
  command.options.push_back(count_option(*run));
  command.options.push_back(centre_option(*run));
  command.options.push_back(set_column_option(run->input));
  command.options.push_back(least_share_option(*run));
  command.options.push_back(least_size_option(*run));
  command.options.push_back(stability_option(*run));
  command.options.push_back(containment_option(*run));
  add_input_options(command.options, run->input);
  command.options.push_back(seed_option(run->find.seed));
  command.options.push_back(threads_option(run->find.threads));
  add_output_options(command.options, run->output);
  command.options.push_back(output_option(
      "OUT.csv",
      "Writes the readings with the set of each as a CSV table; - writes it to standard "
      "output.",
      run->output));
  command.examples = {
      {"brink sets quarry/readings.csv", "How many sets there are, and how they scatter."},
      {"brink sets quarry/readings.csv --count 3 -o sets.csv",
       "Three sets, and the readings with the set of each."},
      {"brink sets quarry/readings.csv --centre 50/230:25 --centre 85/130:25",
       "The readings within 25 degrees of two known sets."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_sets(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
