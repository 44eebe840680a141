// Strength of joints against printed tables.
#include "brink/mechanics/strength.hpp"

#include <gtest/gtest.h>

namespace brink {
namespace {

// Hoek, Practical Rock Engineering, chapter on shear strength of discontinuities (from memory):
// residual friction 29, JRC 16.9, JCS 96 MPa. Half of the last digit printed, but 0.001 where the
// table's own rounding adds up.
TEST(PublishedStrength, HoekBartonTable) {
  const Strength law = BartonBandis{29_deg, 16.9, 96000.0};
  struct Row {
    double normal_MPa, shear_MPa, slope, friction_deg, cohesion_MPa;
  };
  for (const Row& row : {Row{0.360, 0.989, 1.652, 58.82, 0.394},
                         {0.720, 1.538, 1.423, 54.91, 0.513},
                         {1.440, 2.476, 1.213, 50.49, 0.730},
                         {2.880, 4.073, 1.030, 45.85, 1.107}}) {
    const TangentStrength line = tangent_strength(law, row.normal_MPa * 1000.0);
    EXPECT_NEAR(line.shear_strength_kPa / 1000.0, row.shear_MPa, 0.001);
    EXPECT_NEAR(tan(line.friction), row.slope, 0.001);
    EXPECT_NEAR(line.friction.deg(), row.friction_deg, 0.01);
    EXPECT_NEAR(line.cohesion_kPa / 1000.0, row.cohesion_MPa, 0.001);
  }
}

}  // namespace
}  // namespace brink
