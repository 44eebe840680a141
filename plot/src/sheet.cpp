#include "brink/plot/sheet.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/mode_net.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"
#include "brink/record/cautions.hpp"

namespace brink::plot {

namespace {

constexpr double kMargin_mm = 14.0;
std::string caution_words(const Readings& readings) {
  std::string words =
      "Hatched: where a pole (planar, flexural) or a line of intersection (wedge, block) is free "
      "to "
      "move. ";
  if (lines_are_thinned(readings)) {
    words += fmt::format("{} lines are drawn; the counts are of all pairs. ", grouped(kMostLines));
  }
  return words + std::string(kinematic_caution()) + " " + std::string(practice_caution());
}

// One line of up to `width`, in a smaller size where it is longer, cut only where even that fails.
Text fitted(Point at, const std::string& words, TextStyle look, double width_mm) {
  Text text{at, words, look, Anchor::start, 0.0, 1};
  const double natural = measure(text).width_mm;
  if (natural <= width_mm) return text;
  text.style.size_mm = std::max(style::kShortTitle_mm, look.size_mm * width_mm / natural * 0.995);
  if (measure(text).width_mm > width_mm) text.width_mm = width_mm;
  return text;
}

std::string sheet_title(const SheetText& text) {
  return text.title.empty() ? "Stereonet" : text.title;
}

}  // namespace

double add_sheet_heading(Group& page, const SheetText& text, const std::string& facts,
                         double width_mm) {
  Text title = fitted({kMargin_mm, 0.0}, text.title,
                      style::text(style::kTitle_mm, style::kInk, true), width_mm);
  title.most_lines = 2;
  double y = kMargin_mm + title.style.size_mm;
  title.at.y_mm = y;
  const TextSize size = measure(title);
  if (!text.title.empty()) {
    add(page, title);
    y += (size.lines - 1) * size.height_mm / size.lines + 6.2;
  }
  Text words{{kMargin_mm, y},
             text.subtitle.empty() ? facts : facts + " " + text.subtitle,
             style::text(style::kText_mm, style::kMuted),
             Anchor::start,
             width_mm,
             2};
  const TextSize facts_size = measure(words);
  add(page, words);
  return y + facts_size.height_mm - facts_size.ascent_mm;
}

std::string facts_in_words(const NetContent& content, Projection projection,
                           const KinematicsOptions* options, const Face* face) {
  const std::size_t n = content.readings.size();
  const std::size_t sets = content.sets.sets.size();
  std::string words = fmt::format("{} {}", grouped(n), n == 1 ? "reading" : "readings");
  if (sets > 0) {
    words += fmt::format(": {} {}", sets, sets == 1 ? "set" : "sets");
    if (content.sets.unassigned > 0) {
      words += fmt::format(" and {} in no set", grouped(content.sets.unassigned));
    }
  }
  words += ". ";
  if (face != nullptr && options != nullptr) {
    words +=
        fmt::format("Face {}, friction {}, ", dip_and_direction(face->dip, face->dip_direction),
                    degrees(options->friction));
    words += options->upper.dip.deg() == 0.0
                 ? "level ground above the crest"
                 : "ground above the crest " +
                       dip_and_direction(options->upper.dip, options->upper.dip_direction);
    words += ". ";
  }
  return words + fmt::format("{} net, lower hemisphere.", projection_name(projection));
}

Picture net_sheet(const NetContent& content, Projection projection, const SheetText& text) {
  Picture picture{210.0, 0.0, {sheet_title(text), {}, {}}};
  Group& page = picture.content;
  const double width = picture.width_mm - 2.0 * kMargin_mm;
  const double foot =
      add_sheet_heading(page, text, facts_in_words(content, projection, nullptr, nullptr), width);
  const NetFrame frame{{105.0, foot + 12.0 + 72.0}, 72.0, projection};
  const double net_foot = frame.centre.y_mm + frame.radius_mm;
  add(page, draw_stereonet(content, frame, {23.0, 23.0, foot + 2.0, net_foot + 10.0}));
  add(page, draw_key(content, {kMargin_mm, net_foot + 19.0}, width));
  picture.height_mm = net_foot + 35.0;
  return picture;
}

Picture face_sheet(const NetContent& content, Projection projection, const SheetText& text,
                   const KinematicsResult& kinematics, std::size_t face) {
  Picture picture{297.0, 210.0, {sheet_title(text), {}, {}}};
  Group& page = picture.content;
  const double width = picture.width_mm - 2.0 * kMargin_mm;
  const FaceKinematics& tested = kinematics.faces[face];
  const double foot = add_sheet_heading(
      page, text, facts_in_words(content, projection, &kinematics.options, &tested.face), width);
  const NetFrame frame{{91.5, 106.0}, 61.0, projection};
  add(page, draw_stereonet(content, frame, {22.0, 21.0, foot + 1.0, 177.0}));
  constexpr Mode kModes[] = {Mode::planar_sliding, Mode::wedge_sliding, Mode::flexural_toppling,
                             Mode::block_toppling};
  for (std::size_t i = 0; i < 4; ++i) {
    const Point centre{201.5 + 58.0 * static_cast<double>(i % 2), i < 2 ? 66.0 : 144.0};
    add(page, draw_mode_net({content.readings, content.sets, kinematics.options, tested, kModes[i]},
                            {centre, 23.5, projection}));
  }
  add(page, draw_key(content, {kMargin_mm, 181.5}, 155.0));
  Text caution{{kMargin_mm, 193.5},
               caution_words(content.readings),
               style::text(style::kNote_mm, style::kMuted),
               Anchor::start,
               width,
               3};
  add(page, caution);
  return picture;
}

Picture stacked(const std::vector<Picture>& pages) {
  Picture all{0.0, 0.0, {pages.empty() ? std::string() : pages[0].content.title, {}, {}}};
  for (const Picture& page : pages) {
    add(all.content, moved(page.content, 0.0, all.height_mm));
    all.width_mm = std::max(all.width_mm, page.width_mm);
    all.height_mm += page.height_mm;
  }
  return all;
}

}  // namespace brink::plot
