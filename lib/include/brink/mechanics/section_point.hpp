// A point of a vertical section through a slope.
#pragma once

namespace brink {

// x runs horizontally into the slope, z up; the origin is the toe.
struct SectionPoint {
  double x_m = 0.0;
  double z_m = 0.0;
};

}  // namespace brink
