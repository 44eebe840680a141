#include "brink/readings/spacing.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <numeric>
#include <utility>

#include "brink/base/number.hpp"
#include "brink/base/ties.hpp"
#include "brink/orientation/notation.hpp"
#include "lines_in_words.hpp"

namespace brink {

namespace {

// Upper limit of a class, not itself in it, and its name; the last class has none.
template <std::size_t N>
struct ClassScale {
  std::array<double, N> limits;
  std::array<std::string_view, N + 1> names;

  std::string_view of(double value) const {
    std::size_t i = 0;
    while (i < N && at_least(value, limits[i])) ++i;
    return names[i];
  }
};

constexpr ClassScale<6> kSpacing{
    {0.02, 0.06, 0.2, 0.6, 2.0, 6.0},
    {"extremely close", "very close", "close", "moderate", "wide", "very wide", "extremely wide"}};
constexpr ClassScale<4> kPersistence{{1.0, 3.0, 10.0, 20.0},
                                     {"very low", "low", "medium", "high", "very high"}};
constexpr ClassScale<5> kAperture{
    {0.1, 0.25, 0.5, 2.5, 10.0},
    {"very tight", "tight", "partly open", "open", "moderately wide", "wide"}};

// Metres in the unit that ends a heading: "position_cm", "aperture (mm)"; `otherwise` without one.
double metres_per_unit(std::string_view heading, double otherwise) {
  std::string letters;
  for (const char c : heading) {
    if (std::isalpha(static_cast<unsigned char>(c))) {
      letters += static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
    } else if (c != ')' && c != ']') {
      letters += ' ';
    }
  }
  const std::string_view word = std::string_view(letters).substr(letters.rfind(' ') + 1);
  if (word == "mm") return 1e-3;
  if (word == "cm") return 1e-2;
  if (word == "m") return 1.0;
  return otherwise;
}

std::optional<double> number_in(std::string_view cell) {
  std::string text(cell);
  // A decimal comma; thousands are not separated in a log of lengths.
  if (std::count(text.begin(), text.end(), ',') == 1) {
    std::replace(text.begin(), text.end(), ',', '.');
  }
  return parse_decimal(text);
}

// The numbers of a column in metres, nothing where a cell is missing or is none.
struct NumberColumn {
  std::vector<std::optional<double>> metres;
  std::vector<std::size_t> unreadable;
};

NumberColumn read_numbers(const ExtraColumn& column, double unit_otherwise) {
  const double unit = metres_per_unit(column.heading, unit_otherwise);
  NumberColumn numbers;
  for (std::size_t i = 0; i < column.cells.size(); ++i) {
    const auto value = number_in(column.cells[i]);
    if (!value && !is_missing(column.cells[i])) numbers.unreadable.push_back(i);
    numbers.metres.push_back(value ? std::optional(*value * unit) : std::nullopt);
  }
  return numbers;
}

// Positions on one traverse: of the members of a set, or of all readings (no set).
std::vector<double> positions_on(std::size_t traverse, const TraverseOfReading& on,
                                 const NumberColumn& positions, const std::vector<int>& assignment,
                                 std::optional<int> set) {
  std::vector<double> found;
  for (std::size_t i = 0; i < on.size(); ++i) {
    if (on[i] != traverse || !positions.metres[i]) continue;
    if (!set || assignment[i] == *set) found.push_back(*positions.metres[i]);
  }
  return found;
}

TraverseFrequency frequency_on(const Traverse& traverse, const std::vector<double>& positions) {
  TraverseFrequency result;
  result.name = in_words(traverse);
  result.count = positions.size();
  if (positions.size() < 2) return result;
  const auto [first, last] = std::minmax_element(positions.begin(), positions.end());
  result.span_m = *last - *first;
  if (!(result.span_m > 0.0)) return result;
  result.frequency_per_m = static_cast<double>(positions.size() - 1) / result.span_m;
  result.rqd_percent = rqd_estimate(*result.frequency_per_m);
  return result;
}

bool is_line(const Traverse& traverse) {
  return traverse.kind != TraverseKind::window;
}

// Gaps along the traverse as distances square to the set, unless the traverse hardly sees the set.
void add_spacings(std::vector<double>& spacings, const std::vector<double>& along,
                  const Traverse& traverse, const SetPlane& set, Angle blind_angle,
                  std::vector<std::string>& warnings) {
  if (along.empty()) return;
  if (in_blind_zone(traverse, set.normal, blind_angle)) {
    warnings.push_back(fmt::format(
        "{} runs less than {} degrees from the mean plane of set {}; spacings of that set are not "
        "taken from it",
        in_words(traverse), shortest(blind_angle.deg()), set.name));
    return;
  }
  const double sine = meeting_sine(traverse, set.normal);
  for (const double gap : along) spacings.push_back(gap * sine);
}

SetSpacing describe(std::vector<double> spacings) {
  SetSpacing set;
  set.spacing_m = summarise_lengths(std::move(spacings));
  if (!set.spacing_m) return set;
  set.isrm_class = isrm_spacing_class(set.spacing_m->mean);
  if (set.spacing_m->mean > 0.0) set.frequency_per_m = 1.0 / set.spacing_m->mean;
  return set;
}

std::vector<MeasuredColumn> measure(const Readings& readings, const ExtraColumn& column,
                                    const std::vector<int>& assignment, std::size_t set_count,
                                    double unit_otherwise, double result_unit) {
  const NumberColumn numbers = read_numbers(column, unit_otherwise);
  std::vector<std::vector<double>> values(set_count);
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (assignment[i] > 0 && numbers.metres[i]) {
      values[static_cast<std::size_t>(assignment[i]) - 1].push_back(*numbers.metres[i] /
                                                                    result_unit);
    }
  }
  std::vector<MeasuredColumn> sets;
  for (auto& of_set : values) {
    sets.push_back({column.heading, summarise_lengths(std::move(of_set)), {}});
  }
  return sets;
}

}  // namespace

