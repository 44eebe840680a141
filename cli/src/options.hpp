// The grammars of option values, and the options that commands share.
//
// Builders bind an option to the variable it fills, by reference: keep that variable in the state
// that the command's `run` holds.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/base/interval.hpp"
#include "brink/kinematics/kinematics.hpp"
#include "brink/orientation/face.hpp"
#include "command_line.hpp"

namespace brink::cli {

// Value parsers. Each throws Error(ErrorKind::argument) naming `option`, the text and what would be
// accepted. Blanks around numbers are ignored; nan, inf and hexadecimal are refused.
double parse_number(const std::string& option, std::string_view text, const Interval& accepted);
Angle parse_angle(const std::string& option, std::string_view text, const Interval& accepted);
std::uint64_t parse_whole(const std::string& option, std::string_view text, std::uint64_t low,
                          std::uint64_t high);
// DIP/DIR: dip 0..90, direction 0..360 (360 becomes 0; a horizontal plane's direction becomes 0).
Plane parse_plane(const std::string& option, std::string_view text);
// DIP/DIR: dip above 0 and below 180.
Face parse_face(const std::string& option, std::string_view text);
// TREND/PLUNGE: plunge -90..90, positive down; a vertical line's trend becomes 0.
Line parse_line(const std::string& option, std::string_view text);

struct ForceAlong {
  double magnitude = 0.0;  // kN, or kN per metre of face, as the option says; 0 or more
  Line direction;
};
// KN@TREND/PLUNGE; `form` as the help shows it ("KN@TREND/PLUNGE", "KN_M@TREND/PLUNGE").
ForceAlong parse_force(const std::string& option, std::string_view text, const std::string& form);

// Builders of single options.
Option flag_option(std::string name, std::string help, bool& target, std::string group = {});
Option text_option(std::string name, std::string value, std::string help, std::string& target,
                   std::string group = {});
Option number_option(std::string name, std::string value, std::string help, Interval accepted,
                     double& target, std::string group = {});
Option number_option(std::string name, std::string value, std::string help, Interval accepted,
                     std::optional<double>& target, std::string group = {});
Option angle_option(std::string name, std::string help, Interval accepted, Angle& target,
                    std::string group = {});
Option plane_option(std::string name, std::string help, Plane& target, std::string group = {});
Option face_option(std::string name, std::string help, Face& target, std::string group = {});
// The same option, marked as one that has to be given, or with its default as the help shows it.
Option required(Option option);
Option with_default(Option option, std::string text);

// What every command has.
struct OutputOptions {
  bool json = false;
  bool quiet = false;
  std::string output;  // -o, empty where not given
};
void add_output_options(std::vector<Option>& options, OutputOptions& target);
// -o PATH; `value` as the help shows it ("OUT.csv"), `help` with the endings that are known.
Option output_option(std::string value, std::string help, OutputOptions& target);

Option seed_option(std::uint64_t& target);
Option threads_option(unsigned& target);

// --face (repeatable; required), --upper, --friction (required), --strike-tolerance,
// --toppling-tolerance. `required` false leaves face and friction to a site file.
void add_kinematic_options(std::vector<Option>& options, KinematicsOptions& target,
                           bool required = true);

// "warning: TEXT" lines on standard error, unless quiet.
void print_warnings(const std::vector<std::string>& warnings, const OutputOptions& output,
                    Streams& streams);

}  // namespace brink::cli
