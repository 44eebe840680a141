#include "brink/risk/plane_variation.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/error.hpp"

namespace brink {
namespace {

PlaneSlideInput slide() {
  PlaneSlideInput in;
  in.plane = {35_deg, 150_deg};
  in.face = {60_deg, 150_deg};
  in.height_m = 12.0;
  in.unit_weight_kN_m3 = 26.0;
  in.strength = MohrCoulomb{25.0, 37_deg};
  in.crack = CrackChoice::at_setback;
  in.crack_setback_m = 4.0;
  in.water_depth_m = 3.0;
  return in;
}

// Every variable, set to what the slide has already, leaves the factor of safety.
TEST(PlaneVariation, ItsOwnValueChangesNothing) {
  PlaneSlideInput in = slide();
  in.bolts = {{50.0, {330_deg, 10_deg}}, {25.0, {330_deg, 20_deg}}};
  const double expected = analyse_plane_slide(in).factor_of_safety;
  for (const auto& [name, value] : {std::pair{"friction", 37.0},
                                    {"cohesion", 25.0},
                                    {"water-depth", 3.0},
                                    {"water-fill", 3.0 / greatest_water_depth_m(in)},
                                    {"height", 12.0},
                                    {"seismic", 0.0},
                                    {"face-dip", 60.0},
                                    {"plane-dip", 35.0},
                                    {"crack-setback", 4.0},
                                    {"bolt-force", 75.0},
                                    {"surcharge", 0.0}})
    EXPECT_NEAR(varied_plane(in, plane_variable(name)).safety(value).value(), expected, 1e-12)
        << name;
}

// The friction at which a dry, cohesionless plane reaches its target: tan(phi) = FS tan(p) (exact).
TEST(PlaneVariation, SolvesForFriction) {
  PlaneSlideInput in = slide();
  in.strength = MohrCoulomb{0.0, 30_deg};
  in.water_depth_m = 0.0;
  const PlaneVariable& v = plane_variable("friction");
  const auto found = find_crossings(varied_plane(in, v).safety, 1.2, v.solve_low, v.solve_high);
  ASSERT_EQ(found.size(), 1U);
  EXPECT_NEAR(found[0].value, atan2(1.2 * tan(35_deg), 1.0).deg(), 1e-8);
}

// Back-analysis and forward analysis agree.
TEST(PlaneVariation, SolvedValuesGiveTheTarget) {
  PlaneSlideInput in = slide();
  for (const char* name : {"cohesion", "water-fill", "height", "face-dip"}) {
    const PlaneVariable& v = plane_variable(name);
    const SafetyAt safety = varied_plane(in, v).safety;
    const auto found = find_crossings(safety, 1.3, v.solve_low, v.solve_high, v.by_ratio);
    ASSERT_FALSE(found.empty()) << name;
    for (const Crossing& c : found) {
      if (c.jump) continue;
      EXPECT_NEAR(safety(c.value).value(), 1.3, 1e-6) << name;
    }
  }
}

// A low face has a crack too shallow for the water: the water then fills it.
TEST(PlaneVariation, WaterStandsNoDeeperThanItCan) {
  const VariedInput height = varied_plane(slide(), plane_variable("height"));
  for (double h = 1.0; h < 30.0; h += 0.5) EXPECT_NO_THROW(height.safety(h)) << h;
}

std::string refusal(const PlaneSlideInput& in, const char* name) {
  try {
    varied_plane(in, plane_variable(name));
  } catch (const Error& e) {
    return e.what();
  }
  return "accepted";
}

TEST(PlaneVariation, SaysWhatTheSlideLacks) {
  PlaneSlideInput in = slide();
  EXPECT_EQ(refusal(in, "bolt-force"),
            "bolt-force: cannot vary: there is no bolt, so no direction either; accepted: a bolt "
            "with a force "
            "above 0");
  in.crack = CrackChoice::critical;
  EXPECT_EQ(refusal(in, "water-fill"),
            "water-fill: cannot vary: a critical crack moves with the water; accepted: a crack at "
            "a setback, or "
            "none");
  in.strength = BartonBandis{28_deg, 8.0, 5e4};
  EXPECT_EQ(refusal(in, "friction"),
            "friction: cannot vary: the plane follows another strength law; accepted: Mohr-Coulomb "
            "strength");
  EXPECT_NE(refusal(in, "colour").find("friction, cohesion"), std::string::npos);
}

}  // namespace
}  // namespace brink
