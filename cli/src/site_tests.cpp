#include "site_tests.hpp"

#include <algorithm>

#include "brink/base/error.hpp"
#include "brink/record/set_names.hpp"

namespace brink::cli {

namespace {

Error missing(const std::string& option, const std::string& accepted) {
  return Error(ErrorKind::argument, Place{.file = {}, .key = option}, "is missing", {}, accepted);
}

// Adds the face to the last test with this ground above, or to a new one.
void add_face(std::vector<KinematicsOptions>& tests, const KinematicsOptions& pattern,
              const SiteFace& face, bool upper_typed) {
  const Plane upper = upper_typed ? pattern.upper : face.upper;
  if (tests.empty() || tests.back().upper != upper) {
    tests.push_back(pattern);
    tests.back().upper = upper;
  }
  tests.back().faces.push_back(face.face);
}

}  // namespace

void note_typed(std::vector<Option>& options, Typed& typed) {
  for (Option& option : options) {
    option.take = [&typed, name = option.name, take = option.take](std::string_view text) {
      typed.insert(name);
      take(text);
    };
  }
}

std::vector<KinematicsOptions> tests_with_site(const KinematicsOptions& from_options,
                                               const Typed& typed,
                                               const std::optional<Site>& site) {
  if (!site) return {from_options};
  KinematicsOptions pattern = from_options;
  if (!typed.contains("--friction")) {
    pattern.friction = kinematic_friction(*site).value_or(pattern.friction);
  }
  if (!typed.contains("--strike-tolerance")) {
    pattern.strike_tolerance = site->kinematics.strike_tolerance;
  }
  if (!typed.contains("--toppling-tolerance")) {
    pattern.toppling_tolerance = site->kinematics.toppling_tolerance;
  }
  if (!pattern.faces.empty()) return {pattern};
  std::vector<KinematicsOptions> tests;
  for (const SiteFace& face : site->faces) {
    add_face(tests, pattern, face, typed.contains("--upper"));
  }
  return tests;
}

void require_face_and_friction(const std::vector<KinematicsOptions>& tests, const Typed& typed,
                               const std::optional<Site>& site) {
  if (tests.empty() || tests.front().faces.empty()) throw missing("--face", "--face DIP/DIR");
  if (typed.contains("--friction") || (site && kinematic_friction(*site))) return;
  throw missing("--friction", site ? "--friction DEG, or friction_deg in [strength] or "
                                     "[kinematics] of the site file"
                                   : "--friction DEG");
}

KinematicsResult run_tests(const Readings& readings, const SetsResult& sets,
                           const std::vector<KinematicsOptions>& tests) {
  KinematicsResult all;
  for (const KinematicsOptions& options : tests) {
    KinematicsResult one = test_kinematics(readings, sets.assignment, sets.sets.size(), options);
    if (&options == &tests.front()) {
      all = std::move(one);
      continue;
    }
    auto& faces = all.options.faces;
    faces.insert(faces.end(), options.faces.begin(), options.faces.end());
    for (FaceKinematics& face : one.faces) all.faces.push_back(std::move(face));
    for (std::string& warning : one.warnings) {
      if (std::find(all.warnings.begin(), all.warnings.end(), warning) != all.warnings.end()) {
        continue;
      }
      all.warnings.push_back(std::move(warning));
    }
  }
  return all;
}

SetsResult sets_with_site(const Readings& readings, const std::string& set_column,
                          const FindSetsOptions& options, const std::optional<Site>& site) {
  if (!set_column.empty()) return sets_by_column(readings, set_column, options);
  if (!site) return find_sets(readings, options);
  Site own = *site;
  if (options.count) {  // typed: it wins over the file's
    own.sets.count = options.count;
    own.sets.column.reset();
  }
  return sets_of_site(own, readings, options).sets;
}

}  // namespace brink::cli
