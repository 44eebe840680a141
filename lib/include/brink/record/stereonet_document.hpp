// What a stereonet shows, as a record.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/kinematics/kinematics.hpp"
#include "brink/record/document.hpp"
#include "brink/sets/sets.hpp"
#include "brink/sphere/density.hpp"
#include "brink/sphere/projection.hpp"

namespace brink {

// "equal-angle", "equal-area".
std::string name_of(Projection projection);

struct StereonetRecord {
  std::string file;  // as written
  std::size_t pages = 1;
  double width_mm = 0.0;  // of the first page
  double height_mm = 0.0;
  const Readings& readings;
  const SetsResult& sets;
  const DensityGrid* density = nullptr;
  std::vector<double> levels;
  const KinematicsResult* kinematics = nullptr;
};

// {file, pages, width_mm, height_mm, readings, unassigned, sets[] {name, count, mean,
// confidence_cone_deg, variability_cone_deg}, density {kernel_concentration, peak, peak_pole
// {trend_deg, plunge_deg}, levels[]} or null, kinematics as of that command or null}.
Value stereonet_result(const StereonetRecord& record);

}  // namespace brink
