// Block toppling a second way: each block as a rigid body in space coordinates, its unknown forces
// from three equations of equilibrium about its centroid, water pressures integrated by strips.
#include "brink/mechanics/toppling.hpp"

#include <gtest/gtest.h>

#include <Eigen/Dense>
#include <algorithm>
#include <cmath>

#include "brink/base/random.hpp"

namespace brink {
namespace {

using Eigen::Vector2d;

// Down the base and out of it (into the block), with x out of the slope and y up.
struct Axes {
  Vector2d down, up;
};

Axes axes_of(const ToppleInput& in) {
  const double p = in.columns.base_dip.rad();
  return {{std::cos(p), -std::sin(p)}, {std::sin(p), std::cos(p)}};
}

struct Body {
  Axes axes;
  double width, height;
  Vector2d force = Vector2d::Zero();
  double turn = 0.0;  // moment about the centroid, tipping out of the slope (clockwise) positive

  // A point by its distance behind the front edge and above the base, from the centroid.
  Vector2d at(double behind, double above) const {
    return -(behind - width / 2.0) * axes.down + (above - height / 2.0) * axes.up;
  }
  static double clockwise(const Vector2d& arm, const Vector2d& f) {
    return arm.y() * f.x() - arm.x() * f.y();
  }
  void push(const Vector2d& f, const Vector2d& arm) {
    force += f;
    turn += clockwise(arm, f);
  }
};

void add_pressures(const ToppleInput& in, double upper, double lower, Body& body) {
  const double gradient = in.water_unit_weight_kN_m3 * std::cos(in.columns.base_dip.rad());
  constexpr int kStrips = 2000;
  for (int i = 0; i < kStrips; ++i) {
    const double share = (i + 0.5) / kStrips;
    const double strip = 1.0 / kStrips;
    body.push(gradient * upper * (1.0 - share) * upper * strip * body.axes.down,
              body.at(body.width, share * upper));
    body.push(-gradient * lower * (1.0 - share) * lower * strip * body.axes.down,
              body.at(0.0, share * lower));
    const double head = lower + (upper - lower) * share;
    body.push(gradient * head * body.width * strip * body.axes.up,
              body.at(share * body.width, 0.0));
  }
}

Body loaded_body(const ToppleInput& in, std::size_t number) {
  Body body{axes_of(in), in.columns.width_m, in.columns.heights_m[number - 1]};
  const double weight = in.unit_weight_kN_m3 * body.width * body.height;
  body.push({in.seismic_horizontal * weight, -weight}, Vector2d::Zero());
  for (const BlockWater& w : in.water)
    if (w.block == number) add_pressures(in, w.upper_m, w.lower_m, body);
  for (const BlockForce& f : in.loads)
    if (f.block == number)
      body.push(f.force_kN_m * Vector2d(std::cos(f.plunge.rad()), -std::sin(f.plunge.rad())),
                body.at(body.width / 2.0, f.height_m.value_or(body.height)));
  for (const BlockForce& f : in.bolts)
    if (f.block == number)
      body.push(f.force_kN_m * Vector2d(-std::cos(f.plunge.rad()), -std::sin(f.plunge.rad())),
                body.at(0.0, f.height_m.value_or(body.height / 2.0)));
  return body;
}

struct Held {
  double passed = 0.0, normal = 0.0, shear = 0.0;
  BlockMode mode = BlockMode::stable;
};

// Unknowns: the hold of the block in front (with its friction, which drags this block's front
// down as it tips), the base's normal and shear force.
Held solve_block(const ToppleInput& in, std::size_t number, double behind) {
  Body body = loaded_body(in, number);
  const Axes& a = body.axes;
  const ToppleColumns& c = in.columns;
  const double t = std::tan(in.friction.rad());
  const double upper_arm = body.height - (number >= c.crest ? c.a2_m : 0.0);
  const double lower_arm = body.height - (number <= c.crest ? c.a1_m : 0.0);
  body.push(behind * (a.down - t * a.up), body.at(body.width, upper_arm));
  const Vector2d hold = -a.down + t * a.up;
  Held tip, slide;
  tip.mode = BlockMode::topples;
  slide.mode = BlockMode::slides;
  if (lower_arm > 0.0) {  // base force at the front edge
    Eigen::Matrix3d m;
    const Vector2d corner = body.at(0.0, 0.0);
    m.row(0) << hold.x(), a.up.x(), -a.down.x();
    m.row(1) << hold.y(), a.up.y(), -a.down.y();
    m.row(2) << Body::clockwise(body.at(0.0, lower_arm), hold), Body::clockwise(corner, a.up),
        Body::clockwise(corner, -a.down);
    const Eigen::Vector3d x =
        m.fullPivLu().solve(Eigen::Vector3d(-body.force.x(), -body.force.y(), -body.turn));
    tip.passed = x[0];
    tip.normal = x[1];
    tip.shear = x[2];
  }
  if (in.friction < 45_deg) {  // friction used up on the base
    Eigen::Matrix2d m;
    m.col(0) = hold;
    m.col(1) = a.up - t * a.down;
    const Vector2d x = m.fullPivLu().solve(-body.force);
    slide.passed = x[0];
    slide.normal = x[1];
    slide.shear = t * x[1];
  }
  const Held& worse = tip.passed >= slide.passed ? tip : slide;
  if (worse.passed > 1e-9) return worse;
  // Stands: whatever the base has to give.
  return {0.0, -body.force.dot(a.up), body.force.dot(a.down), BlockMode::stable};
}

class Draw {
 public:
  explicit Draw(std::uint64_t stream) : stream_(stream) {}
  double in(double low, double high) {
    return low + (high - low) * random_uniform(77, stream_, index_++);
  }
  std::size_t block(std::size_t count) {
    return static_cast<std::size_t>(in(0.0, static_cast<double>(count))) + 1;
  }

