#include "simulation_options.hpp"

#include <fmt/format.h>

#include <cmath>
#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "input.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

const std::string kGroup = "Simulation";

Option word_option(std::string name, std::string value, std::string help,
                   std::function<void(std::string_view)> take) {
  Option option;
  option.name = std::move(name);
  option.value = std::move(value);
  option.help = std::move(help);
  option.group = kGroup;
  option.take = std::move(take);
  return option;
}

Sampling parse_sampling(std::string_view text) {
  if (text == "plain") return Sampling::plain;
  if (text == "latin-hypercube") return Sampling::latin_hypercube;
  throw Error(ErrorKind::argument, Place{.key = "--sampling"}, "is no way of sampling", text,
              "plain or latin-hypercube");
}

// Readings whose set column names this set.
std::vector<Plane> planes_of_set(const Readings& readings, const SimulationOptions& o,
                                 const std::string& option, const std::string& set) {
  const ExtraColumn* column = readings.find_column(o.set_column);
  std::vector<Plane> planes;
  for (std::size_t i = 0; column != nullptr && i < readings.size(); ++i) {
    if (column->cells[i] == set) planes.push_back(readings.planes[i]);
  }
  if (planes.empty()) {
    throw Error(ErrorKind::argument, Place{.key = option}, "names a set without readings", set,
                "a name in the column " + o.set_column);
  }
  return planes;
}

void draw_readings(WedgeSimulation& s, const SimulationOptions& o, const OutputOptions& output,
                   Streams& streams) {
  if (o.set_column.empty() || o.set1.empty() || o.set2.empty()) {
    throw Error(ErrorKind::argument, Place{.key = "--readings"},
                "is given without the sets to draw from", {}, "--set-column, --set1 and --set2");
  }
  if (o.fisher_k1 || o.fisher_k2) {
    throw Error(ErrorKind::argument, Place{.key = "--readings"},
                "is given together with a Fisher concentration", {}, "one of the two");
  }
  InputOptions input;
  input.set_column = o.set_column;
  const Readings readings = load_readings(o.readings, input, output, streams);
  s.plane1 = {std::nullopt, planes_of_set(readings, o, "--set1", o.set1)};
  s.plane2 = {std::nullopt, planes_of_set(readings, o, "--set2", o.set2)};
}

std::string share_text(const Share& share) {
  return fmt::format("{:.4g} % (standard error {:.2g})", 100.0 * share.value,
                     100.0 * share.standard_error);
}

std::string below_text(const char* what, const Share& among, const Share& product) {
  return fmt::format("  {:<28}{} of the wedges that form, {} of all draws\n", what,
                     share_text(among), share_text(product));
}

std::string safety_text(double safety) {
  return std::isfinite(safety) ? fixed(safety, 3) : "infinite";
}

}  // namespace

Option uncertain_option(std::string name, std::string value, std::string help, Interval accepted,
                        std::optional<Distribution>& target, std::string group) {
  Option option;
  option.name = name;
  option.value = std::move(value);
  option.help = std::move(help);
  option.group = std::move(group);
  option.take = [&target, name, accepted](std::string_view text) {
    if (text.find('(') == std::string_view::npos) {
      target = fixed_value(parse_number(name, text, accepted));
      return;
    }
    const Distribution distribution = parse_distribution(name, text);
    require_within(distribution, name, accepted.low, accepted.high, accepted.high_open);
    target = distribution;
  };
  return option;
}

