#include "kinematics_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cstdint>
#include <functional>
#include <optional>
#include <utility>
#include <vector>

#include "brink/base/number.hpp"
#include "brink/readings/bias.hpp"
#include "brink/record/cautions.hpp"
#include "brink/record/kinematics_document.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

// 1234567 as "1,234,567".
std::string grouped(std::uint64_t count) {
  std::string digits = std::to_string(count);
  for (std::size_t at = digits.size(); at > 3;) digits.insert(at -= 3, ",");
  return digits;
}

std::string counted(std::uint64_t count, const char* one, const char* many) {
  return grouped(count) + ' ' + (count == 1 ? one : many);
}

std::string percent(const std::optional<double>& share) {
  return share ? fixed(*share * 100.0, 1) : "";
}

std::string interval(const ModeCount& mode) {
  if (!mode.share_low || !mode.share_high || mode.admissible == 0) return {};
  return percent(mode.share_low) + " to " + percent(mode.share_high);
}

// The sets, or pairs of sets, with the most admissible readings or pairs: at most three of those
// that hold a tenth or more.
std::string leaders(const ModeCount& mode, bool pairs, const SetsResult& sets) {
  std::vector<SetCount> order = mode.by_set;
  std::stable_sort(order.begin(), order.end(), [](const SetCount& a, const SetCount& b) {
    return a.admissible > b.admissible;
  });
  std::string text;
  for (std::size_t i = 0; i < std::min<std::size_t>(order.size(), 3); ++i) {
    const SetCount& count = order[i];
    if (count.admissible == 0 || count.admissible * 10 < mode.admissible) break;
    std::string name = set_name(sets, count.set_a);
    if (pairs) name += " + " + set_name(sets, count.set_b);
    text += fmt::format("{}{} {}", text.empty() ? "" : ", ", name, grouped(count.admissible));
  }
  return text;
}

struct ModeRow {
  const char* name;
  const ModeCount& mode;
  bool pairs;
};

std::string notes(const FaceKinematics& face) {
  std::string text = fmt::format(
      "Of the pairs that daylight, {} a factor of safety below 1 under friction alone, dry, the "
      "planes' wedging counted. {} for blocks to topple on, {} of which {} steep enough to slide.",
      counted(face.unstable_dry, "has", "have"), counted(face.bases, "base", "bases"),
      grouped(face.sliding_bases), face.sliding_bases == 1 ? "is" : "are");
  if (face.unstable_dry_standard_error) {
    text += fmt::format(
        " The first number is estimated from a sample of {}, with a standard error of {}.",
        counted(face.unstable_dry_sampled, "pair", "pairs"),
        grouped(static_cast<std::uint64_t>(*face.unstable_dry_standard_error + 0.5)));
  }
  if (face.parallel_pairs > 0) {
    text += fmt::format(" Left out: {}.", counted(face.parallel_pairs, "pair of parallel readings",
                                                  "pairs of parallel readings"));
  }
  return paragraph(text);
}

std::string orientation(Angle dip, Angle direction) {
  return fmt::format("{}/{:0>3}", shortest(dip.deg()), shortest(direction.deg()));
}

std::string face_text(const FaceKinematics& face, const KinematicsResult& result,
                      const SetsResult& sets, bool weighted) {
  const KinematicsOptions& options = result.options;
  std::string text = fmt::format("Face {}, friction {} degrees",
                                 orientation(face.face.dip, face.face.dip_direction),
                                 shortest(options.friction.deg()));
  if (face.upper.dip.deg() > 0.0) {
    text += ", upper ground " + orientation(face.upper.dip, face.upper.dip_direction);
  }
  return text + "\n\n" + mode_table(face, sets, weighted) + '\n' + notes(face) + '\n';
}

std::string set_list(const SetsResult& sets) {
  if (sets.sets.empty()) return {};
  std::string text = "Sets:";
  for (const SetStatistics& set : sets.sets) {
    text += fmt::format("{} {} {}/{:0>3} ({})", text.back() == ':' ? "" : ",", set.name,
                        fixed(set.mean.dip.deg(), 0), fixed(set.mean.dip_direction.deg(), 0),
                        set.count);
  }
  return paragraph(text + fmt::format("; in no set: {}", sets.unassigned)) + '\n';
}

}  // namespace

std::string mode_table(const FaceKinematics& face, const SetsResult& sets, bool weighted) {
  std::vector<TextTable::Column> columns{{"mode", Align::left}, {"of"},       {"tested"},
                                         {"admissible"},        {"share, %"}, {"95 % interval, %"}};
  if (weighted) columns.push_back({"by weight, %"});
  columns.push_back({"led by", Align::left});
  TextTable table(std::move(columns));
  for (const ModeRow& row : {ModeRow{"planar sliding", face.planar_sliding, false},
                             ModeRow{"wedge sliding", face.wedge_sliding, true},
                             ModeRow{"flexural toppling", face.flexural_toppling, false},
                             ModeRow{"block toppling", face.block_toppling, true}}) {
    std::vector<std::string> cells{row.name,
                                   row.pairs ? "pairs" : "readings",
                                   grouped(row.mode.tested),
                                   grouped(row.mode.admissible),
                                   percent(row.mode.share),
                                   interval(row.mode)};
    if (weighted) cells.push_back(percent(row.mode.weighted_share));
    cells.push_back(leaders(row.mode, row.pairs, sets));
    table.add_row(std::move(cells));
  }
  return table.text();
}

bool weights_differ(std::span<const double> weights) {
  return std::adjacent_find(weights.begin(), weights.end(), std::not_equal_to<>()) != weights.end();
}

std::string kinematics_text(const KinematicsResult& result, const SetsResult& sets,
                            std::span<const double> weights) {
  const bool weighted = weights_differ(weights);
  std::string text = set_list(sets);
  if (weighted) {
    text +=
        paragraph(fmt::format("Weighted readings: {}, which carry as much as {} of equal weight.",
                              weights.size(), fixed(effective_number(weights), 1))) +
        '\n';
  }
  for (const FaceKinematics& face : result.faces) text += face_text(face, result, sets, weighted);
  return text + paragraph(kinematic_caution()) + paragraph(practice_caution());
}

}  // namespace brink::cli
