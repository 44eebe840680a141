#include "brink/plot/section.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/plot/cairo_painter.hpp"

namespace brink::plot {
namespace {

const SectionBox kBox{{10.0, 10.0}, 120.0, 80.0};

void expect_within(const Group& group, double slack_mm) {
  for (const Mark& mark : group.marks) {
    const auto* path = std::get_if<Path>(&mark.content);
    if (path == nullptr) continue;
    for (const Step& step : path->steps) {
      Point p{20.0, 20.0};
      if (const auto* move = std::get_if<MoveTo>(&step)) p = move->to;
      if (const auto* line = std::get_if<LineTo>(&step)) p = line->to;
      EXPECT_GE(p.x_mm, 10.0 - slack_mm);
      EXPECT_LE(p.x_mm, 130.0 + slack_mm);
      EXPECT_GE(p.y_mm, 10.0 - slack_mm);
      EXPECT_LE(p.y_mm, 90.0 + slack_mm);
    }
  }
}

PlaneSlideInput slide_input() {
  PlaneSlideInput input;
  input.plane = {35_deg, 90_deg};
  input.face = {60_deg, 90_deg};
  input.height_m = 20.0;
  input.unit_weight_kN_m3 = 26.0;
  input.strength = MohrCoulomb{};
  input.crack = CrackChoice::at_setback;
  input.crack_setback_m = 5.0;
  input.water_depth_m = 4.0;
  return input;
}

TEST(Section, ThePlaneSlideFitsItsBoxToScale) {
  const PlaneSlideInput input = slide_input();
  const PlaneSlide slide = analyse_plane_slide(input);
  ASSERT_TRUE(slide.forms) << slide.reason;
  const Group group = draw_plane_section(input, slide, kBox);
  expect_within(group, 1e-9);
  // The block's white area repeats the result's outline, uniformly scaled.
  const auto& area = std::get<Path>(group.marks[1].content);
  const auto& outline = slide.section.outline;
  const auto corner = [&](std::size_t i) {
    return i == 0 ? std::get<MoveTo>(area.steps[0]).to : std::get<LineTo>(area.steps[i]).to;
  };
  const double scale = (corner(1).x_mm - corner(0).x_mm) / (outline[1].x_m - outline[0].x_m);
  for (std::size_t i = 1; i < outline.size(); ++i) {
    EXPECT_NEAR(corner(i).x_mm - corner(0).x_mm, scale * (outline[i].x_m - outline[0].x_m), 1e-9);
    EXPECT_NEAR(corner(0).y_mm - corner(i).y_mm, scale * (outline[i].z_m - outline[0].z_m), 1e-9);
  }
}

TEST(Section, NoBlockSaysWhy) {
  PlaneSlideInput input = slide_input();
  input.crack = CrackChoice::none;
  input.water_depth_m = 0.0;
  input.plane = {70_deg, 90_deg};  // steeper than the face
  const PlaneSlide slide = analyse_plane_slide(input);
  ASSERT_FALSE(slide.forms);
  EXPECT_TRUE(draw_plane_section(input, slide, kBox).description.starts_with("no block forms: "));
}

TEST(Section, ColumnsFitAndAreAllDrawn) {
  ToppleGeometry geometry;
  geometry.face_dip = Angle::degrees(56.6);
  geometry.height_m = 92.5;
  geometry.upper_dip = 4_deg;
  geometry.base_dip = 30_deg;
  geometry.width_m = 10.0;
  geometry.step_m = 1.0;
  ToppleInput input;
  input.columns = topple_columns(geometry);
  input.unit_weight_kN_m3 = 25.0;
  input.friction = 33_deg;
  const ToppleResult result = analyse_toppling(input);
  const Group group = draw_topple_section(input.columns, result, kBox);
  expect_within(group, 1.0);
  std::size_t hatchings = 0, topples = 0;
  for (const ToppleBlock& block : result.blocks) {
    topples += block.mode == BlockMode::topples ? 1 : 0;
  }
  for (const Mark& mark : group.marks) {
    const auto* path = std::get_if<Path>(&mark.content);
    hatchings += path != nullptr && path->stroke && path->stroke->width_mm == 0.13 ? 1 : 0;
  }
  EXPECT_EQ(hatchings, topples + 1);  // and one in the key
  Picture page{140.0, 100.0, group};
  EXPECT_TRUE(paint_svg(page).warnings.empty());
}

TEST(Section, ScaleBarsAreRoundAndReadable) {
  for (double m_per_mm = 0.001; m_per_mm < 100.0; m_per_mm *= 1.3) {
    const double mm = scale_bar_m(m_per_mm) / m_per_mm;
    EXPECT_GE(mm, 15.0 - 1e-9);
    EXPECT_LE(mm, 40.0);
  }
}

}  // namespace
}  // namespace brink::plot
