#include "brink/record/job_document.hpp"

#include "brink/record/cautions.hpp"
#include "brink/record/kinematics_document.hpp"
#include "brink/record/plane_document.hpp"
#include "brink/record/readings_document.hpp"
#include "brink/record/sets_document.hpp"
#include "brink/record/site_document.hpp"
#include "brink/record/wedge_document.hpp"

namespace brink {

namespace {

Value met(const Job& job, bool forms, double factor_of_safety) {
  return forms ? Value(meets_target(job.site, factor_of_safety)) : Value();
}

Value plane_value(const Job& job, const PlaneFollowUp& follow) {
  return Object{
      {"set", set_name(job.sets, follow.set)},
      {"strength", mohr_coulomb_value(follow.strength)},
      {"dry", plane_slide_value(follow.dry)},
      {"as_written", plane_slide_value(follow.as_written)},
      {"meets_target", met(job, follow.as_written.forms, follow.as_written.factor_of_safety)}};
}

Value wedge_follow_value(const Job& job, const WedgeFollowUp& follow) {
  return Object{
      {"sets", Array{set_name(job.sets, follow.set_a), set_name(job.sets, follow.set_b)}},
      {"line", line_value(follow.line)},
      {"strengths",
       Array{mohr_coulomb_value(follow.strength_a), mohr_coulomb_value(follow.strength_b)}},
      {"dry", wedge_value(follow.dry)},
      {"as_written", wedge_value(follow.as_written)},
      {"meets_target", met(job, follow.as_written.forms, follow.as_written.factor_of_safety)}};
}

Value face_value(const Job& job, const FaceJob& face) {
  Object object{{"name", face.face.name}, {"height_m", Value(face.face.height_m)}};
  const Object counts = face_kinematics_value(face.counts(), job.friction, job.sets);
  for (const auto& [key, value] : counts.members()) object.add(key, value);
  Array planes;
  for (const PlaneFollowUp& follow : face.planes) planes.push_back(plane_value(job, follow));
  Array wedges;
  for (const WedgeFollowUp& follow : face.wedges) wedges.push_back(wedge_follow_value(job, follow));
  object.add("planes", std::move(planes));
  object.add("wedges", std::move(wedges));
  object.add("no_factors_because", face.no_sizes.empty() ? Value() : Value(face.no_sizes));
  return object;
}

}  // namespace

Value job_inputs(const Job& job) {
  Array files;
  for (const InputFile& file : job.readings.files) {
    files.emplace_back(Object{{"name", file.name}, {"sha256", file.sha256}});
  }
  return Object{{"site", site_value(job.site)},
                {"files", std::move(files)},
                {"seed", Value(job.options.seed)}};
}

Value job_result(const Job& job) {
  Array faces;
  for (const FaceJob& face : job.faces) faces.push_back(face_value(job, face));
  return Object{
      {"title", job.site.title},
      {"readings", readings_result(job.readings)},
      {"sets", sets_result(job.sets)},
      {"faces", std::move(faces)},
      {"target_factor_of_safety", Value(job.site.target_factor_of_safety)},
      {"cautions", Array{kinematic_caution(), rigid_block_caution(), practice_caution()}}};
}

}  // namespace brink
