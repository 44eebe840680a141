#include "brink/record/readings_document.hpp"

#include <gtest/gtest.h>

#include "brink/base/error.hpp"
#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"

namespace brink {
namespace {

Readings read(std::string_view bytes, const ReadingOptions& options = {}) {
  const InputBytes file{"t.csv", bytes};
  return read_readings({&file, 1}, options);
}

std::string many_planes() {
  std::string bytes =
      "dip,dd,kind\n0,0,flat\n90,0,upright\n90,359.9,upright\n90,45,upright\n0.1,10,x\n";
  for (std::uint64_t i = 0; i < 300; ++i) {
    const double scale = i % 2 == 0 ? 1.0 : 100.0;
    const double dip = std::floor(random_uniform(2, 0, i) * 90.0 * scale) / scale;
    const double azimuth = std::floor(random_uniform(2, 1, i) * 360.0 * scale) / scale;
    bytes += print_degrees(Angle::degrees(dip)) + "," + print_degrees(Angle::degrees(azimuth)) +
             ",joint\n";
  }
  return bytes;
}

// Property: a table in any notation reads back as the same planes, with the other columns.
TEST(ReadingsDocument, EveryNotationRoundTrips) {
  const Readings given = read(many_planes());
  for (const Notation notation :
       {Notation::dip_direction, Notation::strike_dip, Notation::strike_quadrant,
        Notation::quadrant_bearing, Notation::pole, Notation::core}) {
    for (const StrikeRule rule : {StrikeRule::right, StrikeRule::left}) {
      TableForm form{notation, rule, Hole{{20_deg, Angle::degrees(-55)}, ReferenceLine::bottom}};
      const std::string csv = readings_csv(given, form);
      const Readings back = read(csv);
      ASSERT_TRUE(back.rejected.empty()) << back.rejected.front().reason << csv.substr(0, 200);
      ASSERT_EQ(back.size(), given.size());
      for (std::size_t i = 0; i < given.size(); ++i) {
        EXPECT_LT(axis_angle(back.normals[i], given.normals[i]).deg(), 1e-9) << name_of(notation);
      }
      EXPECT_EQ(back.find_column("kind")->cells[1], "upright");
      if (notation == Notation::dip_direction) {
        EXPECT_EQ(back.planes, given.planes);
      }
    }
  }
  EXPECT_THROW(readings_csv(given, {Notation::core, StrikeRule::right, {}}), Error);
}

TEST(ReadingsDocument, OtherColumnsTravelWhatTheyHold) {
  const Readings r = read(
      "dip,dd,note,strike,weight,#\n30,90,\"a, \"\"b\"\"\",0,1,x\n40,100,\"two\nlines\",10,3,y\n");
  const std::string csv = readings_csv(r, {});
  EXPECT_EQ(csv,
            "dip_deg,dip_direction_deg,weight,note,\"#\"\n"
            "30,90,0.5,\"a, \"\"b\"\"\",x\n40,100,1.5,\"two\nlines\",y\n");
  const Readings back = read(csv);
  EXPECT_EQ(back.weights, r.weights);
  EXPECT_EQ(back.find_column("note")->cells[1], "two\nlines");
  TableForm form;
  form.with_weights = false;
  EXPECT_EQ(readings_csv(r, form).substr(0, 31), "dip_deg,dip_direction_deg,note,");
}

TEST(ReadingsDocument, ResultHoldsWhatWasReadAndWhatNot) {
  const Readings r = read("dip,dd,line,kind\n30,90,L1,joint\n95,90,L1,joint\n");
  const std::string json = to_json(readings_result(r));
  for (const char* part :
       {"\"read\": 2", "\"used\": 1", "\"filtered\": 0", "\"line\": 3", "\"value\": \"95\"",
        "\"reason\": \"is above 90;", "\"heading\": \"dip\"", "\"dip_deg\": 30.0",
        "\"dip_direction_deg\": 90.0", "\"weight\": 1.0", "\"kind\": \"joint\"",
        "\"column line\": \"L1\""}) {
    EXPECT_NE(json.find(part), std::string::npos) << part << "\n" << json;
  }
}

TEST(ReadingsDocument, InputsEchoWhatWasAsked) {
  ReadingOptions options;
  options.notation = Notation::dip_direction;
  options.declination = 3.5_deg;
  options.only = {parse_filter("kind=joint")};
  options.hole = Hole{{20_deg, 55_deg}, ReferenceLine::bottom};
  const std::string json =
      to_json(readings_inputs(read("dip,dd,kind\n30,90,joint\n", options), options));
  for (const char* part :
       {"\"name\": \"t.csv\"", "\"sha256\": \"", "\"notation\": \"dip/dip-direction\"",
        "\"strike_rule\": null", "\"declination_deg\": 3.5", "\"kind=joint\"",
        "\"reference_line\": \"bottom\""}) {
    EXPECT_NE(json.find(part), std::string::npos) << part << "\n" << json;
  }
}

}  // namespace
}  // namespace brink
