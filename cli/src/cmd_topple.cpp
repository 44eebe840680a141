#include <fmt/format.h>

#include <algorithm>
#include <memory>
#include <ostream>
#include <utility>

#include "brink/base/digest.hpp"
#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/mechanics/topple_table.hpp"
#include "brink/plot/section.hpp"
#include "brink/record/topple_document.hpp"
#include "commands.hpp"
#include "drawing_file.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "mechanics_options.hpp"
#include "slide_text.hpp"

namespace brink::cli {

namespace {

struct ToppleOptions {
  std::optional<double> face_dip_deg, height_m, upper_dip_deg, step_m;
  std::string blocks_file;
  std::optional<double> a1_m, a2_m;
  std::optional<std::uint64_t> crest;
  double width_m = 0.0;
  Angle base_dip;
  ToppleInput input;
  std::string title;
  OutputOptions output;
};

Error option_error(std::string option, std::string_view what, std::string_view accepted) {
  return Error(ErrorKind::argument, Place{.key = std::move(option)}, what, {}, accepted);
}

[[noreturn]] void refuse(const std::string& option, std::string_view text, std::string_view what,
                         const std::string& form) {
  throw Error(ErrorKind::argument, Place{.key = option}, what, text, form);
}

// "BLOCK=REST": the number of the block and what it is given.
std::pair<std::size_t, std::string_view> block_and_rest(const std::string& option,
                                                        std::string_view text,
                                                        const std::string& form) {
  const std::size_t equals = text.find('=');
  const auto block = parse_integer(text.substr(0, equals));
  if (equals == std::string_view::npos || !block || *block < 1)
    refuse(option, text, "does not begin with the number of a block", form);
  return {static_cast<std::size_t>(*block), text.substr(equals + 1)};
}

// Numbers between separators; nothing where any is none.
std::optional<std::vector<double>> numbers(std::string_view text, char separator) {
  std::vector<double> out;
  for (std::size_t start = 0; start <= text.size();) {
    const std::size_t end = std::min(text.find(separator, start), text.size());
    const auto number = parse_decimal(text.substr(start, end - start));
    if (!number) return {};
    out.push_back(*number);
    start = end + 1;
  }
  return out;
}

BlockWater parse_water(std::string_view text) {
  const std::string form = "BLOCK=BEHIND/FRONT in m, as in 3=4.5/2";
  const auto [block, rest] = block_and_rest("--water", text, form);
  const auto depths = numbers(rest, '/');
  if (!depths || depths->size() != 2) refuse("--water", text, "has no two depths", form);
  return {block, (*depths)[0], (*depths)[1]};
}

BlockForce parse_block_force(const std::string& option, std::string_view text) {
  const std::string form = "BLOCK=KN_M@PLUNGE or BLOCK=KN_M@PLUNGE@HEIGHT, as in 1=500@10@2";
  const auto [block, rest] = block_and_rest(option, text, form);
  const auto parts = numbers(rest, '@');
  if (!parts || parts->size() < 2 || parts->size() > 3)
    refuse(option, text, "is not a force with its plunge", form);
  BlockForce force{block, (*parts)[0], Angle::degrees((*parts)[1]), {}};
  if (parts->size() == 3) force.height_m = (*parts)[2];
  return force;
}

Option repeatable_option(std::string name, std::string value, std::string help, std::string group,
                         std::function<void(std::string_view)> take) {
  Option option;
  option.name = std::move(name);
  option.value = std::move(value);
  option.help = std::move(help);
  option.group = std::move(group);
  option.repeatable = true;
  option.take = std::move(take);
  return option;
}

Option block_force_option(const std::string& name, std::string help, std::string group,
                          std::vector<BlockForce>& target) {
  return repeatable_option(
      name, "BLOCK=KN_M@PLUNGE[@HEIGHT]", std::move(help), std::move(group),
      [name, &target](std::string_view text) { target.push_back(parse_block_force(name, text)); });
}

void add_geometry_options(std::vector<Option>& options, ToppleOptions& o) {
  const std::string group = "Blocks made from the geometry";
  options.push_back(number_option("--face-dip", "DEG", "Dip of the face, the bases' way.",
                                  between(0.0, 180.0, "degrees"), o.face_dip_deg, group));
  options.push_back(
      number_option("--height", "M", "Height of the face.", above(0.0, "m"), o.height_m, group));
  options.push_back(
      with_default(number_option("--upper-dip", "DEG", "Rise of the ground behind the crest.",
                                 from_to(-90.0, 90.0, "degrees"), o.upper_dip_deg, group),
                   "0"));
  options.push_back(with_default(
      number_option("--step", "M",
                    "Rise of the stepped base from block to block, square to the bases.",
                    at_least_value(0.0, "m"), o.step_m, group),
      "0"));
}

void add_table_options(std::vector<Option>& options, ToppleOptions& o) {
  const std::string group = "Blocks given";
  options.push_back(text_option("--blocks", "FILE.csv",
                                "Table with the columns number and height_m, block 1 at the toe.",
                                o.blocks_file, group));
  Option crest;
  crest.name = "--crest";
  crest.value = "NUMBER";
  crest.help = "Block at the crest.";
  crest.group = group;
  crest.take = [&o](std::string_view text) { o.crest = parse_whole("--crest", text, 1, 10000); };
  options.push_back(std::move(crest));
  options.push_back(number_option(
      "--a1", "M",
      "How far a block's top stands above that of the block in front, below the crest.",
      at_least_value(0.0, "m"), o.a1_m, group));
  options.push_back(number_option(
      "--a2", "M", "How far it stands above that of the block behind, above the crest.",
      at_least_value(0.0, "m"), o.a2_m, group));
}

void add_common_options(std::vector<Option>& options, ToppleOptions& o) {
  const std::string group = "Columns and rock";
  options.push_back(required(number_option("--width", "M", "Width of the columns, along the bases.",
                                           above(0.0, "m"), o.width_m, group)));
  options.push_back(required(angle_option("--base-dip", "Dip of the bases, out of the slope.",
                                          from_to(0.0, 90.0, "degrees"), o.base_dip, group)));
  options.push_back(required(number_option("--unit-weight", "KN_M3", "Unit weight of the rock.",
                                           above(0.0, "kN/m3"), o.input.unit_weight_kN_m3, group)));
  options.push_back(required(
      angle_option("--friction", "Friction angle of bases and joints, 0 to below 90 degrees.",
                   {0.0, 90.0, false, true, "degrees"}, o.input.friction, group)));
}

void add_load_options(std::vector<Option>& options, ToppleOptions& o) {
  const std::string group = "Water, loads and bolts, per metre of face";
  ToppleInput& in = o.input;
  options.push_back(with_default(
      number_option("--water-fill", "F",
                    "How full every joint is, 0 (dry) to 1 (as high as its blocks touch); the toe "
                    "is drained.",
                    from_to(0.0, 1.0), in.water_fill, group),
      "0"));
  options.push_back(repeatable_option(
      "--water", "BLOCK=BEHIND/FRONT",
      "Instead: depth of water in the joints behind and in front of one block, above its base, m.",
      group, [&in](std::string_view text) { in.water.push_back(parse_water(text)); }));
  options.push_back(
      with_default(number_option("--water-unit-weight", "KN_M3", "Unit weight of water.",
                                 above(0.0, "kN/m3"), in.water_unit_weight_kN_m3, group),
                   "9.81"));
  options.push_back(with_default(
      number_option("--seismic-horizontal", "K",
                    "Horizontal earthquake load out of the slope, share of the weight.",
                    any_number(), in.seismic_horizontal, group),
      "0"));
  options.push_back(block_force_option("--load",
                                       "A force on one block, pushing out of the slope and down by "
                                       "the plunge (90: a weight), at the "
                                       "middle of its top or at a height above its base.",
                                       group, in.loads));
  options.push_back(block_force_option("--bolt",
                                       "A bolt in one block, pulling into the slope and down by "
                                       "the plunge, at half its height or at a "
                                       "height above its base.",
                                       group, in.bolts));
  options.push_back(with_default(
      angle_option("--bolt-plunge", "Plunge of the bolt on block 1 that would balance the slope.",
                   from_to(-90.0, 90.0, "degrees"), in.balance_bolt_plunge, group),
      "0"));
  options.push_back(number_option("--bolt-height", "M",
                                  "Height of that bolt above the base, where block 1 may topple.",
                                  above(0.0, "m"), in.balance_bolt_height_m, group));
}

ToppleGeometry geometry_of(const ToppleOptions& o) {
  if (!o.face_dip_deg)
    throw option_error("--face-dip", "is missing", "--face-dip and --height, or --blocks FILE.csv");
  if (!o.height_m) throw option_error("--height", "is missing", "--height M");
  for (const auto& [given, name] : {std::pair{o.a1_m.has_value(), "--a1"},
                                    {o.a2_m.has_value(), "--a2"},
                                    {o.crest.has_value(), "--crest"}}) {
    if (given) throw option_error(name, "is given without --blocks", "--blocks FILE.csv with it");
  }
  return {Angle::degrees(*o.face_dip_deg),
          *o.height_m,
          Angle::degrees(o.upper_dip_deg.value_or(0.0)),
          o.base_dip,
          o.width_m,
          o.step_m.value_or(0.0)};
}

struct Problem {
  ToppleInput input;
  std::optional<ToppleGeometry> geometry;
  Value file;  // name and digest of the table of blocks
  std::vector<std::string> warnings;
};

void refuse_geometry(const ToppleOptions& o) {
  for (const auto& [given, name] : {std::pair{o.face_dip_deg.has_value(), "--face-dip"},
                                    {o.height_m.has_value(), "--height"},
                                    {o.upper_dip_deg.has_value(), "--upper-dip"},
                                    {o.step_m.has_value(), "--step"}}) {
    if (given)
      throw option_error(name, "is given together with --blocks",
                         "blocks given or made from the geometry");
  }
  if (!o.crest) throw option_error("--crest", "is missing for --blocks", "--crest NUMBER");
  if (!o.a1_m) throw option_error("--a1", "is missing for --blocks", "--a1 M");
  if (!o.a2_m) throw option_error("--a2", "is missing for --blocks", "--a2 M");
}

template <typename T>
void append(std::vector<T>& to, const std::vector<T>& from) {
  to.insert(to.end(), from.begin(), from.end());
}

Problem problem_of(const ToppleOptions& o, Streams& streams) {
  Problem out{o.input, {}, {}, {}};
  if (o.blocks_file.empty()) {
    out.geometry = geometry_of(o);
    out.input.columns = topple_columns(*out.geometry);
    return out;
  }
  refuse_geometry(o);
  const std::string bytes = read_bytes(o.blocks_file, streams);
  const ToppleTable table = read_topple_table(bytes, o.blocks_file);
  out.file = Object{{"name", o.blocks_file}, {"sha256", sha256_hex(bytes)}};
  out.input.columns = {
      table.heights_m, static_cast<std::size_t>(*o.crest), o.width_m, o.base_dip, *o.a1_m, *o.a2_m};
  append(out.input.water, table.water);
  append(out.input.loads, table.loads);
  append(out.input.bolts, table.bolts);
  out.warnings = table.warnings;
  return out;
}

int run(const ToppleOptions& o, Streams& streams) {
  const Problem problem = problem_of(o, streams);
  const ToppleResult result = analyse_toppling(problem.input);
  std::vector<std::string> warnings = problem.warnings;
  append(warnings, result.warnings);
  if (!o.output.output.empty())
    write_drawing(o.output.output, plot::topple_sheet(problem.input, result, o.title));
  print_warnings(warnings, o.output, streams);
  if (o.output.json) {
    Object inputs{{"blocks_file", problem.file}};
    const Object values = topple_inputs(problem.input, problem.geometry);
    for (const auto& [key, value] : values.members()) inputs.add(key, value);
    streams.out << to_json(result_document("topple", inputs, warnings, topple_value(result)));
  } else {
    streams.out << topple_text(problem.input, result);
  }
  return kDone;
}

}  // namespace

Command topple_command() {
  const auto state = std::make_shared<ToppleOptions>();
  Command command;
  command.name = "topple";
  command.summary = "Block toppling by limit equilibrium.";
  command.description =
      "Columns on a stepped base, from the top block down: each passes on the force that keeps it "
      "from toppling or from sliding (Goodman & Bray 1976), per metre of face. The blocks are made "
      "from the geometry or given in a table, which may have the columns water_behind_m, "
      "water_front_m, load_kN_m, load_plunge_deg, bolt_kN_m and bolt_plunge_deg too. The factor of "
      "safety is tan(friction) over the tangent of the friction that just balances the toe.";
  add_common_options(command.options, *state);
  add_geometry_options(command.options, *state);
  add_table_options(command.options, *state);
  add_load_options(command.options, *state);
  add_drawing_options(command.options, state->title, state->output);
  add_output_options(command.options, state->output);
  command.examples = {
      {"brink topple --face-dip 57 --height 90 --upper-dip 4 --base-dip 30 --width 10 --step 1 "
       "--unit-weight 25 --friction 36",
       "Blocks made from the geometry."},
      {"brink topple --blocks road-cut/columns.csv --width 2 --base-dip 28 --crest 6 --a1 1.2 "
       "--a2 0.9 --unit-weight 26 --friction 33 --water-fill 0.2 --bolt-plunge 10",
       "Measured blocks with some water in the joints, and the bolt at the toe."}};
  command.run = [state](const std::vector<std::string>&, Streams& streams) {
    return run(*state, streams);
  };
  return command;
}

}  // namespace brink::cli
