#include "brink/readings/checks.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <optional>
#include <unordered_map>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"
#include "brink/base/random.hpp"
#include "brink/base/ties.hpp"
#include "check_support.hpp"
#include "lines_in_words.hpp"

namespace brink {

namespace {

// Chance of a false alarm that the checks of whole files allow.
constexpr double kRare = 0.001;

// Chance of `count` or more events where `expected` are expected and they are independent.
double poisson_tail(std::size_t count, double expected) {
  double term = std::exp(-expected);
  double below = 0.0;
  for (std::size_t k = 0; k < count; ++k) {
    below += term;
    term *= expected / static_cast<double>(k + 1);
  }
  return std::max(0.0, 1.0 - below);
}

std::uint64_t hash_text(std::uint64_t hash, std::string_view text) {
  for (const char c : text) hash = mix_bits(hash ^ static_cast<unsigned char>(c));
  return mix_bits(hash ^ 0xFFU);
}

// A number that two readings share only if plane and cells are the same (or by a chance of 2^-64 a
// pair). The columns of `without` don't count.
std::vector<std::uint64_t> signatures(const Readings& readings, const ExtraColumn* without) {
  std::vector<std::uint64_t> marks(readings.size());
  for (std::size_t i = 0; i < readings.size(); ++i) {
    std::uint64_t hash = hash_text(1, shortest(readings.planes[i].dip.deg()));
    hash = hash_text(hash, shortest(readings.planes[i].dip_direction.deg()));
    for (const ExtraColumn& column : readings.extra) {
      if (&column != without) hash = hash_text(hash, column.cells[i]);
    }
    marks[i] = hash;
  }
  return marks;
}

// Number of pairs of readings with the same signature. Summed in the order of the readings: a hash
// map's own order is nobody's contract.
double equal_pairs(const std::vector<std::uint64_t>& marks) {
  std::unordered_map<std::uint64_t, double> counts;
  for (const std::uint64_t mark : marks) counts[mark] += 1.0;
  double pairs = 0.0;
  for (const std::uint64_t mark : marks) pairs += counts[mark] - 1.0;
  return pairs / 2.0;
}

double all_pairs(std::size_t count) {
  const auto n = static_cast<double>(count);
  return n * (n - 1.0) / 2.0;
}

std::string cell_of(const Readings& readings, std::string_view heading, std::size_t i) {
  const ExtraColumn* column = readings.find_column(heading);
  return column == nullptr ? std::string{} : std::string(column->cells[i]);
}

// An id names one reading of a traverse; a second row with it is a repetition or a slip.
std::vector<std::string> repeated_ids(const Readings& readings, const ExtraColumn& ids) {
  std::vector<std::string> warnings;
  std::map<std::string, std::vector<std::size_t>> rows;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (is_missing(ids.cells[i])) continue;
    rows[fmt::format("{}\n{}\n{}\n{}", readings.places[i].file, cell_of(readings, "traverse", i),
                     cell_of(readings, "set", i), ids.cells[i])]
        .push_back(i);
  }
  std::vector<std::size_t> repeated;
  for (const auto& [key, indices] : rows) {
    if (indices.size() > 1) repeated.insert(repeated.end(), indices.begin(), indices.end());
  }
  if (repeated.empty()) return {};
  std::sort(repeated.begin(), repeated.end());
  return {fmt::format("{}: the same {} stands on several rows", lines_in_words(readings, repeated),
                      printable(ids.heading))};
}

// Rows equal in every column, the position included. Pairs at one position may be equal by chance,
// where positions are coarse and joints alike: the number found must be beyond what the share of
// equal pairs at different positions makes likely.
std::vector<std::string> repeated_positions(const Readings& readings,
                                            const ExtraColumn& positions) {
  const std::vector<std::uint64_t> rest = signatures(readings, &positions);
  std::map<std::string, std::vector<std::size_t>> places;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    if (is_missing(positions.cells[i])) continue;
    places[fmt::format("{}\n{}", cell_of(readings, "traverse", i), positions.cells[i])].push_back(
        i);
  }
  double pairs_here = 0.0;
  double equal_here = 0.0;
  std::vector<std::size_t> repeated;
  for (const auto& [place, indices] : places) {
    pairs_here += all_pairs(indices.size());
    for (std::size_t b = 1; b < indices.size(); ++b) {
      const auto again =
          std::count_if(indices.begin(), indices.begin() + static_cast<std::ptrdiff_t>(b),
                        [&](std::size_t a) { return rest[a] == rest[indices[b]]; });
      equal_here += static_cast<double>(again);
      if (again > 0) repeated.push_back(indices[b]);
    }
  }
  if (repeated.empty()) return {};
  const double pairs_elsewhere = all_pairs(readings.size()) - pairs_here;
  const double chance =
      pairs_elsewhere > 0.0 ? (equal_pairs(rest) - equal_here) / pairs_elsewhere : 0.0;
  if (poisson_tail(repeated.size(), pairs_here * chance) >= kRare) return {};
  std::sort(repeated.begin(), repeated.end());
  return {fmt::format("{}: {} equal in every column to a row before, position included",
                      lines_in_words(readings, repeated),
                      repeated.size() == 1 ? "the row is" : "the rows are")};
}

