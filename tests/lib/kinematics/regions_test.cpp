#include "brink/kinematics/regions.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "brink/base/random.hpp"

namespace {

using namespace brink;

constexpr Mode kModes[] = {Mode::planar_sliding, Mode::wedge_sliding, Mode::flexural_toppling,
                           Mode::block_toppling};

struct Flat {
  double x, y;
};

// Stereographic from the zenith: the lower hemisphere is the unit disc.
Flat flat(const Vector3& v) {
  return {v.x() / (1.0 - v.z()), v.y() / (1.0 - v.z())};
}

bool inside_even_odd(const Region& region, const Vector3& v) {
  const Flat p = flat(v);
  bool inside = false;
  for (const SphereLoop& loop : region.loops) {
    for (std::size_t i = 0; i < loop.size(); ++i) {
      const Flat a = flat(loop[i]);
      const Flat b = flat(loop[(i + 1) % loop.size()]);
      if ((a.y > p.y) == (b.y > p.y)) continue;
      if (p.x < a.x + (p.y - a.y) / (b.y - a.y) * (b.x - a.x)) inside = !inside;
    }
  }
  return inside;
}

double distance_to_outline(const Region& region, const Vector3& v) {
  double least = 2.0;
  for (const SphereLoop& loop : region.loops) {
    for (const Vector3& vertex : loop) least = std::min(least, (vertex - v).norm());
  }
  return least;
}

void check_region(Mode mode, const Face& face, const ModeSettings& settings, std::uint64_t seed) {
  const Region region = admissible_region(mode, face, settings);
  for (const SphereLoop& loop : region.loops) {
    ASSERT_GT(loop.size(), 2U);
    for (std::size_t i = 0; i < loop.size(); ++i) {
      EXPECT_NEAR(loop[i].norm(), 1.0, 1e-12);
      EXPECT_LE(loop[i].z(), 1e-12);
      EXPECT_LE((loop[i] - loop[(i + 1) % loop.size()]).norm(), 0.01746);
    }
  }
  const FaceLimits limits = prepare_limits(face, settings);
  for (std::uint64_t k = 0; k < 400; ++k) {
    const double z = -random_uniform(seed, 1, k);
    const double a = 2.0 * std::numbers::pi * random_uniform(seed, 2, k);
    const double across = std::sqrt(1.0 - z * z);
    const Vector3 v(across * std::sin(a), across * std::cos(a), z);
    // Chords of the outline cut off slivers of its arcs.
    if (distance_to_outline(region, v) < 0.02) continue;
    EXPECT_EQ(inside_even_odd(region, v), in_region(mode, limits, v))
        << line_of_vector(v).trend.deg() << "/" << line_of_vector(v).plunge.deg();
  }
}

TEST(Regions, OutlineSeparatesWhatPassesFromWhatFails) {
  const double dips[] = {10, 40, 60, 75, 90, 100, 130, 170};
  const double frictions[] = {0, 20, 35, 60};
  const double tolerances[] = {1, 20, 30, 90, 120, 180};
  for (std::uint64_t seed = 0; seed < 150; ++seed) {
    const auto pick = [&](const auto& values, std::uint64_t which) {
      return Angle::degrees(values[random_index(seed, 9, which, std::size(values))]);
    };
    const Face face{pick(dips, 0), Angle::degrees(360.0 * random_uniform(seed, 8, 0))};
    ModeSettings settings;
    settings.friction = pick(frictions, 1);
    settings.strike_tolerance = pick(tolerances, 2);
    settings.toppling_tolerance = pick(tolerances, 3);
    if (seed % 3 == 0) {
      settings.upper = {Angle::degrees(35.0 * random_uniform(seed, 8, 1)),
                        Angle::degrees(360.0 * random_uniform(seed, 8, 2))};
    }
    for (const Mode mode : kModes) {
      SCOPED_TRACE(testing::Message()
                   << "seed " << seed << " mode " << static_cast<int>(mode) << " face "
                   << face.dip.deg() << "/" << face.dip_direction.deg() << " friction "
                   << settings.friction.deg() << " upper " << settings.upper.dip.deg() << "/"
                   << settings.upper.dip_direction.deg() << " tolerances "
                   << settings.strike_tolerance.deg() << " " << settings.toppling_tolerance.deg());
      check_region(mode, face, settings, seed);
    }
  }
}

TEST(Regions, NothingIsAdmissibleOnAFaceFlatterThanFriction) {
  ModeSettings settings;
  settings.friction = 35_deg;
  const Face face{30_deg, 120_deg};
  EXPECT_TRUE(admissible_region(Mode::planar_sliding, face, settings).loops.empty());
  EXPECT_TRUE(admissible_region(Mode::wedge_sliding, face, settings).loops.empty());
  EXPECT_TRUE(admissible_region(Mode::flexural_toppling, face, settings).loops.empty());
  EXPECT_EQ(admissible_region(Mode::block_toppling, face, settings).loops.size(), 1U);
}

TEST(Regions, SlidingWedgesOnAnOrdinaryFaceFillOneCrescent) {
  ModeSettings settings;
  settings.friction = 30_deg;
  const Region region = admissible_region(Mode::wedge_sliding, {60_deg, 90_deg}, settings);
  EXPECT_FALSE(region.of_poles);
  ASSERT_EQ(region.loops.size(), 1U);
  double steepest = 0.0;
  double flattest = 90.0;
  for (const Vector3& v : region.loops[0]) {
    steepest = std::max(steepest, line_of_vector(v).plunge.deg());
    flattest = std::min(flattest, line_of_vector(v).plunge.deg());
  }
  // Between the friction cone and the face, whose steepest line is its dip.
  EXPECT_NEAR(steepest, 60.0, 1e-9);
  EXPECT_NEAR(flattest, 30.0, 1e-9);
}

}  // namespace
