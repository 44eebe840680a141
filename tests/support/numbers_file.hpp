// Rows of numbers from a small CSV file with '#' comments and one heading line.
#pragma once

#include <fstream>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

namespace brink::test {

inline std::vector<std::vector<double>> read_numbers(const std::string& path) {
  std::ifstream in(path);
  if (!in) throw std::runtime_error("no file " + path);
  std::vector<std::vector<double>> rows;
  bool heading = false;
  for (std::string line; std::getline(in, line);) {
    if (line.empty() || line[0] == '#') continue;
    if (!heading) {
      heading = true;
      continue;
    }
    std::istringstream cells(line);
    std::vector<double> row;
    for (std::string cell; std::getline(cells, cell, ',');) row.push_back(std::stod(cell));
    rows.push_back(row);
  }
  return rows;
}

}  // namespace brink::test
