// The kinematic counts against a second implementation that works in angles: azimuths, dips and
// plunges by atan2, one pair at a time, straight from the definitions. Readings are whole degrees
// from a small stock, so that ties, parallel pairs, vertical and horizontal planes abound.
#include "brink/kinematics/kinematics.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <map>
#include <vector>

#include "brink/base/random.hpp"

namespace {

using namespace brink;

constexpr double kDegree = 3.14159265358979323846 / 180.0;
constexpr double kSlack = 1e-9;

struct Axis {
  double dip, direction;  // degrees
};

std::array<double, 3> unit(double down_deg, double azimuth_deg) {
  const double d = down_deg * kDegree;
  const double a = azimuth_deg * kDegree;
  return {std::cos(d) * std::sin(a), std::cos(d) * std::cos(a), -std::sin(d)};
}

double dot(const std::array<double, 3>& a, const std::array<double, 3>& b) {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

// A plane's normal is the line 90 degrees up from its dip vector.
std::array<double, 3> normal_of(double dip, double direction) {
  return unit(dip - 90.0, direction);
}

// Radians between two azimuths in degrees.
double between(double a, double b) {
  const double turns = std::fabs(std::remainder(a - b, 360.0));
  return turns * kDegree;
}

struct Site {
  double face_dip, face_direction, upper_dip, upper_direction, friction, strike, toppling;
};

bool line_daylights_ref(const Site& s, const std::array<double, 3>& v) {
  return dot(v, normal_of(s.face_dip, s.face_direction)) > kSlack &&
         dot(v, normal_of(s.upper_dip, s.upper_direction)) < -kSlack;
}

// Both directions of a vertical plane, none of a horizontal one.
std::vector<double> dip_directions(const Axis& p) {
  if (p.dip == 0.0) return {};
  if (p.dip == 90.0) return {p.direction, p.direction + 180.0};
  return {p.direction};
}

bool base_ref(const Site& s, const Axis& p) {
  for (const double direction : dip_directions(p)) {
    if (line_daylights_ref(s, unit(p.dip, direction)) &&
        between(direction, s.face_direction) <= s.strike * kDegree + kSlack) {
      return true;
    }
  }
  return false;
}

bool planar_ref(const Site& s, const Axis& p) {
  return base_ref(s, p) && p.dip * kDegree >= s.friction * kDegree - kSlack;
}

bool flexural_ref(const Site& s, const Axis& p) {
  if (s.face_dip * kDegree < s.friction * kDegree - kSlack) return false;
  const auto slip = normal_of(s.face_dip - s.friction, s.face_direction);
  for (const double direction : dip_directions(p)) {
    const auto pole = unit(90.0 - p.dip, direction + 180.0);
    if (dot(pole, slip) >= -kSlack &&
        between(direction, s.face_direction + 180.0) <= s.toppling * kDegree + kSlack) {
      return true;
    }
  }
  return false;
}

// The line in which two planes meet, as every (trend, plunge) in degrees that it has; a vertical
// line has plunge 90 and a trend that is not a number.
std::vector<std::array<double, 2>> lines_ref(const Axis& p, const Axis& q) {
  const auto a = normal_of(p.dip, p.direction);
  const auto b = normal_of(q.dip, q.direction);
  std::array<double, 3> c = {a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2],
                             a[0] * b[1] - a[1] * b[0]};
  const double sine = std::sqrt(dot(c, c));
  if (std::atan2(sine, std::fabs(dot(a, b))) <= 1e-6) return {};
  for (double& component : c) component /= c[2] > 0.0 ? -sine : sine;
  const double across = std::hypot(c[0], c[1]);
  if (across <= kSlack) return {{std::nan(""), 90.0}};
  const double trend = std::atan2(c[0], c[1]) / kDegree;
  const double plunge = std::atan2(-c[2], across) / kDegree;
  if (std::fabs(c[2]) <= kSlack) return {{trend, 0.0}, {trend + 180.0, 0.0}};
  return {{trend, plunge}};
}

std::array<double, 3> unit_of(const std::array<double, 2>& line) {
  return std::isnan(line[0]) ? std::array<double, 3>{0.0, 0.0, -1.0} : unit(line[1], line[0]);
}

bool wedge_ref(const Site& s, const std::vector<std::array<double, 2>>& lines) {
  for (const auto& line : lines) {
    if (line_daylights_ref(s, unit_of(line)) &&
        line[1] * kDegree >= s.friction * kDegree - kSlack) {
      return true;
    }
  }
  return false;
}

bool block_ref(const Site& s, const std::vector<std::array<double, 2>>& lines) {
  for (const auto& line : lines) {
    if (std::isnan(line[0])) continue;
    if (between(line[0], s.face_direction + 180.0) <= s.toppling * kDegree + kSlack &&
        line[1] * kDegree > (90.0 - s.face_dip) * kDegree + kSlack) {
      return true;
    }
  }
  return false;
}

using Vector = std::array<double, 3>;

Vector cross(const Vector& a, const Vector& b) {
  return {a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]};
}
Vector scaled(const Vector& a, double f) {
  return {a[0] * f, a[1] * f, a[2] * f};
}
Vector sum(const Vector& a, const Vector& b) {
  return {a[0] + b[0], a[1] + b[1], a[2] + b[2]};
}

