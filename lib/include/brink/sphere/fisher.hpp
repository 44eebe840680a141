// The Fisher distribution on the sphere: mean, concentration, cones, and drawing from it.
//
// Density kappa / (4 pi sinh kappa) exp(kappa mu.x) over the whole sphere (Fisher 1953, Proc. R.
// Soc. A 217:295); for axes the same with cosh in place of exp. Further sources: Fisher, Lewis &
// Embleton 1987, Statistical Analysis of Spherical Data (FLE); Mardia & Jupp 2000, Directional
// Statistics. Vectors are unit vectors in any frame. Weights, where given, are above 0 and one a
// direction; without them every direction weighs 1.
#pragma once

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

#include "brink/orientation/orientation.hpp"

namespace brink {

// What a sample says about mean and concentration. With unequal weights both count and length are
// scaled to the effective number (sum w)^2 / sum w^2 (Kish 1965, Survey Sampling), so that the
// formulas below, written for equal weights, hold approximately.
struct Resultant {
  double count = 0.0;               // N, or the effective number
  double length = 0.0;              // R, between 0 and count
  Vector3 mean = Vector3::UnitZ();  // direction of the sum; straight up where R is 0
};

// Of directions with a sense (vectors). An empty sample gives count 0.
Resultant vector_resultant(std::span<const Vector3> directions,
                           std::span<const double> weights = {});

// Of axes: each is first turned into the hemisphere of the sample's principal axis (tensor.hpp);
// one square to it keeps its sense. Turning raises R: uniform axes read as kappa 1.8, and values
// below about 3 say little.
Resultant axial_resultant(std::span<const Vector3> axes, std::span<const double> weights = {});

// The axes turned as axial_resultant turns them.
std::vector<Vector3> turned_to_principal_axis(std::span<const Vector3> axes,
                                              std::span<const double> weights = {});

// A(kappa) = coth kappa - 1/kappa, the mean cosine to the mean direction; 0 at kappa 0.
double mean_cosine(double kappa);
// Inverse of A for 0 <= r <= 1; infinite at 1. Relative error below 1e-12.
double kappa_of_mean_cosine(double r);

// Estimators of kappa. Absent where the sample can't give one; infinite for identical directions.
// Fisher's own (N-1)/(N-R): its reciprocal is unbiased for 1/kappa. Needs N above 1.
std::optional<double> kappa_fisher(const Resultant& sample);
// (N-2)/(N-R): unbiased for large kappa (McFadden 1980, Geophys. J. R. astr. Soc. 60). Needs N > 2.
std::optional<double> kappa_unbiased(const Resultant& sample);
// Maximum likelihood, A(kappa) = R/N; too large by about N/(N-2). Needs N above 1.
std::optional<double> kappa_maximum_likelihood(const Resultant& sample);

// Ends of an interval of confidence.
struct KappaInterval {
  double low = 0.0;
  double high = 0.0;
};
// Interval for kappa from 2 kappa (N-R) ~ chi-square with 2(N-1) degrees of freedom (Watson 1956,
// Geophys. Suppl. Mon. Not. R. astr. Soc. 7; FLE 5.3.2). 0 < level < 1. Needs N above 1 and R < N.
std::optional<KappaInterval> kappa_interval(const Resultant& sample, double level = 0.95);

// Half angle of the cone about the sample mean that holds the true mean with confidence `level`
// (Fisher 1953): cos a = 1 - ((N-R)/R) (p^(-1/(N-1)) - 1), p = 1 - level. Absent for N at most 1,
// and where the right side is below -1 (the cone would be the whole sphere).
std::optional<Angle> confidence_cone(const Resultant& sample, double level = 0.95);

// Half angle of the cone about the mean that holds the share `share` (0..1) of the population,
// exact for every kappa >= 0: of vectors, 0..180 degrees; of axes, 0..90 degrees.
Angle containment_cone(double kappa, double share);
Angle containment_cone_axial(double kappa, double share);

// ln of the axial density at an axis with cosine `t` to the mean, over the whole sphere; kappa >=
// 0. `t` is read as |t|. Relative error about 1e-15 up to kappa 1e5.
double log_axial_density(double kappa, double t);

// The direction that the uniform numbers u, v in (0, 1) give: inverse of the distribution function,
// exact for all kappa > 0. cos theta = 1 + ln(u + (1-u) exp(-2 kappa))/kappa (Fisher, Lewis &
// Willcox 1981, Commun. Statist. B 10).
Vector3 draw_fisher(const Vector3& mean, double kappa, double u, double v);
// The same from the counter-based generator: draw `index` of `stream`.
Vector3 draw_fisher(const Vector3& mean, double kappa, std::uint64_t seed, std::uint64_t stream,
                    std::uint64_t index);
// Uniform on the sphere.
Vector3 draw_uniform(double u, double v);

// Two unit vectors that make a right-handed frame with `axis` as third: the first is horizontal
// and the second points up the vertical plane through the axis. For a vertical axis: east and the
// vector that completes the frame.
struct Tangents {
  Vector3 across;
  Vector3 along;
};
Tangents tangents(const Vector3& axis);

}  // namespace brink
