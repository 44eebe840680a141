// Volume and face areas of a half-space intersection by the library Qhull (Barber, Dobkin &
// Huhdanpaa 1996), for comparison with brink's own. By its C interface: the headers of its C++
// interface do not compile as C++20.
#pragma once

extern "C" {
#include <libqhull_r/qhull_ra.h>
}

#include <Eigen/Geometry>
#include <cmath>
#include <functional>
#include <stdexcept>
#include <string>
#include <vector>

#include "brink/mechanics/half_spaces.hpp"

namespace brink::reference {

struct QhullSolid {
  double volume = 0.0;
  std::vector<double> areas;  // one a half-space
};

// Runs Qhull on rows of `dimension` numbers and hands over every facet; returns the volume.
inline double run_qhull(std::vector<double> rows, int dimension, std::string options,
                        const std::function<void(qhT*, facetT*)>& visit) {
  qhT state;
  qh_zero(&state, stderr);
  const int status = qh_new_qhull(&state, dimension, static_cast<int>(rows.size()) / dimension,
                                  rows.data(), False, options.data(), nullptr, stderr);
  if (status != 0) throw std::runtime_error("Qhull failed");
  qh_getarea(&state, state.facet_list);
  for (facetT* facet = state.facet_list; facet != nullptr && facet->next != nullptr;
       facet = facet->next) {
    visit(&state, facet);
  }
  const double volume = state.totvol;
  qh_freeqhull(&state, qh_ALL);
  return volume;
}

// Corners, three numbers each: facets of the dual hull about a point inside.
inline std::vector<double> qhull_corners(const std::vector<HalfSpace>& spaces,
                                         const Vector3& inside) {
  std::vector<double> rows;
  for (const HalfSpace& h : spaces) {
    for (int k = 0; k < 3; ++k) rows.push_back(h.outward[k]);
    rows.push_back(h.outward.dot(inside) - h.offset_m);
  }
  std::vector<double> corners;
  run_qhull(rows, 4, "qhull H0,0,0 Qt", [&](qhT*, facetT* facet) {
    for (int k = 0; k < 3; ++k) corners.push_back(inside[k] - facet->normal[k] / facet->offset);
  });
  return corners;
}

// The hull of the corners; each of its facets goes to the half-space in whose plane it lies.
inline QhullSolid qhull_solid(const std::vector<HalfSpace>& spaces, const Vector3& inside) {
  QhullSolid solid{0.0, std::vector<double>(spaces.size(), 0.0)};
  solid.volume =
      run_qhull(qhull_corners(spaces, inside), 3, "qhull Qt", [&](qhT* state, facetT* facet) {
        const Vector3 outward(facet->normal[0], facet->normal[1], facet->normal[2]);
        const Vector3 centre = Eigen::Map<const Vector3>(qh_getcenter(state, facet->vertices));
        std::size_t best = 0;
        double nearest = 1e300;
        for (std::size_t i = 0; i < spaces.size(); ++i) {
          const double miss = std::abs(spaces[i].outward.dot(centre) - spaces[i].offset_m) +
                              (outward - spaces[i].outward).norm();
          if (miss < nearest) {
            nearest = miss;
            best = i;
          }
        }
        solid.areas[best] += facet->f.area;
      });
  return solid;
}

}  // namespace brink::reference