// Inward normal of plane `p`: towards the corner where the other plane and the face meet the
// ground one unit above the line's outlet. Nothing where they meet nowhere.
bool inward(const Vector& p, const Vector& q, const Vector& face, const Vector& upper, Vector& m) {
  const Vector along = cross(q, face);
  const double climb = dot(along, upper);
  if (std::fabs(climb) <= kSlack) return false;
  const Vector corner = scaled(along, 1.0 / climb);
  m = scaled(p, dot(p, corner) > 0.0 ? 1.0 : -1.0);
  return true;
}

// Weight 1 downwards, resolved by solving for the normal forces; as in lib/doc/methods.md, wedge.
double safety_ref(const Site& s, const Axis& p, const Axis& q) {
  const Vector face = normal_of(s.face_dip, s.face_direction);
  const Vector upper = normal_of(s.upper_dip, s.upper_direction);
  const Vector a = normal_of(p.dip, p.direction);
  const Vector b = normal_of(q.dip, q.direction);
  Vector m1, m2;
  if (!inward(a, b, face, upper, m1) || !inward(b, a, face, upper, m2)) return HUGE_VAL;
  const Vector weight = {0.0, 0.0, -1.0};
  const double friction = std::tan(s.friction * kDegree);
  const double k = dot(m1, m2);
  const double n1 = (-dot(weight, m1) + k * dot(weight, m2)) / (1.0 - k * k);
  const double n2 = (-dot(weight, m2) + k * dot(weight, m1)) / (1.0 - k * k);
  if (n1 >= -kSlack && n2 >= -kSlack) {
    const Vector shear = sum(weight, sum(scaled(m1, n1), scaled(m2, n2)));
    const double drive = std::sqrt(dot(shear, shear));
    return drive <= 1e-12 ? HUGE_VAL : (n1 + n2) * friction / drive;
  }
  for (const auto& [m, other] : {std::pair{m1, m2}, std::pair{m2, m1}}) {
    const double press = -dot(weight, m);
    const Vector shear = sum(weight, scaled(m, press));
    if (press > 0.0 && dot(shear, other) > 0.0) {
      return press * friction / std::sqrt(dot(shear, shear));
    }
  }
  return 0.0;
}

struct Tally {
  std::uint64_t tested = 0;
  std::uint64_t admissible = 0;
  double tested_weight = 0.0;
  double admissible_weight = 0.0;
  std::map<std::pair<int, int>, std::pair<std::uint64_t, std::uint64_t>> by_set;

  void add(int a, int b, double weight, bool yes) {
    ++tested;
    tested_weight += weight;
    auto& entry = by_set[std::minmax(a == 0 ? 99 : a, b == 0 ? 99 : b)];
    ++entry.first;
    if (!yes) return;
    ++admissible;
    admissible_weight += weight;
    ++entry.second;
  }
};

struct Reference {
  Tally planar, flexural, wedge, block;
  std::uint64_t parallel = 0, bases = 0, sliding_bases = 0, unstable = 0;
};

struct Sample {
  std::vector<Axis> axes;
  std::vector<int> sets;
  std::vector<double> weights;
};

