#include "input.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cerrno>
#include <cstdio>
#include <filesystem>
#include <istream>
#include <iterator>
#include <memory>
#include <ostream>
#include <system_error>

#include "brink/base/error.hpp"
#include "brink/base/large_memory.hpp"
#include "brink/record/readings_document.hpp"
#include "brink/record/site_document.hpp"

namespace brink::cli {

namespace {

constexpr auto kGroup = "Reading the files";

Error option_error(const std::string& option, std::string_view text, std::string_view what,
                   std::string_view accepted) {
  return Error(ErrorKind::argument, Place{.key = option}, what, text.empty() ? "''" : text,
               accepted);
}

Option input_option(std::string name, std::string value, std::string help) {
  Option option;
  option.name = std::move(name);
  option.value = std::move(value);
  option.help = std::move(help);
  option.group = kGroup;
  return option;
}

Option notation_option(ReadingOptions& target) {
  Option option = input_option("--notation", "NAME",
                               "How planes are written: " + notation_names() +
                                   ". Also settles what a heading such as 'azimuth' means.");
  option.default_text = "as the headings say";
  option.take = [&target](std::string_view text) {
    target.notation = notation_named(text);
    if (!target.notation) {
      throw option_error("--notation", text, "is not a notation", notation_names());
    }
  };
  return option;
}

Option strike_rule_option(ReadingOptions& target) {
  Option option =
      input_option("--strike-rule", "right|left",
                   "Side to which strikes without a quadrant dip: right, dip direction = strike + "
                   "90; left, strike - 90. Strikes are written by the same rule.");
  option.take = [&target](std::string_view text) {
    if (text != "right" && text != "left") {
      throw option_error("--strike-rule", text, "is not a strike rule", "right or left");
    }
    target.strike_rule = text == "right" ? StrikeRule::right : StrikeRule::left;
  };
  return option;
}

Option declination_option(ReadingOptions& target) {
  constexpr double half_turn = 180.0;
  Option option =
      angle_option("--declination",
                   "Degrees from grid to magnetic north, east positive: added to every azimuth "
                   "once. A column 'declination' overrides it row by row.",
                   from_to(-half_turn, half_turn, "degrees"), target.declination, kGroup);
  option.default_text = "0";
  return option;
}

Hole& hole_of(ReadingOptions& target) {
  if (!target.hole) target.hole.emplace();
  return *target.hole;
}

Option hole_option(ReadingOptions& target) {
  Option option = input_option("--hole", "TREND/PLUNGE",
                               "How the borehole runs, for alpha and beta of core; plunge negative "
                               "upwards. In a vertical hole the trend is the reference line's.");
  option.take = [&target](std::string_view text) {
    Line axis = parse_line("--hole", text);
    // A vertical hole keeps its trend: it says where the reference line is.
    axis.trend = parse_angle("--hole", text.substr(0, text.find('/')), from_to(0.0, 360.0));
    hole_of(target).axis = axis;
  };
  return option;
}

Option only_option(ReadingOptions& target) {
  Option option = input_option("--only", "FILTER",
                               "Leaves out all rows but those with COLUMN=VALUE[,VALUE], "
                               "COLUMN>=NUMBER, COLUMN<=NUMBER or COLUMN=FROM..TO.");
  option.repeatable = true;
  option.take = [&target](std::string_view text) {
    try {
      target.only.push_back(parse_filter(text));
    } catch (const Error& error) {
      throw option_error("--only", text, "is not a filter", error.accepted());
    }
  };
  return option;
}

constexpr auto kBiasGroup = "Orientation bias";

void add_bias_options(std::vector<Option>& options, BiasOptions& target) {
  Option traverse;
  traverse.name = "--traverse";
  traverse.value = "NAME=KIND@...";
  traverse.help =
      "Where readings were taken: NAME=scanline@TREND/PLUNGE, NAME=borehole@TREND/PLUNGE or "
      "NAME=window@DIP/DIR, NAME as in the readings' column. Readings weigh more the closer their "
      "plane runs along the traverse. One traverse without NAME= holds for all readings.";
  traverse.repeatable = true;
  traverse.group = kBiasGroup;
  traverse.take = [&target](std::string_view text) {
    target.traverses.push_back(parse_traverse(text, "--traverse"));
  };
  options.push_back(std::move(traverse));
  Option column = text_option("--traverse-column", "NAME", "Column that names the traverse.",
                              target.column, kBiasGroup);
  column.default_text = "traverse";
  options.push_back(std::move(column));
  constexpr double right = 90.0;
  Option blind = angle_option("--blind-angle",
                              "Planes that meet their traverse at less than this angle weigh as at "
                              "it, and are pointed out.",
                              {0.0, right, true, false, "degrees"}, target.blind_angle, kBiasGroup);
  blind.default_text = "15";
  options.push_back(std::move(blind));
  options.push_back(flag_option("--unweighted",
                                "Every reading weighs the same, whatever its traverse or its "
                                "column of weights.",
                                target.unweighted, kBiasGroup));
}

std::string read_stream(std::istream& in) {
  return {std::istreambuf_iterator<char>(in), std::istreambuf_iterator<char>()};
}

Error file_error(const std::string& name, std::string_view what) {
  return Error(ErrorKind::file, Place{.file = name}, what);
}

struct CloseFile {
  void operator()(std::FILE* file) const { std::fclose(file); }
};

// Reads to the end, whatever size the file claims: pipes and devices claim none.
std::string read_open_file(std::FILE* file, const std::string& name, std::size_t claimed) {
  constexpr std::size_t piece = std::size_t{1} << 16;
  std::string bytes;
  bytes.reserve(claimed + 1);
  expect_large(bytes.data(), bytes.capacity());
  std::size_t used = 0;
  for (;;) {
    if (used == bytes.size()) bytes.resize(std::max({claimed + 1, used + piece, used + used / 2}));
    const std::size_t got = std::fread(bytes.data() + used, 1, bytes.size() - used, file);
    used += got;
    if (got > 0) continue;
    if (std::ferror(file) != 0) {
      throw file_error(name,
                       fmt::format("can't be read: {}", std::generic_category().message(errno)));
    }
    bytes.resize(used);
    return bytes;
  }
}

void check_set_column(const Readings& readings, const InputOptions& options) {
  if (options.set_column.empty() || readings.find_column(options.set_column) != nullptr) return;
  std::string headings;
  for (const ExtraColumn& column : readings.extra) {
    headings += fmt::format("{}{}", headings.empty() ? "" : ", ", printable(column.heading));
  }
  throw option_error("--set-column", options.set_column, "is not a column of the readings",
                     headings.empty() ? "a column beside those of the plane" : headings);
}

void print_rejections(const Readings& readings, std::size_t most, Streams& streams) {
  if (readings.rejected.empty()) return;
  const std::size_t shown = std::min(most, readings.rejected.size());
  for (std::size_t i = 0; i < shown; ++i) {
    streams.err << "warning: " << rejection_text(readings.rejected[i]) << '\n';
  }
  if (shown < readings.rejected.size() && shown > 0) {
    streams.err << "warning: and " << readings.rejected.size() - shown
                << " more rejected lines; 'brink readings' lists them all\n";
  }
  streams.err << "warning: " << usage_text(readings) << '\n';
}

}  // namespace

void add_input_options(std::vector<Option>& options, InputOptions& target) {
  options.push_back(
      text_option("--site", "SITE.toml",
                  "In place of FILEs: the site file that names them and says how each "
                  "is written.",
                  target.site_file, kGroup));
  options.push_back(notation_option(target.reading));
  options.push_back(strike_rule_option(target.reading));
  options.push_back(declination_option(target.reading));
  options.push_back(hole_option(target.reading));
  Option reference = input_option("--reference-line", "top|bottom",
                                  "Side of the core on which the reference line was drawn.");
  reference.default_text = "top";
  reference.take = [&reading = target.reading](std::string_view text) {
    if (text != "top" && text != "bottom") {
      throw option_error("--reference-line", text, "is not a side of the core", "top or bottom");
    }
    hole_of(reading).reference = text == "top" ? ReferenceLine::top : ReferenceLine::bottom;
  };
  options.push_back(std::move(reference));
  options.push_back(flag_option("--overturned",
                                "Takes dips above 90 and up to 180 degrees as overturned beds and "
                                "marks them in a column 'overturned'.",
                                target.reading.overturned, kGroup));
  options.push_back(only_option(target.reading));
  options.push_back(flag_option("--strict", "Makes any rejected line an error, status 1.",
                                target.strict, kGroup));
  add_bias_options(options, target.bias);
}

Option set_column_option(InputOptions& target) {
  return text_option("--set-column", "NAME",
                     "Takes the sets as this column names them; empty or 0: in no set.",
                     target.set_column, kGroup);
}

std::string read_bytes(const std::string& name, Streams& streams) {
  if (name == "-") return read_stream(streams.in);
  std::error_code failure;
  if (std::filesystem::is_directory(name, failure)) {
    throw file_error(name, "is a folder; accepted: a file of readings");
  }
  const std::unique_ptr<std::FILE, CloseFile> file(std::fopen(name.c_str(), "rb"));
  if (!file) {
    throw file_error(name,
                     fmt::format("can't be opened: {}", std::generic_category().message(errno)));
  }
  const auto size = std::filesystem::file_size(name, failure);
  return read_open_file(file.get(), name, failure ? 0 : static_cast<std::size_t>(size));
}

std::optional<Site> load_site(const std::vector<std::string>& files, const InputOptions& options) {
  if (options.site_file.empty()) return {};
  if (!files.empty()) {
    throw option_error("FILE", files.front(), "stands beside --site, which names the files",
                       "files or --site");
  }
  const ReadingOptions& reading = options.reading;
  const bool says_how = reading.notation || reading.strike_rule || reading.hole ||
                        reading.overturned || reading.declination != Angle() ||
                        !options.bias.traverses.empty();
  if (says_how) {
    throw option_error("--site", options.site_file,
                       "stands beside options that say how its files were written and taken",
                       "[[readings]] and [[traverse]] in the site file");
  }
  return read_site(options.site_file);
}

std::vector<std::string> files_read(const std::vector<std::string>& files,
                                    const std::optional<Site>& site) {
  if (!site) return files;
  std::vector<std::string> result{site->source.name};
  for (const SiteReadings& readings : site->readings) result.push_back(readings.file);
  return result;
}

namespace {

Readings read_files(const std::vector<std::string>& files, const ReadingOptions& options,
                    Streams& streams) {
  if (files.empty()) {
    throw Error(ErrorKind::argument, Place{.key = "FILE"}, "is missing", {},
                "one or more files of readings, or - for standard input");
  }
  if (std::count(files.begin(), files.end(), "-") > 1) {
    throw option_error("FILE", "-", "is named twice", "standard input once");
  }
  std::vector<std::string> contents;
  for (const std::string& name : files) contents.push_back(read_bytes(name, streams));
  std::vector<InputBytes> inputs;
  for (std::size_t i = 0; i < files.size(); ++i) inputs.push_back({files[i], contents[i]});
  return read_readings(inputs, options);
}

Readings read_site_files(const Site& site, const ReadingOptions& options, Streams& streams) {
  std::vector<std::string> contents;
  for (const SiteReadings& readings : site.readings) {
    contents.push_back(read_bytes(readings.file, streams));
  }
  std::vector<ReadingSource> sources;
  for (std::size_t i = 0; i < contents.size(); ++i) {
    ReadingSource source{{site.readings[i].file, contents[i]}, site.readings[i].options};
    auto& only = source.options.only;
    only.insert(only.end(), options.only.begin(), options.only.end());
    sources.push_back(std::move(source));
  }
  return read_readings(sources);
}

}  // namespace

Readings load_readings(const std::vector<std::string>& files, const InputOptions& options,
                       const OutputOptions& output, Streams& streams, std::size_t most_rejections,
                       const std::optional<Site>& site) {
  Readings readings = site ? read_site_files(*site, options.reading, streams)
                           : read_files(files, options.reading, streams);
  check_set_column(readings, options);
  BiasOptions bias = site ? site->bias : options.bias;
  bias.unweighted = options.bias.unweighted;
  weigh_readings(readings, bias);
  print_warnings(readings.warnings, output, streams);
  if (!output.quiet) print_rejections(readings, most_rejections, streams);
  return readings;
}

Object input_record(const Readings& readings, const InputOptions& options,
                    const std::optional<Site>& site) {
  Object record = readings_inputs(readings, options.reading);
  record.add("site", site ? site_value(*site) : Value());
  const BiasOptions& bias = site ? site->bias : options.bias;
  Array traverses;
  for (const Traverse& traverse : bias.traverses) {
    traverses.push_back(traverse_value(traverse));
  }
  record.add("traverses", std::move(traverses));
  record.add("traverse_column", bias.column);
  record.add("blind_angle_deg", bias.blind_angle.deg());
  record.add("unweighted", options.bias.unweighted);
  return record;
}

void require_usable(const Readings& readings, const InputOptions& options) {
  const bool none = readings.size() == 0;
  if (!none && (!options.strict || readings.rejected.empty())) return;
  const std::string counts =
      fmt::format("{} row{} read, {} rejected, {} left out by a filter", readings.read,
                  readings.read == 1 ? "" : "s", readings.rejected.size(), readings.filtered);
  if (readings.rejected.empty()) {
    const std::string file = readings.files.empty() ? "" : readings.files.front().name;
    throw Error(ErrorKind::input, Place{.file = file}, "not one usable reading: " + counts, {},
                "a heading line and at least one reading");
  }
  const Rejection& first = readings.rejected.front();
  throw Error(
      ErrorKind::input, {first.file, first.line, first.column, first.heading},
      fmt::format("{} ({}: {})", first.reason,
                  none ? "not one usable reading" : "--strict allows no rejected line", counts),
      first.value);
}

std::string rejection_text(const Rejection& rejection) {
  const Place place{rejection.file, rejection.line, rejection.column, rejection.heading};
  const std::string value = rejection.value.empty() ? "" : fmt::format("'{}' ", rejection.value);
  return to_string(place) + value + rejection.reason;
}

std::string usage_text(const Readings& readings) {
  std::string parts;
  if (!readings.rejected.empty()) parts += fmt::format("{} rejected", readings.rejected.size());
  if (readings.filtered > 0) {
    parts += fmt::format("{}{} left out by --only", parts.empty() ? "" : ", ", readings.filtered);
  }
  return fmt::format("{} of {} readings used{}", readings.size(), readings.read,
                     parts.empty() ? "" : " (" + parts + ")");
}

}  // namespace brink::cli
