#include "brink/readings/spacing.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/random.hpp"

namespace {

using namespace brink;

struct Row {
  Plane plane;
  const char* traverse;
  std::string position;
};

Readings readings_of(const std::vector<Row>& rows, std::string heading = "position_m") {
  Readings readings;
  readings.files = {{"pit.csv", ""}};
  readings.extra = {{"traverse", {}}, {std::move(heading), {}}};
  for (const Row& row : rows) {
    readings.planes.push_back(row.plane);
    readings.normals.push_back(upward_normal(row.plane));
    readings.weights.push_back(1.0);
    readings.places.push_back({0, readings.size() + 1});
    readings.extra[0].cells.push_back(row.traverse);
    readings.extra[1].cells.push_back(row.position);
  }
  return readings;
}

BiasOptions traverses(const std::vector<const char*>& texts) {
  BiasOptions options;
  for (const char* text : texts) options.traverses.push_back(parse_traverse(text, ""));
  return options;
}

TEST(Spacing, GapTimesTheSineOfTheAngleToTheTraverse) {
  // Planes dipping 30 east, logged along a level line to the east: 1 m along is 0.5 m across.
  const Plane plane{30_deg, 90_deg};
  const Readings readings = readings_of(
      {{plane, "A", "4.0"}, {plane, "A", "1.0"}, {plane, "A", "2.0"}, {plane, "B", "100"}});
  const auto result = measure_spacing(readings, {1, 1, 1, 1}, {{"J1", upward_normal(plane)}},
                                      traverses({"A=scanline@90/0", "B=scanline@270/0"}));
  ASSERT_EQ(result.sets.size(), 1U);
  EXPECT_EQ(result.sets[0].spacing_m->count, 2U);
  EXPECT_NEAR(result.sets[0].spacing_m->mean, 0.75, 1e-15);
  EXPECT_NEAR(result.sets[0].spacing_m->median, 0.75, 1e-15);
  EXPECT_NEAR(*result.sets[0].spacing_m->deviation, std::sqrt(0.125), 1e-15);
  EXPECT_NEAR(*result.sets[0].frequency_per_m, 1.0 / 0.75, 1e-15);
  EXPECT_EQ(result.sets[0].isrm_class, "wide");
  ASSERT_EQ(result.traverses.size(), 2U);
  EXPECT_NEAR(*result.traverses[0].frequency_per_m, 2.0 / 3.0, 1e-15);
  EXPECT_FALSE(result.traverses[1].frequency_per_m.has_value());
}

// A second way: planes at stated distances along their normal, met by a slanting borehole.
TEST(Spacing, RecoversTheSpacingOfParallelPlanes) {
  const Plane plane{63_deg, 217_deg};
  const Traverse hole = parse_traverse("H=borehole@100/55", "");
  const Vector3 n = upward_normal(plane);
  const Vector3 t = direction(hole.line);
  std::vector<Row> rows;
  double across = 0.0;
  double sum = 0.0;
  for (std::uint64_t i = 0; i < 200; ++i) {
    const double step = 0.05 - 0.4 * std::log(random_uniform(3, 0, i));
    if (i > 0) sum += step;
    across += step;
    rows.push_back({plane, "H", std::to_string(across / t.dot(n))});  // t s . n = across
  }
  const auto result = measure_spacing(readings_of(rows), std::vector<int>(200, 1), {{"J1", n}},
                                      traverses({"H=borehole@100/55"}));
  EXPECT_EQ(result.sets[0].spacing_m->count, 199U);
  EXPECT_NEAR(result.sets[0].spacing_m->mean, sum / 199.0, 1e-7);
}

TEST(Spacing, BlindTraversesAndUnreadableCellsAreNamed) {
  const Plane plane{80_deg, 90_deg};
  const Readings readings =
      readings_of({{plane, "A", "1"}, {plane, "A", "2"}, {plane, "A", "ca. 3"}, {plane, "A", "-"}});
  const auto result = measure_spacing(readings, {1, 1, 1, 1}, {{"bedding", upward_normal(plane)}},
                                      traverses({"A=borehole@0/90"}));
  EXPECT_FALSE(result.sets[0].spacing_m.has_value());
  EXPECT_EQ(result.traverses[0].count, 2U);
  ASSERT_EQ(result.warnings.size(), 2U);
  EXPECT_EQ(result.warnings[0],
            "pit.csv: line 4: position_m is no number, so not used for spacing");
  EXPECT_EQ(result.warnings[1],
            "borehole A (0/90) runs less than 15 degrees from the mean plane of set bedding; "
            "spacings of that set are not taken from it");
}

TEST(Spacing, HeadingsNameTheUnit) {
  const Plane plane{90_deg, 90_deg};
  for (const auto& [heading, metres] :
       {std::pair{"Position (cm)", 0.02}, {"position mm", 0.002}, {"position", 2.0}}) {
    const auto result =
        measure_spacing(readings_of({{plane, "A", "1,5"}, {plane, "A", "3,5"}}, heading), {1, 1},
                        {{"J1", upward_normal(plane)}}, traverses({"A=scanline@90/0"}));
    EXPECT_NEAR(result.sets.at(0).spacing_m->mean, metres, 1e-15) << heading;
  }
}

TEST(Spacing, NothingWithoutPositionsOrLines) {
  const Plane plane{90_deg, 90_deg};
  const Readings readings = readings_of({{plane, "A", "1"}}, "note");
  EXPECT_TRUE(
      measure_spacing(readings, {1}, {{"J1", upward_normal(plane)}}, traverses({"A=scanline@90/0"}))
          .sets.empty());
  EXPECT_TRUE(measure_spacing(readings_of({{plane, "A", "1"}}), {1}, {{"J1", upward_normal(plane)}},
                              traverses({"A=window@90/0"}))
                  .sets.empty());
}

TEST(Spacing, ClassesIncludeTheirLowerLimit) {
  EXPECT_EQ(isrm_spacing_class(0.019), "extremely close");
  EXPECT_EQ(isrm_spacing_class(0.02), "very close");
  EXPECT_EQ(isrm_spacing_class(0.06), "close");
  EXPECT_EQ(isrm_spacing_class(0.2), "moderate");
  EXPECT_EQ(isrm_spacing_class(0.6), "wide");
  EXPECT_EQ(isrm_spacing_class(2.0), "very wide");
  EXPECT_EQ(isrm_spacing_class(6.0), "extremely wide");
  EXPECT_EQ(isrm_persistence_class(0.5), "very low");
  EXPECT_EQ(isrm_persistence_class(3.0), "medium");
  EXPECT_EQ(isrm_persistence_class(25.0), "very high");
  EXPECT_EQ(isrm_aperture_class(0.05), "very tight");
  EXPECT_EQ(isrm_aperture_class(0.25), "partly open");
  EXPECT_EQ(isrm_aperture_class(12.0), "wide");
}

TEST(Spacing, PersistenceAndApertureBySet) {
  const Plane plane{90_deg, 90_deg};
  Readings readings =
      readings_of({{plane, "A", "2.0"}, {plane, "A", "4.0"}, {plane, "A", "30"}}, "trace_length_m");
  const auto persistence = measure_persistence(readings, {1, 1, 0}, 2);
  ASSERT_EQ(persistence.size(), 2U);
  EXPECT_EQ(persistence[0].summary->mean, 3.0);
  EXPECT_EQ(persistence[0].isrm_class, "medium");
  EXPECT_FALSE(persistence[1].summary.has_value());
  EXPECT_TRUE(measure_aperture(readings, {1, 1, 0}, 2).empty());
  readings.extra[1].heading = "aperture";
  const auto aperture = measure_aperture(readings, {1, 1, 0}, 1);
  EXPECT_NEAR(aperture[0].summary->mean, 3.0, 1e-12);
  EXPECT_EQ(aperture[0].isrm_class, "moderately wide");
}

}  // namespace
