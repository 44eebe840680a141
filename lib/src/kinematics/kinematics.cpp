#include "brink/kinematics/kinematics.hpp"

#include <fmt/format.h>

#include <string_view>
#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/kinematics/chords.hpp"
#include "brink/kinematics/modes.hpp"
#include "brink/kinematics/pairs.hpp"
#include "brink/kinematics/unstable.hpp"
#include "brink/mechanics/dry_wedge.hpp"
#include "intervals.hpp"

namespace brink {

namespace {

using Counts = std::vector<std::uint64_t>;

void require(bool ok, std::string_view key, Angle value, std::string_view accepted) {
  if (ok) return;
  throw Error(ErrorKind::argument, Place{.file = {}, .key = std::string(key)}, "out of range",
              fmt::format("{}", value.deg()), accepted);
}

// Written so that not-a-number fails too.
void check(const KinematicsOptions& options) {
  const auto between = [](Angle low, Angle value, Angle high) {
    return low <= value && value <= high;
  };
  const Angle zero;
  const Angle half_turn = Angle::degrees(180.0);
  require(zero <= options.friction && options.friction < Angle::degrees(90.0), "friction",
          options.friction, "0 or more and below 90 degrees");
  require(between(zero, options.strike_tolerance, half_turn), "strike tolerance",
          options.strike_tolerance, "0 to 180 degrees");
  require(between(zero, options.toppling_tolerance, half_turn), "toppling tolerance",
          options.toppling_tolerance, "0 to 180 degrees");
  require(between(zero, options.upper.dip, Angle::degrees(90.0)), "dip of the upper ground",
          options.upper.dip, "0 to 90 degrees");
  for (const Face& face : options.faces) {
    require(zero < face.dip && face.dip < half_turn, "dip of the face", face.dip,
            "above 0 and below 180 degrees");
  }
}

// Group g of the arrangement as the set number of the result.
int set_number(std::size_t group, std::size_t groups) {
  return group + 1 == groups ? 0 : static_cast<int>(group + 1);
}

struct Weights {
  double tested = 0.0;
  double admissible = 0.0;
};

void fill_shares(ModeCount& mode, const Weights& weights) {
  if (mode.tested == 0) return;
  mode.share = static_cast<double>(mode.admissible) / static_cast<double>(mode.tested);
  mode.weighted_share = weights.admissible / weights.tested;
}

void add_set(ModeCount& mode, Weights& weights, const SetCount& set) {
  mode.tested += set.tested;
  mode.admissible += set.admissible;
  weights.tested += set.tested_weight;
  weights.admissible += set.admissible_weight;
  if (set.tested > 0) mode.by_set.push_back(set);
}

// `admissible` holds 1 or 0 for each reading as arranged.
ModeCount plane_mode(const PairReadings& readings, const Counts& admissible) {
  ModeCount mode;
  Weights weights;
  for (std::size_t g = 0; g < readings.groups(); ++g) {
    SetCount set{.set_a = set_number(g, readings.groups())};
    for (std::size_t i = readings.group_begin[g]; i < readings.group_begin[g + 1]; ++i) {
      ++set.tested;
      set.admissible += admissible[i];
      set.tested_weight += readings.weight[i];
      if (admissible[i] > 0) set.admissible_weight += readings.weight[i];
    }
    add_set(mode, weights, set);
  }
  fill_shares(mode, weights);
  return mode;
}

ModeCount pair_mode(const PairReadings& readings, const PairTally& lines,
                    const PairTally& admissible) {
  ModeCount mode;
  Weights weights;
  const std::size_t groups = readings.groups();
  for (std::size_t a = 0; a < groups; ++a) {
    for (std::size_t b = a; b < groups; ++b) {
      const PairSum& tested = lines.by_groups[pair_slot(a, b, groups)];
      const PairSum& passed = admissible.by_groups[pair_slot(a, b, groups)];
      add_set(mode, weights,
              {set_number(a, groups), set_number(b, groups), tested.count, passed.count,
               tested.weight, passed.weight});
    }
  }
  fill_shares(mode, weights);
  return mode;
}

// Which readings pass the tests on planes, as arranged.
struct PlaneFlags {
  Counts sliding;
  Counts flexural;
  std::uint64_t bases = 0;
};

PlaneFlags test_planes(const PairReadings& readings, const FaceLimits& limits) {
  PlaneFlags flags;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const Vector3 n{readings.x[i], readings.y[i], readings.z[i]};
    flags.sliding.push_back(planar_sliding(limits, n) ? 1 : 0);
    flags.flexural.push_back(flexural_toppling(limits, n) ? 1 : 0);
    if (toppling_base(limits, n)) ++flags.bases;
  }
  return flags;
}

void fill_interval(ModeCount& mode, const std::optional<ShareInterval>& interval) {
  if (!interval) return;
  mode.share_low = interval->low;
  mode.share_high = interval->high;
}

// Up to here every pair is looked at for its factor of safety; beyond, a sample.
constexpr std::size_t kMostDistinct = 20'000;

UnstableDry test_dry(const PairReadings& readings, const ChordCounter& pairs,
                     const FaceLimits& limits, const KinematicsOptions& options) {
  const std::uint64_t n = readings.size();
  if (pairs.distinct() > kMostDistinct && n * (n - 1) / 2 > options.pairs) {
    return sample_unstable_dry(readings, limits, options.friction, options.pairs, options.seed,
                               options.threads);
  }
  const DistinctPlanes distinct = pairs.distinct_planes();
  return {count_unstable_dry(distinct.planes, distinct.copies, limits, options.friction,
                             options.threads),
          std::nullopt, 0};
}

FaceKinematics test_face(const PairReadings& readings, const ChordCounter& pairs,
                         const PairTally& lines, const Face& face,
                         const KinematicsOptions& options) {
  const FaceLimits limits = prepare_limits(
      face,
      {options.upper, options.friction, options.strike_tolerance, options.toppling_tolerance});
  const PlaneFlags planes = test_planes(readings, limits);
  const PairTally wedge = pairs.wedge_sliding(limits, options.threads);
  const PairTally block = pairs.block_toppling(limits, options.threads);
  FaceKinematics result;
  result.face = face;
  result.upper = options.upper;
  result.planar_sliding = plane_mode(readings, planes.sliding);
  result.flexural_toppling = plane_mode(readings, planes.flexural);
  result.wedge_sliding = pair_mode(readings, lines, wedge);
  result.block_toppling = pair_mode(readings, lines, block);
  const UnstableDry dry = test_dry(readings, pairs, limits, options);
  result.unstable_dry = dry.count;
  result.unstable_dry_standard_error = dry.standard_error;
  result.unstable_dry_sampled = dry.sampled;
  result.bases = planes.bases;
  result.sliding_bases = result.planar_sliding.admissible;
  const std::uint64_t n = readings.size();
  result.parallel_pairs = (n < 2 ? 0 : n * (n - 1) / 2) - result.wedge_sliding.tested;

  const Counts each(readings.size(), 1);
  const auto intervals = share_intervals({{planes.sliding, each, 1},
                                          {planes.flexural, each, 1},
                                          {wedge.of_reading, lines.of_reading, 2},
                                          {block.of_reading, lines.of_reading, 2}},
                                         options.seed, options.threads);
  fill_interval(result.planar_sliding, intervals[0]);
  fill_interval(result.flexural_toppling, intervals[1]);
  fill_interval(result.wedge_sliding, intervals[2]);
  fill_interval(result.block_toppling, intervals[3]);
  return result;
}

std::string in_words(Angle dip, Angle direction) {
  return fmt::format("{}/{}", shortest(dip.deg()), shortest(direction.deg()));
}

void warn_without_crest(const Face& face, const Plane& upper, std::vector<std::string>& warnings) {
  if (rises_to_crest(outward_normal(face), upward_normal(upper))) return;
  warnings.push_back(fmt::format(
      "face {}: the ground above it ({}) falls away steeper than the face, so there is no crest "
      "and no wedge; check --face and --upper",
      in_words(face.dip, face.dip_direction), in_words(upper.dip, upper.dip_direction)));
}

}  // namespace

KinematicsResult test_kinematics(const Readings& readings, const std::vector<int>& assignment,
                                 std::size_t set_count, const KinematicsOptions& options) {
  check(options);
  const PairReadings arranged = arrange_by_set(readings, assignment, set_count);
  const ChordCounter pairs(arranged);
  const PairTally lines = pairs.lines();
  KinematicsResult result;
  result.options = options;
  for (const Face& face : options.faces) {
    result.faces.push_back(test_face(arranged, pairs, lines, face, options));
    warn_without_crest(face, options.upper, result.warnings);
  }
  return result;
}

}  // namespace brink
