// What a command takes from the site file of --site where the command line does not say it.
#pragma once

#include <optional>
#include <set>
#include <string>
#include <vector>

#include "brink/kinematics/kinematics.hpp"
#include "brink/record/site.hpp"
#include "brink/sets/sets.hpp"
#include "command_line.hpp"

namespace brink::cli {

// Names of the options that were typed.
using Typed = std::set<std::string>;

// Makes every option of the list note its name in `typed`, which must outlive the options.
void note_typed(std::vector<Option>& options, Typed& typed);

// The tests to run: those of the command line, and what was not typed from the site: faces with
// their ground above, friction, tolerances. One entry for each different ground, faces in order.
std::vector<KinematicsOptions> tests_with_site(const KinematicsOptions& from_options,
                                               const Typed& typed, const std::optional<Site>& site);

// Error(argument) where no face or no friction angle was given, on the command line or in the site.
void require_face_and_friction(const std::vector<KinematicsOptions>& tests, const Typed& typed,
                               const std::optional<Site>& site);

// All tests as one result, faces in the order of `tests`; its options are those of the first with
// every face.
KinematicsResult run_tests(const Readings& readings, const SetsResult& sets,
                           const std::vector<KinematicsOptions>& tests);

// The sets as a column of --set-column names them, or those of the site, or found.
SetsResult sets_with_site(const Readings& readings, const std::string& set_column,
                          const FindSetsOptions& options, const std::optional<Site>& site);

}  // namespace brink::cli
