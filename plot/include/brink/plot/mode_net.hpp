// A small net for one mode on one face: the admissible region hatched, and what falls in it.
#pragma once

#include <cstddef>

#include "brink/kinematics/kinematics.hpp"
#include "brink/kinematics/regions.hpp"
#include "brink/plot/net_frame.hpp"
#include "brink/sets/sets.hpp"

namespace brink::plot {

struct ModeNetContent {
  const Readings& readings;
  const SetsResult& sets;
  const KinematicsOptions& options;
  const FaceKinematics& face;
  Mode mode = Mode::planar_sliding;
};

// More lines of intersection than this are thinned for drawing, never for counting; whoever draws
// the net says so.
inline constexpr std::size_t kMostLines = 4000;
bool lines_are_thinned(const Readings& readings);

// Title above, the net, and under it the count in words; `frame.centre` is the net's. Admissible
// poles or lines take the warm colour, the others grey.
Group draw_mode_net(const ModeNetContent& content, const NetFrame& frame);

// From the net's centre up to the title's top, and down to the last line's foot.
double mode_net_above_mm(const NetFrame& frame);
double mode_net_below_mm(const NetFrame& frame);

// Lines of intersection of pairs of readings, parallel pairs left out: all of them, or `most` of
// them evenly drawn by fixed random numbers, the same for the same readings.
std::vector<Vector3> lines_for_drawing(const Readings& readings, std::size_t most);

}  // namespace brink::plot
