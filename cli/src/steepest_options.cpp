#include "steepest_options.hpp"

#include <array>
#include <string>
#include <string_view>
#include <utility>

#include "brink/base/error.hpp"

namespace brink::cli {

namespace {

constexpr const char* kLimits = "Limits";
constexpr const char* kTarget = "Factor of safety";

struct LimitName {
  std::string_view name;
  Mode mode;
};
constexpr std::array kLimitNames = {
    LimitName{"planar", Mode::planar_sliding}, LimitName{"wedge", Mode::wedge_sliding},
    LimitName{"flexural", Mode::flexural_toppling}, LimitName{"block", Mode::block_toppling}};

void take_limit(std::string_view text, ModeShares& limits) {
  const std::size_t equals = text.find('=');
  for (const LimitName& known : kLimitNames) {
    if (equals == std::string_view::npos || text.substr(0, equals) != known.name) continue;
    limits[static_cast<std::size_t>(known.mode)] =
        parse_number("--limit", text.substr(equals + 1), from_to(0.0, 100.0, "percent")) / 100.0;
    return;
  }
  throw Error(ErrorKind::argument, Place{.file = {}, .key = "--limit"}, "is not MODE=PERCENT", text,
              "planar=, wedge=, flexural= or block= with 0 to 100 percent");
}

Option limit_option(SteepestChoice& target) {
  Option option;
  option.name = "--limit";
  option.value = "MODE=PCT";
  option.help =
      "Greatest share of one mode, in percent: planar, wedge, flexural or block. A share equal to "
      "it "
      "is within it.";
  option.take = [&target](std::string_view text) { take_limit(text, target.search.limits); };
  option.default_text = "5 each";
  option.repeatable = true;
  option.group = kLimits;
  return option;
}

void add_target_options(std::vector<Option>& options, SteepestChoice& target) {
  options.push_back(number_option("--target", "FS",
                                  "Least factor of safety of the wedges between the means of every "
                                  "two sets; needs --height and "
                                  "--unit-weight.",
                                  above(0.0), target.target, kTarget));
  options.push_back(number_option("--height", "M", "Height of the face for --target, in m.",
                                  above(0.0, "m"), target.height, kTarget));
  options.push_back(number_option("--unit-weight", "KN_M3", "Of the rock, in kN/m3.",
                                  above(0.0, "kN/m3"), target.unit_weight, kTarget));
  options.push_back(
      with_default(number_option("--cohesion", "KPA", "Of the joints, in kPa.",
                                 at_least_value(0.0, "kPa"), target.cohesion, kTarget),
                   "0"));
  options.push_back(with_default(
      number_option("--water-fill", "F", "Water in the joints, from 0 (dry) to 1 (full).",
                    from_to(0.0, 1.0), target.water_fill, kTarget),
      "0"));
}

double needed(const std::optional<double>& value, const char* option) {
  if (value) return *value;
  throw Error(ErrorKind::argument, Place{.file = {}, .key = option}, "is missing", {},
              "a value, for --target");
}

}  // namespace

void add_test_options(std::vector<Option>& options, KinematicsOptions& target, Typed& typed) {
  std::vector<Option> shared;
  add_kinematic_options(shared, target, false);
  std::erase_if(shared, [](const Option& option) { return option.name == "--face"; });
  note_typed(shared, typed);
  options.insert(options.end(), shared.begin(), shared.end());
}

ModeSettings test_settings(const KinematicsOptions& tests, const Typed& typed,
                           const std::optional<Site>& site) {
  KinematicsOptions pattern = tests;
  pattern.faces = {Face{}};  // so that the site's own faces don't count
  const KinematicsOptions merged = tests_with_site(pattern, typed, site).front();
  require_face_and_friction({merged}, typed, site);
  return {merged.upper, merged.friction, merged.strike_tolerance, merged.toppling_tolerance};
}

void add_steepest_options(std::vector<Option>& options, SteepestChoice& target,
                          bool every_azimuth) {
  add_test_options(options, target.tests, target.typed);
  options.push_back(limit_option(target));
  options.push_back(flag_option("--weighted",
                                "Shares of the readings' weight in place of their number.",
                                target.search.weighted, kLimits));
  if (every_azimuth) {
    options.push_back(
        with_default(angle_option("--every", "Step between azimuths, from 0.",
                                  from_to(0.1, 180.0, "degrees"), target.search.every),
                     "5"));
  }
  options.push_back(
      with_default(angle_option("--resolution", "Step between face dips.",
                                from_to(0.1, 45.0, "degrees"), target.search.resolution),
                   "1"));
  options.push_back(with_default(
      angle_option("--greatest-dip", "Steepest face looked at; past 90 it overhangs.",
                   Interval{0.1, 180.0, false, true, "degrees"}, target.search.greatest_dip),
      "90"));
  options.push_back(number_option(
      "--confident", "P",
      "Adds the dip that keeps within the limits in at least this part of resampled readings.",
      from_to(0.5, 0.99), target.search.confident));
  add_target_options(options, target);
  options.push_back(seed_option(target.tests.seed));
  options.push_back(threads_option(target.tests.threads));
}

SteepestOptions steepest_options(const SteepestChoice& choice, const std::optional<Site>& site) {
  SteepestOptions options = choice.search;
  options.settings = test_settings(choice.tests, choice.typed, site);
  options.seed = choice.tests.seed;
  options.threads = choice.tests.threads;
  if (!choice.target) return options;
  SafetyTarget target;
  target.factor_of_safety = *choice.target;
  target.wedge.geometry.size = {WedgeMeasure::height, needed(choice.height, "--height")};
  target.wedge.unit_weight_kN_m3 = needed(choice.unit_weight, "--unit-weight");
  const MohrCoulomb strength{choice.cohesion.value_or(0.0), options.settings.friction};
  target.wedge.strength1 = target.wedge.strength2 = strength;
  target.wedge.water = WaterFill{choice.water_fill.value_or(0.0)};
  options.safety = target;
  return options;
}

}  // namespace brink::cli
