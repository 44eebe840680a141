// Terzaghi 1965, "Sources of error in joint surveys", Geotechnique 15:287: the number of joints
// met by a line has to be divided by the sine of the angle between joint and line. Values of
// 1 / sin a, to four decimals.
#include <gtest/gtest.h>

#include "brink/readings/bias.hpp"

namespace {

using namespace brink;

TEST(OrientationBias, TerzaghiWeights) {
  const Traverse borehole = parse_traverse("borehole@0/90", "");
  const std::pair<double, double> published[] = {{90, 1.0},    {60, 1.1547}, {45, 1.4142},
                                                 {30, 2.0},    {20, 2.9238}, {15, 3.8637},
                                                 {14, 3.8637}, {0, 3.8637}};  // capped at 15
  for (const auto& [angle, weight] : published) {
    // A plane that dips 90 - a meets a vertical hole at a.
    const Vector3 n = normal(Angle::degrees(90.0 - angle), 123_deg);
    EXPECT_NEAR(bias_weight(borehole, n, 15_deg), weight, 5e-5) << angle;
  }
}

// The same law for a window, by the angle between plane and window.
TEST(OrientationBias, WindowWeights) {
  const Traverse window = parse_traverse("window@90/40", "");
  for (const auto& [angle, weight] :
       {std::pair{90.0, 1.0}, {60.0, 1.1547}, {30.0, 2.0}, {15.0, 3.8637}, {5.0, 3.8637}}) {
    EXPECT_NEAR(bias_weight(window, normal(90_deg, Angle::degrees(40.0 + angle)), 15_deg), weight,
                5e-5)
        << angle;
  }
}

}  // namespace
