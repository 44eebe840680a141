#include "scenario.hpp"

#include <Eigen/Dense>
#include <algorithm>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <numbers>
#include <numeric>
#include <set>

#include "brink/base/random.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/sphere/fisher.hpp"

namespace brink::bench {

namespace {

// A stream of numbers of one file.
class Dice {
 public:
  explicit Dice(std::uint64_t seed) : seed_(seed) {}
  double uniform() { return random_uniform(seed_, 77, index_++); }
  double between(double low, double high) { return low + (high - low) * uniform(); }
  std::size_t whole(std::size_t low, std::size_t high) {
    return low + static_cast<std::size_t>(uniform() * static_cast<double>(high - low + 1));
  }
  double normal() {
    const double r = std::sqrt(-2.0 * std::log(uniform()));
    return r * std::cos(2.0 * std::numbers::pi * uniform());
  }
  // Sum of squares of `freedom` normals.
  double chi_square(int freedom) {
    double sum = 0.0;
    for (int i = 0; i < freedom; ++i) sum += std::pow(normal(), 2);
    return sum;
  }

 private:
  std::uint64_t seed_;
  std::uint64_t index_ = 0;
};

// A set on the gnomonic plane about its mean: spreads (tangents of angles) along two directions.
struct TrueSet {
  Vector3 mean;
  Vector3 first;
  Vector3 second;
  double weight = 0.0;
  double kappa = 0.0;
  double spread1 = 0.0;
  double spread2 = 0.0;
};

Vector3 on_plane(const TrueSet& set, double a, double b) {
  return (set.mean + a * set.spread1 * set.first + b * set.spread2 * set.second).normalized();
}

Vector3 draw_axis(Family family, const TrueSet& set, Dice& dice) {
  if (family == Family::fisher) {
    const double u = dice.uniform();
    return draw_fisher(set.mean, set.kappa, u, dice.uniform());
  }
  const double a = dice.normal();
  const double b = dice.normal();
  if (family == Family::normal) return on_plane(set, a, b);
  const int freedom = family == Family::cauchy ? 1 : 4;
  const double scale = std::sqrt(dice.chi_square(freedom) / freedom);
  return on_plane(set, a / scale, b / scale);
}

// Density over the hemisphere. On the gnomonic plane an area element is that of the sphere divided
// by the cube of the cosine to the mean.
double density(Family family, const TrueSet& set, const Vector3& axis) {
  const double cosine = std::abs(axis.dot(set.mean));
  if (family == Family::fisher) return 2.0 * std::exp(log_axial_density(set.kappa, cosine));
  if (cosine < 1e-12) return 0.0;
  const double a = axis.dot(set.first) / (axis.dot(set.mean) * set.spread1);
  const double b = axis.dot(set.second) / (axis.dot(set.mean) * set.spread2);
  const double q = a * a + b * b;
  const double jacobian =
      1.0 / (2.0 * std::numbers::pi * set.spread1 * set.spread2 * std::pow(cosine, 3));
  if (family == Family::normal) return jacobian * std::exp(-q / 2.0);
  const double freedom = family == Family::cauchy ? 1.0 : 4.0;
  return jacobian * std::pow(1.0 + q / freedom, -(freedom + 2.0) / 2.0);
}

TrueSet draw_set(const Recipe& recipe, bool at_rim, Dice& dice) {
  TrueSet set;
  const double z = at_rim ? dice.between(0.0, 0.17) : dice.uniform();
  const double turn = dice.between(0.0, 2.0 * std::numbers::pi);
  const double r = std::sqrt(1.0 - z * z);
  set.mean = {r * std::cos(turn), r * std::sin(turn), z};
  const Tangents t = tangents(set.mean);
  const double twist = dice.between(0.0, std::numbers::pi);
  set.first = std::cos(twist) * t.across + std::sin(twist) * t.along;
  set.second = -std::sin(twist) * t.across + std::cos(twist) * t.along;
  set.kappa = 10.0 * std::pow(8.0, dice.uniform());
  const double aspect = recipe.family == Family::fisher ? 1.0 : dice.between(1.5, 4.0);
  // The heavier the tails the narrower the core, so that about as much stays in reach.
  const double narrow = recipe.family == Family::cauchy ? 0.5 : 0.8;
  set.spread1 = narrow * std::sqrt(aspect / set.kappa);
  set.spread2 = narrow * std::sqrt(1.0 / (aspect * set.kappa));
  set.weight = dice.between(0.5, 2.0);
  return set;
}

std::vector<TrueSet> draw_sets(const Recipe& recipe, Dice& dice) {
  std::vector<TrueSet> sets;
  // Gives way a little each time that no place is left, so that it always ends.
  double apart = recipe.least_apart_deg;
  while (sets.size() < recipe.sets) {
    const bool at_rim = recipe.at_rim && sets.size() % 2 == 0;
    const TrueSet set = draw_set(recipe, at_rim, dice);
    const bool clear = std::all_of(sets.begin(), sets.end(), [&](const TrueSet& other) {
      return axis_angle(set.mean, other.mean).deg() >= apart;
    });
    if (clear) sets.push_back(set);
    apart -= 0.01;
  }
  double total = 0.0;
  for (const TrueSet& set : sets) total += set.weight;
  for (TrueSet& set : sets) set.weight *= (1.0 - recipe.noise_share) / total;
  return sets;
}

int bayes_label(const Recipe& recipe, const std::vector<TrueSet>& sets, const Vector3& axis) {
  int best = 0;
  double greatest = recipe.noise_share / (2.0 * std::numbers::pi);
  for (std::size_t k = 0; k < sets.size(); ++k) {
    const double value = sets[k].weight * density(recipe.family, sets[k], axis);
    if (value > greatest) {
      greatest = value;
      best = static_cast<int>(k) + 1;
    }
  }
  return best;
}

void add_reading(Scenario& scenario, Plane plane, int truth) {
  scenario.readings.planes.push_back(plane);
  scenario.readings.normals.push_back(upward_normal(plane));
  scenario.readings.weights.push_back(1.0);
  scenario.truth.push_back(truth);
}

Plane in_whole_degrees(const Plane& plane) {
  const double dip = std::round(plane.dip.deg());
  const Angle direction = wrap_360(Angle::degrees(std::round(plane.dip_direction.deg())));
  return {Angle::degrees(dip), dip == 0.0 ? Angle{} : direction};
}

}  // namespace

Scenario simulate(const Recipe& recipe, std::uint64_t seed) {
  Dice dice(seed);
  const std::vector<TrueSet> sets = draw_sets(recipe, dice);
  Scenario scenario;
  scenario.sets = sets.size();
  for (std::size_t i = 0; i < recipe.readings; ++i) {
    double left = dice.uniform() - recipe.noise_share;
    std::size_t k = 0;
    while (left >= 0.0 && k + 1 < sets.size() && left >= sets[k].weight) left -= sets[k++].weight;
    const bool noise = left < 0.0 || sets.empty();
    const double u = dice.uniform();
    const double v = dice.uniform();
    const Vector3 axis = noise ? draw_uniform(u, v) : draw_axis(recipe.family, sets[k], dice);
    const Plane plane = plane_of_normal(axis);
    add_reading(scenario, recipe.whole_degrees ? in_whole_degrees(plane) : plane,
                noise ? 0 : static_cast<int>(k) + 1);
    scenario.bayes.push_back(bayes_label(recipe, sets, axis));
  }
  return scenario;
}

Recipe draw_recipe(Family family, std::uint64_t seed) {
  Dice dice(seed ^ 0x5EEDULL);
  Recipe recipe;
  recipe.family = family;
  recipe.readings = static_cast<std::size_t>(std::round(40.0 * std::pow(125.0, dice.uniform())));
  recipe.sets = dice.whole(2, recipe.readings < 100 ? 3 : recipe.readings < 300 ? 4 : 6);
  recipe.noise_share = dice.between(0.0, 0.3);
  recipe.at_rim = dice.uniform() < 0.5;
  recipe.whole_degrees = dice.uniform() < 0.5;
  return recipe;
}

std::vector<Scenario> read_scenarios(const std::string& folder) {
  std::set<std::filesystem::path> paths;
  for (const auto& entry : std::filesystem::directory_iterator(folder)) {
    if (entry.path().extension() == ".csv" && entry.path().stem() != "best") {
      paths.insert(entry.path());
    }
  }
  std::vector<Scenario> scenarios;
  for (const auto& path : paths) {
    Scenario scenario;
    scenario.name = path.filename().string();
    std::ifstream in(path);
    std::string heading;
    std::getline(in, heading);
    double dip = 0.0;
    double direction = 0.0;
    char comma = 0;
    int truth = 0;
    while (in >> dip >> comma >> direction >> comma >> truth) {
      add_reading(scenario, {Angle::degrees(dip), wrap_360(Angle::degrees(direction))}, truth);
      scenario.sets = std::max(scenario.sets, static_cast<std::size_t>(truth));
    }
    scenarios.push_back(std::move(scenario));
  }
  return scenarios;
}

}  // namespace brink::bench
