// Readings from the FILEs of a command line.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/readings/bias.hpp"
#include "brink/readings/readings.hpp"
#include "brink/record/document.hpp"
#include "brink/record/site.hpp"
#include "command_line.hpp"
#include "options.hpp"

namespace brink::cli {

struct InputOptions {
  ReadingOptions reading;
  std::string set_column;  // heading of the column that names the sets; empty: none
  bool strict = false;     // any rejected line is an error
  BiasOptions bias;
  std::string site_file;  // --site, in place of FILEs; empty: none
};

// --site, --notation, --strike-rule, --declination, --hole, --reference-line, --overturned, --only,
// --strict, and for orientation bias --traverse, --traverse-column, --blind-angle, --unweighted.
// `target` must outlive the options.
void add_input_options(std::vector<Option>& options, InputOptions& target);
// --set-column, for commands that work with sets.
Option set_column_option(InputOptions& target);

// The bytes of a file, or of streams.in for "-". Error(file) where it can't be read or is a folder.
std::string read_bytes(const std::string& name, Streams& streams);

// The site file of --site, or nothing. Error(argument) where FILEs or options that say how files
// are written stand beside it: the site file says that for each of its own.
std::optional<Site> load_site(const std::vector<std::string>& files, const InputOptions& options);

// The files read by this run, so that no output overwrites them.
std::vector<std::string> files_read(const std::vector<std::string>& files,
                                    const std::optional<Site>& site);

// Reads the files ("-": standard input, once) or those of the site, checks that the set column is
// there, weighs the readings for orientation bias, and prints warnings and rejected lines to
// streams.err unless quiet: up to `most_rejections` of these one by one, the rest as a count.
Readings load_readings(const std::vector<std::string>& files, const InputOptions& options,
                       const OutputOptions& output, Streams& streams,
                       std::size_t most_rejections = 20,
                       const std::optional<Site>& site = std::nullopt);

// What a command that reads files echoes about them: readings_inputs(), the traverses, and the site
// (null where there is none).
Object input_record(const Readings& readings, const InputOptions& options,
                    const std::optional<Site>& site = std::nullopt);

// To be called once the results stand printed: Error(input), and so status 1, where not one reading
// was usable or, with --strict, where a line was rejected.
void require_usable(const Readings& readings, const InputOptions& options);

// "pit.csv:7:1: dip: '120' is above 90; accepted: 0 to 90 degrees".
std::string rejection_text(const Rejection& rejection);
// "171 of 180 readings used (6 rejected, 3 left out by --only)".
std::string usage_text(const Readings& readings);

}  // namespace brink::cli
