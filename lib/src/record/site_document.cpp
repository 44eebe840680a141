#include "brink/record/site_document.hpp"

namespace brink {

namespace {

Value degrees(const std::optional<Angle>& angle) {
  return angle ? Value(angle->deg()) : Value();
}

Value whole(const std::optional<std::size_t>& number) {
  return number ? Value(std::uint64_t{*number}) : Value();
}

Value readings_value(const SiteReadings& readings) {
  const ReadingOptions& options = readings.options;
  Array only;
  for (const Filter& filter : options.only) only.emplace_back(filter.text);
  return Object{
      {"file", readings.file},
      {"notation", options.notation ? Value(name_of(*options.notation)) : Value()},
      {"strike_rule", options.strike_rule ? Value(name_of(*options.strike_rule)) : Value()},
      {"declination_deg", options.declination.deg()},
      {"only", std::move(only)}};
}

Value sets_value(const SiteSets& sets) {
  Array known;
  for (const SiteSet& set : sets.known) {
    known.emplace_back(Object{{"name", set.name},
                              {"near", set.near ? plane_value(*set.near) : Value()},
                              {"strength", mohr_coulomb_value(set.strength)}});
  }
  return Object{
      {"count", whole(sets.count)}, {"column", Value(sets.column)}, {"known", std::move(known)}};
}

Value faces_value(const Site& site) {
  Array faces;
  for (const SiteFace& face : site.faces) {
    faces.emplace_back(Object{{"name", face.name},
                              {"face", face_value(face.face)},
                              {"height_m", Value(face.height_m)},
                              {"upper", plane_value(face.upper)}});
  }
  return faces;
}

}  // namespace

Value mohr_coulomb_value(const std::optional<MohrCoulomb>& strength) {
  if (!strength) return nullptr;
  return Object{{"friction_deg", strength->friction.deg()},
                {"cohesion_kPa", strength->cohesion_kPa}};
}

Value site_value(const Site& site) {
  Array readings;
  for (const SiteReadings& one : site.readings) readings.push_back(readings_value(one));
  Object object{{"file", site.source.name},
                {"sha256", site.source.sha256},
                {"title", site.title},
                {"readings", std::move(readings)},
                {"sets", sets_value(site.sets)},
                {"faces", faces_value(site)},
                {"strength", mohr_coulomb_value(site.strength)},
                {"unit_weight_kN_m3", Value(site.unit_weight_kN_m3)}};
  object.add("water", Object{{"fill", site.water.fill},
                             {"unit_weight_kN_m3", site.water.unit_weight_kN_m3}});
  object.add("seismic", Object{{"horizontal", site.seismic.horizontal},
                               {"vertical", site.seismic.vertical},
                               {"trend_deg", degrees(site.seismic.trend)}});
  object.add("kinematics",
             Object{{"friction_deg", degrees(kinematic_friction(site))},
                    {"strike_tolerance_deg", site.kinematics.strike_tolerance.deg()},
                    {"toppling_tolerance_deg", site.kinematics.toppling_tolerance.deg()}});
  object.add("target", Object{{"factor_of_safety", Value(site.target_factor_of_safety)}});
  return object;
}

}  // namespace brink
