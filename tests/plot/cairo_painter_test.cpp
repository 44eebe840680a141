#include "brink/plot/cairo_painter.hpp"

#include <gtest/gtest.h>

#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <limits>
#include <set>

#include "brink/base/error.hpp"

namespace brink::plot {
namespace {

Picture sample_picture() {
  Picture picture{60.0, 40.0, {"Scarp & <gully>", "A trial drawing", {}}};
  Path disc = circle({20.0, 20.0}, 15.0);
  disc.stroke = Stroke{{0, 0, 0}, 0.3, {}, false};
  disc.fill = Colour{240, 220, 200};
  add(picture.content, disc);
  for (const Shape shape : {Shape::disc, Shape::square, Shape::triangle, Shape::diamond,
                            Shape::wedge, Shape::cross, Shape::saltire, Shape::ring}) {
    const double x = 40.0 + 2.0 * static_cast<double>(static_cast<int>(shape));
    add(picture.content, Symbols{shape, 1.2, 0.2, {10, 60, 140}, {{x, 10.0}, {x, 14.0}}});
  }
  Group inner{"Names", "in several scripts", {}};
  add(inner, Text{{30.0, 30.0}, "Fels κ ≤ 30°", {3.5, true, {0, 0, 0}}, Anchor::middle, 0.0, 1});
  add(picture.content, inner);
  return picture;
}

std::size_t count_of(const std::string& text, std::string_view part) {
  std::size_t n = 0;
  for (std::size_t at = text.find(part); at != std::string::npos; at = text.find(part, at + 1)) ++n;
  return n;
}

// Runs an outside program on the bytes; its exit status, or nothing where it isn't installed.
std::optional<int> checked_by(const std::string& command, const std::string& bytes) {
  const std::string program = command.substr(0, command.find(' '));
  if (std::system(("command -v " + program + " >/dev/null").c_str()) != 0) return std::nullopt;
  const auto path =
      std::filesystem::path(testing::TempDir()) /
      (std::string("brink-") + testing::UnitTest::GetInstance()->current_test_info()->name());
  std::ofstream(path, std::ios::binary) << bytes;
  return std::system((command + " " + path.string() + " >/dev/null 2>&1").c_str());
}

void expect_accepted(const std::string& command, const std::string& bytes) {
  const auto status = checked_by(command, bytes);
  ASSERT_TRUE(status.has_value()) << command << " is not installed; see .ci/packages";
  EXPECT_EQ(*status, 0) << command;
}

TEST(CairoPainter, SvgIsInMillimetresAndWellFormed) {
  const std::string svg = paint_svg(sample_picture()).bytes;
  EXPECT_NE(svg.find("width=\"60mm\" height=\"40mm\" viewBox=\"0 0 60 40\""), std::string::npos);
  EXPECT_NE(svg.find("Scarp &amp; &lt;gully&gt;</title>"), std::string::npos);
  EXPECT_NE(svg.find("A trial drawing. Names. in several scripts</desc>"), std::string::npos);
  EXPECT_NE(svg.find(">Fels κ ≤ 30°</text>"), std::string::npos);
  expect_accepted("xmllint --noout", svg);
}

TEST(CairoPainter, SvgRendersElsewhere) {
  expect_accepted("rsvg-convert -f png", paint_svg(sample_picture()).bytes);
}

TEST(CairoPainter, PdfIsSoundAndOpensElsewhere) {
  const std::string pdf = paint_pdf({sample_picture(), sample_picture()}).bytes;
  expect_accepted("qpdf --check", pdf);
  expect_accepted("pdftoppm -r 20 -png", pdf);
}

TEST(CairoPainter, TheSamePictureGivesTheSameBytesWhateverWasDrawnBefore) {
  const Picture picture = sample_picture();
  const std::string svg = paint_svg(picture).bytes;
  const std::string pdf = paint_pdf({picture}, 86400).bytes;
  const std::string png = paint_png(picture).bytes;
  Picture other = sample_picture();
  add(other.content, Text{{5.0, 38.0}, "another figure", {2.0, false, {}}, Anchor::start, 0.0, 1});
  (void)paint_svg(other);
  (void)paint_pdf({other, other});
  EXPECT_EQ(paint_svg(picture).bytes, svg);
  EXPECT_EQ(paint_pdf({picture}, 86400).bytes, pdf);
  EXPECT_EQ(paint_png(picture).bytes, png);
}

TEST(CairoPainter, PdfCarriesTheDateItIsGiven) {
  const std::string pdf = paint_pdf({sample_picture()}, 86400).bytes;
  EXPECT_NE(pdf.find("/CreationDate (19700102000000Z"), std::string::npos)
      << pdf.substr(pdf.find("/CreationDate"), 60);
}

TEST(CairoPainter, SvgIdsAreUniqueCarryThePrefixAndResolve) {
  const std::string svg = paint_svg(sample_picture(), "net-a").bytes;
  std::set<std::string> ids;
  for (std::size_t at = svg.find(" id=\""); at != std::string::npos;
       at = svg.find(" id=\"", at + 1)) {
    const std::string id = svg.substr(at + 5, svg.find('"', at + 5) - at - 5);
    EXPECT_TRUE(id.starts_with("net-a-")) << id;
    EXPECT_TRUE(ids.insert(id).second) << id;
  }
  EXPECT_GT(ids.size(), 5u);
  for (std::size_t at = svg.find("href=\"#"); at != std::string::npos;
       at = svg.find("href=\"#", at + 1)) {
    EXPECT_TRUE(ids.contains(svg.substr(at + 7, svg.find('"', at + 7) - at - 7)));
  }
}

TEST(CairoPainter, RefusesPlacesThatAreNoNumbers) {
  for (const double bad :
       {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::infinity()}) {
    Picture picture = sample_picture();
    add(picture.content, segment({0.0, 0.0}, {bad, 1.0}, {}));
    EXPECT_THROW(paint_svg(picture), Error);
    EXPECT_THROW(paint_pdf({picture}), Error);
    EXPECT_THROW(paint_png(picture), Error);
  }
  EXPECT_THROW(paint_png(sample_picture(), 1e6), Error);
  EXPECT_THROW(paint_svg(Picture{}), Error);
}

TEST(CairoPainter, NamesTextsThatNoFontCanShow) {
  Picture picture = sample_picture();
  EXPECT_TRUE(paint_svg(picture).warnings.empty());
  // A private-use character: no font should have it.
  add(picture.content,
      Text{{5.0, 5.0}, "set \U0010FFFDx", {3.0, false, {}}, Anchor::start, 0.0, 1});
  const auto warnings = paint_svg(picture).warnings;
  ASSERT_EQ(warnings.size(), 1u);
  EXPECT_NE(warnings[0].find("set "), std::string::npos);
}

TEST(CairoPainter, BrokenUtf8AndControlBytesStillDraw) {
  Picture picture = sample_picture();
  add(picture.content,
      Text{{5.0, 5.0}, "bad \xff\x01 text", {3.0, false, {}}, Anchor::start, 0.0, 1});
  add(picture.content, Text{{5.0, 9.0}, "after", {3.0, false, {}}, Anchor::start, 0.0, 1});
  const std::string svg = paint_svg(picture).bytes;
  EXPECT_EQ(count_of(svg, ">after</text>"), 1u);
  expect_accepted("xmllint --noout", svg);
}

TEST(CairoPainter, TextWrapsAndIsCut) {
  Text text{{0.0, 0.0},
            "one two three four five six seven eight nine ten",
            {4.0, false, {}},
            Anchor::start,
            0.0,
            1};
  const TextSize line = measure(text);
  EXPECT_EQ(line.lines, 1);
  text.width_mm = line.width_mm / 2.0;
  text.most_lines = 3;
  const TextSize wrapped = measure(text);
  EXPECT_GT(wrapped.lines, 1);
  EXPECT_FALSE(wrapped.cut);
  EXPECT_LE(wrapped.width_mm, text.width_mm);
  text.most_lines = 1;
  EXPECT_TRUE(measure(text).cut);
}

TEST(CairoPainter, TextSizeScales) {
  Text small{{0.0, 0.0}, "J1 58/152", {2.0, false, {}}, Anchor::start, 0.0, 1};
  Text large = small;
  large.style.size_mm = 8.0;
  EXPECT_NEAR(measure(large).width_mm / measure(small).width_mm, 4.0, 0.02);
}

TEST(Picture, MovedShiftsEveryMark) {
  const Group group = moved(sample_picture().content, 5.0, -3.0);
  const auto& path = std::get<Path>(group.marks[0].content);
  EXPECT_EQ(std::get<ArcTo>(path.steps[0]).centre, (Point{25.0, 17.0}));
  const auto& inner = std::get<Group>(group.marks.back().content);
  EXPECT_EQ(std::get<Text>(inner.marks[0].content).at, (Point{35.0, 27.0}));
}

}  // namespace
}  // namespace brink::plot