struct Block {
  std::size_t first;  // where it stood first
  std::size_t again;  // where it stands again
  std::size_t length;
};

// Blocks of at least `least` readings that repeat, without overlap, an earlier block.
std::vector<Block> repeated_blocks(const std::vector<std::uint64_t>& marks, std::size_t least) {
  std::vector<Block> blocks;
  std::unordered_map<std::uint64_t, std::size_t> first_at;
  std::size_t covered = 0;  // readings before this already belong to a repetition
  for (std::size_t i = 0; i + least <= marks.size(); ++i) {
    std::uint64_t hash = 1;
    for (std::size_t k = 0; k < least; ++k) hash = mix_bits(hash ^ marks[i + k]) + k;
    const auto [at, is_new] = first_at.emplace(hash, i);
    if (is_new || i < covered || i < at->second + least) continue;
    std::size_t length = least;
    while (i + length < marks.size() && at->second + length < i &&
           marks[i + length] == marks[at->second + length]) {
      ++length;
    }
    blocks.push_back({at->second, i, length});
    covered = i + length;
  }
  return blocks;
}

// Without ids and positions single equal rows mean nothing: whole degrees repeat. A run of L rows
// that equals another is expected N^2/2 p^L times, p being the chance that two readings are equal;
// L is the least for which that is rare. Readings of one set in a row raise p little, as p is taken
// from the readings themselves.
std::vector<std::string> repeated_rows(const Readings& readings) {
  const std::vector<std::uint64_t> marks = signatures(readings, nullptr);
  if (marks.size() < 2) return {};
  const double runs = all_pairs(marks.size());
  const double p = equal_pairs(marks) / runs;
  if (p >= 0.5) return {};
  const double length = p <= 0.0 ? 2.0 : std::ceil(std::log(runs / kRare) / -std::log(p));
  const auto least = static_cast<std::size_t>(std::max(2.0, length));
  std::vector<std::string> warnings;
  constexpr std::size_t kMostNamed = 10;
  for (const Block& block : repeated_blocks(marks, least)) {
    if (warnings.size() == kMostNamed) break;
    const ReadingPlace& from = readings.places[block.again];
    const ReadingPlace& to = readings.places[block.again + block.length - 1];
    const ReadingPlace& source = readings.places[block.first];
    warnings.push_back(
        fmt::format("{}: lines {} to {}: these {} readings repeat those from {}, line {} on",
                    readings.files[from.file].name, from.line, to.line, block.length,
                    readings.files[source.file].name, source.line));
  }
  return warnings;
}

bool is_whole(double value) {
  return value == std::floor(value);
}

// One in five whole numbers ends in 0 or 5. The count of n honest values is binomial; the normal
// approximation holds from 50 values on, and 3.7 standard deviations are passed by one file in ten
// thousand. Steep sets would have to be read within two degrees of a multiple of five to look
// heaped. A significant but small excess, below one value in ten rounded, is not worth a line.
std::optional<std::string> heaping_of(const std::vector<double>& values, std::string_view what) {
  constexpr double kExpected = 0.2;
  constexpr double kDeviations = 3.7;
  constexpr std::size_t kFewest = 50;
  constexpr double kWorthALine = 0.1;
  if (values.size() < kFewest) return std::nullopt;
  const auto n = static_cast<double>(values.size());
  const auto share_of = [&](double step) {
    return static_cast<double>(std::count_if(values.begin(), values.end(),
                                             [&](double v) { return std::fmod(v, step) == 0.0; })) /
           n;
  };
  const double fives = share_of(5.0);
  const double rounded = (fives - kExpected) / (1.0 - kExpected);
  const double deviations = (fives - kExpected) * std::sqrt(n / (kExpected * (1.0 - kExpected)));
  if (deviations < kDeviations || rounded < kWorthALine) return std::nullopt;
  return fmt::format(
      "{} heaped: {:.0f} % of {} values are multiples of 5 (20 % expected), {:.0f} % of 10 (10 % "
      "expected); about {:.0f} % of the values seem rounded",
      what, 100.0 * fives, values.size(), 100.0 * share_of(10.0), 100.0 * rounded);
}

std::optional<double> number_in(const ExtraColumn& column, std::size_t i) {
  return parse_decimal(column.cells[i]);
}

}  // namespace

std::vector<std::string> check_duplicates(const Readings& readings) {
  const ExtraColumn* ids = readings.find_column("id");
  const ExtraColumn* positions = readings.find_column("position");
  if (ids != nullptr) return repeated_ids(readings, *ids);
  if (positions != nullptr) return repeated_positions(readings, *positions);
  return repeated_rows(readings);
}

