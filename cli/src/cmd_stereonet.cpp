// brink stereonet: the net of the readings, and the four modes of each face.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/sheet.hpp"
#include "brink/record/kinematics_document.hpp"
#include "brink/record/stereonet_document.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "output_file.hpp"
#include "site_tests.hpp"
#include "source_date.hpp"

namespace brink::cli {

namespace {

constexpr double kHighestLevel = 10000.0;

struct StereonetRun {
  InputOptions input;
  KinematicsOptions tests;
  OutputOptions output;
  Typed typed;
  bool no_sets = false;
  std::optional<std::size_t> set_count;
  Projection projection = Projection::equal_angle;
  bool contours = true;
  std::vector<double> levels;  // empty: chosen from the peak
  std::optional<double> kernel;
  std::string title;
};

Option projection_option(StereonetRun& run) {
  Option option;
  option.name = "--projection";
  option.value = "NAME";
  option.help =
      "equal-angle (circles stay circles) or equal-area (crowding can be compared across the net).";
  option.default_text = "equal-angle";
  option.group = "Drawing";
  option.take = [&run](std::string_view text) {
    if (text != "equal-angle" && text != "equal-area") {
      throw Error(ErrorKind::argument, Place{.key = "--projection"}, "is not a projection", text,
                  "equal-angle, equal-area");
    }
    run.projection = text == "equal-angle" ? Projection::equal_angle : Projection::equal_area;
  };
  return option;
}

std::vector<double> parse_levels(std::string_view text) {
  const Interval accepted = between(0.0, kHighestLevel, "times uniform");
  std::vector<double> levels;
  for (std::size_t at = 0; at <= text.size();) {
    const std::size_t comma = std::min(text.find(',', at), text.size());
    levels.push_back(parse_number("--contours", text.substr(at, comma - at), accepted));
    at = comma + 1;
  }
  std::sort(levels.begin(), levels.end());
  levels.erase(std::unique(levels.begin(), levels.end()), levels.end());
  return levels;
}

Option contours_option(StereonetRun& run) {
  Option option;
  option.name = "--contours";
  option.value = "LEVELS";
  option.help =
      "Density contours of the poles in multiples of a uniform scatter: on, off, or levels such as "
      "2,4,8.";
  option.default_text = "on";
  option.group = "Drawing";
  option.take = [&run](std::string_view text) {
    run.contours = text != "off";
    run.levels.clear();
    if (text != "off" && text != "on") run.levels = parse_levels(text);
  };
  return option;
}

Option count_option(StereonetRun& run) {
  Option option;
  option.name = "--count";
  option.value = "K";
  option.help = "Looks for this number of sets; without it the number is chosen.";
  option.group = "Sets";
  option.take = [&run](std::string_view text) {
    run.set_count = static_cast<std::size_t>(parse_whole("--count", text, 0, 50));
  };
  return option;
}

bool friction_typed(const StereonetRun& run) {
  return run.typed.contains("--friction");
}

void check_options(const StereonetRun& run) {
  if (run.output.output.empty()) {
    throw Error(ErrorKind::argument, Place{.key = "-o"}, "is missing", {},
                "a file ending in .svg, .pdf or .png");
  }
  known_ending("-o", run.output.output, {".svg", ".pdf", ".png"});
  if (friction_typed(run) && run.tests.faces.empty() && run.input.site_file.empty()) {
    throw Error(ErrorKind::argument, Place{.key = "--friction"}, "is given without a face", {},
                "--face DIP/DIR as well");
  }
  const int ways = static_cast<int>(run.no_sets) + static_cast<int>(run.set_count.has_value()) +
                   static_cast<int>(!run.input.set_column.empty());
  if (ways > 1) {
    throw Error(ErrorKind::argument, {},
                "only one of --count, --set-column and --no-sets can say where sets come from");
  }
}

SetsResult sets_of(const Readings& readings, const StereonetRun& run,
                   const std::optional<Site>& site) {
  if (run.no_sets) {
    SetsResult none;
    none.assignment.assign(readings.size(), 0);
    none.unassigned = readings.size();
    return none;
  }
  return sets_with_site(readings, run.input.set_column,
                        {run.set_count, run.tests.seed, run.tests.threads}, site);
}

// Everything the drawing shows.
struct Shown {
  Readings readings;
  SetsResult sets;
  std::optional<DensityGrid> density;
  std::vector<double> levels;
  std::vector<Face> faces;
  std::vector<KinematicsOptions> tests;
  std::optional<KinematicsResult> kinematics;
};

// With a face and a friction angle the modes are tested too.
bool tests_wanted(const std::vector<KinematicsOptions>& tests, const StereonetRun& run,
                  const std::optional<Site>& site) {
  if (tests.empty() || tests.front().faces.empty()) return false;
  return friction_typed(run) || (site && kinematic_friction(*site));
}

Shown work_out(Readings readings, const StereonetRun& run, const std::optional<Site>& site) {
  Shown shown{std::move(readings), {}, {}, {}, {}, {}, {}};
  shown.sets = sets_of(shown.readings, run, site);
  shown.tests = tests_with_site(run.tests, run.typed, site);
  for (const KinematicsOptions& test : shown.tests) {
    shown.faces.insert(shown.faces.end(), test.faces.begin(), test.faces.end());
  }
  if (run.contours) {
    const AxialDensity density(shown.readings.normals, shown.readings.weights, run.kernel);
    shown.density = density_grid(density, kDensityRings, run.tests.threads);
    shown.levels = run.levels.empty() ? usual_levels(shown.density->peak) : run.levels;
  }
  if (tests_wanted(shown.tests, run, site)) {
    shown.kinematics = run_tests(shown.readings, shown.sets, shown.tests);
  }
  return shown;
}

std::vector<plot::Picture> pages_of(const Shown& shown, const StereonetRun& run) {
  plot::NetContent content{shown.readings, shown.sets,  shown.density ? &*shown.density : nullptr,
                           shown.levels,   shown.faces, {}};
  const plot::SheetText text{run.title, {}};
  if (!shown.kinematics) return {plot::net_sheet(content, run.projection, text)};
  std::vector<plot::Picture> pages;
  KinematicsResult kinematics = *shown.kinematics;
  for (std::size_t face = 0; face < shown.faces.size(); ++face) {
    kinematics.options.upper = kinematics.faces[face].upper;
    content.marked_face = face;
    pages.push_back(plot::face_sheet(content, run.projection, text, kinematics, face));
  }
  return pages;
}

plot::Painted painted(const std::vector<plot::Picture>& pages, const std::string& ending) {
  if (ending == ".pdf") return plot::paint_pdf(pages, source_date());
  const plot::Picture one = pages.size() == 1 ? pages.front() : plot::stacked(pages);
  return ending == ".svg" ? plot::paint_svg(one) : plot::paint_png(one);
}

Value inputs_value(const Shown& shown, const StereonetRun& run, const std::optional<Site>& site) {
  Object inputs = input_record(shown.readings, run.input, site);
  const Object tests = kinematics_inputs(shown.kinematics ? shown.kinematics->options : run.tests);
  for (const auto& [key, value] : tests.members()) {
    inputs.add(key, key == "friction_deg" && !shown.kinematics ? Value() : value);
  }
  inputs.add("set_column", run.input.set_column.empty() ? Value() : Value(run.input.set_column));
  inputs.add("find_sets", !run.no_sets && run.input.set_column.empty());
  inputs.add("count", run.set_count ? Value(std::uint64_t{*run.set_count}) : Value());
  inputs.add("projection", name_of(run.projection));
  Array levels;
  for (const double level : run.levels) levels.emplace_back(level);
  inputs.add("contours", run.levels.empty() ? Value(run.contours) : Value(std::move(levels)));
  inputs.add("kernel_concentration", run.kernel);
  inputs.add("title", run.title);
  inputs.add("output", run.output.output);
  return inputs;
}

std::string drawn_text(const Shown& shown, const StereonetRun& run, std::size_t pages) {
  std::string text = fmt::format("{}; drawn to {}", usage_text(shown.readings), run.output.output);
  if (pages > 1) text += fmt::format(", a sheet for each of {} faces", pages);
  text += '\n';
  if (shown.density) {
    const Line& peak = shown.density->peak_line;
    text +=
        fmt::format("densest at the pole {:03d}/{:02.0f}: {:.1f} times uniform\n",
                    std::lround(peak.trend.deg()) % 360, peak.plunge.deg(), shown.density->peak);
  }
  return text;
}

int run_stereonet(const std::vector<std::string>& files, const StereonetRun& run,
                  Streams& streams) {
  check_options(run);
  const std::optional<Site> site = load_site(files, run.input);
  Readings readings = load_readings(files, run.input, run.output, streams, 20, site);
  if (readings.size() == 0) require_usable(readings, run.input);
  const Shown shown = work_out(std::move(readings), run, site);
  const auto pages = pages_of(shown, run);
  const std::string ending = known_ending("-o", run.output.output, {".svg", ".pdf", ".png"});
  const plot::Painted file = painted(pages, ending);
  std::vector<std::string> warnings = shown.sets.warnings;
  if (shown.kinematics) {
    const auto& more = shown.kinematics->warnings;
    warnings.insert(warnings.end(), more.begin(), more.end());
  }
  warnings.insert(warnings.end(), file.warnings.begin(), file.warnings.end());
  print_warnings(warnings, run.output, streams);
  write_file(run.output.output, file.bytes, files_read(files, site));
  if (run.output.json) {
    const auto& before = shown.readings.warnings;
    warnings.insert(warnings.begin(), before.begin(), before.end());
    streams.out << to_json(
        result_document("stereonet", inputs_value(shown, run, site), warnings,
                        stereonet_result({run.output.output, pages.size(), pages.front().width_mm,
                                          pages.front().height_mm, shown.readings, shown.sets,
                                          shown.density ? &*shown.density : nullptr, shown.levels,
                                          shown.kinematics ? &*shown.kinematics : nullptr})));
  } else if (!run.output.quiet) {
    streams.out << drawn_text(shown, run, pages.size());
  }
  require_usable(shown.readings, run.input);
  return kDone;
}

void add_drawing_options(std::vector<Option>& options, StereonetRun& run) {
  options.push_back(output_option(
      "OUT.svg", "The drawing: .svg, .pdf (a page for each face) or .png. Required.", run.output));
  options.push_back(projection_option(run));
  options.push_back(contours_option(run));
  options.push_back(number_option(
      "--kernel", "K",
      "Concentration of the density's kernel; by the rule 2 (1 + N/9), at most 200, without it.",
      Interval{0.0, kHighestLevel, true, false, {}}, run.kernel, "Drawing"));
  options.push_back(
      text_option("--title", "TEXT", "Heading of the drawing.", run.title, "Drawing"));
}

}  // namespace

Command stereonet_command() {
  const auto run = std::make_shared<StereonetRun>();
  Command command;
  command.name = "stereonet";
  command.summary = "Draws the readings on a lower-hemisphere net";
  command.description =
      "Poles by set, mean planes and cones, density contours and faces. With --face and --friction "
      "a small net for each mode shows where a pole or a line of intersection is free to move, and "
      "the counts; several faces become pages of a PDF, and stand one below the other in SVG and "
      "PNG.";
  command.positionals = Positionals::files;
  add_drawing_options(command.options, *run);
  add_kinematic_options(command.options, run->tests, false);
  note_typed(command.options, run->typed);
  add_input_options(command.options, run->input);
  command.options.push_back(set_column_option(run->input));
  command.options.push_back(count_option(*run));
  command.options.push_back(
      flag_option("--no-sets", "Looks for no sets: all poles alike.", run->no_sets, "Sets"));
  command.options.push_back(seed_option(run->tests.seed));
  command.options.push_back(threads_option(run->tests.threads));
  add_output_options(command.options, run->output);
  command.examples = {
      {"brink stereonet quarry/readings.csv -o net.svg", "Poles, sets and contours."},
      {"brink stereonet quarry/readings.csv --face 70/135 --friction 32 -o sheet.pdf",
       "The net and the four modes of one face on a page."},
  };
  command.run = [run](const std::vector<std::string>& files, Streams& streams) {
    return run_stereonet(files, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
