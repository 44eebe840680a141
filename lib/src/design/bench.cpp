#include "brink/design/bench.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <functional>
#include <string_view>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "brink/kinematics/chords.hpp"

namespace brink {

namespace {

void require(bool ok, std::string_view key, double value, std::string_view accepted) {
  if (ok) return;
  throw Error(ErrorKind::argument, Place{.file = {}, .key = std::string(key)}, "out of range",
              fmt::format("{}", value), accepted);
}

// Written so that not-a-number fails too.
void check(const BenchOptions& o) {
  require(o.face.dip.deg() > 0.0 && o.face.dip.deg() <= 90.0, "dip of the face", o.face.dip.deg(),
          "above 0, at most 90 degrees");
  require(o.height_m > 0.0 && std::isfinite(o.height_m), "--height", o.height_m, "above 0 m");
  require(o.berm_m > 0.0 && std::isfinite(o.berm_m), "--berm", o.berm_m, "above 0 m");
  require(o.settings.friction.deg() > 0.0 && o.settings.friction.deg() < 90.0, "friction",
          o.settings.friction.deg(), "above 0 and below 90 degrees");
  for (const double percentile : o.percentiles) {
    require(percentile > 0.0 && percentile < 100.0, "--percentile", percentile,
            "above 0 and below 100");
  }
}

double cotangent(Angle angle) {
  const SinCos at = sincos(angle);
  return at.cos / at.sin;
}

// Behind the crest, for a broken face through the toe.
double back_break_m(const BenchOptions& o, Angle broken_face) {
  return o.height_m * (cotangent(broken_face) - cotangent(o.face.dip));
}

// What slides on a face of this dip in place of the bench's.
using CountAt = std::function<double(Angle dip)>;

constexpr int kHalvings = 50;

// The steepest face on which no more than `most` is left sliding; counts grow with the dip.
Angle steepest_with(const CountAt& count, double most, Angle steepest) {
  Angle low;
  Angle high = steepest;
  for (int i = 0; i < kHalvings && !at_least(low, high); ++i) {
    const Angle middle = (low + high) * 0.5;
    (count(middle) <= most ? low : high) = middle;
  }
  return low;
}

BackBreak back_break(const BenchOptions& o, double percentile, Angle broken_face) {
  BackBreak out;
  out.percentile = percentile;
  out.effective_face = broken_face;
  out.back_break_m = back_break_m(o, broken_face);
  out.berm_left_m = o.berm_m - out.back_break_m;
  const double least = ritchie_width_m(o.height_m);
  out.keeps_ritchie = at_least(out.berm_left_m, least);
  out.inter_ramp_to_keep = inter_ramp_angle(o.height_m, least + out.back_break_m, o.face.dip);
  return out;
}

BreakingJoints summarise(const BenchOptions& o, double tested, const CountAt& count) {
  BreakingJoints out;
  out.tested = tested;
  out.breaking = count(o.face.dip);
  if (tested > 0.0) out.share = out.breaking / tested;
  if (out.breaking <= 0.0) return out;
  for (const double percentile : o.percentiles) {
    const double left = out.breaking * (1.0 - percentile / 100.0);
    // A share of whole numbers: rounding must not hold back the last of them.
    const Angle face = steepest_with(count, left + kTie * out.breaking, o.face.dip);
    out.percentiles.push_back(back_break(o, percentile, face));
  }
  for (double dip = o.face.dip.deg(); dip > 1.0; dip -= 1.0) {
    const double share = 1.0 - count(Angle::degrees(dip)) / out.breaking;
    out.distribution.push_back({back_break_m(o, Angle::degrees(dip)), share});
    if (share >= 1.0) break;
  }
  return out;
}

double amount(const PairSum& sum, bool weighted) {
  return weighted ? sum.weight : static_cast<double>(sum.count);
}

// A reading slides with its dip direction near the face's, wherever the crest lies: tested on the
// face's own direction at every dip.
CountAt planes_at(const PairReadings& readings, const BenchOptions& o) {
  return [&readings, &o](Angle dip) {
    const FaceLimits limits = prepare_limits({dip, o.face.dip_direction}, o.settings);
    double sum = 0.0;
    for (std::size_t i = 0; i < readings.size(); ++i) {
      const Vector3 n{readings.x[i], readings.y[i], readings.z[i]};
      if (planar_sliding(limits, n)) sum += o.weighted ? readings.weight[i] : 1.0;
    }
    return sum;
  };
}

CountAt wedges_at(const ChordCounter& pairs, const BenchOptions& o) {
  return [&pairs, &o](Angle dip) {
    return amount(
        pairs.wedge_sliding_total(prepare_limits({dip, o.face.dip_direction}, o.settings)),
        o.weighted);
  };
}

void choose_governing(BenchResult& result) {
  const auto& planes = result.planes.percentiles;
  const auto& wedges = result.wedges.percentiles;
  for (std::size_t i = 0; i < result.options.percentiles.size(); ++i) {
    if (planes.empty() && wedges.empty()) return;
    if (planes.empty() || wedges.empty()) {
      result.governing.push_back(planes.empty() ? wedges[i] : planes[i]);
      continue;
    }
    result.governing.push_back(planes[i].back_break_m > wedges[i].back_break_m ? planes[i]
                                                                               : wedges[i]);
  }
}

void warn(BenchResult& result) {
  const BenchOptions& o = result.options;
  if (!at_least(o.berm_m, result.ritchie_width_m)) {
    result.warnings.push_back(fmt::format(
        "the berm of {} m is narrower than 0.2 H + 4.5 m = {} m even before the crest breaks",
        shortest(o.berm_m), shortest(result.ritchie_width_m)));
  }
}

}  // namespace

double ritchie_width_m(double height_m) {
  return 0.2 * height_m + 4.5;
}

double berm_width_m(double height_m, Angle inter_ramp, Angle face_dip) {
  return height_m * (cotangent(inter_ramp) - cotangent(face_dip));
}

Angle inter_ramp_angle(double height_m, double berm_m, Angle face_dip) {
  return atan2(height_m, berm_m + height_m * cotangent(face_dip));
}

BenchResult design_bench(const Readings& readings, const BenchOptions& options) {
  check(options);
  BenchResult result;
  result.options = options;
  std::ranges::sort(result.options.percentiles);
  const BenchOptions& o = result.options;
  result.ritchie_width_m = ritchie_width_m(o.height_m);
  result.inter_ramp = inter_ramp_angle(o.height_m, o.berm_m, o.face.dip);
  const PairReadings arranged = arrange_by_set(readings, std::vector<int>(readings.size()), 0);
  const ChordCounter pairs(arranged);
  double readings_tested = static_cast<double>(arranged.size());
  if (o.weighted) {
    readings_tested = 0.0;
    for (const double weight : arranged.weight) readings_tested += weight;
  }
  result.planes = summarise(o, readings_tested, planes_at(arranged, o));
  result.wedges = summarise(o, amount(pairs.lines().total(), o.weighted), wedges_at(pairs, o));
  choose_governing(result);
  warn(result);
  return result;
}

}  // namespace brink
