#include "brink/risk/distribution.hpp"

#include <gtest/gtest.h>

#include <boost/math/distributions/lognormal.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/triangular.hpp>
#include <cmath>

#include "brink/base/error.hpp"

namespace brink {
namespace {

Distribution of(const char* text) {
  return parse_distribution("--friction", text);
}

TEST(Distribution, NormalEqualsBoost) {
  const boost::math::normal reference(30, 3);
  const Distribution d = of("normal(30, 3)");
  for (int i = -300; i <= 0; ++i) {
    const double p = std::pow(10.0, i * 0.05);  // 1e-15 .. 1
    if (p >= 0.999) continue;
    EXPECT_NEAR(quantile(d, p), boost::math::quantile(reference, p), 1e-12 * 30) << p;
    if (p > 1e-12) {
      EXPECT_NEAR(quantile(d, 1 - p),
                  boost::math::quantile(boost::math::complement(reference, 1 - (1 - p))),
                  1e-12 * 60)
          << p;
    }
  }
  EXPECT_NEAR(cumulative(d, 33), boost::math::cdf(reference, 33), 1e-15);
}

TEST(Distribution, LognormalByItsOwnMean) {
  const double spread = std::log(1 + 0.16), location = std::log(20.0) - spread / 2;
  const boost::math::lognormal reference(location, std::sqrt(spread));
  EXPECT_NEAR(boost::math::mean(reference), 20, 1e-9);
  EXPECT_NEAR(boost::math::standard_deviation(reference), 8, 1e-9);
  const Distribution d = of("lognormal(20, 8)");
  for (const double p : {1e-6, 0.01, 0.3, 0.5, 0.9, 0.999}) {
    EXPECT_NEAR(quantile(d, p) / boost::math::quantile(reference, p), 1, 1e-12);
  }
}

TEST(Distribution, TriangularAndUniform) {
  const boost::math::triangular reference(20, 30, 35);
  const Distribution d = of("triangular(20,30,35)");
  for (const double p : {0.001, 0.2, 0.5, 2.0 / 3, 0.9, 0.999}) {
    EXPECT_NEAR(quantile(d, p), boost::math::quantile(reference, p), 1e-12);
    EXPECT_NEAR(cumulative(d, quantile(d, p)), p, 1e-12);
  }
  EXPECT_NEAR(quantile(of("uniform(0, 40)"), 0.25), 10, 1e-12);
  EXPECT_EQ(quantile(of("25"), 0.7), 25);
}

TEST(Distribution, LimitsCutAndRescale) {
  const Distribution d = of("normal(30, 3)[27..36]");
  const boost::math::normal whole(30, 3);
  const double below = boost::math::cdf(whole, 27), within = boost::math::cdf(whole, 36) - below;
  for (const double p : {1e-9, 0.1, 0.5, 0.99, 1 - 1e-9}) {
    EXPECT_NEAR(quantile(d, p), boost::math::quantile(whole, below + p * within), 1e-11);
    EXPECT_GE(quantile(d, p), 27);
    EXPECT_LE(quantile(d, p), 36);
  }
  EXPECT_EQ(cumulative(d, 26), 0);
  EXPECT_EQ(cumulative(d, 37), 1);
  EXPECT_GE(quantile(of("normal(5, 3)[0..]"), 1e-12), 0);
}

TEST(Distribution, RoundTripAndRefusals) {
  for (const char* text : {"30", "normal(30, 3)", "lognormal(20, 8)[..60]",
                           "triangular(20, 30, 35)", "uniform(0, 40)", "normal(30, 3)[20..40]"}) {
    EXPECT_EQ(to_string(of(text)), text);
    EXPECT_EQ(of(to_string(of(text)).c_str()), of(text));
  }
  for (const char* text :
       {"", "normal", "normal(30)", "normal(30,0)", "normal(30,nan)", "weibull(1,2)",
        "uniform(4,4)", "triangular(3,2,5)", "lognormal(-1,2)", "normal(30,3)[40..20]",
        "normal(30,3)[20]", "normal(30,3) extra", "uniform(0,1)[2..3]", "normal(30,3"}) {
    EXPECT_THROW(of(text), Error) << text;
  }
}

TEST(Distribution, WithinItsRange) {
  EXPECT_NO_THROW(require_within(of("normal(30, 3)"), "--friction", 0, 90, true));
  EXPECT_NO_THROW(require_within(of("normal(10, 5)[0..]"), "--cohesion", 0, 1e300, true));
  EXPECT_THROW(require_within(of("90"), "--friction", 0, 90, true), Error);
  try {
    require_within(of("normal(10, 5)"), "--cohesion", 0, std::numeric_limits<double>::infinity(),
                   true);
    FAIL();
  } catch (const Error& error) {
    EXPECT_STREQ(
        error.what(),
        "--cohesion: 'normal(10, 5)' draws values that are too small; accepted: 0 or more, "
        "by limits behind the distribution, as in [0..]");
  }
}

}  // namespace
}  // namespace brink
