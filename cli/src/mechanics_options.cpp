#include "mechanics_options.hpp"

#include <fmt/format.h>

#include <utility>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"

namespace brink::cli {

namespace {

const Interval kFriction{0.0, 90.0, false, true, "degrees"};

Error option_error(std::string option, std::string_view what, std::string_view accepted) {
  return Error(ErrorKind::argument, Place{.key = std::move(option)}, what, {}, accepted);
}

// An option with whether it was given.
struct Given {
  const char* name;
  bool given;
};

void need(const std::vector<Given>& options, const char* law) {
  for (const Given& option : options) {
    if (!option.given)
      throw option_error(option.name, fmt::format("is missing for {} strength", law), option.name);
  }
}

void exclude(const std::vector<Given>& options, const char* law) {
  for (const Given& option : options) {
    if (option.given)
      throw option_error(option.name, fmt::format("does not belong to {} strength", law),
                         "the options of one law");
  }
}

BartonBandis barton_bandis(const StrengthOptions& s) {
  constexpr auto law = "Barton-Bandis";
  exclude({{"--friction", s.friction_deg.has_value()},
           {"--cohesion", s.cohesion_kPa.has_value()},
           {"--roughness", s.roughness_deg.has_value()},
           {"--transition", s.transition_kPa.has_value()}},
          law);
  need({{"--residual-friction", s.residual_friction_deg.has_value()},
        {"--jrc", s.jrc.has_value()},
        {"--jcs", s.jcs_kPa.has_value()}},
       law);
  const BartonBandis sample{Angle::degrees(*s.residual_friction_deg), *s.jrc, *s.jcs_kPa};
  if (!s.joint_length_m) {
    if (s.sample_length_m)
      throw option_error("--sample-length", "is given without --joint-length", "both or neither");
    return sample;
  }
  constexpr double kProfile_m = 0.1;
  return scaled_to_length(sample, *s.joint_length_m, s.sample_length_m.value_or(kProfile_m));
}

BilinearPatton bilinear(const StrengthOptions& s) {
  constexpr auto law = "bilinear";
  exclude({{"--cohesion", s.cohesion_kPa.has_value()}}, law);
  need({{"--friction", s.friction_deg.has_value()},
        {"--roughness", s.roughness_deg.has_value()},
        {"--transition", s.transition_kPa.has_value()}},
       law);
  return {Angle::degrees(*s.friction_deg), Angle::degrees(*s.roughness_deg), *s.transition_kPa};
}

BoltAction parse_action(std::string_view text) {
  if (text == "active") return BoltAction::active;
  if (text == "passive") return BoltAction::passive;
  throw Error(ErrorKind::argument, Place{.key = "--bolt-action"}, "is not a bolt action", text,
              "active or passive");
}

}  // namespace

Option one_face_option(Face& target, const std::string& group) {
  return required(face_option(
      "--face",
      "Cut face: dip above 0 and below 180 degrees (past 90 it overhangs) and dip direction.",
      target, group));
}

Option force_option(std::string name, std::string form, std::string help,
                    std::vector<DirectedForce>& target, const std::string& group) {
  Option option;
  option.name = name;
  option.value = form;
  option.help = std::move(help);
  option.group = group;
  option.repeatable = true;
  option.take = [name, form, &target](std::string_view text) {
    const ForceAlong force = parse_force(name, text, form);
    target.push_back({force.magnitude, force.direction});
  };
  return option;
}

Option bolt_action_option(BoltAction& target, const std::string& group) {
  Option option;
  option.name = "--bolt-action";
  option.value = "active|passive";
  option.help =
      "Active bolts are tensioned and act on the block; passive ones add to the resistance as the "
      "block moves.";
  option.default_text = "active";
  option.group = group;
  option.take = [&target](std::string_view text) { target = parse_action(text); };
  return option;
}

void add_strength_options(std::vector<Option>& options, StrengthOptions& s,
                          const std::string& group) {
  const auto add = [&](std::string name, std::string value, std::string help, Interval accepted,
                       std::optional<double>& target) {
    options.push_back(number_option(std::move(name), std::move(value), std::move(help),
                                    std::move(accepted), target, group));
  };
  add("--friction", "DEG", "Friction angle, 0 to below 90 degrees.", kFriction, s.friction_deg);
  add("--cohesion", "KPA", "Cohesion.", at_least_value(0.0, "kPa"), s.cohesion_kPa);
  options.back().default_text = "0";
  add("--roughness", "DEG",
      "Bilinear strength (Patton): angle of the teeth, added to the friction up to --transition.",
      kFriction, s.roughness_deg);
  add("--transition", "KPA",
      "Bilinear strength: effective normal stress at which the teeth shear off.",
      at_least_value(0.0, "kPa"), s.transition_kPa);
  add("--residual-friction", "DEG", "Barton-Bandis strength: residual friction angle.",
      from_to(0.0, 70.0, "degrees"), s.residual_friction_deg);
  add("--jrc", "N", "Barton-Bandis strength: joint roughness coefficient.", from_to(0.0, 20.0),
      s.jrc);
  add("--jcs", "KPA",
      "Barton-Bandis strength: compressive strength of the joint wall (1 MPa is 1000 kPa).",
      above(0.0, "kPa"), s.jcs_kPa);
  add("--joint-length", "M",
      "Length of the joint, to which JRC and JCS of a sample are scaled (Barton & Bandis 1982).",
      above(0.0, "m"), s.joint_length_m);
  options.back().default_text = "no scaling";
  add("--sample-length", "M", "Length of that sample.", above(0.0, "m"), s.sample_length_m);
  options.back().default_text = "0.1";
}

Strength strength_of(const StrengthOptions& s) {
  if (s.residual_friction_deg || s.jrc || s.jcs_kPa || s.joint_length_m || s.sample_length_m)
    return barton_bandis(s);
  if (s.roughness_deg || s.transition_kPa) return bilinear(s);
  if (!s.friction_deg)
    throw option_error("--friction", "is missing",
                       "--friction DEG, or the options of another strength law");
  return MohrCoulomb{s.cohesion_kPa.value_or(0.0), Angle::degrees(*s.friction_deg)};
}

std::vector<std::string> strength_warnings(const StrengthOptions& given) {
  constexpr double kSoftest_kPa = 1000.0;  // the weakest rock of the usual classes, 1 MPa
  if (!given.jcs_kPa || *given.jcs_kPa >= kSoftest_kPa) return {};
  return {fmt::format(
      "--jcs: a joint wall of {} kPa is weaker than the weakest rock; 1 MPa is 1000 kPa",
      shortest(*given.jcs_kPa))};
}

}  // namespace brink::cli
