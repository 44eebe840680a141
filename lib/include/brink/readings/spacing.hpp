// Spacing of joints: how far apart the members of a set lie, measured square to them, and what
// follows from it. Also persistence and aperture, where columns hold them.
#pragma once

#include <cstddef>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/readings/bias.hpp"
#include "brink/readings/readings.hpp"

namespace brink {

// Descriptive classes of ISRM 1978, "Suggested methods for the quantitative description of
// discontinuities in rock masses", Int. J. Rock Mech. Min. Sci. 15:319 (aperture: from memory). A
// value equal to a limit is in the class above it.
std::string_view isrm_spacing_class(double spacing_m);  // "extremely close" .. "extremely wide"
std::string_view isrm_persistence_class(double persistence_m);  // "very low" .. "very high"
std::string_view isrm_aperture_class(double aperture_mm);       // "very tight" .. "wide"

// Lengths of one kind. `deviation` with n - 1; absent for a single value.
struct LengthSummary {
  std::size_t count = 0;
  double mean = 0.0;
  double median = 0.0;
  std::optional<double> deviation;
};
// Nothing for no values.
std::optional<LengthSummary> summarise_lengths(std::vector<double> values);

// Gaps between neighbours: positions in any order, in m. One fewer than the positions.
std::vector<double> gaps(std::vector<double> positions_m);

// RQD, in per cent, estimated from the number of joints a metre along a line when their gaps are
// negative exponential: 100 exp(-0.1 f) (1 + 0.1 f), 0.1 m being the least length of core that
// counts (Priest & Hudson 1976, Int. J. Rock Mech. Min. Sci. 13:135). 100 for none.
double rqd_estimate(double frequency_per_m);

// One set. The true spacing of neighbours on a traverse is their gap times the sine of the angle
// between the traverse and the set's mean plane; gaps of all traverses are taken together.
struct SetSpacing {
  std::optional<LengthSummary> spacing_m;  // absent where no traverse has two members
  std::optional<double> frequency_per_m;   // along the normal: 1 / mean; absent for a mean of 0
  std::string isrm_class;                  // of the mean; empty where there is no spacing
};

// All joints with a position on one scanline or borehole, whatever their set.
struct TraverseFrequency {
  std::string name;
  std::size_t count = 0;
  double span_m = 0.0;                    // from the first to the last
  std::optional<double> frequency_per_m;  // (count - 1) / span; absent for a span of 0
  std::optional<double> rqd_percent;
};

struct SpacingResult {
  std::vector<SetSpacing> sets;              // in the order of the sets given
  std::vector<TraverseFrequency> traverses;  // scanlines and boreholes in the order of the options
  std::vector<std::string> warnings;
};

// A set's mean plane.
struct SetPlane {
  std::string name;  // for warnings
  Vector3 normal;    // unit, either sense
};

// Spacing of each set from the column "position" (m, or the unit that its heading names) of the
// readings on scanlines and boreholes. `assignment` is one integer a reading, 0 for no set, k for
// sets[k - 1]. A set in a traverse's blind zone gets no
// gaps from it, with a warning; a cell that is no number is left out, with a warning. Empty sets
// and traverses where there is no such column or no such traverse.
SpacingResult measure_spacing(const Readings& readings, const std::vector<int>& assignment,
                              const std::vector<SetPlane>& sets, const BiasOptions& options);

// Persistence or aperture of one set.
struct MeasuredColumn {
  std::string heading;                   // of the column used
  std::optional<LengthSummary> summary;  // m for persistence, mm for aperture
  std::string isrm_class;                // of the mean
};

// One entry a set, from the column "persistence" or, where there is none, "trace_length" (what is
// seen of a joint's persistence in an exposure: ISRM 1978). Empty without either column.
std::vector<MeasuredColumn> measure_persistence(const Readings& readings,
                                                const std::vector<int>& assignment,
                                                std::size_t set_count);
// The same from the column "aperture", in mm unless its heading names another unit.
std::vector<MeasuredColumn> measure_aperture(const Readings& readings,
                                             const std::vector<int>& assignment,
                                             std::size_t set_count);

// All of these for the sets of one job.
struct JointLengths {
  SpacingResult spacing;
  std::vector<MeasuredColumn> persistence;
  std::vector<MeasuredColumn> aperture;
};
JointLengths measure_joints(const Readings& readings, const std::vector<int>& assignment,
                            const std::vector<SetPlane>& sets, const BiasOptions& options);

}  // namespace brink
