// brink readings: reads, checks and converts.
#include <fmt/format.h>

#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/readings/checks.hpp"
#include "brink/record/readings_document.hpp"
#include "commands.hpp"
#include "input.hpp"
#include "output_file.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

struct ReadingsRun {
  InputOptions input;
  OutputOptions output;
  std::optional<Notation> to;
};

Option to_option(ReadingsRun& run) {
  Option option;
  option.name = "--to";
  option.value = "NAME";
  option.help = "Notation of the table written with -o: " + notation_names() + ".";
  option.default_text = "dip/dip-direction";
  option.group = "Output";
  option.take = [&run](std::string_view text) {
    run.to = notation_named(text);
    if (run.to) return;
    throw Error(ErrorKind::argument, Place{.key = "--to"}, "is not a notation", text,
                notation_names());
  };
  return option;
}

void check_output(const ReadingsRun& run) {
  if (run.output.output.empty()) {
    if (!run.to) return;
    throw Error(ErrorKind::argument, Place{.key = "--to"}, "needs a file to write to", {},
                "-o OUT.csv");
  }
  if (run.output.output == "-" && run.output.json) {
    throw Error(ErrorKind::argument, Place{.key = "-o"},
                "would put a table where --json puts its document", "-", "a file, or no --json");
  }
  if (run.output.output != "-") known_ending("-o", run.output.output, {".csv"});
  if (run.to == Notation::core && !run.input.reading.hole) {
    throw Error(ErrorKind::argument, Place{.key = "--to"}, "needs to know how the hole runs",
                "core", "--hole TREND/PLUNGE");
  }
}

TableForm table_form(const ReadingsRun& run, const std::optional<Site>& site) {
  TableForm form;
  form.notation = run.to.value_or(Notation::dip_direction);
  form.strike_rule = run.input.reading.strike_rule.value_or(StrikeRule::right);
  form.hole = run.input.reading.hole;
  // Weights for the direction of traverses follow from the traverses; in the table they would count
  // twice when it is read beside them.
  const BiasOptions& bias = site ? site->bias : run.input.bias;
  form.with_weights = bias.traverses.empty() || run.input.bias.unweighted;
  return form;
}

std::string rejection_list(const Readings& readings) {
  std::string text = "Not used:\n";
  for (const Rejection& rejection : readings.rejected) text += rejection_text(rejection) + "\n";
  return text;
}

std::string file_table(const Readings& readings) {
  std::vector<std::size_t> used(readings.files.size(), 0);
  for (const ReadingPlace& place : readings.places) ++used[place.file];
  TextTable table({{"file", Align::left}, {"used"}});
  for (std::size_t i = 0; i < used.size(); ++i) {
    table.add_row({readings.files[i].name, std::to_string(used[i])});
  }
  return table.text();
}

std::string summary(const Readings& readings, const ReadingOptions& options) {
  std::string text = usage_text(readings) + "\n";
  if (options.declination.deg() != 0.0) {
    text += fmt::format("declination {} degrees added to every azimuth\n",
                        print_degrees(options.declination));
  }
  if (readings.files.size() > 1) text += "\n" + file_table(readings);
  if (!readings.rejected.empty()) text += "\n" + rejection_list(readings);
  return text;
}

int run_readings(const std::vector<std::string>& files, const ReadingsRun& run, Streams& streams) {
  check_output(run);
  // The rejected lines stand in the result; standard error gets their number.
  const std::optional<Site> site = load_site(files, run.input);
  Readings readings = load_readings(files, run.input, run.output, streams, 0, site);
  const std::vector<std::string> doubts = check_readings(readings);
  print_warnings(doubts, run.output, streams);
  readings.warnings.insert(readings.warnings.end(), doubts.begin(), doubts.end());
  if (!run.output.output.empty() && readings.size() > 0) {
    write_output(run.output.output, readings_csv(readings, table_form(run, site)), streams.out,
                 files_read(files, site));
  }
  if (run.output.json) {
    Object inputs = input_record(readings, run.input, site);
    inputs.add("strict", run.input.strict);
    inputs.add("to", run.to ? Value(name_of(*run.to)) : Value());
    streams.out << to_json(result_document("readings", std::move(inputs), readings.warnings,
                                           readings_result(readings)));
  } else if (run.output.output != "-") {
    streams.out << summary(readings, run.input.reading);
  }
  require_usable(readings, run.input);
  return 0;
}

}  // namespace

Command readings_command() {
  const auto run = std::make_shared<ReadingsRun>();
  Command command;
  command.name = "readings";
  command.summary = "Reads, checks and converts orientation readings";
  command.description =
      "Reads CSV files (comma, semicolon or tab) and the discontinuities of AGS4 files by their "
      "headings. Says how many readings were used, which lines were not, and why. Warns of what "
      "deserves a second look: rows that stand twice, dip and direction exchanged, an observer "
      "whose directions are turned about, rounded values, a set that one traverse alone meets, "
      "readings in a traverse's blind zone. With -o the readings are written as one table, in any "
      "notation.";
  command.positionals = Positionals::files;
  add_input_options(command.options, run->input);
  add_output_options(command.options, run->output);
  command.options.push_back(output_option("OUT.csv",
                                          "Writes the used readings as a CSV table; - "
                                          "writes it to standard output.",
                                          run->output));
  command.options.push_back(to_option(*run));
  command.examples = {
      {"brink readings quarry/readings.csv", "How many of the readings could be used."},
      {"brink readings road-cut/readings.csv --strike-rule right -o planes.csv",
       "Strikes become dips and dip directions."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_readings(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
