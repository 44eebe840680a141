#include "brink/record/steepest_document.hpp"

#include <array>
#include <utility>
#include <variant>

#include "brink/record/kinematics_document.hpp"

namespace brink {

namespace {

constexpr std::array kModeOrder = {Mode::planar_sliding, Mode::wedge_sliding,
                                   Mode::flexural_toppling, Mode::block_toppling};

Object shares_object(const ModeShares& shares) {
  Object object;
  for (const Mode mode : kModeOrder) {
    object.add(std::string(mode_key(mode)), shares[static_cast<std::size_t>(mode)]);
  }
  return object;
}

Value shares_value(const std::optional<ModeShares>& shares) {
  return shares ? Value(shares_object(*shares)) : Value();
}

Value wedge_value(const std::optional<WeakestWedge>& wedge, const SetsResult& sets) {
  if (!wedge) return {};
  return Object{{"sets", Array{set_name(sets, wedge->set_a), set_name(sets, wedge->set_b)}},
                {"factor_of_safety", number_or_word(wedge->factor_of_safety)}};
}

Value governed_by(Governs governs) {
  switch (governs) {
    case Governs::share:
      return "share";
    case Governs::factor_of_safety:
      return "factor_of_safety";
    default:
      return {};
  }
}

bool of_pairs(Mode mode) {
  return mode == Mode::wedge_sliding || mode == Mode::block_toppling;
}

Array governing_sets(const SteepestFace& face, const SetsResult& sets) {
  Array out;
  for (const GoverningSets& part : face.governing_sets) {
    Object object;
    if (of_pairs(*face.governing_mode)) {
      object.add("sets", Array{set_name(sets, part.set_a), set_name(sets, part.set_b)});
    } else {
      object.add("set", set_name(sets, part.set_a));
    }
    object.add("part", part.part);
    out.emplace_back(std::move(object));
  }
  return out;
}

// Water as the set means' wedges take it; they know no other form.
Value target_value(const SteepestOptions& options) {
  if (!options.safety) return {};
  const WedgeCase& wedge = options.safety->wedge;
  const auto* strength = std::get_if<MohrCoulomb>(&wedge.strength1);
  const auto* water = std::get_if<WaterFill>(&wedge.water);
  return Object{{"factor_of_safety", options.safety->factor_of_safety},
                {"height_m", wedge.geometry.size.value},
                {"unit_weight_kN_m3", wedge.unit_weight_kN_m3},
                {"friction_deg", strength ? Value(strength->friction.deg()) : Value()},
                {"cohesion_kPa", strength ? Value(strength->cohesion_kPa) : Value()},
                {"water_fill", water ? Value(water->fill) : Value()},
                {"water_unit_weight_kN_m3", wedge.water_unit_weight_kN_m3}};
}

void add_shares(CsvTable& table, const std::optional<ModeShares>& shares) {
  for (std::size_t m = 0; m < kModes; ++m) {
    table.cell(shares ? std::optional((*shares)[m] * 100.0) : std::nullopt);
  }
}

}  // namespace

std::string_view mode_key(Mode mode) {
  switch (mode) {
    case Mode::planar_sliding:
      return "planar_sliding";
    case Mode::wedge_sliding:
      return "wedge_sliding";
    case Mode::flexural_toppling:
      return "flexural_toppling";
    default:
      return "block_toppling";
  }
}

std::string set_pair_name(const SetsResult& sets, int set_a, int set_b) {
  return set_name(sets, set_a) + " + " + set_name(sets, set_b);
}

Object steepest_inputs(const SteepestOptions& options) {
  Object limits;
  for (const Mode mode : kModeOrder) {
    limits.add(std::string(mode_key(mode)), options.limits[static_cast<std::size_t>(mode)] * 100.0);
  }
  Object inputs;
  if (options.azimuths.empty()) {
    inputs.add("every_deg", options.every.deg());
  } else {
    Array azimuths;
    for (const Angle azimuth : options.azimuths) azimuths.emplace_back(azimuth.deg());
    inputs.add("azimuths_deg", std::move(azimuths));
  }
  inputs.add("resolution_deg", options.resolution.deg());
  inputs.add("greatest_dip_deg", options.greatest_dip.deg());
  inputs.add("limits_percent", std::move(limits));
  inputs.add("weighted", options.weighted);
  inputs.add("confident", options.confident);
  inputs.add("target", target_value(options));
  inputs.add("upper", plane_value(options.settings.upper));
  inputs.add("friction_deg", options.settings.friction.deg());
  inputs.add("strike_tolerance_deg", options.settings.strike_tolerance.deg());
  inputs.add("toppling_tolerance_deg", options.settings.toppling_tolerance.deg());
  inputs.add("seed", options.seed);
  return inputs;
}

Object steepest_face_object(const SteepestFace& face, const SetsResult& sets) {
  Object object{
      {"dip_direction_deg", face.dip_direction.deg()},
      {"steepest_dip_deg", face.steepest_dip.deg()},
      {"governing_mode", face.governing_mode ? Value(mode_key(*face.governing_mode)) : Value()},
      {"governed_by", governed_by(face.governs)},
      {"governing_sets", governing_sets(face, sets)},
      {"shares", shares_object(face.shares)},
      {"shares_one_step_steeper", shares_value(face.shares_one_step_steeper)},
      {"shares_five_degrees_steeper", shares_value(face.shares_five_degrees_steeper)},
      {"confident_dip_deg", face.confident_dip ? Value(face.confident_dip->deg()) : Value()},
      {"weakest_wedge", wedge_value(face.weakest_wedge, sets)},
      {"weakest_wedge_one_step_steeper", wedge_value(face.weakest_wedge_one_step_steeper, sets)}};
  return object;
}

Value known_sets_value(const SetsResult& sets) {
  Array known;
  for (const SetStatistics& set : sets.sets) {
    known.push_back(
        Object{{"name", set.name}, {"count", set.count}, {"mean", plane_value(set.mean)}});
  }
  return known;
}

Value steepest_result(const SteepestResult& result, const SetsResult& sets) {
  Array azimuths;
  for (const SteepestFace& face : result.azimuths) {
    azimuths.emplace_back(steepest_face_object(face, sets));
  }
  return Object{{"azimuths", std::move(azimuths)}, {"sets", known_sets_value(sets)}};
}

std::vector<std::string> steepest_headings() {
  std::vector<std::string> headings{"dip_direction_deg", "steepest_dip_deg", "governed_by",
                                    "governing_sets"};
  for (const char* when : {"", "_one_step_steeper", "_five_degrees_steeper"}) {
    for (const Mode mode : kModeOrder) {
      headings.push_back(std::string(mode_key(mode)) + "_percent" + when);
    }
  }
  headings.insert(headings.end(), {"confident_dip_deg", "least_factor_of_safety"});
  return headings;
}

void add_steepest_cells(CsvTable& table, const SteepestFace& face, const SetsResult& sets) {
  table.cell(face.dip_direction.deg()).cell(face.steepest_dip.deg());
  if (face.governing_mode) {
    table.cell(mode_key(*face.governing_mode));
  } else {
    table.cell(face.governs == Governs::factor_of_safety ? "factor_of_safety" : "");
  }
  if (face.governing_sets.empty()) {
    table.cell("");
  } else {
    const GoverningSets& first = face.governing_sets.front();
    table.cell(of_pairs(*face.governing_mode) ? set_pair_name(sets, first.set_a, first.set_b)
                                              : set_name(sets, first.set_a));
  }
  add_shares(table, face.shares);
  add_shares(table, face.shares_one_step_steeper);
  add_shares(table, face.shares_five_degrees_steeper);
  table.cell(face.confident_dip ? std::optional(face.confident_dip->deg()) : std::nullopt);
  table.cell(face.weakest_wedge ? std::optional(face.weakest_wedge->factor_of_safety)
                                : std::nullopt);
}

std::string steepest_csv(const SteepestResult& result, const SetsResult& sets) {
  CsvTable table(steepest_headings());
  for (const SteepestFace& face : result.azimuths) {
    add_steepest_cells(table, face, sets);
    table.end_row();
  }
  return table.text();
}

}  // namespace brink
