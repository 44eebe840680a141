#include "brink/record/bench_document.hpp"

#include <utility>

#include "brink/record/csv_tables.hpp"

namespace brink {

namespace {

Array percentiles_value(const std::vector<BackBreak>& percentiles) {
  Array out;
  for (const BackBreak& p : percentiles) {
    out.push_back(Object{{"percentile", p.percentile},
                         {"back_break_m", p.back_break_m},
                         {"effective_face_deg", p.effective_face.deg()},
                         {"berm_left_m", p.berm_left_m},
                         {"keeps_ritchie_width", p.keeps_ritchie},
                         {"inter_ramp_to_keep_deg", p.inter_ramp_to_keep.deg()}});
  }
  return out;
}

Value joints_value(const BreakingJoints& joints) {
  return Object{{"tested", joints.tested},
                {"breaking", joints.breaking},
                {"share_of_crest_lost", joints.share},
                {"percentiles", percentiles_value(joints.percentiles)}};
}

void add_rows(CsvTable& table, const char* what, const std::vector<BackBreak>& percentiles) {
  for (const BackBreak& p : percentiles) {
    table.cell(what).cell(p.percentile).cell(p.back_break_m).cell(p.effective_face.deg());
    table.cell(p.berm_left_m).cell(p.keeps_ritchie ? "yes" : "no");
    table.cell(p.inter_ramp_to_keep.deg());
    table.end_row();
  }
}

}  // namespace

Object bench_inputs(const BenchOptions& options) {
  Array percentiles;
  for (const double percentile : options.percentiles) percentiles.emplace_back(percentile);
  return Object{{"face", face_value(options.face)},
                {"height_m", options.height_m},
                {"berm_m", options.berm_m},
                {"percentiles", std::move(percentiles)},
                {"weighted", options.weighted},
                {"upper", plane_value(options.settings.upper)},
                {"friction_deg", options.settings.friction.deg()},
                {"strike_tolerance_deg", options.settings.strike_tolerance.deg()}};
}

Value bench_result(const BenchResult& result) {
  return Object{{"ritchie_width_m", result.ritchie_width_m},
                {"inter_ramp_deg", result.inter_ramp.deg()},
                {"planes", joints_value(result.planes)},
                {"wedges", joints_value(result.wedges)},
                {"governing", percentiles_value(result.governing)}};
}

std::string bench_csv(const BenchResult& result) {
  CsvTable table({"of", "percentile", "back_break_m", "effective_face_deg", "berm_left_m",
                  "keeps_ritchie_width", "inter_ramp_to_keep_deg"});
  add_rows(table, "planes", result.planes.percentiles);
  add_rows(table, "wedges", result.wedges.percentiles);
  add_rows(table, "governing", result.governing);
  return table.text();
}

}  // namespace brink
