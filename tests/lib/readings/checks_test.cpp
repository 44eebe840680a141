#include "brink/readings/checks.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/random.hpp"

namespace brink {
namespace {

// Readings in the making: planes and cells, turned into a file so that places are real.
struct Field {
  std::string headings = "dip,dip_direction";
  std::vector<std::string> rows;

  Readings read() const {
    std::string bytes = headings + "\n";
    for (const std::string& row : rows) bytes += row + "\n";
    const InputBytes file{"t.csv", bytes};
    return read_readings({&file, 1}, {});
  }
};

double draw(std::uint64_t seed, std::uint64_t stream, std::uint64_t i) {
  return random_uniform(seed, stream, i);
}

double gaussian(std::uint64_t seed, std::uint64_t stream, std::uint64_t i) {
  return std::sqrt(-2.0 * std::log(draw(seed, 2 * stream, i))) *
         std::cos(2.0 * std::numbers::pi * draw(seed, 2 * stream + 1, i));
}

std::string whole(double value) {
  return std::to_string(std::lround(value));
}

struct Set {
  double dip, direction;
};

// About 8 degrees of scatter, whole degrees, every tenth reading a stray unless said otherwise.
Plane scattered(const Set& set, std::uint64_t seed, std::uint64_t i, std::uint64_t strays = 10) {
  if (i % strays == strays - 1) {
    return {Angle::degrees(std::round(acos(draw(seed, 20, i)).deg())),
            Angle::degrees(std::floor(360.0 * draw(seed, 21, i)))};
  }
  const double dip = std::min(89.0, std::max(1.0, set.dip + 8.0 * gaussian(seed, 5, i)));
  const double direction = set.direction + 8.0 / sin(Angle::degrees(dip)) * gaussian(seed, 6, i);
  return {Angle::degrees(std::round(dip)), wrap_360(Angle::degrees(std::round(direction)))};
}

std::string row_of(const Plane& plane) {
  return whole(plane.dip.deg()) + "," + whole(plane.dip_direction.deg());
}

constexpr Set kSets[] = {{70, 130}, {60, 255}, {35, 20}};

Field three_sets(std::uint64_t seed, std::uint64_t count) {
  Field field;
  for (std::uint64_t i = 0; i < count; ++i) {
    field.rows.push_back(row_of(scattered(kSets[i % 3], seed, i)));
  }
  return field;
}

bool mentions(const std::vector<std::string>& warnings, std::string_view text) {
  for (const std::string& warning : warnings) {
    if (warning.find(text) != std::string::npos) return true;
  }
  return false;
}

// The promise of the header: honest readings rarely cause a warning. Twenty files have at most a
// few false alarms where one in twenty is allowed for each of two checks.
TEST(Checks, HonestReadingsAreLeftInPeace) {
  std::size_t alarms = 0;
  for (std::uint64_t seed = 0; seed < 20; ++seed) {
    Field field = three_sets(seed, 180);
    field.headings += ",observer";
    for (std::size_t i = 0; i < field.rows.size(); ++i) field.rows[i] += i % 2 == 0 ? ",A" : ",B";
    alarms += check_readings(field.read()).size();
  }
  EXPECT_LE(alarms, 4U);
}

TEST(Checks, SwappedDipAndDirectionAreNamed) {
  Field field;
  for (std::uint64_t i = 0; i < 240; ++i) {
    const Set sets[] = {{70, 25}, {60, 255}, {35, 200}};
    field.rows.push_back(row_of(scattered(sets[i % 3], 1, i, 40)));
  }
  field.rows[30] = "24,71";
  field.rows[77] = "27,69";
  const auto warnings = check_swapped(field.read());
  EXPECT_TRUE(mentions(warnings, "t.csv: line 32: 24/071")) << ::testing::PrintToString(warnings);
  EXPECT_TRUE(mentions(warnings, "t.csv: line 79: 27/069"));
  EXPECT_LE(warnings.size(), 3U);
}

TEST(Checks, AnObserverTurnedAboutIsNamed) {
  Field field;
  field.headings += ",observer";
  for (std::uint64_t i = 0; i < 180; ++i) {
    Plane plane = scattered(kSets[i % 3], 4, i);
    const bool reversed = i % 6 == 0 || i % 6 == 4;
    if (reversed) plane.dip_direction = wrap_360(plane.dip_direction + 180_deg);
    field.rows.push_back(row_of(plane) + (reversed ? ",B" : i % 2 == 0 ? ",A" : ",C"));
  }
  const auto warnings = check_reversed(field.read());
  ASSERT_EQ(warnings.size(), 1U) << ::testing::PrintToString(warnings);
  EXPECT_TRUE(mentions(warnings, "the directions of B fit"));
  EXPECT_TRUE(mentions(warnings, "t.csv: lines 2, "));
}

TEST(Checks, HeapedValuesAreReportedWithTheirShare) {
  Field field = three_sets(2, 200);
  for (std::size_t i = 0; i < 120; ++i) {
    const Plane plane = scattered(kSets[i % 3], 2, i);
    field.rows[i] =
        whole(5.0 * std::round(plane.dip.deg() / 5.0)) + "," + whole(plane.dip_direction.deg());
  }
  const auto warnings = check_heaping(field.read());
  ASSERT_EQ(warnings.size(), 1U) << ::testing::PrintToString(warnings);
  EXPECT_TRUE(mentions(warnings, "dips are heaped"));
  EXPECT_TRUE(mentions(warnings, "t.csv: lines 2 to 201"));
  EXPECT_TRUE(check_heaping(three_sets(3, 200).read()).empty());
}

TEST(Checks, RepeatedRowsAreFoundByIdPositionOrBlock) {
  Field ids = three_sets(5, 20);
  ids.headings += ",id";
  for (std::size_t i = 0; i < 20; ++i) ids.rows[i] += "," + std::to_string(i == 7 ? 3 : i);
  EXPECT_TRUE(mentions(check_duplicates(ids.read()), "t.csv: lines 5, 9"));

  Field positions = three_sets(5, 40);
  positions.headings += ",traverse,position";
  for (std::size_t i = 0; i < 40; ++i) positions.rows[i] += ",T1," + std::to_string(i) + ".25";
  EXPECT_TRUE(check_duplicates(positions.read()).empty());
  positions.rows[12] = positions.rows[11];
  EXPECT_TRUE(mentions(check_duplicates(positions.read()), "t.csv: line 14: the row is equal"));

  Field blocks = three_sets(5, 120);
  EXPECT_TRUE(check_duplicates(blocks.read()).empty());
  blocks.rows.push_back(blocks.rows[50]);  // one equal row means nothing
  EXPECT_TRUE(check_duplicates(blocks.read()).empty());
  for (std::size_t i = 20; i < 40; ++i) blocks.rows.push_back(blocks.rows[i]);
  const auto warnings = check_duplicates(blocks.read());
  ASSERT_EQ(warnings.size(), 1U) << ::testing::PrintToString(warnings);
  EXPECT_TRUE(mentions(
      warnings, "t.csv: lines 123 to 142: these 20 readings repeat those from t.csv, line 22"));
}

TEST(Checks, SetOfOneTraverse) {
  Field field;
  field.headings += ",set,traverse";
  for (std::uint64_t i = 0; i < 90; ++i) {
    const std::string traverse = "T" + std::to_string(i / 30);
    const std::uint64_t set = i < 30 && i % 3 == 2 ? 3 : 1 + i % 2;
    field.rows.push_back(row_of(scattered(kSets[set - 1], 6, i)) + "," + std::to_string(set) + "," +
                         traverse);
  }
  const auto warnings = check_single_traverse_sets(field.read());
  ASSERT_EQ(warnings.size(), 1U);
  EXPECT_TRUE(mentions(warnings, "set 3 is met by traverse T0 alone"));
}

TEST(Checks, ReadingsInTheBlindZone) {
  Field field;
  field.headings += ",traverse,traverse_trend,traverse_plunge";
  // A vertical plane meets the level line towards 090 at 90 degrees less the turn of its direction.
  field.rows = {"90,90,T1,90,0",  "90,164,T1,90,0", "90,165,T1,90,0",
                "90,166,T1,90,0", "10,0,T1,90,0",   "90,0,T1,,"};
  const auto warnings = check_blind_zones(field.read());
  ASSERT_EQ(warnings.size(), 1U);
  EXPECT_TRUE(mentions(warnings, "t.csv: lines 5, 6: within 15 degrees")) << warnings[0];
}

TEST(Checks, NothingToCheckIsNoTrouble) {
  EXPECT_TRUE(check_readings(Readings{}).empty());
  EXPECT_TRUE(check_readings(Field{"dip,dip_direction", {"30,90"}}.read()).empty());
}

}  // namespace
}  // namespace brink