 private:
  std::uint64_t stream_;
  std::uint64_t index_ = 0;
};

ToppleInput random_slope(std::uint64_t stream) {
  Draw draw(stream);
  ToppleInput in;
  const double base = draw.in(8.0, 40.0);
  const double width = draw.in(0.5, 8.0);
  const double over = draw.in(8.0, 40.0);
  in.columns =
      topple_columns({Angle::degrees(base + over), width * draw.in(4.0, 25.0),
                      Angle::degrees(draw.in(0.0, base - 5.0)), Angle::degrees(base), width,
                      draw.in(0.0, 0.6) * width * std::tan(Angle::degrees(over).rad())});
  in.unit_weight_kN_m3 = draw.in(20.0, 30.0);
  in.friction = Angle::degrees(draw.in(15.0, 60.0));
  if (draw.in(0.0, 1.0) < 0.5) return in;
  in.seismic_horizontal = draw.in(0.0, 0.2);
  const std::size_t count = in.columns.heights_m.size();
  const std::size_t wet = draw.block(count);
  const double height = in.columns.heights_m[wet - 1];
  in.water = {{wet, draw.in(0.0, height), draw.in(0.0, height)}};
  in.loads = {{draw.block(count), draw.in(0.0, 500.0), Angle::degrees(draw.in(-20.0, 90.0)), {}}};
  in.bolts = {{draw.block(count), draw.in(0.0, 500.0), Angle::degrees(draw.in(-10.0, 50.0)), {}}};
  return in;
}

TEST(TopplingReference, RigidBodiesOnRandomSlopes) {
  int modes[3] = {};
  for (std::uint64_t i = 0; i < 400; ++i) {
    const ToppleInput in = random_slope(i);
    const ToppleResult result = analyse_toppling(in);
    double behind = 0.0;
    for (std::size_t n = in.columns.heights_m.size(); n > 0; --n) {
      const Held held = solve_block(in, n, behind);
      const ToppleBlock& block = result.blocks[n - 1];
      // Strips integrate a moment to about 1e-7 of itself.
      const double slack = 1e-6 * (block.weight_kN_m + behind + 500.0);
      EXPECT_NEAR(block.force_on_next_kN_m, held.passed, slack) << i << " block " << n;
      EXPECT_NEAR(block.normal_kN_m, held.normal, slack) << i << " block " << n;
      EXPECT_NEAR(block.shear_kN_m, held.shear, slack) << i << " block " << n;
      ++modes[static_cast<int>(block.mode)];
      behind = block.force_on_next_kN_m;
    }
  }
  for (const int count : modes) EXPECT_GT(count, 100);
}

// Bisection on whole analyses in place of the root search.
TEST(TopplingReference, FrictionThatBalances) {
  int found = 0;
  for (std::uint64_t i = 0; i < 200; ++i) {
    ToppleInput in = random_slope(5000 + i);
    const auto required = analyse_toppling(in).friction_for_balance;
    if (!required || required->deg() < 0.5) continue;
    ++found;
    in.friction = *required + Angle::degrees(1e-6);
    EXPECT_TRUE(analyse_toppling(in).stable) << i;
    in.friction = *required - Angle::degrees(1e-5);
    EXPECT_FALSE(analyse_toppling(in).stable) << i << " at " << required->deg();
  }
  EXPECT_GT(found, 100);
}

// The bolt put on block 1 leaves nothing to hold there.
TEST(TopplingReference, BoltForBalanceBalances) {
  int found = 0;
  for (std::uint64_t i = 0; i < 400; ++i) {
    ToppleInput in = random_slope(9000 + i);
    in.balance_bolt_plunge = 10_deg;
    in.balance_bolt_height_m = in.columns.heights_m[0] * 0.7;
    const ToppleResult before = analyse_toppling(in);
    if (before.stable || !before.bolt_for_balance_kN_m) continue;
    ++found;
    in.bolts.push_back({1, *before.bolt_for_balance_kN_m, 10_deg, in.balance_bolt_height_m});
    EXPECT_NEAR(analyse_toppling(in).toe_force_kN_m, 0.0, 1e-6) << i;
    in.bolts.back().force_kN_m *= 0.999;
    EXPECT_GT(analyse_toppling(in).toe_force_kN_m, 0.0) << i;
  }
  EXPECT_GT(found, 20);
}

}  // namespace
}  // namespace brink
