// Discontinuity sets: found in the readings or given, and described.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "brink/readings/readings.hpp"
#include "brink/sets/mixture.hpp"
#include "brink/sphere/fisher.hpp"
#include "brink/sphere/goodness.hpp"

namespace brink {

// Cone about the mean that holds a share of a Fisher distribution of the set's kappa.
struct ContainmentCone {
  double share = 0.0;
  Angle half_angle;
};

// Woodcock 1977: shape above 1 a cluster, below 1 a girdle.
enum class Pattern { cluster, girdle };

inline constexpr double kFitFails = 0.05;

// Statistics of one set; estimators and sources in sphere/fisher.hpp and sphere/tensor.hpp. A value
// that the data cannot give (one reading has no kappa) is absent. The readings of the set are
// counted whole, whatever their probability of belonging to it.
struct SetStatistics {
  std::string name;               // "J1", or as the user's column names it
  std::size_t count = 0;          // readings
  double weight = 0.0;            // sum of their weights
  double effective_number = 0.0;  // N of the formulas: (sum w)^2 / sum w^2
  Plane mean;
  double resultant_length = 0.0;             // R, not R/N; scaled to the effective number
  std::optional<double> fisher_k;            // (N-1)/(N-R); infinite for identical readings
  std::optional<double> unbiased_k;          // (N-2)/(N-R)
  std::optional<KappaInterval> k_interval;   // 95 %
  std::optional<Angle> confidence_cone;      // 95 % cone on the mean
  std::optional<Angle> variability_cone;     // holds 68.27 % of a Fisher distribution of fisher_k
  std::vector<ContainmentCone> containment;  // for the shares asked for
  std::array<double, 3> eigenvalues{};       // of the orientation tensor, descending
  std::array<Plane, 3> principal_planes{};   // whose normals are its eigenvectors, in that order
  std::optional<double> woodcock_shape;      // infinite where S2 = S3
  std::optional<double> woodcock_strength;   // infinite where S3 = 0
  std::optional<FisherFit> fisher_fit;       // the verdict of the three tests of goodness.hpp
  std::optional<FisherFitTests> fit_tests;   // all three
  // Where the fit fails (p below kFitFails): what the scatter looks like instead, and a cone for
  // the mean that assumes no distribution (sphere/bootstrap.hpp, 95 %).
  std::optional<Pattern> pattern;
  std::optional<Angle> bootstrap_cone;
  std::optional<Shape> shape;       // of the component, where the set was found
  std::optional<double> stability;  // share of resamples in which it came back (stability.hpp)
};

// Least value of the criterion with this number of sets.
struct CountTried {
  std::size_t count = 0;
  double bic = 0.0;
};

// Do two sets share their mean (Watson & Williams 1956, goodness.hpp)? Equal kappas assumed.
struct MeanComparison {
  std::size_t a = 0;  // index into SetsResult::sets; a < b
  std::size_t b = 0;
  Angle between;  // the two means, as axes
  TestResult test;
};

// Sets by weight, heaviest first, then by first appearance.
struct SetsResult {
  std::vector<SetStatistics> sets;
  std::vector<int> assignment;  // one a reading: 0 none, k the k-th set
  std::size_t unassigned = 0;
  std::optional<double> log_likelihood;  // over the whole sphere; absent where membership was given
  std::optional<double> bic;
  std::vector<CountTried> tried;            // by count; one entry where the count was fixed
  std::optional<CountTried> runner_up;      // next best count, where the count was chosen
  bool undecided = false;                   // the runner-up is less than kDecided behind
  std::optional<Mixture> mixture;           // components in the order of `sets`
  std::optional<TestResult> uniformity;     // Bingham's test on all readings
  std::vector<MeanComparison> comparisons;  // every pair that can be compared
  std::vector<std::string> warnings;
};

// A difference in the criterion below 2 is not worth a bare mention (Kass & Raftery 1995, J. Am.
// Stat. Assoc. 90).
inline constexpr double kDecided = 2.0;

// Where a set is known to lie. With `within`, the set is the readings inside that angle; without,
// it is found from there.
struct Centre {
  Plane plane;
  std::optional<Angle> within;  // above 0, at most 90 degrees
};

struct FindSetsOptions {
  std::optional<std::size_t> count;  // fixed number of sets; chosen by the criterion where absent
  std::uint64_t seed = 1;
  unsigned threads = 0;
  std::vector<double> containment_shares = {};  // each above 0 and below 1
  std::vector<Centre> centres = {};             // all with `within` or none; then `count` is theirs
  double least_share = 0.0;    // of the readings that a set has to hold, 0 up to below 1
  std::size_t least_size = 0;  // number of readings that a set has to hold
  std::size_t resamples = 0;   // for SetStatistics::stability; 0: not asked for
};

// Finds the sets by the mixture of sets/mixture.hpp; the number and shape of components by the
// least BIC. Without a fixed count a component has to hold one reading more than it has parameters
// (5 round, 7 elliptical), and least_size and least_share. A reading belongs to the likeliest
// component, or to none where the uniform part is likelier. Axial throughout: a set that straddles
// the rim of the net is one set. At least one reading is needed; no set at all is a result. Names
// are J1, J2, ... by weight. The p value of fisher_fit is that of samples drawn from the mixture
// with round components and divided by the same rule, because a set cut out of a mixture is no
// longer a whole sample. With centres, EM starts there and nowhere else; with centres that say how
// far they reach, every reading belongs to the nearest centre that reaches it, and no test of fit
// is made, for a set cut out by a cone can't pass it. Throws ErrorKind::argument for centres with
// and without `within` mixed, and for a share or size out of its range.
SetsResult find_sets(const Readings& readings, const FindSetsOptions& options);

// Describes the sets that an extra column names; empty cells and "0" are no set. Throws
// ErrorKind::argument where there is no such column.
SetsResult sets_by_column(const Readings& readings, std::string_view heading,
                          const FindSetsOptions& options = {});

// Describes the sets of a given membership: assignment[i] is 0 for none or the number of one of
// `names`. The result is ordered by weight, then by first appearance; names that nothing carries
// are left out. Of the options only containment_shares, seed and threads count.
SetsResult sets_by_membership(const Readings& readings, std::span<const int> assignment,
                              std::span<const std::string> names,
                              const FindSetsOptions& options = {});

// One set out of those named, under a new name; of a single set: renames it.
struct SetMerge {
  std::string name;
  std::vector<std::string> of;
};

// The result with sets merged and renamed; the others stay. A merged set is described anew and has
// no component, shape or stability. Order as ever: by weight. Throws ErrorKind::argument for a name
// that no set has, a set used twice, and a new name that another set has.
SetsResult merge_sets(const Readings& readings, const SetsResult& result,
                      std::span<const SetMerge> merges, const FindSetsOptions& options = {});

// Statistics of one set of axes, without the test of fit. At least one axis.
SetStatistics describe_set(std::string name, std::span<const Vector3> axes,
                           std::span<const double> weights,
                           std::span<const double> containment_shares = {});

}  // namespace brink
