#include "job_text.hpp"

#include <fmt/format.h>

#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/record/cautions.hpp"
#include "brink/record/kinematics_document.hpp"
#include "input.hpp"
#include "kinematics_text.hpp"
#include "sets_text.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

// "65/120"; for a line trend first: "120/35".
std::string dip_and_direction(Angle dip, Angle direction) {
  return fmt::format("{}/{:0>3}", fixed(dip.deg(), 0),
                     fixed(wrap_360(Angle::degrees(std::round(direction.deg()))).deg(), 0));
}

std::string line_text(const Line& line) {
  return fmt::format("{:0>3}/{:0>2}",
                     fixed(wrap_360(Angle::degrees(std::round(line.trend.deg()))).deg(), 0),
                     fixed(line.plunge.deg(), 0));
}

std::string heading(const FaceJob& face, Angle friction) {
  const SiteFace& f = face.face;
  std::string text = fmt::format("{}: face {}/{:0>3}", printable(f.name),
                                 shortest(f.face.dip.deg()), shortest(f.face.dip_direction.deg()));
  if (f.height_m) text += fmt::format(", {} m high", shortest(*f.height_m));
  text += f.upper == kLevelGround
              ? ", level ground above"
              : ", ground above " + dip_and_direction(f.upper.dip, f.upper.dip_direction);
  return text + fmt::format(", tested with friction {} degrees\n", shortest(friction.deg()));
}

std::string factor(bool forms, double value) {
  if (!forms) return "-";
  return std::isinf(value) ? "infinite" : fixed(value, 2);
}

std::string verdict(const Job& job, bool forms, double value) {
  const auto met = forms ? meets_target(job.site, value) : std::nullopt;
  return met ? (*met ? "meets it" : "BELOW IT") : "";
}

void add_plane(TextTable& table, const Job& job, const PlaneFollowUp& follow) {
  const SetStatistics& set = job.sets.sets.at(static_cast<std::size_t>(follow.set) - 1);
  const PlaneSlide& slide = follow.as_written;
  table.add_row(
      {set.name, "plane " + dip_and_direction(set.mean.dip, set.mean.dip_direction),
       slide.forms ? fixed(slide.weight_kN_m, 0) + " kN/m" : "",
       slide.forms ? (slide.mode == PlaneSlideMode::lifts ? "lifts" : "slides") : slide.reason,
       factor(follow.dry.forms, follow.dry.factor_of_safety),
       factor(slide.forms, slide.factor_of_safety),
       verdict(job, slide.forms, slide.factor_of_safety)});
}

std::string wedge_mode(const Job& job, const WedgeFollowUp& follow) {
  switch (follow.as_written.contact.mode) {
    case WedgeMode::both:
      return "on both";
    case WedgeMode::plane1:
      return "on " + set_name(job.sets, follow.set_a);
    case WedgeMode::plane2:
      return "on " + set_name(job.sets, follow.set_b);
    case WedgeMode::lifts:
      return "lifts";
  }
  return {};
}

void add_wedge(TextTable& table, const Job& job, const WedgeFollowUp& follow) {
  const WedgeResult& wedge = follow.as_written;
  table.add_row({set_name(job.sets, follow.set_a) + " + " + set_name(job.sets, follow.set_b),
                 "line " + line_text(follow.line),
                 wedge.forms ? fixed(wedge.weight_kN, 0) + " kN" : "",
                 wedge.forms ? wedge_mode(job, follow) : wedge.reason,
                 factor(follow.dry.forms, follow.dry.factor_of_safety),
                 factor(wedge.forms, wedge.factor_of_safety),
                 verdict(job, wedge.forms, wedge.factor_of_safety)});
}

std::string follow_ups(const Job& job, const FaceJob& face) {
  if (!face.no_sizes.empty()) {
    return paragraph(
        "Sets are free to slide, but no factor of safety can be given: " + face.no_sizes + ".");
  }
  if (face.planes.empty() && face.wedges.empty()) {
    return paragraph("No mean plane of a set is free to slide, and no line of two sets daylights.");
  }
  const auto& target = job.site.target_factor_of_safety;
  TextTable table({{"sets", Align::left},
                   {"slides along", Align::left},
                   {"weight"},
                   {"how", Align::left},
                   {"dry"},
                   {"as the site file says"},
                   {target ? "target " + shortest(*target) : "", Align::left}});
  for (const PlaneFollowUp& follow : face.planes) add_plane(table, job, follow);
  for (const WedgeFollowUp& follow : face.wedges) add_wedge(table, job, follow);
  return "Factors of safety of the mean planes:\n" + table.text();
}

std::string loads_text(const Site& site) {
  std::string text = fmt::format("The site file says: water fill {}", shortest(site.water.fill));
  if (site.seismic.horizontal != 0.0 || site.seismic.vertical != 0.0) {
    text += fmt::format(", shaking {} of the weight horizontally and {} upward",
                        shortest(site.seismic.horizontal), shortest(site.seismic.vertical));
  }
  return paragraph(
      text +
      ". A plane is wet from its toe to that share of its height; over a wedge's planes that share "
      "of the full pressure acts.");
}

}  // namespace

std::string job_text(const Job& job) {
  std::string text = printable(job.site.title) + "\n" + usage_text(job.readings) + "\n\n" +
                     sets_text(job.sets, job.readings);
  const bool weighted = weights_differ(job.readings.weights);
  for (const FaceJob& face : job.faces) {
    text += "\n" + heading(face, job.friction) + "\n" +
            mode_table(face.counts(), job.sets, weighted) + "\n" + follow_ups(job, face);
  }
  text += "\n" + loads_text(job.site) + "\n";
  return text + paragraph(kinematic_caution()) + paragraph(rigid_block_caution()) +
         paragraph(practice_caution());
}

}  // namespace brink::cli
