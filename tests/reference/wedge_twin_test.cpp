#include "reference/wedge_twin.hpp"

#include <gtest/gtest.h>

#include <array>
#include <map>

#include "brink/base/error.hpp"
#include "brink/mechanics/dry_wedge.hpp"

namespace brink {
namespace {

char letter(WedgeMode mode) {
  switch (mode) {
    case WedgeMode::both:
      return 'b';
    case WedgeMode::plane1:
      return '1';
    case WedgeMode::plane2:
      return '2';
    case WedgeMode::lifts:
      break;
  }
  return 'l';
}

// Volume, areas, mode and factor of safety against the twin, on wedges of every kind.
TEST(WedgeTwin, RandomWedges) {
  reference::RandomWedges draw(11);
  std::map<char, int> modes;
  int cracked = 0, cut = 0, hidden = 0;
  for (int i = 0; i < 25000; ++i) {
    const WedgeCase w = draw.next();
    WedgeResult r;
    try {
      r = analyse_wedge(w);
    } catch (const Error&) {
      continue;  // plane 1's trace does not rise: no height on it
    }
    if (!r.forms) {
      hidden += r.reason.find("crack comes out in the face") != std::string::npos;
      continue;
    }
    // Blocks that run to the horizon have no use and few digits.
    if (r.block.total_height_m > 300 || r.block.volume_m3 > 1e7 || r.block.volume_m3 < 1e-3) {
      continue;
    }
    const reference::TwinResult twin = reference::twin(w);
    ASSERT_NEAR(r.block.volume_m3, twin.solid.volume, 1e-8 * twin.solid.volume) << i;
    const WedgeAreas& a = r.block.areas;
    const std::array<double, 5> areas{a.plane1_m2, a.plane2_m2, a.face_m2, a.upper_m2, a.crack_m2};
    const double whole = a.plane1_m2 + a.plane2_m2 + a.face_m2 + a.upper_m2 + a.crack_m2;
    for (std::size_t k = 0; k < 5; ++k) {
      ASSERT_NEAR(areas[k], twin.solid.areas[k], 1e-8 * whole) << i << ' ' << k;
    }
    ASSERT_EQ(letter(r.contact.mode), twin.mode) << i;
    ASSERT_NEAR(r.factor_of_safety, twin.safety, 1e-6 * std::max(1.0, twin.safety)) << i;
    ASSERT_NEAR(r.contact.driving_kN, twin.driving, 1e-7 * r.weight_kN) << i;
    ++modes[twin.mode];
    cracked += w.geometry.crack.has_value();
    cut += r.block.cut;
  }
  for (const char mode : {'b', '1', '2', 'l'}) EXPECT_GT(modes[mode], 100) << mode;
  EXPECT_GT(cut, 500);
  EXPECT_GT(cracked - cut, 200);
  EXPECT_GT(hidden, 100);
}

// Friction alone on a dry wedge: the fast twin, and size does not enter.
TEST(WedgeTwin, DirectionsAlone) {
  reference::RandomWedges draw(12);
  int compared = 0;
  for (int i = 0; i < 20000; ++i) {
    WedgeCase w = draw.next();
    w.geometry.crack.reset();
    w.geometry.size.measure = WedgeMeasure::height;
    reference::drop_cohesion(w);
    w.water = WaterFill{0};
    w.seismic = {};
    w.loads.clear();
    w.bolts.clear();
    const WedgeResult r = analyse_wedge(w);
    if (!r.forms) continue;
    const double fast = dry_factor_of_safety(
        upward_normal(w.geometry.plane1), upward_normal(w.geometry.plane2),
        tan(reference::mohr(w.strength1).friction), tan(reference::mohr(w.strength2).friction),
        outward_normal(w.geometry.face), upward_normal(w.geometry.upper));
    ASSERT_NEAR(r.factor_of_safety, fast, 1e-9 * std::max(1.0, fast)) << i;
    ++compared;
  }
  EXPECT_GT(compared, 2000);
}

}  // namespace
}  // namespace brink
