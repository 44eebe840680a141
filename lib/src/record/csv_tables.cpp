#include "brink/record/csv_tables.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <stdexcept>
#include <utility>

#include "brink/base/number.hpp"
#include "brink/record/job.hpp"
#include "brink/record/kinematics_document.hpp"

namespace brink {

namespace {

std::string quoted(std::string_view text) {
  const bool plain = text.find_first_of(",\"\r\n") == std::string_view::npos &&
                     !text.starts_with(' ') && !text.ends_with(' ') && !text.starts_with('#');
  if (plain) return std::string(text);
  std::string result = "\"";
  for (const char c : text) {
    if (c == '"') result += '"';
    result += c;
  }
  return result + '"';
}

std::optional<double> degrees(const std::optional<Angle>& angle) {
  if (!angle) return {};
  return angle->deg();
}

const char* yes_or_no(bool value) {
  return value ? "yes" : "no";
}

const char* target_cell(const std::optional<bool>& met) {
  return met ? yes_or_no(*met) : "";
}

void add_mode(CsvTable& table, const Job& job, const FaceJob& face, const char* name,
              const ModeCount& mode, bool pairs) {
  const auto start = [&](const std::string& a, const std::string& b) {
    table.cell(face.face.name)
        .cell(face.face.face.dip.deg())
        .cell(face.face.face.dip_direction.deg())
        .cell(name)
        .cell(a)
        .cell(b);
  };
  start("all", pairs ? "all" : "");
  table.whole(mode.tested).whole(mode.admissible).cell(mode.share).cell(mode.weighted_share);
  table.cell(mode.share_low).cell(mode.share_high).end_row();
  for (const SetCount& count : mode.by_set) {
    start(set_name(job.sets, count.set_a), pairs ? set_name(job.sets, count.set_b) : "");
    table.whole(count.tested).whole(count.admissible);
    table.cell(static_cast<double>(count.admissible) / static_cast<double>(count.tested));
    table.cell(count.admissible_weight / count.tested_weight).cell("").cell("").end_row();
  }
}

}  // namespace

CsvTable::CsvTable(const std::vector<std::string>& headings) : columns_(headings.size()) {
  for (const std::string& heading : headings) cell(heading);
  end_row();
}

void CsvTable::separate() {
  if (cells_++ > 0) text_ += ',';
}

CsvTable& CsvTable::cell(std::string_view text) {
  separate();
  text_ += quoted(text);
  return *this;
}

CsvTable& CsvTable::cell(double number) {
  if (std::isinf(number)) return cell(number > 0.0 ? "infinite" : "-infinite");
  separate();
  if (!std::isnan(number)) text_ += shortest(number);
  return *this;
}

CsvTable& CsvTable::cell(const std::optional<double>& number) {
  return number ? cell(*number) : cell(std::string_view());
}

CsvTable& CsvTable::whole(std::uint64_t number) {
  separate();
  text_ += std::to_string(number);
  return *this;
}

void CsvTable::end_row() {
  if (cells_ != columns_) throw std::logic_error("a CSV row of the wrong length");
  cells_ = 0;
  text_ += '\n';
}

std::string sets_csv(const SetsResult& sets) {
  CsvTable table({"set", "readings", "weight", "mean_dip_deg", "mean_dip_direction_deg",
                  "resultant_length", "fisher_k", "confidence_cone_deg", "variability_cone_deg",
                  "eigenvalue_1", "eigenvalue_2", "eigenvalue_3", "woodcock_shape",
                  "woodcock_strength", "fisher_fit_test", "fisher_fit_statistic",
                  "fisher_fit_p_value"});
  for (const SetStatistics& set : sets.sets) {
    table.cell(set.name).whole(set.count).cell(set.weight);
    table.cell(set.mean.dip.deg()).cell(set.mean.dip_direction.deg());
    table.cell(set.resultant_length).cell(set.fisher_k);
    table.cell(degrees(set.confidence_cone)).cell(degrees(set.variability_cone));
    for (const double eigenvalue : set.eigenvalues) table.cell(eigenvalue);
    table.cell(set.woodcock_shape).cell(set.woodcock_strength);
    table.cell(set.fisher_fit ? set.fisher_fit->test : std::string());
    table.cell(set.fisher_fit ? std::optional(set.fisher_fit->statistic) : std::nullopt);
    table.cell(set.fisher_fit ? std::optional(set.fisher_fit->p_value) : std::nullopt);
    table.end_row();
  }
  return table.text();
}

std::string kinematics_csv(const Job& job) {
  CsvTable table({"face", "face_dip_deg", "face_dip_direction_deg", "mode", "set_a", "set_b",
                  "tested", "admissible", "share", "weighted_share", "share_low", "share_high"});
  for (const FaceJob& face : job.faces) {
    add_mode(table, job, face, "planar_sliding", face.counts().planar_sliding, false);
    add_mode(table, job, face, "wedge_sliding", face.counts().wedge_sliding, true);
    add_mode(table, job, face, "flexural_toppling", face.counts().flexural_toppling, false);
    add_mode(table, job, face, "block_toppling", face.counts().block_toppling, true);
  }
  return table.text();
}

std::string planes_csv(const Job& job) {
  CsvTable table({"face", "set", "dip_deg", "dip_direction_deg", "friction_deg", "cohesion_kPa",
                  "forms", "reason", "weight_kN_m", "sliding_length_m", "factor_of_safety_dry",
                  "factor_of_safety", "meets_target"});
  for (const FaceJob& face : job.faces) {
    for (const PlaneFollowUp& follow : face.planes) {
      const SetStatistics& set = job.sets.sets.at(static_cast<std::size_t>(follow.set) - 1);
      const PlaneSlide& slide = follow.as_written;
      table.cell(face.face.name).cell(set.name);
      table.cell(set.mean.dip.deg()).cell(set.mean.dip_direction.deg());
      table.cell(follow.strength.friction.deg()).cell(follow.strength.cohesion_kPa);
      table.cell(yes_or_no(slide.forms)).cell(slide.reason);
      const auto number = [&](double value) {
        return slide.forms ? std::optional(value) : std::nullopt;
      };
      table.cell(number(slide.weight_kN_m)).cell(number(slide.sliding_length_m));
      table.cell(number(follow.dry.factor_of_safety)).cell(number(slide.factor_of_safety));
      table.cell(slide.forms ? target_cell(meets_target(job.site, slide.factor_of_safety)) : "");
      table.end_row();
    }
  }
  return table.text();
}

std::string wedges_csv(const Job& job) {
  CsvTable table({"face", "set_a", "set_b", "line_trend_deg", "line_plunge_deg", "friction_a_deg",
                  "friction_b_deg", "cohesion_a_kPa", "cohesion_b_kPa", "forms", "reason", "mode",
                  "volume_m3", "weight_kN", "factor_of_safety_dry", "factor_of_safety",
                  "meets_target"});
  for (const FaceJob& face : job.faces) {
    for (const WedgeFollowUp& follow : face.wedges) {
      const WedgeResult& wedge = follow.as_written;
      table.cell(face.face.name).cell(set_name(job.sets, follow.set_a));
      table.cell(set_name(job.sets, follow.set_b));
      table.cell(follow.line.trend.deg()).cell(follow.line.plunge.deg());
      table.cell(follow.strength_a.friction.deg()).cell(follow.strength_b.friction.deg());
      table.cell(follow.strength_a.cohesion_kPa).cell(follow.strength_b.cohesion_kPa);
      table.cell(yes_or_no(wedge.forms)).cell(wedge.reason);
      table.cell(wedge.forms ? to_string(wedge.contact.mode) : std::string_view());
      const auto number = [&](double value) {
        return wedge.forms ? std::optional(value) : std::nullopt;
      };
      table.cell(number(wedge.block.volume_m3)).cell(number(wedge.weight_kN));
      table.cell(number(follow.dry.factor_of_safety)).cell(number(wedge.factor_of_safety));
      table.cell(wedge.forms ? target_cell(meets_target(job.site, wedge.factor_of_safety)) : "");
      table.end_row();
    }
  }
  return table.text();
}

}  // namespace brink
