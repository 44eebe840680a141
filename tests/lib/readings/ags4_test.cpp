#include "brink/readings/ags4.hpp"

#include <gtest/gtest.h>

#include <algorithm>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"
#include "brink/readings/readings.hpp"

namespace brink {
namespace {

// An invented scanline, written by the rules of the standard (AGS4 data format, edition 4.1: groups
// LOCA, HORN and DISC).
const std::string kScanline =
    "\"GROUP\",\"LOCA\"\r\n"
    "\"HEADING\",\"LOCA_ID\",\"LOCA_TYPE\",\"LOCA_NATE\",\"LOCA_NATN\",\"LOCA_GL\"\r\n"
    "\"UNIT\",\"\",\"\",\"m\",\"m\",\"m\"\r\n"
    "\"TYPE\",\"ID\",\"PA\",\"2DP\",\"2DP\",\"2DP\"\r\n"
    "\"DATA\",\"SL1\",\"SCAN\",\"4000.00\",\"5000.00\",\"120.50\"\r\n"
    "\r\n"
    "\"GROUP\",\"HORN\"\r\n"
    "\"HEADING\",\"LOCA_ID\",\"HORN_TOP\",\"HORN_BASE\",\"HORN_ORNT\",\"HORN_INCL\"\r\n"
    "\"UNIT\",\"\",\"m\",\"m\",\"deg\",\"deg\"\r\n"
    "\"TYPE\",\"ID\",\"2DP\",\"2DP\",\"0DP\",\"0DP\"\r\n"
    "\"DATA\",\"SL1\",\"0.00\",\"3.00\",\"62\",\"2\"\r\n"
    "\"DATA\",\"SL1\",\"3.00\",\"30.00\",\"70\",\"-1\"\r\n"
    "\r\n"
    "\"GROUP\",\"DISC\"\r\n"
    "\"HEADING\",\"LOCA_ID\",\"DISC_TOP\",\"DISC_BASE\",\"FRAC_SET\",\"DISC_NUMB\",\"DISC_TYPE\","
    "\"DISC_DIP\",\"DISC_DIR\",\"DISC_TERM\",\"DISC_PERS\",\"DISC_REM\"\r\n"
    "\"UNIT\",\"\",\"m\",\"m\",\"\",\"\",\"\",\"deg\",\"deg\",\"\",\"m\",\"\"\r\n"
    "\"TYPE\",\"ID\",\"2DP\",\"2DP\",\"X\",\"X\",\"PA\",\"X\",\"X\",\"PA\",\"1DP\",\"X\"\r\n"
    "\"DATA\",\"SL1\",\"1.35\",\"\",\"J1\",\"1\",\"Joint\",\"68\",\"214\",\"RX\",\"4.5\",\"says "
    "\"\"tight\"\"\"\r\n"
    "\"DATA\",\"SL1\",\"3.80\",\"\",\"J1\",\"3\",\"Joint\",\"65-70\",\"NI\",\"D\",\"1.2\",\"\"\r\n"
    "\"DATA\",\"SL1\",\"4.10\",\"\",\"J2\",\"4\",\"Joint\",\"65-70\",\"350-020\",\"D\",\"1.2\","
    "\"\"\r\n";

Readings read(const std::string& bytes) {
  const InputBytes file{"s.ags", bytes};
  return read_readings({&file, 1}, {});
}

bool any_holds(const std::vector<std::string>& texts, std::string_view part) {
  return std::any_of(texts.begin(), texts.end(),
                     [&](const std::string& t) { return t.find(part) != std::string::npos; });
}

std::string replaced(std::string text, std::string_view what, std::string_view with) {
  const std::size_t at = text.find(what);
  EXPECT_NE(at, std::string::npos) << what;
  return text.replace(at, what.size(), with);
}

TEST(Ags4, ReadsDiscontinuitiesWithTheirLocation) {
  const Readings r = read(kScanline);
  ASSERT_EQ(r.size(), 2U);
  EXPECT_EQ(r.planes[0], (Plane{68_deg, 214_deg}));
  EXPECT_EQ(r.planes[1], (Plane{67.5_deg, 5_deg}));
  ASSERT_EQ(r.rejected.size(), 1U);
  EXPECT_EQ(r.rejected[0].line, 19U);
  EXPECT_EQ(r.rejected[0].value, "NI");
  EXPECT_EQ(r.rejected[0].heading, "DISC_DIR");
  EXPECT_EQ(r.rejected[0].column, 9U);  // the descriptor DATA is the first
  EXPECT_EQ(r.find_column("set")->cells[1], "J2");
  EXPECT_EQ(r.find_column("FRAC_SET")->cells[0], "J1");
  EXPECT_EQ(r.find_column("traverse")->cells[0], "SL1");
  EXPECT_EQ(r.find_column("position")->cells[0], "1.35");
  EXPECT_EQ(r.find_column("note")->cells[0], "says \"tight\"");
  EXPECT_EQ(r.find_column("LOCA_TYPE")->cells[0], "SCAN");
  EXPECT_EQ(r.find_column("LOCA_GL")->cells[0], "120.50");
  EXPECT_EQ(r.find_column("HORN_ORNT")->cells[0], "62");
  EXPECT_EQ(r.find_column("traverse trend")->cells[1], "70");
  EXPECT_TRUE(any_holds(r.warnings, "s.ags:19: group DISC: DISC_DIP: the range '65-70'"));
}

TEST(Ags4, ReadsByHeadingWhateverTheOrder) {
  const std::string bytes =
      "\"GROUP\",\"DISC\"\r\n\"HEADING\",\"DISC_DIR\",\"LOCA_ID\",\"DISC_DIP\"\r\n"
      "\"UNIT\",\"deg\",\"\",\"deg\"\r\n\"TYPE\",\"X\",\"ID\",\"X\"\r\n"
      "\"DATA\",\"214\",\"SL1\",\"68\"\r\n\r\n\"GROUP\",\"ODD1\"\r\n\"HEADING\",\"A\"\r\n"
      "\"UNIT\",\"\"\r\n\"TYPE\",\"X\"\r\n\"DATA\",\"1\"\r\n";
  EXPECT_EQ(read(bytes).planes, (std::vector<Plane>{{68_deg, 214_deg}}));
}

TEST(Ags4, NamesWhatBreaksTheRules) {
  const auto breaches = [](const std::string& bytes) {
    return parse_ags4(bytes, "s.ags").breaches;
  };
  const std::vector<std::string> none = breaches(kScanline);
  ASSERT_EQ(none.size(), 1U);
  EXPECT_NE(none[0].find("PROJ, TRAN, UNIT, TYPE"), std::string::npos);

  struct Case {
    const char* what;
    const char* with;
    const char* breach;
  };
  const Case cases[] = {
      {"\"SCAN\",\"4000.00\"", "SCAN,\"4000.00\"", "s.ags:5: group LOCA: a field is not in double"},
      {"\"120.50\"\r\n", "\"120.50\"\n", "s.ags:5: group LOCA: the line doesn't end in CR LF"},
      {"\r\n\r\n\"GROUP\",\"HORN\"", "\r\n\"GROUP\",\"HORN\"",
       "s.ags:6: group HORN: no blank line"},
      {"\"4000.00\"", "\"4000.0\"", "s.ags:5: group LOCA: a field is not of the type"},
      {"\"4000.00\"", "\"4,000.00\"", "LOCA_NATE is '4,000.00', not 2DP"},
      {"\"UNIT\",\"\",\"\",\"m\"", "\"UNIT\",\"\",\"m\"",
       "group LOCA: the UNIT row has another number"},
      {"\"DATA\",\"SL1\",\"0.00\"", "\"DATE\",\"SL1\",\"0.00\"",
       "s.ags:11: group HORN: the row begins"},
      {"\"DATA\",\"SL1\",\"SCAN\"", "\"DATA\",\"SL9\",\"SCAN\"",
       "s.ags:18: group DISC: the location is not"},
      {"\"GROUP\",\"HORN\"", "\"GROUP\",\"LOCA\"", "s.ags:7: group LOCA: the group stands twice"},
      {"\"HORN_INCL\"", "\"HORN_TOP\"", "s.ags:8: group HORN: a heading stands twice"},
      {"tight", "\xC3\xA9t\xC3\xA9",
       "s.ags:18: group DISC: the line holds characters beyond ASCII"},
      {"\"TYPE\",\"ID\",\"PA\",\"2DP\",\"2DP\",\"2DP\"\r\n", "",
       "group LOCA: the group has no TYPE row"},
      {"\"GROUP\",\"LOCA\"", "\"GROUP\",\"LOCA\",\"x\"",
       "a GROUP row has its name and nothing else"},
      {"\"4.5\",\"says", "\"4.5\"x,\"says", "text stands between a quote and a comma"},
  };
  for (const Case& c : cases) {
    const auto found = breaches(replaced(kScanline, c.what, c.with));
    EXPECT_TRUE(any_holds(found, c.breach)) << c.breach << "\n" << ::testing::PrintToString(found);
  }
}

TEST(Ags4, RowWithAnotherNumberOfFieldsIsRejected) {
  const Readings r =
      read(replaced(kScanline, "\"DATA\",\"SL1\",\"1.35\",\"\"", "\"DATA\",\"SL1\",\"1.35\""));
  ASSERT_EQ(r.rejected.size(), 2U);
  EXPECT_EQ(r.rejected[0].line, 18U);
  EXPECT_NE(r.rejected[0].reason.find("has 11 fields"), std::string::npos);
  const Readings open = read(replaced(kScanline, "\"RX\"", "\"RX"));
  EXPECT_EQ(open.rejected[0].line, 18U);
  EXPECT_EQ(open.size(), 1U);
}

TEST(Ags4, FileWithoutDiscontinuitiesIsAnError) {
  try {
    read("\"GROUP\",\"LOCA\"\r\n\"HEADING\",\"LOCA_ID\"\r\n");
    ADD_FAILURE();
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::input);
    EXPECT_NE(std::string(error.what()).find("DISC"), std::string::npos);
  }
}

TEST(Ags4, BrokenFilesNeitherCrashNorHang) {
  constexpr std::string_view kBytes = "\"\",,\r\n\n-05DATAGROUP\xB0";
  for (std::uint64_t seed = 0; seed < 400; ++seed) {
    std::string bytes = kScanline;
    for (std::uint64_t i = 0; i < 12; ++i) {
      const std::uint64_t at = 10 + random_index(seed, 0, i, bytes.size() - 10);
      const char byte = kBytes[random_index(seed, 1, i, kBytes.size())];
      if (i % 3 == 0) {
        bytes.erase(at, 1 + random_index(seed, 2, i, 8));
      } else {
        bytes.insert(at, 1, byte);
      }
    }
    try {
      const Readings r = read(bytes);
      EXPECT_EQ(r.read, r.size() + r.rejected.size());
    } catch (const Error& error) {
      EXPECT_EQ(error.kind(), ErrorKind::input);
    }
  }
}

}  // namespace
}  // namespace brink
