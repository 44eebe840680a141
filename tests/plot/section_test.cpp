#include "brink/plot/section.hpp"

#include <gtest/gtest.h>

#include <algorithm>

#include "brink/plot/cairo_painter.hpp"

namespace brink::plot {
namespace {

std::vector<std::string> texts_of(const Group& group) {
  std::vector<std::string> out;
  for (const Mark& mark : group.marks) {
    if (const auto* text = std::get_if<Text>(&mark.content)) out.push_back(text->text);
    if (const auto* inner = std::get_if<Group>(&mark.content)) {
      const auto more = texts_of(*inner);
      out.insert(out.end(), more.begin(), more.end());
    }
  }
  return out;
}

bool says(const Picture& picture, const std::string& words) {
  const auto texts = texts_of(picture.content);
  return std::find(texts.begin(), texts.end(), words) != texts.end();
}

const Group* find_group(const Group& group, const std::string& title) {
  if (group.title == title) return &group;
  for (const Mark& mark : group.marks) {
    const auto* inner = std::get_if<Group>(&mark.content);
    if (inner == nullptr) continue;
    if (const Group* found = find_group(*inner, title)) return found;
  }
  return nullptr;
}

PlaneSlideInput plane_input() {
  PlaneSlideInput in;
  in.plane = {35_deg, 150_deg};
  in.face = {60_deg, 150_deg};
  in.height_m = 12.0;
  in.unit_weight_kN_m3 = 26.0;
  in.strength = MohrCoulomb{25.0, 37_deg};
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = 4.0;
  in.water_depth_m = 3.0;
  in.bolts = {{100.0, {330_deg, 10_deg}}};
  in.loads = {{50.0, {0_deg, 90_deg}}};
  in.target = 2.0;
  return in;
}

TEST(PlaneSection, SaysTheNumbersOfTheResult) {
  const PlaneSlideInput in = plane_input();
  const Picture picture = plane_sheet(in, analyse_plane_slide(in), "Trial");
  EXPECT_NO_THROW(check(picture));
  EXPECT_TRUE(says(picture, "Trial"));
  EXPECT_TRUE(says(picture, "U 196"));
  EXPECT_TRUE(says(picture, "V 44.1"));
  EXPECT_TRUE(says(picture, "W 1242"));
  EXPECT_TRUE(says(picture, "crack 4.35 m deep, 4.00 m behind the crest"));
  EXPECT_TRUE(says(picture, "bolt 100 kN/m"));
}

// The block's outline on the page keeps the proportions of the ground: 12 m of face height against
// 10.93 m of width.
TEST(PlaneSection, IsToScale) {
  const PlaneSlideInput in = plane_input();
  const Picture picture = plane_sheet(in, analyse_plane_slide(in), {});
  const Group* block = find_group(picture.content, "Block");
  ASSERT_NE(block, nullptr);
  const auto& steps = std::get<Path>(block->marks.front().content).steps;
  const Point toe = std::get<MoveTo>(steps[0]).to;
  const Point crest = std::get<LineTo>(steps[1]).to;
  const Point back = std::get<LineTo>(steps[2]).to;
  EXPECT_NEAR((back.x_mm - toe.x_mm) / (toe.y_mm - crest.y_mm), (12.0 / tan(60_deg) + 4.0) / 12.0,
              1e-9);
  EXPECT_TRUE(says(picture, "scale 1:200"));
  EXPECT_NEAR(toe.y_mm - crest.y_mm, 12000.0 / 200.0, 1e-9);
}

TEST(PlaneSection, ABlockThatDoesNotFormIsDrawnWithTheReason) {
  PlaneSlideInput in = plane_input();
  in.plane.dip = 65_deg;
  const Picture picture = plane_sheet(in, analyse_plane_slide(in), {});
  EXPECT_NO_THROW(check(picture));
  EXPECT_TRUE(says(picture, "No block forms"));
}

// Every face and plane that can be typed gives a picture that can be painted.
TEST(PlaneSection, HoldsForSteepFlatAndOverhangingSlopes) {
  PlaneSlideInput in = plane_input();
  in.crack = CrackChoice::none;
  in.water_depth_m = 0.0;
  for (const double face : {5.0, 45.0, 90.0, 120.0, 170.0})
    for (const double plane : {0.0, 3.0, 40.0, 89.0, 90.0})
      for (const double upper : {0.0, 30.0, 90.0}) {
        in.face.dip = Angle::degrees(face);
        in.plane.dip = Angle::degrees(plane);
        in.upper = {Angle::degrees(upper), 150_deg};
        const Picture picture = plane_sheet(in, analyse_plane_slide(in), {});
        EXPECT_NO_THROW(check(picture)) << face << ' ' << plane << ' ' << upper;
      }
}

ToppleInput topple_input() {
  ToppleInput in;
  in.columns = topple_columns({57_deg, 90.0, 4_deg, 30_deg, 10.0, 1.0});
  in.unit_weight_kN_m3 = 25.0;
  in.friction = 36_deg;
  in.water_fill = 0.2;
  in.loads = {{10, 100.0, 90_deg, {}}};
  in.bolts = {{1, 100.0, 10_deg, {}}};
  return in;
}

TEST(ToppleSection, EveryBlockHasItsModeByPatternAndWord) {
  const ToppleInput in = topple_input();
  const ToppleResult result = analyse_toppling(in);
  const Picture picture = topple_sheet(in, result, {});
  EXPECT_NO_THROW(check(picture));
  for (const ToppleBlock& block : result.blocks) {
    const std::string mode = block.mode == BlockMode::stable    ? "stable"
                             : block.mode == BlockMode::topples ? "topples"
                                                                : "slides";
    const Group* drawn =
        find_group(picture.content, "Block " + std::to_string(block.number) + ": " + mode);
    ASSERT_NE(drawn, nullptr) << block.number;
    // Outline and number, and a set of hatching for each direction.
    const std::size_t hatchings = block.mode == BlockMode::stable    ? 0
                                  : block.mode == BlockMode::topples ? 1
                                                                     : 2;
    EXPECT_EQ(drawn->marks.size(), 2U + hatchings) << block.number;
  }
  EXPECT_TRUE(says(picture, "joints full to"));
}

// For a report: the drawing alone, within its box.
TEST(Section, StaysWithinItsBox) {
  const SectionBox box{{10.0, 10.0}, 120.0, 80.0};
  const PlaneSlideInput in = plane_input();
  const PlaneSlide slide = analyse_plane_slide(in);
  const Group drawing = draw_plane_section(in, slide, box);
  EXPECT_TRUE(drawing.description.starts_with("factor of safety "));
  const Group* ground = find_group(drawing, "Ground");
  ASSERT_NE(ground, nullptr);
  for (const Step& step : std::get<Path>(ground->marks.front().content).steps) {
    const auto* line = std::get_if<LineTo>(&step);
    if (line == nullptr) continue;
    EXPECT_GE(line->to.x_mm, 10.0 - 1e-9);
    EXPECT_LE(line->to.x_mm, 130.0 + 1e-9);
    EXPECT_GE(line->to.y_mm, 10.0 - 1e-9);
    EXPECT_LE(line->to.y_mm, 90.0 + 1e-9);
  }
}

TEST(Section, ScaleBarsAreRoundAndReadable) {
  for (double m_per_mm = 0.001; m_per_mm < 100.0; m_per_mm *= 1.3) {
    const double mm = scale_bar_m(m_per_mm) / m_per_mm;
    EXPECT_GE(mm, 15.0 - 1e-9);
    EXPECT_LE(mm, 40.0);
  }
}

TEST(ToppleSection, PaintsTheSameBytesTwice) {
  const ToppleInput in = topple_input();
  const Picture picture = topple_sheet(in, analyse_toppling(in), "Trial");
  EXPECT_EQ(paint_svg(picture).bytes, paint_svg(picture).bytes);
  EXPECT_TRUE(paint_svg(picture).warnings.empty());
}

}  // namespace
}  // namespace brink::plot
