#include "steepest_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>
#include <vector>

#include "brink/base/number.hpp"
#include "brink/record/cautions.hpp"
#include "brink/record/kinematics_document.hpp"
#include "brink/record/steepest_document.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

std::string percent(double share) {
  return fixed(share * 100.0, 1);
}

std::string degrees(Angle angle) {
  return shortest(std::round(angle.deg() * 1e6) / 1e6);
}

// The governing mode's share a little steeper: what more slope costs.
std::string governing_share(const SteepestFace& face, const std::optional<ModeShares>& shares) {
  if (!face.governing_mode || !shares) return {};
  return percent((*shares)[static_cast<std::size_t>(*face.governing_mode)]);
}

std::string factor(const std::optional<WeakestWedge>& wedge) {
  if (!wedge) return "none";
  return std::isfinite(wedge->factor_of_safety) ? fixed(wedge->factor_of_safety, 2) : "infinite";
}

TextTable make_table(const SteepestOptions& options) {
  std::vector<TextTable::Column> columns{{"towards,\ndeg"}, {"steepest,\ndeg"}};
  if (options.confident) {
    columns.push_back({fmt::format("in {} %,\ndeg", shortest(*options.confident * 100.0))});
  }
  for (const char* heading : {"planar,\n%", "wedge,\n%", "flexural,\n%", "block,\n%"}) {
    columns.push_back({heading});
  }
  if (options.safety) columns.push_back({"least\nFS"});
  columns.push_back({"governed by", Align::left});
  columns.push_back({"a step\nsteeper, %"});
  columns.push_back({"5 degrees\nsteeper, %"});
  return TextTable(std::move(columns));
}

std::string table_text(const SteepestResult& result, const SetsResult& sets) {
  TextTable table = make_table(result.options);
  for (const SteepestFace& face : result.azimuths) {
    std::vector<std::string> cells{degrees(face.dip_direction), degrees(face.steepest_dip)};
    if (face.confident_dip) cells.push_back(degrees(*face.confident_dip));
    for (const double share : face.shares) cells.push_back(percent(share));
    if (result.options.safety) cells.push_back(factor(face.weakest_wedge));
    cells.push_back(governing_in_words(face, sets));
    cells.push_back(governing_share(face, face.shares_one_step_steeper));
    cells.push_back(governing_share(face, face.shares_five_degrees_steeper));
    table.add_row(std::move(cells));
  }
  return table.text();
}

std::string heading(const SteepestOptions& options) {
  std::string text = fmt::format(
      "Steepest faces at which at most {} % of the readings slide on a plane, {} % of the pairs "
      "slide "
      "as wedges, {} % of the readings topple by bending and {} % of the pairs as blocks; friction "
      "{} "
      "degrees",
      shortest(options.limits[0] * 100.0), shortest(options.limits[1] * 100.0),
      shortest(options.limits[2] * 100.0), shortest(options.limits[3] * 100.0),
      degrees(options.settings.friction));
  if (options.weighted) text += ", readings weighted";
  if (options.safety) {
    text += fmt::format(", and no wedge between two set means below a factor of safety of {}",
                        shortest(options.safety->factor_of_safety));
  }
  return paragraph(text + '.');
}

// Where the flattest and the steepest of the answers lie.
std::string summary(const SteepestResult& result) {
  const auto [low, high] =
      std::ranges::minmax_element(result.azimuths, {}, &SteepestFace::steepest_dip);
  std::string text =
      fmt::format("Flattest towards {}: {} degrees; steepest towards {}: {} degrees.",
                  degrees(low->dip_direction), degrees(low->steepest_dip),
                  degrees(high->dip_direction), degrees(high->steepest_dip));
  if (result.options.confident) {
    text += fmt::format(
        " The dip \"in {} %\" keeps within the limits in that part of the cases had other joints "
        "been logged (resampled readings).",
        shortest(*result.options.confident * 100.0));
  }
  return paragraph(text);
}

}  // namespace

std::string mode_in_words(Mode mode) {
  std::string words(mode_key(mode));
  std::ranges::replace(words, '_', ' ');
  return words;
}

std::string governing_in_words(const SteepestFace& face, const SetsResult& sets) {
  if (face.governs == Governs::factor_of_safety) {
    const auto& wedge = face.weakest_wedge_one_step_steeper;
    return wedge ? "factor of safety (" + set_pair_name(sets, wedge->set_a, wedge->set_b) + ')'
                 : "factor of safety";
  }
  if (!face.governing_mode) return {};
  std::string words = mode_in_words(*face.governing_mode);
  if (sets.sets.empty() || face.governing_sets.empty()) return words;
  const GoverningSets& first = face.governing_sets.front();
  const bool pairs =
      *face.governing_mode == Mode::wedge_sliding || *face.governing_mode == Mode::block_toppling;
  return words + " (" +
         (pairs ? set_pair_name(sets, first.set_a, first.set_b) : set_name(sets, first.set_a)) +
         ')';
}

std::string steepest_text(const SteepestResult& result, const SetsResult& sets) {
  std::string text = heading(result.options) + '\n' + table_text(result, sets) + '\n' +
                     summary(result) + paragraph(kinematic_caution());
  if (result.options.safety) text += paragraph(rigid_block_caution());
  return text + paragraph(practice_caution());
}

}  // namespace brink::cli
