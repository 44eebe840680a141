// Invented readings with known membership, for judging how well sets are found. Seeded: the same
// seed gives the same files.
#pragma once

#include <cstdint>
#include <string>
#include <vector>

#include "brink/readings/readings.hpp"

namespace brink::bench {

struct Scenario {
  std::string name;
  Readings readings;
  std::vector<int> truth;  // 0 noise, k the k-th set
  std::vector<int> bayes;  // by the classifier that knows the true mixture; empty where unknown
  std::size_t sets = 0;
};

// How a family's sets scatter about their means.
enum class Family {
  fisher,   // Fisher, kappa 10 to 80
  cauchy,   // angular central Gaussian: elliptical with very heavy tails
  student,  // elliptical Student, 4 degrees of freedom, on the gnomonic plane
  normal,   // elliptical normal on the gnomonic plane: no heavy tails
};

struct Recipe {
  Family family = Family::fisher;
  std::size_t readings = 300;
  std::size_t sets = 3;
  double noise_share = 0.1;
  double least_apart_deg = 40.0;  // between set means, as axes
  bool at_rim = false;            // means of half of the sets within 10 degrees of vertical
  bool whole_degrees = false;
};

Scenario simulate(const Recipe& recipe, std::uint64_t seed);

// The recipe of the seed-th unseen file of a family: sizes, counts and noise drawn from the whole
// range that the program is meant for.
Recipe draw_recipe(Family family, std::uint64_t seed);

// A folder of CSV files with the columns dip, dip_direction, true_set.
std::vector<Scenario> read_scenarios(const std::string& folder);

}  // namespace brink::bench
