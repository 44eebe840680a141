// How well the sets are found, against known membership. Not a test: prints the figures that the
// contributor guide quotes.
//   sets_quality FOLDER                 files with dip,dip_direction,true_set; best.csv beside them
//   sets_quality simulate FIRST COUNT   unseen files of every family, seeds FIRST ...
//   sets_quality noise FIRST COUNT      pure noise of several sizes
#include <fmt/format.h>

#include <algorithm>
#include <chrono>
#include <cstdlib>
#include <fstream>
#include <map>
#include <sstream>

#include "../support/partition.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/sets/sets.hpp"
#include "scenario.hpp"

namespace brink::bench {
namespace {

struct Score {
  double index = 0.0;
  double best = 0.0;  // of the classifier that knows the mixture
  std::size_t found = 0;
  std::size_t elliptical = 0;
  std::size_t runner_up = 0;
  bool undecided = false;
  double mean_error_deg = 0.0;   // found sets' means, against those of the true members
  double truth_error_deg = 0.0;  // unused where the true means are unknown
  double seconds = 0.0;
};

// For every true set the angle from the mean of its members to the nearest found mean, averaged,
// and the angle that sampling alone gives: the 63 % point of the mean's distribution, from kappa.
void compare_means(const Scenario& scenario, const SetsResult& result, Score& score) {
  std::vector<std::string> names(scenario.sets, "true");
  const SetsResult truth = sets_by_membership(scenario.readings, scenario.truth, names);
  double error = 0.0;
  for (const SetStatistics& t : truth.sets) {
    double nearest = 90.0;
    for (const SetStatistics& f : result.sets) {
      nearest = std::min(nearest, axis_angle(upward_normal(t.mean), upward_normal(f.mean)).deg());
    }
    error += nearest / static_cast<double>(truth.sets.size());
  }
  score.mean_error_deg = error;
}

Score judge(const Scenario& scenario, double best) {
  FindSetsOptions options;
  options.threads = 2;
  const auto begin = std::chrono::steady_clock::now();
  const SetsResult result = find_sets(scenario.readings, options);
  Score score;
  score.seconds = std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count();
  score.index = test::adjusted_rand_index(result.assignment, scenario.truth);
  score.best = best;
  score.found = result.sets.size();
  for (const SetStatistics& s : result.sets) score.elliptical += s.shape == Shape::elliptical;
  score.undecided = result.undecided;
  score.runner_up = result.runner_up ? result.runner_up->count : 0;
  compare_means(scenario, result, score);
  return score;
}

void print(const Scenario& scenario, const Score& s) {
  fmt::print(
      "{:<22} n {:>6} sets {} found {} ({} ell.){} index {:.4f} best {:.4f} ratio {:.3f} "
      "mean err {:.2f} {:.2f} s\n",
      scenario.name, scenario.readings.size(), scenario.sets, s.found, s.elliptical,
      s.undecided ? fmt::format(" or {}", s.runner_up) : "", s.index, s.best,
      s.best > 0 ? s.index / s.best : 0.0, s.mean_error_deg, s.seconds);
  std::fflush(stdout);
}

struct Summary {
  double ratio = 0.0;
  double worst = 1e9;
  std::size_t files = 0;
  std::size_t large = 0;
  std::size_t right = 0;
};

void add(Summary& summary, const Scenario& scenario, const Score& score) {
  ++summary.files;
  const double ratio = score.index / score.best;
  summary.ratio += ratio;
  summary.worst = std::min(summary.worst, ratio);
  if (scenario.readings.size() < 100) return;
  ++summary.large;
  summary.right += score.found == scenario.sets;
}

void print(const std::map<std::string, Summary>& summaries) {
  for (const auto& [name, s] : summaries) {
    fmt::print(
        "{}: {} files, index ratio {:.4f} on average, worst {:.3f}; right number in {} of "
        "{} with 100 readings or more\n",
        name, s.files, s.ratio / static_cast<double>(s.files), s.worst, s.right, s.large);
  }
}

std::map<std::string, double> best_indices(const std::string& folder) {
  std::map<std::string, double> best;
  std::ifstream in(folder + "/best.csv");
  std::string line;
  std::getline(in, line);
  while (std::getline(in, line)) {
    std::istringstream cells(line);
    std::array<std::string, 5> cell;
    for (std::string& c : cell) std::getline(cells, c, ',');
    if (!cell[4].empty()) best[cell[0]] = std::strtod(cell[4].c_str(), nullptr);
  }
  return best;
}

int judge_folder(const std::string& folder) {
  const std::map<std::string, double> best = best_indices(folder);
  std::map<std::string, Summary> summaries;
  for (const Scenario& scenario : read_scenarios(folder)) {
    const auto at = best.find(scenario.name);
    const Score score = judge(scenario, at == best.end() ? 0.0 : at->second);
    print(scenario, score);
    if (at != best.end()) add(summaries[scenario.name.substr(0, 1)], scenario, score);
  }
  print(summaries);
  return 0;
}

int judge_simulated(std::uint64_t first, std::uint64_t count) {
  const std::map<std::string, Family> families = {{"fisher", Family::fisher},
                                                  {"cauchy", Family::cauchy},
                                                  {"student", Family::student},
                                                  {"normal", Family::normal}};
  std::map<std::string, Summary> summaries;
  for (const auto& [name, family] : families) {
    for (std::uint64_t seed = first; seed < first + count; ++seed) {
      Scenario scenario = simulate(draw_recipe(family, seed), seed);
      scenario.name = fmt::format("{}-{}", name, seed);
      const Score score =
          judge(scenario, test::adjusted_rand_index(scenario.bayes, scenario.truth));
      print(scenario, score);
      add(summaries[name], scenario, score);
    }
  }
  print(summaries);
  return 0;
}

int judge_noise(std::uint64_t first, std::uint64_t count) {
  for (const std::size_t size : {40U, 100U, 300U, 1000U}) {
    std::size_t found = 0;
    for (std::uint64_t seed = first; seed < first + count; ++seed) {
      Recipe recipe{Family::fisher, size, 0, 1.0};
      recipe.whole_degrees = seed % 2 == 0;
      FindSetsOptions options;
      options.threads = 2;
      found += find_sets(simulate(recipe, seed).readings, options).sets.empty() ? 0 : 1;
    }
    fmt::print("noise, {} readings: a set in {} of {} files\n", size, found, count);
    std::fflush(stdout);
  }
  return 0;
}

}  // namespace
}  // namespace brink::bench

int main(int argc, char** argv) {
  const std::string what = argc > 1 ? argv[1] : "";
  if (argc == 2) return brink::bench::judge_folder(what);
  if (argc != 4) return 2;
  const auto first = std::strtoull(argv[2], nullptr, 10);
  const auto count = std::strtoull(argv[3], nullptr, 10);
  return what == "noise" ? brink::bench::judge_noise(first, count)
                         : brink::bench::judge_simulated(first, count);
}