Reference count_ref(const Site& s, const Sample& sample) {
  Reference r;
  for (std::size_t i = 0; i < sample.axes.size(); ++i) {
    const Axis& p = sample.axes[i];
    const double w = sample.weights[i];
    r.planar.add(sample.sets[i], sample.sets[i], w, planar_ref(s, p));
    r.flexural.add(sample.sets[i], sample.sets[i], w, flexural_ref(s, p));
    if (base_ref(s, p)) ++(p.dip >= s.friction ? r.sliding_bases : r.bases);
    for (std::size_t j = 0; j < i; ++j) {
      const Axis& q = sample.axes[j];
      const auto lines = lines_ref(p, q);
      if (lines.empty()) {
        ++r.parallel;
        continue;
      }
      const double product = w * sample.weights[j];
      r.wedge.add(sample.sets[i], sample.sets[j], product, wedge_ref(s, lines));
      r.block.add(sample.sets[i], sample.sets[j], product, block_ref(s, lines));
      bool daylights = false;
      for (const auto& line : lines) daylights |= line_daylights_ref(s, unit_of(line));
      if (daylights && safety_ref(s, p, q) < 1.0 - kSlack) ++r.unstable;
    }
  }
  r.bases += r.sliding_bases;
  return r;
}

// Draws that prefer the awkward.
class Source {
 public:
  explicit Source(std::uint64_t seed) : seed_(seed) {}
  std::size_t below(std::size_t count) { return random_index(seed_, 0, next_++, count); }
  double pick(const std::vector<double>& values) { return values[below(values.size())]; }
  double direction(double step) {
    return step * static_cast<double>(below(static_cast<std::size_t>(360.0 / step)));
  }
  double uniform() { return random_uniform(seed_, 1, next_++); }

 private:
  std::uint64_t seed_;
  std::uint64_t next_ = 0;
};

Site draw_site(Source& source) {
  const double step = source.pick({1.0, 5.0, 15.0, 30.0});
  Site s{};
  s.face_dip =
      source.pick({1.0, 20.0, 30.0, 45.0, 60.0, 65.0, 75.0, 89.0, 90.0, 91.0, 100.0, 120.0, 179.0});
  if (source.below(3) == 0) s.face_dip = 1.0 + static_cast<double>(source.below(179));
  s.face_direction = source.direction(step);
  if (source.below(3) == 0) {
    s.upper_dip = source.pick({5.0, 12.0, 30.0, 60.0, 90.0});
    s.upper_direction = source.direction(step);
  }
  s.friction = source.pick({0.0, 15.0, 25.0, 30.0, 35.0, 45.0, 60.0, 89.0});
  s.strike = source.pick({0.0, 10.0, 20.0, 30.0, 90.0, 120.0, 180.0});
  s.toppling = source.pick({0.0, 10.0, 20.0, 30.0, 90.0, 150.0, 180.0});
  return s;
}

Sample draw_sample(Source& source, std::size_t size) {
  const double step = source.pick({1.0, 5.0, 15.0, 45.0});
  Sample sample;
  for (std::size_t i = 0; i < size; ++i) {
    double dip = source.pick({0.0, 15.0, 30.0, 45.0, 60.0, 75.0, 85.0, 90.0});
    if (source.below(2) == 0) dip = static_cast<double>(source.below(91));
    sample.axes.push_back({dip, dip == 0.0 ? 0.0 : source.direction(step)});
    sample.sets.push_back(static_cast<int>(source.below(4)));
    sample.weights.push_back(0.5 + source.uniform());
  }
  return sample;
}

Readings to_readings(const Sample& sample) {
  Readings readings;
  for (const Axis& axis : sample.axes) {
    readings.planes.push_back({Angle::degrees(axis.dip), Angle::degrees(axis.direction)});
    readings.normals.push_back(upward_normal(readings.planes.back()));
  }
  readings.weights = sample.weights;
  readings.read = readings.size();
  return readings;
}

KinematicsOptions to_options(const Site& s) {
  KinematicsOptions options;
  options.faces = {{Angle::degrees(s.face_dip), Angle::degrees(s.face_direction)}};
  options.upper = {Angle::degrees(s.upper_dip), Angle::degrees(s.upper_direction)};
  options.friction = Angle::degrees(s.friction);
  options.strike_tolerance = Angle::degrees(s.strike);
  options.toppling_tolerance = Angle::degrees(s.toppling);
  options.threads = 2;
  return options;
}

