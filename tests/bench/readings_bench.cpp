// W5: 10^6 rows "dip,dip_direction,kind" with one decimal (17 MB) from bytes to readings, beside
// what a programmer writes first. The twin makes columns only; read_readings() also makes normals,
// weights and places, checks every value and digests the file.
#include <benchmark/benchmark.h>

#include <charconv>
#include <sstream>
#include <string>
#include <string_view>
#include <vector>

#include "brink/base/digest.hpp"
#include "brink/base/number.hpp"
#include "brink/base/random.hpp"
#include "brink/readings/csv.hpp"
#include "brink/readings/readings.hpp"

namespace {

std::string make_rows(std::size_t count) {
  constexpr const char* kKinds[] = {"joint", "fault", "bedding", "shear"};
  std::string bytes = "dip,dip_direction,kind\n";
  for (std::uint64_t i = 0; i < count; ++i) {
    bytes += brink::fixed(90.0 * brink::random_uniform(3, 0, i), 1) + ",";
    bytes += brink::fixed(360.0 * brink::random_uniform(3, 1, i), 1) + ",";
    bytes += kKinds[brink::random_index(3, 2, i, std::size(kKinds))];
    bytes += '\n';
  }
  return bytes;
}

const std::string& rows() {
  static const std::string bytes = make_rows(1'000'000);
  return bytes;
}

void report_bytes(benchmark::State& state) {
  state.SetBytesProcessed(static_cast<std::int64_t>(state.iterations()) *
                          static_cast<std::int64_t>(rows().size()));
}

void BM_read_readings(benchmark::State& state) {
  const brink::InputBytes file{"w5.csv", rows()};
  for (auto _ : state) {
    benchmark::DoNotOptimize(brink::read_readings({&file, 1}, {}));
  }
  report_bytes(state);
}
BENCHMARK(BM_read_readings)->Unit(benchmark::kMillisecond);

// Cells found and trimmed, nothing kept: what the table reader alone takes.
void BM_csv_cells(benchmark::State& state) {
  for (auto _ : state) {
    brink::CsvReader reader(rows(), "w5.csv");
    brink::Row row;
    std::size_t cells = 0;
    while (reader.next(row)) cells += row.cells.size();
    benchmark::DoNotOptimize(cells);
  }
  report_bytes(state);
}
BENCHMARK(BM_csv_cells)->Unit(benchmark::kMillisecond);

void BM_digest(benchmark::State& state) {
  for (auto _ : state) benchmark::DoNotOptimize(brink::sha256_hex(rows()));
  report_bytes(state);
}
BENCHMARK(BM_digest)->Unit(benchmark::kMillisecond);

double number(const std::string& cell) {
  double value = 0.0;
  std::from_chars(cell.data(), cell.data() + cell.size(), value);
  return value;
}

void BM_plain_getline_from_chars(benchmark::State& state) {
  for (auto _ : state) {
    std::istringstream in(rows());
    std::vector<double> dips;
    std::vector<double> directions;
    std::vector<std::string> kinds;
    std::string line;
    std::getline(in, line);
    while (std::getline(in, line)) {
      std::istringstream fields(line);
      std::string cell;
      std::getline(fields, cell, ',');
      dips.push_back(number(cell));
      std::getline(fields, cell, ',');
      directions.push_back(number(cell));
      std::getline(fields, cell, ',');
      kinds.push_back(cell);
    }
    benchmark::DoNotOptimize(dips.data());
    benchmark::DoNotOptimize(directions.data());
    benchmark::DoNotOptimize(kinds.data());
  }
  report_bytes(state);
}
BENCHMARK(BM_plain_getline_from_chars)->Unit(benchmark::kMillisecond);

}  // namespace