std::string_view isrm_spacing_class(double spacing_m) {
  return kSpacing.of(spacing_m);
}
std::string_view isrm_persistence_class(double persistence_m) {
  return kPersistence.of(persistence_m);
}
std::string_view isrm_aperture_class(double aperture_mm) {
  return kAperture.of(aperture_mm);
}

std::optional<LengthSummary> summarise_lengths(std::vector<double> values) {
  if (values.empty()) return std::nullopt;
  std::sort(values.begin(), values.end());
  const auto n = static_cast<double>(values.size());
  LengthSummary summary;
  summary.count = values.size();
  summary.mean = std::accumulate(values.begin(), values.end(), 0.0) / n;
  const std::size_t half = values.size() / 2;
  summary.median = values.size() % 2 == 1 ? values[half] : (values[half - 1] + values[half]) / 2.0;
  if (values.size() < 2) return summary;
  double squares = 0.0;
  for (const double value : values) {
    squares += (value - summary.mean) * (value - summary.mean);
  }
  summary.deviation = std::sqrt(squares / (n - 1.0));
  return summary;
}

std::vector<double> gaps(std::vector<double> positions_m) {
  std::sort(positions_m.begin(), positions_m.end());
  std::vector<double> found;
  for (std::size_t i = 1; i < positions_m.size(); ++i) {
    found.push_back(positions_m[i] - positions_m[i - 1]);
  }
  return found;
}

double rqd_estimate(double frequency_per_m) {
  constexpr double least_length_m = 0.1;
  const double expected = least_length_m * frequency_per_m;
  return 100.0 * std::exp(-expected) * (1.0 + expected);
}

SpacingResult measure_spacing(const Readings& readings, const std::vector<int>& assignment,
                              const std::vector<SetPlane>& sets, const BiasOptions& options) {
  SpacingResult result;
  const ExtraColumn* column = readings.find_column("position");
  const bool any_line = std::any_of(options.traverses.begin(), options.traverses.end(), is_line);
  if (column == nullptr || !any_line) return result;
  const NumberColumn positions = read_numbers(*column, 1.0);
  if (!positions.unreadable.empty()) {
    result.warnings.push_back(lines_in_words(readings, positions.unreadable) + ": " +
                              column->heading + " is no number, so not used for spacing");
  }
  const TraverseOfReading on = traverses_of(readings, options);
  std::vector<std::vector<double>> spacings(sets.size());
  for (std::size_t t = 0; t < options.traverses.size(); ++t) {
    if (!is_line(options.traverses[t])) continue;
    const auto all = positions_on(t, on, positions, assignment, std::nullopt);
    result.traverses.push_back(frequency_on(options.traverses[t], all));
    for (std::size_t s = 0; s < sets.size(); ++s) {
      const auto members = positions_on(t, on, positions, assignment, static_cast<int>(s + 1));
      add_spacings(spacings[s], gaps(members), options.traverses[t], sets[s], options.blind_angle,
                   result.warnings);
    }
  }
  for (auto& of_set : spacings) result.sets.push_back(describe(std::move(of_set)));
  return result;
}

std::vector<MeasuredColumn> measure_persistence(const Readings& readings,
                                                const std::vector<int>& assignment,
                                                std::size_t set_count) {
  const ExtraColumn* column = readings.find_column("persistence");
  if (column == nullptr) column = readings.find_column("trace_length");
  if (column == nullptr) return {};
  auto sets = measure(readings, *column, assignment, set_count, 1.0, 1.0);
  for (MeasuredColumn& set : sets) {
    if (set.summary) set.isrm_class = isrm_persistence_class(set.summary->mean);
  }
  return sets;
}

std::vector<MeasuredColumn> measure_aperture(const Readings& readings,
                                             const std::vector<int>& assignment,
                                             std::size_t set_count) {
  const ExtraColumn* column = readings.find_column("aperture");
  if (column == nullptr) return {};
  constexpr double millimetre = 1e-3;
  auto sets = measure(readings, *column, assignment, set_count, millimetre, millimetre);
  for (MeasuredColumn& set : sets) {
    if (set.summary) set.isrm_class = isrm_aperture_class(set.summary->mean);
  }
  return sets;
}

JointLengths measure_joints(const Readings& readings, const std::vector<int>& assignment,
                            const std::vector<SetPlane>& sets, const BiasOptions& options) {
  return {measure_spacing(readings, assignment, sets, options),
          measure_persistence(readings, assignment, sets.size()),
          measure_aperture(readings, assignment, sets.size())};
}

}  // namespace brink