std::vector<std::string> check_heaping(const Readings& readings) {
  std::vector<double> dips;
  std::vector<double> directions;
  for (const Plane& plane : readings.planes) {
    const double dip = plane.dip.deg();
    const double direction = plane.dip_direction.deg();
    // Level and vertical planes are real, not rounded.
    if (is_whole(dip) && dip > 0.0 && dip < 90.0) dips.push_back(dip);
    if (is_whole(direction) && dip > 0.0) directions.push_back(direction);
  }
  std::vector<std::string> warnings;
  if (readings.size() == 0) return warnings;
  const ReadingPlace& first = readings.places.front();
  const ReadingPlace& last = readings.places.back();
  const std::string& file = readings.files[first.file].name;
  const std::string lines = first.file == last.file
                                ? fmt::format("{}: lines {} to {}", file, first.line, last.line)
                                : fmt::format("{} to {}", file, readings.files[last.file].name);
  for (const auto& text :
       {heaping_of(dips, "dips are"), heaping_of(directions, "directions are")}) {
    if (text) warnings.push_back(fmt::format("{}: {}", lines, *text));
  }
  return warnings;
}

// If a set's n readings fell on traverses as all N readings do, all would lie on the one with Q
// readings by a chance of Q/N (Q-1)/(N-1) ... (n factors, the hypergeometric law). The chance
// allowed is shared among the sets.
std::vector<std::string> check_single_traverse_sets(const Readings& readings) {
  const ExtraColumn* sets = readings.find_column("set");
  const ExtraColumn* traverses = readings.find_column("traverse");
  if (sets == nullptr || traverses == nullptr) return {};
  const auto by_traverse = readings_by(readings, *traverses);
  auto by_set = readings_by(readings, *sets);
  by_set.erase("0");
  if (by_traverse.size() < 2) return {};
  double all = 0.0;
  for (const auto& [name, members] : by_traverse) all += static_cast<double>(members.size());
  std::vector<std::string> warnings;
  for (const auto& [set, members] : by_set) {
    const std::string_view traverse = traverses->cells[members.front()];
    const bool alone = std::all_of(members.begin(), members.end(),
                                   [&](std::size_t i) { return traverses->cells[i] == traverse; });
    if (!alone || is_missing(traverse)) continue;
    const auto there = static_cast<double>(by_traverse.at(std::string(traverse)).size());
    double chance = 1.0;
    for (std::size_t i = 0; i < members.size(); ++i) {
      const auto taken = static_cast<double>(i);
      chance *= (there - taken) / (all - taken);
    }
    if (chance * static_cast<double>(by_set.size()) >= kRare) continue;
    warnings.push_back(
        fmt::format("{}: set {} is met by traverse {} alone ({} readings; the traverse has {:.0f} "
                    "% of all): it "
                    "is local, or the others run along it",
                    lines_in_words(readings, members), printable(set), printable(traverse),
                    members.size(), 100.0 * there / all));
  }
  return warnings;
}

// Not a matter of chance but of the correction for direction: below 15 degrees it is capped
// (Terzaghi 1965), so that such readings count for less than they stand for.
std::vector<std::string> check_blind_zones(const Readings& readings) {
  const ExtraColumn* trends = readings.find_column("traverse_trend");
  const ExtraColumn* plunges = readings.find_column("traverse_plunge");
  if (trends == nullptr || plunges == nullptr) return {};
  const double limit = sin(Angle::degrees(15.0));
  std::map<std::string, std::vector<std::size_t>> blind;
  for (std::size_t i = 0; i < readings.size(); ++i) {
    const auto trend = number_in(*trends, i);
    const auto plunge = number_in(*plunges, i);
    if (!trend || !plunge) continue;
    const Vector3 along = direction({Angle::degrees(*trend), Angle::degrees(*plunge)});
    if (!strictly_below(std::abs(along.dot(readings.normals[i])), limit)) continue;
    blind[cell_of(readings, "traverse", i)].push_back(i);
  }
  std::vector<std::string> warnings;
  for (const auto& [traverse, members] : blind) {
    warnings.push_back(fmt::format(
        "{}: within 15 degrees of the line of their traverse{}, which meets few of "
        "such planes: there are more than it shows",
        lines_in_words(readings, members), traverse.empty() ? "" : " " + printable(traverse)));
  }
  return warnings;
}

std::vector<std::string> check_readings(const Readings& readings) {
  std::vector<std::string> warnings;
  const auto add = [&](std::vector<std::string> found) {
    warnings.insert(warnings.end(), found.begin(), found.end());
  };
  if (readings.size() <= kMostByHand) {
    add(check_duplicates(readings));
    add(check_swapped(readings));
    add(check_reversed(readings));
  }
  add(check_heaping(readings));
  add(check_single_traverse_sets(readings));
  add(check_blind_zones(readings));
  return warnings;
}

}  // namespace brink
