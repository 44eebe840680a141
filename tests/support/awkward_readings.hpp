// Readings, faces and settings at the edges of the kinematic tests: ties, whole degrees, vertical
// and level planes, copies, near-parallel planes, overhangs, sloping ground. For tests that hold a
// fast count to a plain one.
#pragma once

#include <array>
#include <cmath>
#include <cstdint>
#include <string>
#include <vector>

#include "brink/base/random.hpp"
#include "brink/kinematics/modes.hpp"
#include "brink/kinematics/pairs.hpp"

namespace brink::awkward {

// A stream of numbers, one use each.
class Numbers {
 public:
  explicit Numbers(std::uint64_t seed) : seed_(seed) {}
  double uniform() { return random_uniform(seed_, 0, next_++); }
  double below(double limit) { return limit * uniform(); }
  double whole(double limit, double step = 1.0) { return step * std::floor(below(limit / step)); }
  bool chance(double share) { return uniform() < share; }

 private:
  std::uint64_t seed_;
  std::uint64_t next_ = 0;
};

enum class Kind { smooth, whole_degrees, coarse, thirty_degrees, vertical_and_level };
inline constexpr std::array kKinds = {Kind::smooth, Kind::whole_degrees, Kind::coarse,
                                      Kind::thirty_degrees, Kind::vertical_and_level};

inline Plane draw_plane(Numbers& numbers, Kind kind) {
  const auto plane = [](double dip, double direction) {
    return Plane{Angle::degrees(dip), Angle::degrees(direction)};
  };
  switch (kind) {
    case Kind::smooth:
      return plane(brink::acos(numbers.uniform()).deg(), numbers.below(360.0));
    case Kind::whole_degrees:
      return plane(numbers.whole(91.0), numbers.whole(360.0));
    case Kind::coarse:
      return plane(numbers.whole(95.0, 5.0), numbers.whole(360.0, 15.0));
    case Kind::thirty_degrees:
      return plane(numbers.whole(120.0, 30.0), numbers.whole(360.0, 30.0));
    default:
      return plane(numbers.chance(0.4)   ? 90.0
                   : numbers.chance(0.2) ? 0.0
                                         : numbers.whole(100.0, 10.0),
                   numbers.whole(360.0, 10.0));
  }
}

inline PairReadings draw_readings(Numbers& numbers, Kind kind, double most = 200.0) {
  Readings readings;
  std::vector<int> sets;
  const double set_count = 1.0 + numbers.whole(4.0);
  const double size = 10.0 + numbers.whole(most - 10.0);
  for (double i = 0.0; i < size; ++i) {
    readings.planes.push_back(draw_plane(numbers, kind));
    Vector3 n = upward_normal(readings.planes.back());
    if (numbers.chance(0.5)) n = -n;
    // Copies with noise on both sides of what counts as parallel.
    if (kind == Kind::smooth && i > 0.0 && numbers.chance(0.05)) {
      n = (readings.normals.front() + Vector3(numbers.below(3e-6), 0.0, 0.0)).normalized();
    }
    readings.normals.push_back(n);
    readings.weights.push_back(0.5 + numbers.uniform());
    sets.push_back(static_cast<int>(numbers.whole(set_count)));
  }
  return arrange_by_set(readings, sets, static_cast<std::size_t>(set_count) - 1);
}

inline Face draw_face(Numbers& numbers) {
  const auto face = [](double dip, double direction) {
    return Face{Angle::degrees(dip), Angle::degrees(direction)};
  };
  if (numbers.chance(0.7)) return face(1.0 + numbers.whole(179.0), numbers.whole(360.0));
  if (numbers.chance(0.4)) return face(90.0, numbers.whole(360.0, 30.0));
  if (numbers.chance(0.2)) return face(180.0, 0.0);
  return face(180.0 * numbers.uniform(), numbers.below(360.0));
}

inline ModeSettings draw_settings(Numbers& numbers, const Face& face) {
  ModeSettings settings;
  settings.friction = Angle::degrees(numbers.chance(0.25)  ? 0.0
                                     : numbers.chance(0.9) ? numbers.whole(80.0)
                                                           : numbers.below(89.0));
  if (numbers.chance(0.4)) {
    settings.upper = {Angle::degrees(numbers.whole(60.0)), Angle::degrees(numbers.whole(360.0))};
  } else if (numbers.chance(0.1)) {
    settings.upper = {Angle::degrees(12.0), wrap_360(face.dip_direction + Angle::degrees(180.0))};
  } else if (numbers.chance(0.1)) {
    settings.upper = {Angle::degrees(20.0), face.dip_direction};
  }
  const std::array special = {0.0, 90.0, 180.0, numbers.whole(180.0), numbers.below(180.0)};
  settings.toppling_tolerance =
      Angle::degrees(numbers.chance(0.5) ? special[static_cast<std::size_t>(numbers.whole(5.0))]
                                         : numbers.whole(60.0));
  return settings;
}

inline std::string in_words(const Face& face, const ModeSettings& s) {
  const auto text = [](Angle angle) { return std::to_string(angle.deg()); };
  return "face " + text(face.dip) + "/" + text(face.dip_direction) + " friction " +
         text(s.friction) + " upper " + text(s.upper.dip) + "/" + text(s.upper.dip_direction) +
         " toppling tolerance " + text(s.toppling_tolerance);
}

}  // namespace brink::awkward
