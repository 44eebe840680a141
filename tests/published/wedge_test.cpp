// Published wedges. Each source stands with its check; where a value was recalled from the named
// source rather than read, it says "from memory".
#include <gtest/gtest.h>

#include <cmath>

#include "brink/mechanics/dry_wedge.hpp"
#include "brink/mechanics/wedge_support.hpp"
#include "brink/orientation/intersection.hpp"

namespace brink {
namespace {

// Hoek & Bray, Rock Slope Engineering, 3rd ed. 1981, appendix, comprehensive solution (from
// memory). Feet and pounds are fed as they are: any consistent units do.
WedgeCase comprehensive_example() {
  WedgeCase w;
  w.geometry.plane1 = {45_deg, 105_deg};
  w.geometry.plane2 = {70_deg, 235_deg};
  w.geometry.face = {65_deg, 185_deg};
  w.geometry.upper = {12_deg, 195_deg};
  w.geometry.size = {WedgeMeasure::height_on_plane1, 100.0};
  w.geometry.crack = TensionCrack{{70_deg, 165_deg}, 40.0};
  w.unit_weight_kN_m3 = 160.0;
  w.water_unit_weight_kN_m3 = 62.5;
  w.strength1 = MohrCoulomb{500.0, 20_deg};
  w.strength2 = MohrCoulomb{1000.0, 30_deg};
  w.water = WaterFill{1.0};
  return w;
}

TEST(PublishedWedge, HoekBrayComprehensiveSolution) {
  const WedgeResult r = analyse_wedge(comprehensive_example());
  ASSERT_TRUE(r.forms) << r.reason;
  EXPECT_NEAR(r.block.areas.plane1_m2, 5565.01, 0.1);
  EXPECT_NEAR(r.block.areas.plane2_m2, 6428.1, 0.1);
  EXPECT_NEAR(r.block.areas.crack_m2, 1846.6, 0.1);
  EXPECT_NEAR(r.weight_kN, 2.8272e7, 0.0001e7);
  EXPECT_NEAR(r.water.plane1_kN / r.block.areas.plane1_m2, 1084.3, 0.1);
  EXPECT_NEAR(r.water.crack_kN, 2.0023e6, 0.0003e6);
  EXPECT_NEAR(r.contact.normal1_kN, 1.5171e7, 1.5171e3);
  EXPECT_NEAR(r.contact.normal2_kN, 5.7892e6, 5.7892e2);
  EXPECT_NEAR(r.contact.driving_kN, 1.5886e7, 1.5886e3);
  EXPECT_NEAR(r.resisting_kN, 1.8075e7, 1.8075e3);
  EXPECT_NEAR(r.factor_of_safety, 1.1378, 0.0002);
  EXPECT_EQ(r.contact.mode, WedgeMode::both);
  EXPECT_TRUE(r.warnings.empty());
}

// The same source (from memory): the least cable force that brings the factor of safety to 1.5 is
// 3.4307e6 lb, plunging -6.98 (7 degrees upward) towards 349.
TEST(PublishedWedge, HoekBrayLeastCable) {
  const WedgeCase w = comprehensive_example();
  const WedgeSupport support = support_wedge(w, analyse_wedge(w), {1.5});
  ASSERT_TRUE(support.least && support.least->direction);
  EXPECT_NEAR(support.least->force_kN, 3.4307e6, 0.0005e6);
  EXPECT_NEAR(support.least->direction->plunge.deg(), -6.98, 0.02);
  EXPECT_NEAR(support.least->direction->trend.deg(), 349.0, 0.5);
}

// Hoek & Bray 1981, ch. 8, angle-factor method (from memory): same planes without crack, total
// height 130 ft, phi1 30, phi2 20, average pressure gw H/6. The book reads X 3.336, Y 3.429 and A
// 1.5475 off a net and gives FS 1.3562; exact angles give 1.346 by the same formula.
struct AngleFactors {
  double x, y, a, b;
};

// From angles between lines and normals, as the method measures them on a net.
AngleFactors angle_factors(const WedgeGeometry& g) {
  const Vector3 n1 = upward_normal(g.plane1), n2 = upward_normal(g.plane2);
  const Vector3 f = outward_normal(g.face), u = upward_normal(g.upper);
  const auto line = [](const Vector3& p, const Vector3& q) { return *intersection_vector(p, q); };
  const auto between = [](const Vector3& p, const Vector3& q) { return std::acos(p.dot(q)); };
  // Lines: 1 plane 1 with face, 2 plane 2 with face, 3 plane 1 with ground, 4 plane 2 with ground,
  // 5 plane 1 with plane 2.
  const double t24 = between(line(n2, f), line(n2, u)), t45 = between(line(n2, u), line(n1, n2));
  const double t2_na = between(line(n2, f), n1);
  const double t13 = between(line(n1, f), line(n1, u)), t35 = between(line(n1, u), line(n1, n2));
  const double t1_nb = between(line(n1, f), n2);
  const double dip1 = g.plane1.dip.rad(), dip2 = g.plane2.dip.rad();
  const double plunge = std::asin(-line(n1, n2).z());
  const double apart = between(n1, n2);
  const double scale = std::sin(plunge) * std::sin(apart) * std::sin(apart);
  return {std::sin(t24) / std::abs(std::sin(t45) * std::cos(t2_na)),
          std::sin(t13) / std::abs(std::sin(t35) * std::cos(t1_nb)),
          (std::cos(dip1) - std::cos(dip2) * std::cos(apart)) / scale,
          (std::cos(dip2) - std::cos(dip1) * std::cos(apart)) / scale};
}

TEST(PublishedWedge, HoekBrayAngleFactors) {
  WedgeCase w = comprehensive_example();
  w.geometry.crack.reset();
  w.geometry.size = {WedgeMeasure::height, 1.0};
  w.strength1 = MohrCoulomb{500.0, 30_deg};
  w.strength2 = MohrCoulomb{1000.0, 20_deg};
  w.geometry.size.value = 130.0 / wedge_block(w.geometry).total_height_m;
  const WedgeResult r = analyse_wedge(w);
  ASSERT_TRUE(r.forms);
  EXPECT_NEAR(r.block.total_height_m, 130.0, 1e-9);

  const AngleFactors k = angle_factors(w.geometry);
  EXPECT_NEAR(k.x, 3.336, 0.03 * 3.336);  // read off a net
  EXPECT_NEAR(k.y, 3.429, 0.03 * 3.429);
  EXPECT_NEAR(k.a, 1.5475, 0.01 * 1.5475);
  const double gamma = 160.0, gw = 62.5, h = 130.0;
  const double exact = 3.0 / (gamma * h) * (500.0 * k.x + 1000.0 * k.y) +
                       (k.a - gw / (2 * gamma) * k.x) * tan(30_deg) +
                       (k.b - gw / (2 * gamma) * k.y) * tan(20_deg);
  EXPECT_NEAR(exact, 1.346, 0.0005);
  EXPECT_NEAR(r.factor_of_safety, exact, 1e-9);
}

// Hoek & Bray 1981, ch. 8, friction only (from memory): A = 1.5, B = 0.7 within 0.05, FS 1.30
// within 0.03, whatever the face, the height and the unit weight.
TEST(PublishedWedge, HoekBrayFrictionOnly) {
  WedgeCase w;
  w.geometry.plane1 = {40_deg, 165_deg};
  w.geometry.plane2 = {70_deg, 285_deg};
  w.geometry.face = {65_deg, 200_deg};
  w.geometry.size.value = 20.0;
  w.unit_weight_kN_m3 = 26.0;
  w.strength1 = MohrCoulomb{0.0, 35_deg};
  w.strength2 = MohrCoulomb{0.0, 20_deg};
  const double safety = analyse_wedge(w).factor_of_safety;
  EXPECT_NEAR(safety, 1.30, 0.03);
  const AngleFactors k = angle_factors(w.geometry);
  EXPECT_NEAR(k.a, 1.5, 0.05);
  EXPECT_NEAR(k.b, 0.7, 0.05);
  w.geometry.face = {80_deg, 235_deg};
  w.geometry.size.value = 3.0;
  w.unit_weight_kN_m3 = 20.0;
  EXPECT_NEAR(analyse_wedge(w).factor_of_safety, safety, 1e-12);
}

// Kovari & Fritz 1975, exact: equal friction, dry, no cohesion, both planes in contact: FS =
// sin(beta)/sin(xi/2) tan(phi)/tan(plunge); xi the angle of the wedge between the planes, beta
// that of its bisecting plane from the horizontal, both in the plane square to the line.
TEST(PublishedWedge, KovariFritzWedgeFactor) {
  int compared = 0;
  for (int dip = 40; dip <= 80; dip += 5) {
    for (int turn = 30; turn <= 80; turn += 7) {
      WedgeCase w;
      w.geometry.plane1 = {50_deg, Angle::degrees(180 - turn)};
      w.geometry.plane2 = {Angle::degrees(dip), Angle::degrees(180 + turn)};
      w.geometry.face = {75_deg, 180_deg};
      w.geometry.size.value = 10.0;
      w.unit_weight_kN_m3 = 26.0;
      w.strength1 = w.strength2 = MohrCoulomb{0.0, 33_deg};
      const WedgeResult r = analyse_wedge(w);
      if (!r.forms || r.contact.mode != WedgeMode::both) continue;
      const Vector3 v = *r.block.line;
      const Vector3 in1 = (-upward_normal(w.geometry.plane1)).cross(v).normalized();
      const Vector3 in2 = upward_normal(w.geometry.plane2).cross(v).normalized();
      // Rays square to the line, up each plane from the line.
      const Vector3 ray1 = in1.z() > 0 ? in1 : Vector3(-in1);
      const Vector3 ray2 = in2.z() > 0 ? in2 : Vector3(-in2);
      const double xi = std::acos(ray1.dot(ray2));
      const Vector3 bisector = (ray1 + ray2).normalized();
      const Vector3 level = v.cross(Vector3(0, 0, 1)).normalized();
      const double beta = std::acos(bisector.dot(level));
      const double plunge = std::asin(-v.z());
      EXPECT_NEAR(r.factor_of_safety,
                  std::sin(beta) / std::sin(xi / 2) * tan(33_deg) / std::tan(plunge), 1e-12);
      ++compared;
    }
  }
  EXPECT_GT(compared, 30);
}

}  // namespace
}  // namespace brink
