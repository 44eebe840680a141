// Quantile of the standard normal distribution, branch-free.
#pragma once

#include <cmath>

#include "base/fast_math.hpp"

namespace brink {

// Algorithm AS 241, PPND16 (Wichura 1988, Applied Statistics 37:477), relative error about 1e-15
// for 1e-300 < p < 1 - 1e-16. All three of its ranges are computed and one is chosen, so that loops
// vectorise.
[[gnu::always_inline]] inline double normal_quantile(double p) {
  const double q = p - 0.5;
  const double r = 0.180625 - q * q;
  double top = 2.5090809287301226727e+3;
  top = top * r + 3.3430575583588128105e+4;
  top = top * r + 6.7265770927008700853e+4;
  top = top * r + 4.5921953931549871457e+4;
  top = top * r + 1.3731693765509461125e+4;
  top = top * r + 1.9715909503065514427e+3;
  top = top * r + 1.3314166789178437745e+2;
  top = top * r + 3.3871328727963666080e+0;
  double bottom = 5.2264952788528545610e+3;
  bottom = bottom * r + 2.8729085735721942674e+4;
  bottom = bottom * r + 3.9307895800092710610e+4;
  bottom = bottom * r + 2.1213794301586595867e+4;
  bottom = bottom * r + 5.3941960214247511077e+3;
  bottom = bottom * r + 6.8718700749205790830e+2;
  bottom = bottom * r + 4.2313330701600911252e+1;
  bottom = bottom * r + 1.0;
  const double central = q * top / bottom;

  const double tail = q < 0.0 ? p : 1.0 - p;
  const double t = std::sqrt(-fast_log(tail));
  const double m = t - 1.6;
  top = 7.74545014278341407640e-4;
  top = top * m + 2.27238449892691845833e-2;
  top = top * m + 2.41780725177450611770e-1;
  top = top * m + 1.27045825245236838258e+0;
  top = top * m + 3.64784832476320460504e+0;
  top = top * m + 5.76949722146069140550e+0;
  top = top * m + 4.63033784615654529590e+0;
  top = top * m + 1.42343711074968357734e+0;
  bottom = 1.05075007164441684324e-9;
  bottom = bottom * m + 5.47593808499534494600e-4;
  bottom = bottom * m + 1.51986665636164571966e-2;
  bottom = bottom * m + 1.48103976427480074590e-1;
  bottom = bottom * m + 6.89767334985100004550e-1;
  bottom = bottom * m + 1.67638483018380384940e+0;
  bottom = bottom * m + 2.05319162663775882187e+0;
  bottom = bottom * m + 1.0;
  const double middle = top / bottom;

  const double f = t - 5.0;
  top = 2.01033439929228813265e-7;
  top = top * f + 2.71155556874348757815e-5;
  top = top * f + 1.24266094738807843860e-3;
  top = top * f + 2.65321895265761230930e-2;
  top = top * f + 2.96560571828504891230e-1;
  top = top * f + 1.78482653991729133580e+0;
  top = top * f + 5.46378491116411436990e+0;
  top = top * f + 6.65790464350110377720e+0;
  bottom = 2.04426310338993978564e-15;
  bottom = bottom * f + 1.42151175831644588870e-7;
  bottom = bottom * f + 1.84631831751005468180e-5;
  bottom = bottom * f + 7.86869131145613259100e-4;
  bottom = bottom * f + 1.48753612908506148525e-2;
  bottom = bottom * f + 1.36929880922735805310e-1;
  bottom = bottom * f + 5.99832206555887937690e-1;
  bottom = bottom * f + 1.0;
  const double far = top / bottom;

  const double outer = t <= 5.0 ? middle : far;
  const double signed_outer = q < 0.0 ? -outer : outer;
  const double size = q < 0.0 ? -q : q;
  return size <= 0.425 ? central : signed_outer;
}

}  // namespace brink
