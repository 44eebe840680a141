// brink report: the whole job from one site file, into a folder.
#include <fmt/format.h>

#include <filesystem>
#include <memory>
#include <ostream>

#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/sheet.hpp"
#include "brink/record/csv_tables.hpp"
#include "brink/record/job_document.hpp"
#include "brink/record/readings_document.hpp"
#include "brink/record/sets_document.hpp"
#include "commands.hpp"
#include "exit_status.hpp"
#include "input.hpp"
#include "job_text.hpp"
#include "output_file.hpp"
#include "source_date.hpp"

namespace brink::cli {

namespace {

struct ReportRun {
  InputOptions input;
  OutputOptions output;
  JobOptions job;
};

std::vector<plot::Picture> sheets_of(const Job& job) {
  std::vector<Face> faces;
  for (const SiteFace& face : job.site.faces) faces.push_back(face.face);
  const AxialDensity density(job.readings.normals, job.readings.weights);
  const DensityGrid grid = density_grid(density, kDensityRings, job.options.threads);
  plot::NetContent content{job.readings, job.sets, &grid, usual_levels(grid.peak), faces, {}};
  std::vector<plot::Picture> sheets;
  for (std::size_t i = 0; i < job.faces.size(); ++i) {
    content.marked_face = i;
    const plot::SheetText text{job.site.title + ", " + job.faces[i].face.name, {}};
    sheets.push_back(
        plot::face_sheet(content, Projection::equal_angle, text, job.faces[i].kinematics, 0));
  }
  return sheets;
}

// sheet.svg for one face, sheet-1.svg and so on for several; all of them are pages of sheet.pdf.
std::vector<NamedFile> drawings_of(const Job& job, std::vector<std::string>& warnings) {
  const std::vector<plot::Picture> sheets = sheets_of(job);
  std::vector<NamedFile> files;
  for (std::size_t i = 0; i < sheets.size(); ++i) {
    const std::string name = sheets.size() == 1 ? "sheet.svg" : fmt::format("sheet-{}.svg", i + 1);
    files.push_back({name, plot::paint_svg(sheets[i], fmt::format("sheet{}", i + 1)).bytes});
  }
  plot::Painted pdf = plot::paint_pdf(sheets, source_date());
  warnings.insert(warnings.end(), pdf.warnings.begin(), pdf.warnings.end());
  files.push_back({"sheet.pdf", std::move(pdf.bytes)});
  return files;
}

std::vector<NamedFile> tables_of(const Job& job) {
  return {{"readings.csv", readings_csv(with_set_column(job.readings, job.sets), {})},
          {"sets.csv", sets_csv(job.sets)},
          {"kinematics.csv", kinematics_csv(job)},
          {"planes.csv", planes_csv(job)},
          {"wedges.csv", wedges_csv(job)}};
}

int run_report(const std::vector<std::string>& operands, const ReportRun& run, Streams& streams) {
  const std::optional<Site> site = read_site(operands.front());
  const Readings readings = load_readings({}, run.input, run.output, streams, 20, site);
  require_usable(readings, run.input);
  const Job job = run_job(*site, readings, run.job);

  std::vector<std::string> warnings = job.warnings;
  std::vector<NamedFile> files = tables_of(job);
  for (NamedFile& drawing : drawings_of(job, warnings)) files.push_back(std::move(drawing));
  const std::string document =
      to_json(result_document("report", job_inputs(job), warnings, job_result(job)));
  files.push_back({"report.json", document});
  const std::string text = job_text(job);
  files.push_back({"report.txt", text});

  // Those of the readings were printed when they were read.
  const auto more = static_cast<std::ptrdiff_t>(readings.warnings.size());
  print_warnings({warnings.begin() + more, warnings.end()}, run.output, streams);
  write_folder(run.output.output, files, files_read({}, site));
  if (run.output.json) {
    streams.out << document;
    return kDone;
  }
  streams.out << text << "\nWritten to " << run.output.output << ":";
  for (const NamedFile& file : files) streams.out << ' ' << file.name;
  streams.out << '\n';
  return kDone;
}

}  // namespace

Command report_command() {
  const auto run = std::make_shared<ReportRun>();
  Command command;
  command.name = "report";
  command.summary = "The whole job from one site file: tables, drawings, factors of safety";
  command.description =
      "Reads the site file and the readings it names, finds or takes the sets, tests every face, "
      "and follows what can move: each set whose mean plane is free to slide and each pair of sets "
      "whose mean planes' line daylights gets a factor of safety, dry and with the water and "
      "shaking of the site file, held against its target. Writes a sheet for each face (SVG, and "
      "one PDF), CSV tables, report.json and report.txt into a folder.";
  command.positionals = Positionals::site;
  command.options.push_back(flag_option("--strict", "Makes any rejected line an error, status 1.",
                                        run->input.strict, "Reading the files"));
  command.options.push_back(seed_option(run->job.seed));
  command.options.push_back(threads_option(run->job.threads));
  add_output_options(command.options, run->output);
  command.options.push_back(required(
      output_option("DIR", "Folder to write into; made where it is missing.", run->output)));
  command.examples = {
      {"brink report quarry/site.toml -o report", "The invented quarry, two faces."},
      {"brink report road-cut/site.toml -o report --json", "Prints the record as well."},
  };
  command.run = [run](const std::vector<std::string>& operands, Streams& streams) {
    return run_report(operands, *run, streams);
  };
  return command;
}

}  // namespace brink::cli