void add_simulation_options(std::vector<Option>& options, SimulationOptions& o) {
  options.push_back(word_option(
      "--draws", "N",
      "Simulates the wedge N times. Friction, cohesion, water fill and horizontal seismic load may "
      "then be normal(MEAN,SD), lognormal(MEAN,SD), triangular(LEAST,LIKELIEST,GREATEST) or "
      "uniform(LEAST,GREATEST), with limits behind as in normal(30,3)[20..40].",
      [&o](std::string_view text) { o.draws = parse_whole("--draws", text, 1, 100'000'000); }));
  options.push_back(number_option("--fisher-k1", "K",
                                  "Draws plane 1 about --plane1 by Fisher's distribution of this "
                                  "concentration (fisher_k of brink sets).",
                                  above(0.0), o.fisher_k1, kGroup));
  options.push_back(
      number_option("--fisher-k2", "K", "The same for plane 2.", above(0.0), o.fisher_k2, kGroup));
  Option readings =
      word_option("--readings", "FILE",
                  "Instead: draws both planes from these readings, with replacement; with "
                  "--set-column, --set1 and --set2.",
                  [&o](std::string_view text) { o.readings.emplace_back(text); });
  readings.repeatable = true;
  options.push_back(std::move(readings));
  options.push_back(text_option("--set-column", "NAME", "Column that names the readings' sets.",
                                o.set_column, kGroup));
  options.push_back(text_option("--set1", "NAME", "Set of plane 1.", o.set1, kGroup));
  options.push_back(text_option("--set2", "NAME", "Set of plane 2.", o.set2, kGroup));
  options.push_back(with_default(
      number_option("--correlation", "R",
                    "Between friction and cohesion of one plane (of their normal scores).",
                    from_to(-1.0, 1.0), o.correlation, kGroup),
      "0"));
  options.push_back(with_default(
      word_option("--sampling", "plain|latin-hypercube",
                  "Independent draws, or each input's range in N strata drawn from once each.",
                  [&o](std::string_view text) { o.sampling = parse_sampling(text); }),
      "plain"));
  options.push_back(number_option("--until-error", "E",
                                  "Stops early once the standard error of the probability of "
                                  "failure is at most E.",
                                  above(0.0), o.until_error, kGroup));
  options.push_back(seed_option(o.seed));
  options.push_back(threads_option(o.threads));
}

std::optional<std::string> needs_draws(const SimulationOptions& o) {
  if (o.draws) return std::nullopt;
  if (o.fisher_k1) return "--fisher-k1";
  if (o.fisher_k2) return "--fisher-k2";
  if (!o.readings.empty()) return "--readings";
  if (o.correlation) return "--correlation";
  if (o.sampling) return "--sampling";
  if (o.until_error) return "--until-error";
  return std::nullopt;
}

WedgeSimulation simulation_of(WedgeSimulation s, const SimulationOptions& o,
                              const OutputOptions& output, Streams& streams) {
  s.plane1.fisher_k = o.fisher_k1;
  s.plane2.fisher_k = o.fisher_k2;
  if (!o.readings.empty()) draw_readings(s, o, output, streams);
  s.correlation = o.correlation.value_or(0.0);
  s.draws = *o.draws;
  s.seed = o.seed;
  s.threads = o.threads;
  s.sampling = o.sampling.value_or(Sampling::plain);
  s.until_error = o.until_error;
  if (streams.err_is_terminal && !output.quiet) {
    s.progress = [&streams](double share) {
      streams.err << fmt::format("\r{:3.0f} % of the draws", 100.0 * share)
                  << (share >= 1.0 ? "\n" : "") << std::flush;
    };
  }
  return s;
}

std::string simulation_text(const WedgeSimulation& s, const SimulationResult& r) {
  std::string text =
      fmt::format("\nSimulation: {} {} draws, seed {}{}\n  {:<28}{}\n", r.draws,
                  s.sampling == Sampling::plain ? "plain" : "Latin hypercube", s.seed,
                  r.stopped_early ? ", stopped early at the standard error asked for" : "",
                  "a wedge forms", share_text(r.forms));
  if (r.formed == 0) return text;
  text += below_text("factor of safety below 1", *r.below_one, r.fails);
  if (s.target) {
    text += below_text(fmt::format("factor of safety below {}", shortest(*s.target)).c_str(),
                       *r.below_target, r.misses_target);
  }
  text += fmt::format("  modes: both planes {}, plane 1 {}, plane 2 {}, lifts {}\n\n", r.both,
                      r.plane1, r.plane2, r.lifts);
  TextTable table({{"wedges at or below, %"}, {"factor of safety"}});
  for (const SafetyQuantile& q : r.quantiles) {
    table.add_row({fmt::format("{:g}", 100.0 * q.share), safety_text(q.factor_of_safety)});
  }
  return text + table.text();
}

}  // namespace brink::cli
