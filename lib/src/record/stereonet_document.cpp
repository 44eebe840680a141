#include "brink/record/stereonet_document.hpp"

#include "brink/record/kinematics_document.hpp"

namespace brink {

namespace {

Value degrees_value(const std::optional<Angle>& angle) {
  return angle ? Value(angle->deg()) : Value();
}

Value sets_value(const SetsResult& sets) {
  Array all;
  for (const SetStatistics& set : sets.sets) {
    Object entry;
    entry.add("name", set.name);
    entry.add("count", std::uint64_t{set.count});
    entry.add("mean", plane_value(set.mean));
    entry.add("confidence_cone_deg", degrees_value(set.confidence_cone));
    entry.add("variability_cone_deg", degrees_value(set.variability_cone));
    all.emplace_back(std::move(entry));
  }
  return all;
}

Value density_value(const DensityGrid& density, const std::vector<double>& levels) {
  Object entry;
  entry.add("kernel_concentration", density.concentration);
  entry.add("peak", density.peak);
  entry.add("peak_pole", line_value(density.peak_line));
  Array list;
  for (const double level : levels) list.emplace_back(level);
  entry.add("levels", std::move(list));
  return entry;
}

}  // namespace

std::string name_of(Projection projection) {
  return projection == Projection::equal_angle ? "equal-angle" : "equal-area";
}

Value stereonet_result(const StereonetRecord& record) {
  Object result;
  result.add("file", record.file);
  result.add("pages", std::uint64_t{record.pages});
  result.add("width_mm", record.width_mm);
  result.add("height_mm", record.height_mm);
  result.add("readings", std::uint64_t{record.readings.size()});
  result.add("unassigned", std::uint64_t{record.sets.unassigned});
  result.add("sets", sets_value(record.sets));
  result.add("density",
             record.density != nullptr ? density_value(*record.density, record.levels) : Value());
  result.add("kinematics", record.kinematics != nullptr
                               ? kinematics_result(*record.kinematics, record.sets)
                               : Value());
  return result;
}

}  // namespace brink
