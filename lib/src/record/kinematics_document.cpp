#include "brink/record/kinematics_document.hpp"

#include <utility>

namespace brink {

namespace {

Value ratio(double part, double whole) {
  return whole > 0.0 ? Value(part / whole) : Value();
}

Value set_count_value(const SetCount& count, bool pairs, const SetsResult& sets) {
  Object object;
  if (pairs) {
    object.add("sets", Array{set_name(sets, count.set_a), set_name(sets, count.set_b)});
  } else {
    object.add("set", set_name(sets, count.set_a));
  }
  object.add("tested", count.tested);
  object.add("admissible", count.admissible);
  object.add("share",
             ratio(static_cast<double>(count.admissible), static_cast<double>(count.tested)));
  object.add("weighted_share", ratio(count.admissible_weight, count.tested_weight));
  return object;
}

Object mode_object(const ModeCount& mode, bool pairs, const SetsResult& sets) {
  Array by_set;
  for (const SetCount& count : mode.by_set) by_set.push_back(set_count_value(count, pairs, sets));
  return Object{{"tested", mode.tested},       {"admissible", mode.admissible},
                {"share", mode.share},         {"weighted_share", mode.weighted_share},
                {"share_low", mode.share_low}, {"share_high", mode.share_high},
                {"by_set", std::move(by_set)}};
}

}  // namespace

std::string set_name(const SetsResult& sets, int number) {
  return number > 0 ? sets.sets.at(static_cast<std::size_t>(number) - 1).name : kNoSet;
}

Object face_kinematics_value(const FaceKinematics& face, Angle friction, const SetsResult& sets) {
  Object wedge = mode_object(face.wedge_sliding, true, sets);
  wedge.add("parallel_pairs", face.parallel_pairs);
  wedge.add("unstable_dry", face.unstable_dry);
  wedge.add("unstable_dry_standard_error", face.unstable_dry_standard_error);
  wedge.add("unstable_dry_sampled_pairs",
            face.unstable_dry_sampled > 0 ? Value(face.unstable_dry_sampled) : Value());
  Object block = mode_object(face.block_toppling, true, sets);
  block.add("parallel_pairs", face.parallel_pairs);
  block.add("bases", face.bases);
  block.add("sliding_bases", face.sliding_bases);
  Object modes{{"planar_sliding", mode_object(face.planar_sliding, false, sets)},
               {"wedge_sliding", std::move(wedge)},
               {"flexural_toppling", mode_object(face.flexural_toppling, false, sets)},
               {"block_toppling", std::move(block)}};
  return Object{{"face", face_value(face.face)},
                {"upper", plane_value(face.upper)},
                {"friction_deg", friction.deg()},
                {"modes", std::move(modes)}};
}

Object kinematics_inputs(const KinematicsOptions& options) {
  Array faces;
  for (const Face& face : options.faces) faces.push_back(face_value(face));
  return Object{{"faces", std::move(faces)},
                {"upper", plane_value(options.upper)},
                {"friction_deg", options.friction.deg()},
                {"strike_tolerance_deg", options.strike_tolerance.deg()},
                {"toppling_tolerance_deg", options.toppling_tolerance.deg()},
                {"pairs", options.pairs},
                {"seed", options.seed}};
}

Value kinematics_result(const KinematicsResult& result, const SetsResult& sets) {
  Array faces;
  for (const FaceKinematics& face : result.faces) {
    faces.push_back(face_kinematics_value(face, result.options.friction, sets));
  }
  Array known;
  for (const SetStatistics& set : sets.sets) {
    known.push_back(
        Object{{"name", set.name}, {"count", set.count}, {"mean", plane_value(set.mean)}});
  }
  return Object{{"faces", std::move(faces)}, {"sets", std::move(known)}};
}

}  // namespace brink
