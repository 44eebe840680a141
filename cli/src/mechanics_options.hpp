// Options that the equilibrium commands share: strength of a joint, bolts and loads.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/mechanics/loads.hpp"
#include "brink/mechanics/strength.hpp"
#include "options.hpp"

namespace brink::cli {

// --face DIP/DIR of a command that takes one face.
Option one_face_option(Face& target, const std::string& group);

// FORCE@TREND/PLUNGE, repeatable; `form` as the help shows it ("KN_M@TREND/PLUNGE").
Option force_option(std::string name, std::string form, std::string help,
                    std::vector<DirectedForce>& target, const std::string& group);
// --bolt-action active|passive.
Option bolt_action_option(BoltAction& target, const std::string& group);

// The law of a joint's strength, told by the options given: --friction with --cohesion
// (Mohr-Coulomb), --friction with --roughness and --transition (bilinear), or --residual-friction
// with --jrc and --jcs and, for a joint longer than the sample, --joint-length and --sample-length
// (Barton-Bandis).
struct StrengthOptions {
  std::optional<double> friction_deg, cohesion_kPa;
  std::optional<double> roughness_deg, transition_kPa;
  std::optional<double> residual_friction_deg, jrc, jcs_kPa, joint_length_m, sample_length_m;
};
void add_strength_options(std::vector<Option>& options, StrengthOptions& target,
                          const std::string& group);
// Throws ErrorKind::argument where options of two laws are mixed or one of a law's is missing.
Strength strength_of(const StrengthOptions& given);
// What looks like a slip of units.
std::vector<std::string> strength_warnings(const StrengthOptions& given);

}  // namespace brink::cli
