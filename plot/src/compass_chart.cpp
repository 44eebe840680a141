#include "brink/plot/compass_chart.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <string>

#include "brink/base/ties.hpp"
#include "brink/plot/chart.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"
#include "brink/record/cautions.hpp"
#include "brink/record/kinematics_document.hpp"

namespace brink::plot {

namespace {

constexpr std::array kModeOrder = {Mode::planar_sliding, Mode::wedge_sliding,
                                   Mode::flexural_toppling, Mode::block_toppling};
constexpr Colour kSafetyColour{0x7B, 0x5B, 0x8C};
constexpr Colour kFreeColour{0xE4, 0xE8, 0xEC};

Point towards(const CompassFrame& frame, Angle azimuth, double radius_mm) {
  const SinCos at = sincos(azimuth);
  return {frame.centre.x_mm + radius_mm * at.sin, frame.centre.y_mm - radius_mm * at.cos};
}

double radius_of(const CompassFrame& frame, Angle dip) {
  return frame.radius_mm * dip.deg() / frame.greatest_dip.deg();
}

// On the page angles run clockwise from the x axis, azimuths clockwise from the top.
Angle page_angle(Angle azimuth) {
  return azimuth - Angle::degrees(90.0);
}

// Half the angle that the sector of azimuth `i` takes to either side: up to its neighbours.
Angle half_width(const SteepestResult& result, std::size_t i) {
  const std::size_t count = result.azimuths.size();
  if (count < 2) return Angle::degrees(3.0);
  double least = 360.0;
  for (const std::size_t j : {(i + 1) % count, (i + count - 1) % count}) {
    const Angle apart =
        azimuth_difference(result.azimuths[i].dip_direction, result.azimuths[j].dip_direction);
    if (j != i) least = std::min(least, apart.deg());
  }
  return Angle::degrees(std::min(least / 2.0, 15.0));
}

Path sector(const CompassFrame& frame, Angle azimuth, Angle half, double radius_mm, Colour fill) {
  Path path;
  path.steps = {MoveTo{frame.centre},
                ArcTo{frame.centre, radius_mm, page_angle(azimuth - half), half * 2.0},
                ClosePath{}};
  path.fill = fill;
  path.stroke = Stroke{style::kWhite, style::kHairline_mm, {}, false};
  return path;
}

Path arc(const CompassFrame& frame, Angle azimuth, Angle half, double radius_mm, Stroke stroke) {
  Path path;
  path.steps = {ArcTo{frame.centre, radius_mm, page_angle(azimuth - half), half * 2.0}};
  path.stroke = std::move(stroke);
  return path;
}

// Circles of equal dip, and their numbers along the north.
void add_dip_circles(Group& group, const CompassFrame& frame) {
  const double step = frame.greatest_dip.deg() > 45.0 ? 10.0 : 5.0;
  for (double dip = step; dip < frame.greatest_dip.deg(); dip += step) {
    const bool major = std::fmod(dip, 3.0 * step) == 0.0;
    Path ring = circle(frame.centre, radius_of(frame, Angle::degrees(dip)));
    ring.stroke = Stroke{major ? style::kMuted : style::kPale,
                         major ? style::kThin_mm : style::kHairline_mm,
                         {},
                         false};
    add(group, ring);
  }
  Path rim = circle(frame.centre, frame.radius_mm);
  rim.stroke = Stroke{style::kInk, style::kLine_mm, {}, false};
  add(group, rim);
}

void add_dip_numbers(Group& group, const CompassFrame& frame) {
  const double step = frame.greatest_dip.deg() > 45.0 ? 30.0 : 15.0;
  for (double dip = step; dip < frame.greatest_dip.deg(); dip += step) {
    const Point at = towards(frame, Angle{}, radius_of(frame, Angle::degrees(dip)));
    Path plate = polygon({{at.x_mm - 3.4, at.y_mm - 1.6},
                          {at.x_mm + 3.4, at.y_mm - 1.6},
                          {at.x_mm + 3.4, at.y_mm + 1.6},
                          {at.x_mm - 3.4, at.y_mm + 1.6}});
    plate.fill = style::kWhite;
    add(group, plate);
    add(group, Text{{at.x_mm, at.y_mm + 1.0},
                    degrees(Angle::degrees(dip)),
                    style::text(style::kNote_mm, style::kMuted),
                    Anchor::middle,
                    0.0,
                    1});
  }
}

void add_compass(Group& group, const CompassFrame& frame) {
  for (int azimuth = 0; azimuth < 360; azimuth += 10) {
    const double length = azimuth % 30 == 0 ? 1.8 : 1.0;
    const Angle at = Angle::degrees(azimuth);
    add(group,
        segment(towards(frame, at, frame.radius_mm), towards(frame, at, frame.radius_mm + length),
                Stroke{style::kInk, style::kThin_mm, {}, false}));
  }
  constexpr std::array names = {"N", "E", "S", "W"};
  for (std::size_t i = 0; i < names.size(); ++i) {
    const Point at = towards(frame, Angle::degrees(90.0 * static_cast<double>(i)),
                             frame.radius_mm + (i % 2 == 0 ? 9.5 : 12.0));
    add(group, Text{{at.x_mm, at.y_mm + 1.2},
                    names[i],
                    style::text(style::kHeading_mm, style::kInk, true),
                    Anchor::middle,
                    0.0,
                    1});
  }
}

// The steepest dip outside the rim, at most every 30 degrees.
void add_answers(Group& group, const SteepestResult& result, const CompassFrame& frame) {
  double last = -30.0;
  for (const SteepestFace& face : result.azimuths) {
    if (face.dip_direction.deg() - last < 30.0 - 1e-6) continue;
    last = face.dip_direction.deg();
    const Point at = towards(frame, face.dip_direction, frame.radius_mm + 4.8);
    add(group, Text{{at.x_mm, at.y_mm + 1.0},
                    degrees(face.steepest_dip),
                    style::text(style::kText_mm, style::kInk, true),
                    Anchor::middle,
                    0.0,
                    1});
  }
}

std::string description(const SteepestResult& result) {
  const auto [low, high] =
      std::ranges::minmax_element(result.azimuths, {}, &SteepestFace::steepest_dip);
  return fmt::format(
      "Steepest face dip for {} directions. Flattest towards {:03.0f}: {}; steepest towards "
      "{:03.0f}: {}.",
      result.azimuths.size(), low->dip_direction.deg(), degrees(low->steepest_dip),
      high->dip_direction.deg(), degrees(high->steepest_dip));
}

bool same_kind(const SteepestFace& a, const SteepestFace& b) {
  return a.governs == b.governs && a.governing_mode == b.governing_mode;
}

// Shares in steps: none, up to half the limit, up to the limit, twice, four times, more.
constexpr std::array<Colour, 6> kSteps{{{0xFF, 0xFF, 0xFF},
                                        {0xE8, 0xEE, 0xF3},
                                        {0xC3, 0xD2, 0xDF},
                                        {0xF1, 0xC4, 0x9B},
                                        {0xDA, 0x83, 0x4C},
                                        {0xA3, 0x34, 0x12}}};

std::size_t step_of(double share, double limit) {
  if (share <= 0.0) return 0;
  if (at_most(share, limit)) return at_most(share, limit / 2.0) ? 1 : 2;
  if (at_most(share, 2.0 * limit)) return 3;
  return at_most(share, 4.0 * limit) ? 4 : 5;
}

// Edges between the columns or rows of a map: half-way between neighbours.
std::vector<double> edges_of(const std::vector<double>& centres, double low, double high) {
  std::vector<double> edges{low};
  for (std::size_t i = 1; i < centres.size(); ++i) {
    edges.push_back((centres[i - 1] + centres[i]) / 2.0);
  }
  edges.push_back(high);
  return edges;
}

void add_column(Group& group, const ChartFrame& frame, const SteepestResult& result, Mode mode,
                std::size_t azimuth, double left, double right) {
  const std::size_t dips = result.dips.size();
  const double limit = result.options.limits[static_cast<std::size_t>(mode)];
  const auto step_at = [&](std::size_t k) {
    return step_of(result.map[azimuth * dips + k][static_cast<std::size_t>(mode)], limit);
  };
  for (std::size_t k = 0; k < dips;) {
    const std::size_t step = step_at(k);
    std::size_t end = k + 1;
    while (end < dips && step_at(end) == step) ++end;
    // A dip's cell reaches down to the dip before it: the share is that of its upper edge.
    const double low = k == 0 ? 0.0 : result.dips[k - 1].deg();
    const double high = result.dips[end - 1].deg();
    Path cell = polygon({on_page(frame, {left, low}), on_page(frame, {right, low}),
                         on_page(frame, {right, high}), on_page(frame, {left, high})});
    cell.fill = kSteps[step];
    if (step > 0) add(group, cell);
    k = end;
  }
}

// The last dip within the mode's own limit, column by column.
Path limit_line(const ChartFrame& frame, const SteepestResult& result, Mode mode,
                const std::vector<double>& edges) {
  std::vector<Point> points;
  const std::size_t dips = result.dips.size();
  for (std::size_t a = 0; a < result.azimuths.size(); ++a) {
    double dip = 0.0;
    for (std::size_t k = 0; k < dips; ++k) {
      const double share = result.map[a * dips + k][static_cast<std::size_t>(mode)];
      if (!at_most(share, result.options.limits[static_cast<std::size_t>(mode)])) break;
      dip = result.dips[k].deg();
    }
    points.push_back(on_page(frame, {edges[a], dip}));
    points.push_back(on_page(frame, {edges[a + 1], dip}));
  }
  return polyline(points, Stroke{style::kInk, style::kLine_mm, {}, false});
}

std::string percent(double share) {
  return fmt::format("{:.3g} %", share * 100.0);
}

std::string limits_in_words(const SteepestOptions& options) {
  return fmt::format(
      "at most {} of readings slide on a plane and {} topple by bending, {} of pairs "
      "slide as wedges and {} topple as blocks",
      percent(options.limits[0]), percent(options.limits[2]), percent(options.limits[1]),
      percent(options.limits[3]));
}

// Where the flattest face has to be, why, and what five degrees more would cost.
std::string answer_in_words(const SteepestResult& result, const SetsResult& sets) {
  const SteepestFace& face =
      *std::ranges::min_element(result.azimuths, {}, &SteepestFace::steepest_dip);
  std::string words = fmt::format("Flattest towards {:03.0f}: {}", face.dip_direction.deg(),
                                  degrees(face.steepest_dip));
  if (!face.governing_mode) return words + ". ";
  words += fmt::format(", governed by {}", governing_name(face, result.dips.back()));
  if (!face.governing_sets.empty() && !sets.sets.empty()) {
    const GoverningSets& first = face.governing_sets.front();
    words += " of " + set_name(sets, first.set_a);
    if (first.set_b > 0) words += " with " + set_name(sets, first.set_b);
  }
  const auto mode = static_cast<std::size_t>(*face.governing_mode);
  if (face.shares_five_degrees_steeper) {
    words +=
        fmt::format("; 5° steeper would raise its share from {} to {}", percent(face.shares[mode]),
                    percent((*face.shares_five_degrees_steeper)[mode]));
  }
  return words + ". ";
}

std::string caption(const SteepestResult& result, const SetsResult& sets) {
  std::string words = answer_in_words(result, sets);
  words += fmt::format(
      "How to read it: a sector points the way the face looks and reaches out to the steepest dip "
      "at "
      "which {}.",
      limits_in_words(result.options));
  if (result.options.safety) {
    words += fmt::format(" No wedge of two set means is below a factor of safety of {:g}.",
                         result.options.safety->factor_of_safety);
  }
  if (result.options.confident) {
    words += fmt::format(
        " The line across a sector is the dip that still holds in {:g} % of resampled "
        "readings.",
        *result.options.confident * 100.0);
  }
  return words + " " + std::string(kinematic_caution()) + " " + std::string(practice_caution());
}

std::string facts(const SteepestResult& result, const NetContent& content, Projection projection) {
  std::string words = facts_in_words(content, projection, nullptr, nullptr);
  const ModeSettings& s = result.options.settings;
  words = fmt::format("Friction {}, {}. ", degrees(s.friction),
                      s.upper.dip.deg() == 0.0
                          ? "level ground above the crest"
                          : "ground above the crest " +
                                dip_and_direction(s.upper.dip, s.upper.dip_direction)) +
          words;
  return words;
}

Picture chart_sheet(const SteepestResult& result, const NetContent& content, Projection projection,
                    const SheetText& text) {
  Picture picture{297.0, 210.0, {text.title, {}, {}}};
  Group& page = picture.content;
  const double width = picture.width_mm - 28.0;
  const double foot = add_sheet_heading(page, text, facts(result, content, projection), width);
  const CompassFrame frame{{88.0, 110.0}, 60.0, result.dips.back()};
  add(page, draw_compass_chart(result, frame));
  add(page, draw_compass_key(result, {169.0, 42.0}));
  const NetFrame net{{231.0, 127.0}, 39.0, projection};
  add(page, draw_stereonet(content, net, {19.0, 19.0, foot + 1.0, 178.0}));
  add(page, Text{{14.0, 191.0},
                 caption(result, content.sets),
                 style::text(style::kNote_mm, style::kMuted),
                 Anchor::start,
                 width,
                 4});
  return picture;
}

Picture map_sheet(const SteepestResult& result, const SheetText& text) {
  Picture picture{297.0, 210.0, {text.title + ": shares", {}, {}}};
  Group& page = picture.content;
  add_sheet_heading(page, {text.title + ": shares by dip and azimuth", {}},
                    fmt::format("Friction {}. The line is the steepest dip within each mode's own "
                                "limit.",
                                degrees(result.options.settings.friction)),
                    picture.width_mm - 28.0);
  for (std::size_t i = 0; i < kModeOrder.size(); ++i) {
    const Point corner{30.0 + 137.0 * static_cast<double>(i % 2), i < 2 ? 43.0 : 119.0};
    add(page, draw_share_map(result, kModeOrder[i], corner, 114.0, 52.0));
  }
  constexpr std::array names = {
      "none", "to half the limit", "to the limit", "to twice the limit", "to four times", "more"};
  for (std::size_t i = 0; i < names.size(); ++i) {
    const double left = 30.0 + 42.0 * static_cast<double>(i);
    Path box = polygon({{left, 190.0}, {left + 6.0, 190.0}, {left + 6.0, 193.5}, {left, 193.5}});
    box.fill = kSteps[i];
    box.stroke = Stroke{style::kPale, style::kHairline_mm, {}, false};
    add(page, box);
    add(page, Text{{left + 8.0, 192.8},
                   names[i],
                   style::text(style::kNote_mm, style::kMuted),
                   Anchor::start,
                   0.0,
                   1});
  }
  add(page, Text{{14.0, 201.0},
                 std::string(kinematic_caution()) + " " + std::string(practice_caution()),
                 style::text(style::kNote_mm, style::kMuted),
                 Anchor::start,
                 picture.width_mm - 28.0,
                 2});
  return picture;
}

}  // namespace

Colour mode_colour(Mode mode) {
  constexpr std::array<Colour, kModes> colours{
      {{0xB5, 0x45, 0x2C}, {0xE0, 0xA4, 0x4E}, {0x86, 0xA9, 0xC4}, {0x35, 0x57, 0x74}}};
  return colours[static_cast<std::size_t>(mode)];
}

Colour governing_colour(const SteepestFace& face) {
  if (face.governing_mode) return mode_colour(*face.governing_mode);
  return face.governs == Governs::factor_of_safety ? kSafetyColour : kFreeColour;
}

std::string governing_name(const SteepestFace& face, Angle greatest_dip) {
  if (face.governing_mode) {
    std::string name(mode_name(*face.governing_mode));
    name.front() = static_cast<char>(name.front() - 'A' + 'a');
    return name;
  }
  return face.governs == Governs::factor_of_safety ? "factor of safety"
                                                   : "nothing up to " + degrees(greatest_dip);
}

Group draw_compass_chart(const SteepestResult& result, const CompassFrame& frame) {
  Group group{"Steepest dip round the compass", description(result), {}};
  for (std::size_t i = 0; i < result.azimuths.size(); ++i) {
    const SteepestFace& face = result.azimuths[i];
    if (face.steepest_dip.deg() <= 0.0) continue;
    add(group, sector(frame, face.dip_direction, half_width(result, i),
                      radius_of(frame, face.steepest_dip), governing_colour(face)));
  }
  add_dip_circles(group, frame);
  for (std::size_t i = 0; i < result.azimuths.size(); ++i) {
    const SteepestFace& face = result.azimuths[i];
    if (!face.confident_dip || face.confident_dip->deg() <= 0.0) continue;
    add(group,
        arc(frame, face.dip_direction, half_width(result, i), radius_of(frame, *face.confident_dip),
            Stroke{style::kInk, style::kFace_mm, {}, false}));
  }
  add_dip_numbers(group, frame);
  add_compass(group, frame);
  add_answers(group, result, frame);
  return group;
}

Group draw_compass_key(const SteepestResult& result, Point at) {
  Group group{"What governs", {}, {}};
  std::vector<const SteepestFace*> kinds;
  for (const SteepestFace& face : result.azimuths) {
    const bool known = std::ranges::any_of(
        kinds, [&](const SteepestFace* other) { return same_kind(*other, face); });
    if (!known) kinds.push_back(&face);
  }
  std::ranges::sort(kinds, {}, [](const SteepestFace* face) {
    return face->governing_mode ? static_cast<int>(*face->governing_mode)
                                : 4 + static_cast<int>(face->governs);
  });
  add(group, Text{at, "Governed by", style::text(style::kText_mm, style::kInk, true), Anchor::start,
                  0.0, 1});
  for (const SteepestFace* face : kinds) {
    at.y_mm += kKeyLine_mm;
    Path box = polygon({{at.x_mm, at.y_mm - 2.8},
                        {at.x_mm + 6.0, at.y_mm - 2.8},
                        {at.x_mm + 6.0, at.y_mm + 0.6},
                        {at.x_mm, at.y_mm + 0.6}});
    box.fill = governing_colour(*face);
    add(group, box);
    add(group, Text{{at.x_mm + 8.0, at.y_mm},
                    governing_name(*face, result.dips.back()),
                    style::text(style::kText_mm),
                    Anchor::start,
                    0.0,
                    1});
  }
  return group;
}

Group draw_share_map(const SteepestResult& result, Mode mode, Point top_left, double width_mm,
                     double height_mm) {
  const double greatest = result.dips.back().deg();
  const double limit = result.options.limits[static_cast<std::size_t>(mode)];
  ChartFrame frame{
      top_left, width_mm, height_mm,
      Axis{"the face looks towards, °", 0.0, 360.0, {0, 45, 90, 135, 180, 225, 270, 315, 360}, 0},
      axis_for("face dip, °", 0.0, greatest, 6)};
  frame.y.high = greatest;
  std::erase_if(frame.y.ticks, [&](double tick) { return tick > greatest; });
  Group group{std::string(mode_name(mode)) + ": share by dip and azimuth", {}, {}};
  std::vector<double> centres;
  for (const SteepestFace& face : result.azimuths) centres.push_back(face.dip_direction.deg());
  const std::vector<double> edges = edges_of(centres, 0.0, 360.0);
  for (std::size_t a = 0; a < centres.size(); ++a) {
    add_column(group, frame, result, mode, a, edges[a], edges[a + 1]);
  }
  add(group, draw_axes(frame));
  add(group, limit_line(frame, result, mode, edges));
  add(group, Text{{top_left.x_mm, top_left.y_mm - 7.0},
                  fmt::format("{}, limit {}", mode_name(mode), percent(limit)),
                  style::text(style::kHeading_mm, style::kInk, true),
                  Anchor::start,
                  0.0,
                  1});
  return group;
}

std::vector<Picture> steepest_sheets(const SteepestResult& result, const NetContent& content,
                                     Projection projection, const SheetText& text) {
  SheetText named = text;
  if (named.title.empty()) named.title = "How steep each way";
  std::vector<Picture> pages{chart_sheet(result, content, projection, named)};
  if (!result.map.empty()) pages.push_back(map_sheet(result, named));
  return pages;
}

}  // namespace brink::plot
