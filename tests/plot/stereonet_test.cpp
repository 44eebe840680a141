#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"
#include "brink/plot/cairo_painter.hpp"
#include "brink/plot/mode_net.hpp"
#include "brink/plot/sheet.hpp"
#include "brink/plot/style.hpp"
#include "brink/plot/words.hpp"

namespace brink::plot {
namespace {

void add_reading(Readings& readings, double dip, double direction) {
  readings.planes.push_back({Angle::degrees(dip), Angle::degrees(direction)});
  readings.normals.push_back(upward_normal(readings.planes.back()));
  readings.weights.push_back(1.0);
}

SetStatistics set_of(const std::string& name, double dip, double direction, std::size_t count) {
  SetStatistics set;
  set.name = name;
  set.mean = {Angle::degrees(dip), Angle::degrees(direction)};
  set.count = count;
  set.confidence_cone = 4_deg;
  set.variability_cone = 18_deg;
  return set;
}

struct Sample {
  Readings readings;
  SetsResult sets;
};

// 30 readings about 60/140, 20 about 85/250 (across the rim), 5 strays.
Sample sample() {
  Sample s;
  for (std::uint64_t i = 0; i < 55; ++i) {
    const double a = 24.0 * random_uniform(5, 0, i) - 12.0,
                 b = 24.0 * random_uniform(5, 1, i) - 12.0;
    if (i < 30) {
      add_reading(s.readings, std::round(60.0 + a), std::round(140.0 + b));
    } else if (i < 50) {
      const bool over = 85.0 + a > 90.0;
      add_reading(s.readings, std::round(over ? 95.0 - a : 85.0 + a),
                  std::round(over ? 70.0 + b : 250.0 + b));
    } else {
      add_reading(s.readings, std::round(4.0 * (a + 12.0) / 1.1), std::round(15.0 * (b + 12.0)));
    }
    s.sets.assignment.push_back(i < 30 ? 1 : i < 50 ? 2 : 0);
  }
  s.sets.sets = {set_of("J1", 60, 140, 30), set_of("J2", 85, 250, 20)};
  s.sets.unassigned = 5;
  return s;
}

template <typename Visit>
void for_each_mark(const Group& group, const Visit& visit) {
  for (const Mark& mark : group.marks) {
    if (const auto* inner = std::get_if<Group>(&mark.content)) {
      for_each_mark(*inner, visit);
    } else {
      visit(mark);
    }
  }
}

std::vector<std::string> texts_of(const Group& group) {
  std::vector<std::string> texts;
  for_each_mark(group, [&](const Mark& mark) {
    if (const auto* text = std::get_if<Text>(&mark.content)) texts.push_back(text->text);
  });
  return texts;
}

bool has_text(const Group& group, const std::string& wanted) {
  const auto texts = texts_of(group);
  return std::find(texts.begin(), texts.end(), wanted) != texts.end();
}

std::size_t symbols_of(const Group& group, Shape shape, Colour colour) {
  std::size_t count = 0;
  for_each_mark(group, [&](const Mark& mark) {
    const auto* symbols = std::get_if<Symbols>(&mark.content);
    if (symbols != nullptr && symbols->shape == shape && symbols->colour == colour) {
      count += symbols->centres.size();
    }
  });
  return count;
}

const NetFrame kFrame{{100.0, 100.0}, 60.0, Projection::equal_angle};

std::size_t distinct_planes(const Sample& s, int set) {
  return pole_places(kFrame, s.readings, s.sets.assignment, set).size();
}

TEST(NetFrame, PlacesDirectionsWithNorthUpAndEastRight) {
  EXPECT_EQ(on_page(kFrame, direction({0_deg, 0_deg})), (Point{100.0, 40.0}));
  EXPECT_EQ(on_page(kFrame, direction({90_deg, 0_deg})), (Point{160.0, 100.0}));
  EXPECT_EQ(on_page(kFrame, direction({0_deg, 90_deg})), (Point{100.0, 100.0}));
  EXPECT_EQ(beyond_rim(kFrame, 180_deg, 5.0), (Point{100.0, 165.0}));
}

TEST(NetFrame, ArcsOnThePageKeepTheirClosedForm) {
  const Plane plane{30_deg, 135_deg};
  const auto steps = steps_of(kFrame, great_circle_on_net(Projection::equal_angle, plane));
  ASSERT_EQ(steps.size(), 2u);
  const auto& arc = std::get<ArcTo>(steps[1]);
  EXPECT_NEAR(arc.radius_mm, 60.0 * 1.154700538379, 1e-9);
  EXPECT_NEAR(arc.centre.x_mm, 100.0 - 60.0 * 0.408248290464, 1e-9);
  EXPECT_NEAR(arc.centre.y_mm, 100.0 - 60.0 * 0.408248290464, 1e-9);
  // Its middle lies down the dip: the dip vector's place.
  const Angle middle = arc.start + arc.sweep * 0.5;
  const Point dip = on_page(kFrame, dip_vector(30_deg, 135_deg));
  EXPECT_NEAR(arc.centre.x_mm + arc.radius_mm * cos(middle), dip.x_mm, 1e-9);
  EXPECT_NEAR(arc.centre.y_mm + arc.radius_mm * sin(middle), dip.y_mm, 1e-9);
}

TEST(NetFrame, HachuresPointToTheFreeSide) {
  for (const Face& face : {Face{70_deg, 145_deg}, Face{110_deg, 145_deg}, Face{90_deg, 10_deg}}) {
    const Group group = face_curve(kFrame, face, {{}, 0.75, {}, false});
    const auto& hachures = std::get<Path>(group.marks[0].content);
    ASSERT_EQ(hachures.steps.size(), 70u);
    for (std::size_t i = 1; i < hachures.steps.size(); i += 2) {
      const Point tip = std::get<LineTo>(hachures.steps[i]).to;
      const Vector3 v = unproject(Projection::equal_angle,
                                  {(tip.x_mm - 100.0) / 60.0, (100.0 - tip.y_mm) / 60.0});
      EXPECT_GT(v.dot(outward_normal(face)), 0.0);
    }
  }
}

TEST(Stereonet, DrawsEachSetInItsOwnShapeAndColour) {
  const Sample s = sample();
  const Group net = draw_stereonet({s.readings, s.sets, nullptr, {}, {}, {}}, kFrame, {});
  // One more of each: the symbol before its label.
  const auto j1 = style::set_style(1), j2 = style::set_style(2);
  EXPECT_EQ(symbols_of(net, j1.shape, j1.colour), distinct_planes(s, 1) + 1);
  EXPECT_EQ(symbols_of(net, j2.shape, j2.colour), distinct_planes(s, 2) + 1);
  EXPECT_EQ(symbols_of(net, Shape::ring, style::kMuted), distinct_planes(s, 0));
  EXPECT_EQ(symbols_of(net, Shape::cross, style::kInk), 2u);
  EXPECT_TRUE(has_text(net, "J1  60/140"));
  EXPECT_TRUE(has_text(net, "N"));
}

TEST(Stereonet, EverySymbolLiesInsideTheRim) {
  const Sample s = sample();
  for (int set = 0; set <= 2; ++set) {
    for (const Point& p : pole_places(kFrame, s.readings, s.sets.assignment, set)) {
      EXPECT_LE(std::hypot(p.x_mm - 100.0, p.y_mm - 100.0), 60.0 + 1e-9);
    }
  }
}

TEST(Stereonet, KeyNamesOnlyWhatIsDrawn) {
  Sample s = sample();
  const DensityGrid grid = density_grid(AxialDensity(s.readings.normals, {}), 30);
  const Group full = draw_key({s.readings, s.sets, &grid, {2.0, 4.0}, {}, {}}, {0, 0}, 180.0);
  EXPECT_TRUE(has_text(full, "pole of a reading in no set"));
  EXPECT_TRUE(has_text(full, "density of poles from 2, 4 times uniform"));
  s.sets = {};
  s.sets.assignment.assign(s.readings.size(), 0);
  s.sets.unassigned = s.readings.size();
  const Group plain = draw_key({s.readings, s.sets, nullptr, {}, {}, {}}, {0, 0}, 180.0);
  EXPECT_EQ(texts_of(plain), (std::vector<std::string>{"pole of a reading"}));
}

TEST(Style, SetsDifferByShapeAndColour) {
  std::vector<std::pair<Shape, int>> seen;
  for (std::size_t set = 1; set <= 48; ++set) {
    const auto look = style::set_style(set);
    const std::pair key{look.shape,
                        look.colour.red * 65536 + look.colour.green * 256 + look.colour.blue};
    EXPECT_EQ(std::find(seen.begin(), seen.end(), key), seen.end()) << set;
    seen.push_back(key);
  }
  for (std::size_t set = 1; set < 6; ++set) {
    EXPECT_NE(style::set_style(set).shape, style::set_style(set + 1).shape);
    EXPECT_NE(style::set_style(set).colour, style::set_style(set + 1).colour);
  }
}

TEST(Words, NumbersAndOrientations) {
  EXPECT_EQ(grouped(3120), "3120");
  EXPECT_EQ(grouped(15931), "15\u202F931");
  EXPECT_EQ(grouped(1234567), "1\u202F234\u202F567");
  EXPECT_EQ(dip_and_direction(5_deg, Angle::degrees(359.7)), "05/000");
  EXPECT_EQ(dip_and_direction(65_deg, 20_deg), "65/020");
  EXPECT_EQ(degrees(Angle::degrees(32.5)), "32.5°");
  EXPECT_EQ(degrees(32_deg), "32°");
}

TEST(Words, CountsSayWhereTheyComeFrom) {
  const Sample s = sample();
  ModeCount counts;
  counts.tested = 55;
  counts.admissible = 12;
  counts.share = 12.0 / 55.0;
  counts.by_set = {{1, 0, 30, 12, 0, 0}, {2, 0, 20, 0, 0, 0}, {0, 0, 5, 0, 0, 0}};
  auto words = count_in_words(Mode::planar_sliding, counts, s.sets, false);
  EXPECT_EQ(words.count, "12 of 55 readings, 22 %");
  EXPECT_EQ(words.leading, "all from J1");
  counts.by_set[2].admissible = 3;
  words = count_in_words(Mode::planar_sliding, counts, s.sets, false);
  EXPECT_EQ(words.leading, "12 J1, then 3 strays");
  counts.by_set[2].admissible = 1;
  words = count_in_words(Mode::planar_sliding, counts, s.sets, false);
  EXPECT_EQ(words.leading, "12 J1, then 1 stray");
  counts.by_set = {{0, 1, 30, 9, 0, 0}, {1, 2, 20, 3, 0, 0}};
  words = count_in_words(Mode::wedge_sliding, counts, s.sets, false);
  EXPECT_EQ(words.leading, "9 J1 with strays, then 3 J1 with J2");
  counts.admissible = 0;
  EXPECT_EQ(count_in_words(Mode::wedge_sliding, counts, s.sets, true).leading,
            "no direction is free to move on this face");
  EXPECT_EQ(count_in_words(Mode::wedge_sliding, counts, s.sets, false).count, "none of 55 pairs");
  counts.tested = 0;
  EXPECT_EQ(count_in_words(Mode::wedge_sliding, counts, s.sets, false).count,
            "no pair of readings");
}

KinematicsOptions options_for(const std::vector<Face>& faces) {
  KinematicsOptions options;
  options.faces = faces;
  options.friction = 30_deg;
  return options;
}

TEST(ModeNet, WarmSymbolsAreTheAdmissibleOnes) {
  const Sample s = sample();
  const auto options = options_for({{70_deg, 140_deg}});
  const auto result = test_kinematics(s.readings, s.sets.assignment, 2, options);
  const Group net =
      draw_mode_net({s.readings, s.sets, options, result.faces[0], Mode::planar_sliding}, kFrame);
  std::vector<Point> expected;
  const FaceLimits limits = prepare_limits(
      options.faces[0],
      {options.upper, options.friction, options.strike_tolerance, options.toppling_tolerance});
  for (const Vector3& n : s.readings.normals) {
    if (planar_sliding(limits, n)) expected.push_back(on_page(kFrame, n));
  }
  EXPECT_EQ(expected.size(), result.faces[0].planar_sliding.admissible);
  std::size_t distinct = 0;
  for (std::size_t i = 0; i < expected.size(); ++i) {
    distinct += std::find(expected.begin(), expected.begin() + static_cast<long>(i), expected[i]) ==
                        expected.begin() + static_cast<long>(i)
                    ? 1
                    : 0;
  }
  EXPECT_GT(distinct, 5u);
  EXPECT_EQ(symbols_of(net, Shape::disc, style::kHazard), distinct);
  EXPECT_TRUE(has_text(net, "Planar sliding"));
}

TEST(ModeNet, LinesAreThinnedToTheSameOnesEveryTime) {
  Sample s = sample();
  EXPECT_EQ(
      lines_for_drawing(s.readings, 4000).size(), 55u * 54u / 2u - [&] {
        std::size_t parallel = 0;
        for (std::size_t i = 0; i < 55; ++i) {
          for (std::size_t j = 0; j < i; ++j) {
            parallel += s.readings.planes[i] == s.readings.planes[j] ? 1 : 0;
          }
        }
        return parallel;
      }());
  const auto few = lines_for_drawing(s.readings, 100);
  EXPECT_LE(few.size(), 100u);
  EXPECT_GE(few.size(), 95u);
  const auto again = lines_for_drawing(s.readings, 100);
  ASSERT_EQ(few.size(), again.size());
  for (std::size_t i = 0; i < few.size(); ++i) EXPECT_EQ(few[i], again[i]);
  EXPECT_TRUE(lines_for_drawing(Readings{}, 100).empty());
}

TEST(Sheet, PaintsWithoutWarningsAndWithTheSameBytes) {
  const Sample s = sample();
  const auto options = options_for({{70_deg, 140_deg}, {100_deg, 20_deg}});
  const auto result = test_kinematics(s.readings, s.sets.assignment, 2, options);
  const DensityGrid grid = density_grid(AxialDensity(s.readings.normals, {}));
  NetContent content{s.readings, s.sets, &grid, usual_levels(grid.peak), options.faces, {}};
  for (const Projection projection : {Projection::equal_angle, Projection::equal_area}) {
    std::vector<Picture> pages{net_sheet(content, projection, {"Tern Scar", ""})};
    for (std::size_t face = 0; face < 2; ++face) {
      content.marked_face = face;
      pages.push_back(face_sheet(content, projection, {"Tern Scar", ""}, result, face));
    }
    const Painted first = paint_pdf(pages);
    EXPECT_TRUE(first.warnings.empty());
    EXPECT_EQ(first.bytes, paint_pdf(pages).bytes);
    EXPECT_EQ(paint_svg(stacked(pages)).bytes, paint_svg(stacked(pages)).bytes);
    EXPECT_EQ(stacked(pages).height_mm, pages[0].height_mm + 420.0);
  }
}

TEST(Sheet, OneReadingAndNoSetStillDraw) {
  Readings one;
  add_reading(one, 0, 0);
  SetsResult none;
  none.assignment = {0};
  none.unassigned = 1;
  const auto options = options_for({{70_deg, 140_deg}});
  const auto result = test_kinematics(one, none.assignment, 0, options);
  const DensityGrid grid = density_grid(AxialDensity(one.normals, {}));
  const NetContent content{one, none, &grid, usual_levels(grid.peak), options.faces, 0};
  const Picture page = face_sheet(content, Projection::equal_angle, {}, result, 0);
  EXPECT_TRUE(has_text(page.content, "none of 1 reading"));
  EXPECT_TRUE(has_text(page.content, "no pair of readings"));
  EXPECT_FALSE(paint_svg(page).bytes.empty());
}

TEST(Sheet, LongTitlesShrinkThenTakeTwoLines) {
  const Sample s = sample();
  const NetContent content{s.readings, s.sets, nullptr, {}, {}, {}};
  std::string title = "Quarry";
  for (int i = 0; i < 40; ++i) title += " north bench";
  const Picture page = net_sheet(content, Projection::equal_angle, {title, ""});
  bool found = false;
  for_each_mark(page.content, [&](const Mark& mark) {
    const auto* text = std::get_if<Text>(&mark.content);
    if (text == nullptr || text->text != title) return;
    found = true;
    EXPECT_EQ(measure(*text).lines, 2);
    EXPECT_LE(measure(*text).width_mm, page.width_mm - 28.0);
  });
  EXPECT_TRUE(found);
}

}  // namespace
}  // namespace brink::plot
