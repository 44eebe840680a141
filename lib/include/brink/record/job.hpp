// The whole job: from a site and its readings to sets, kinematic tests and the factors of safety
// that they call for.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "brink/kinematics/kinematics.hpp"
#include "brink/mechanics/plane_slide.hpp"
#include "brink/mechanics/wedge_equilibrium.hpp"
#include "brink/record/site.hpp"
#include "brink/sets/sets.hpp"

namespace brink {

struct JobOptions {
  std::uint64_t seed = 1;
  unsigned threads = 0;
};

// A set whose mean plane is free to slide on a face: its dip vector daylights and its dip direction
// is within the strike tolerance of the face's. Per metre of face.
struct PlaneFollowUp {
  int set = 0;  // from 1
  MohrCoulomb strength;
  PlaneSlide dry;         // under its own weight
  PlaneSlide as_written;  // with the water and the shaking of the site file
};

// A pair of sets whose mean planes' line of intersection daylights on a face.
struct WedgeFollowUp {
  int set_a = 0;  // from 1; set_a < set_b
  int set_b = 0;
  MohrCoulomb strength_a;
  MohrCoulomb strength_b;
  Line line;
  WedgeResult dry;
  WedgeResult as_written;
};

struct FaceJob {
  SiteFace face;
  KinematicsResult kinematics;        // of this face alone, with its own ground above
  std::vector<PlaneFollowUp> planes;  // by set
  std::vector<WedgeFollowUp> wedges;  // by pair of sets
  std::string no_sizes;  // why there are no factors of safety although something may slide; empty
                         // where there are, or where nothing is free to slide

  const FaceKinematics& counts() const { return kinematics.faces.front(); }
};

struct Job {
  Site site;
  JobOptions options;
  Angle friction;  // of the kinematic tests
  Readings readings;
  SetsResult sets;  // named as the site file names them
  std::vector<FaceJob> faces;
  std::vector<std::string> warnings;  // of readings, sets, tests and blocks, in that order
};

// Runs the job on readings already read. Throws ErrorKind::input where the site file gives no
// friction angle, or names a column of sets that the readings lack.
Job run_job(Site site, Readings readings, const JobOptions& options);

}  // namespace brink