void expect_same(const ModeCount& found, const Tally& expected, const char* mode) {
  SCOPED_TRACE(mode);
  EXPECT_EQ(found.tested, expected.tested);
  EXPECT_EQ(found.admissible, expected.admissible);
  if (expected.tested > 0) {
    EXPECT_NEAR(found.weighted_share.value(), expected.admissible_weight / expected.tested_weight,
                1e-12);
  }
  std::size_t entries = 0;
  for (const auto& [sets, counts] : expected.by_set) {
    for (const SetCount& set : found.by_set) {
      const int a = set.set_a == 0 ? 99 : set.set_a;
      const int b = mode[0] == 'p' ? a : set.set_b == 0 ? 99 : set.set_b;
      if (std::pair(a, b) != sets) continue;
      ++entries;
      EXPECT_EQ(set.tested, counts.first) << a << " " << b;
      EXPECT_EQ(set.admissible, counts.second) << a << " " << b;
    }
  }
  EXPECT_EQ(entries, expected.by_set.size());
  EXPECT_EQ(entries, found.by_set.size());
}

// Ground steeper than the face, in its direction: no crest, so no wedge has a factor of safety.
bool has_crest(const Site& s) {
  const Vector up_dip = scaled(unit(s.face_dip, s.face_direction), -1.0);
  return dot(up_dip, normal_of(s.upper_dip, s.upper_direction)) > kSlack;
}

Reference compare(std::uint64_t seed, std::size_t size) {
  Source source(seed);
  const Site s = draw_site(source);
  const Sample sample = draw_sample(source, size);
  SCOPED_TRACE(testing::Message() << "seed " << seed << " face " << s.face_dip << "/"
                                  << s.face_direction << " upper " << s.upper_dip << "/"
                                  << s.upper_direction << " friction " << s.friction
                                  << " tolerances " << s.strike << " " << s.toppling);
  const auto result = test_kinematics(to_readings(sample), sample.sets, 3, to_options(s));
  const FaceKinematics& face = result.faces.at(0);
  const Reference expected = count_ref(s, sample);
  expect_same(face.planar_sliding, expected.planar, "planes: sliding");
  expect_same(face.flexural_toppling, expected.flexural, "planes: toppling");
  expect_same(face.wedge_sliding, expected.wedge, "wedges");
  expect_same(face.block_toppling, expected.block, "blocks");
  EXPECT_EQ(face.parallel_pairs, expected.parallel);
  EXPECT_EQ(face.bases, expected.bases);
  EXPECT_EQ(face.sliding_bases, expected.sliding_bases);
  if (has_crest(s)) {
    EXPECT_EQ(face.unstable_dry, expected.unstable);
  }
  return expected;
}

TEST(KinematicsReference, AgreesOnAwkwardFaces) {
  Reference seen;
  for (std::uint64_t seed = 1; seed <= 1500 && !testing::Test::HasFailure(); ++seed) {
    const Reference one = compare(seed, 40);
    seen.planar.admissible += one.planar.admissible;
    seen.flexural.admissible += one.flexural.admissible;
    seen.wedge.admissible += one.wedge.admissible;
    seen.block.admissible += one.block.admissible;
    seen.parallel += one.parallel;
    seen.unstable += one.unstable;
    seen.bases += one.bases - one.sliding_bases;
  }
  // The draws reach every count.
  EXPECT_GT(seen.planar.admissible, 1000U);
  EXPECT_GT(seen.flexural.admissible, 1000U);
  EXPECT_GT(seen.wedge.admissible, 10000U);
  EXPECT_GT(seen.block.admissible, 10000U);
  EXPECT_GT(seen.parallel, 1000U);
  EXPECT_GT(seen.unstable, 10000U);
  EXPECT_GT(seen.bases, 1000U);
}

TEST(KinematicsReference, AgreesAcrossTheBlocksOfThePairLoop) {
  for (std::uint64_t seed = 10001; seed <= 10006; ++seed) compare(seed, 700);
}

}  // namespace
