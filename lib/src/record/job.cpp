#include "brink/record/job.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "brink/base/error.hpp"
#include "brink/base/ties.hpp"
#include "brink/orientation/intersection.hpp"
#include "brink/record/set_names.hpp"

namespace brink {

namespace {

Error site_error(const Site& site, std::string key, std::string_view what,
                 std::string_view accepted) {
  return Error(ErrorKind::input, Place{site.source.name, 0, 0, std::move(key)}, what, {}, accepted);
}

// Strength of every set: its own, or that of [strength]; nothing where the site file has neither.
using Strengths = std::vector<std::optional<MohrCoulomb>>;

Strengths strengths_of(const Site& site,
                       const std::vector<std::optional<std::size_t>>& known_of_set) {
  Strengths strengths;
  for (const auto& known : known_of_set) {
    const auto own = known ? site.sets.known[*known].strength : std::nullopt;
    strengths.push_back(own ? own : site.strength);
  }
  return strengths;
}

KinematicsResult test_face(const Job& job, const SiteFace& face,
                           std::vector<std::string>& warnings) {
  KinematicsOptions options;
  options.faces = {face.face};
  options.upper = face.upper;
  options.friction = job.friction;
  options.strike_tolerance = job.site.kinematics.strike_tolerance;
  options.toppling_tolerance = job.site.kinematics.toppling_tolerance;
  options.seed = job.options.seed;
  options.threads = job.options.threads;
  KinematicsResult result =
      test_kinematics(job.readings, job.sets.assignment, job.sets.sets.size(), options);
  for (const std::string& warning : result.warnings) {
    warnings.push_back(fmt::format("{}: {}", face.name, warning));
  }
  return result;
}

bool free_to_slide(const Plane& plane, const SiteFace& face, Angle strike_tolerance) {
  const Vector3 down = dip_vector(plane.dip, plane.dip_direction);
  return daylights(down, outward_normal(face.face), upward_normal(face.upper)) &&
         at_most(azimuth_difference(plane.dip_direction, face.face.dip_direction),
                 strike_tolerance);
}

// What one face has to be followed up, before any size is known.
struct Flagged {
  std::vector<std::size_t> planes;
  std::vector<std::pair<std::size_t, std::size_t>> wedges;
  bool empty() const { return planes.empty() && wedges.empty(); }
};

Flagged flag(const Job& job, const SiteFace& face) {
  Flagged flagged;
  const auto& sets = job.sets.sets;
  for (std::size_t a = 0; a < sets.size(); ++a) {
    if (free_to_slide(sets[a].mean, face, job.site.kinematics.strike_tolerance)) {
      flagged.planes.push_back(a);
    }
    for (std::size_t b = a + 1; b < sets.size(); ++b) {
      const auto line =
          intersection_vector(upward_normal(sets[a].mean), upward_normal(sets[b].mean));
      if (line && daylights(*line, outward_normal(face.face), upward_normal(face.upper))) {
        flagged.wedges.emplace_back(a, b);
      }
    }
  }
  return flagged;
}

// Why no factor of safety can be given; empty where it can.
std::string missing_for_sizes(const Job& job, const SiteFace& face, const Flagged& flagged,
                              const Strengths& strengths) {
  if (flagged.empty()) return {};
  if (!face.height_m) return "the face has no height_m";
  if (!job.site.unit_weight_kN_m3) return "[rock] has no unit_weight_kN_m3";
  const auto lacks = [&](std::size_t set) { return !strengths[set]; };
  const bool plane_lacks = std::any_of(flagged.planes.begin(), flagged.planes.end(), lacks);
  const bool wedge_lacks =
      std::any_of(flagged.wedges.begin(), flagged.wedges.end(),
                  [&](const auto& pair) { return lacks(pair.first) || lacks(pair.second); });
  return plane_lacks || wedge_lacks ? "a set has no strength, and there is no [strength]" : "";
}

PlaneFollowUp follow_plane(const Job& job, const SiteFace& face, std::size_t set,
                           const MohrCoulomb& strength) {
  PlaneFollowUp follow;
  follow.set = static_cast<int>(set) + 1;
  follow.strength = strength;
  PlaneSlideInput input;
  input.plane = job.sets.sets[set].mean;
  input.face = face.face;
  input.upper = face.upper;
  input.height_m = face.height_m.value();
  input.unit_weight_kN_m3 = job.site.unit_weight_kN_m3.value();
  input.strength = strength;
  input.strike_tolerance = job.site.kinematics.strike_tolerance;
  follow.dry = analyse_plane_slide(input);
  follow.as_written = follow.dry;
  if (!follow.dry.forms) return follow;
  // Wet from the toe up to the stated share of the way to the back corner, where the plane comes
  // out.
  input.water_depth_m = job.site.water.fill * follow.dry.section.outline.back().z_m;
  input.water_unit_weight_kN_m3 = job.site.water.unit_weight_kN_m3;
  input.seismic_horizontal = job.site.seismic.horizontal;
  input.seismic_vertical = job.site.seismic.vertical;
  follow.as_written = analyse_plane_slide(input);
  return follow;
}

WedgeFollowUp follow_wedge(const Job& job, const SiteFace& face,
                           const std::pair<std::size_t, std::size_t>& pair,
                           const Strengths& strengths) {
  const Plane& a = job.sets.sets[pair.first].mean;
  const Plane& b = job.sets.sets[pair.second].mean;
  WedgeCase wedge;
  wedge.geometry.plane1 = a;
  wedge.geometry.plane2 = b;
  wedge.geometry.face = face.face;
  wedge.geometry.upper = face.upper;
  wedge.geometry.size = {WedgeMeasure::height, face.height_m.value()};
  wedge.unit_weight_kN_m3 = job.site.unit_weight_kN_m3.value();
  wedge.strength1 = strengths[pair.first].value();
  wedge.strength2 = strengths[pair.second].value();
  WedgeFollowUp follow;
  follow.set_a = static_cast<int>(pair.first) + 1;
  follow.set_b = static_cast<int>(pair.second) + 1;
  follow.strength_a = strengths[pair.first].value();
  follow.strength_b = strengths[pair.second].value();
  follow.line = intersection(a, b).value();
  follow.dry = analyse_wedge(wedge);
  wedge.water = WaterFill{job.site.water.fill};
  wedge.water_unit_weight_kN_m3 = job.site.water.unit_weight_kN_m3;
  wedge.seismic = job.site.seismic;
  follow.as_written = analyse_wedge(wedge);
  return follow;
}

void follow_up(Job& job, FaceJob& face, const Strengths& strengths) {
  const Flagged flagged = flag(job, face.face);
  face.no_sizes = missing_for_sizes(job, face.face, flagged, strengths);
  if (!face.no_sizes.empty()) {
    job.warnings.push_back(
        fmt::format("{}: factors of safety are left out: {}", face.face.name, face.no_sizes));
    return;
  }
  const auto warn = [&](const std::string& sets, const std::vector<std::string>& warnings) {
    for (const std::string& warning : warnings) {
      job.warnings.push_back(fmt::format("{}, {}: {}", face.face.name, sets, warning));
    }
  };
  const auto& sets = job.sets.sets;
  for (const std::size_t set : flagged.planes) {
    face.planes.push_back(follow_plane(job, face.face, set, *strengths[set]));
    warn(sets[set].name, face.planes.back().as_written.warnings);
  }
  for (const auto& pair : flagged.wedges) {
    face.wedges.push_back(follow_wedge(job, face.face, pair, strengths));
    warn(sets[pair.first].name + " with " + sets[pair.second].name,
         face.wedges.back().as_written.warnings);
  }
}

}  // namespace

Job run_job(Site site, Readings readings, const JobOptions& options) {
  const std::optional<Angle> friction = kinematic_friction(site);
  if (!friction) {
    throw site_error(site, "strength.friction_deg", "is missing",
                     "friction_deg in [strength] or in [kinematics]");
  }
  Job job{std::move(site), options, *friction, std::move(readings), {}, {}, {}};
  NamedSets named =
      sets_of_site(job.site, job.readings, {std::nullopt, options.seed, options.threads});
  job.sets = std::move(named.sets);
  const Strengths strengths = strengths_of(job.site, named.known);
  job.warnings = job.readings.warnings;
  job.warnings.insert(job.warnings.end(), job.sets.warnings.begin(), job.sets.warnings.end());
  for (const SiteFace& site_face : job.site.faces) {
    FaceJob face;
    face.face = site_face;
    face.kinematics = test_face(job, site_face, job.warnings);
    follow_up(job, face, strengths);
    job.faces.push_back(std::move(face));
  }
  return job;
}

}  // namespace brink
