// Results as CSV (RFC 4180, comma, UTF-8, lines end with LF): headings carry units, numbers are in
// their shortest form that reads back the same, what does not exist is an empty cell, an infinite
// number is the word "infinite".
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/sets/sets.hpp"

namespace brink {

struct Job;

// A table in the making.
class CsvTable {
 public:
  explicit CsvTable(const std::vector<std::string>& headings);
  CsvTable& cell(std::string_view text);  // quoted where it has to be
  CsvTable& cell(double number);
  CsvTable& cell(const std::optional<double>& number);
  CsvTable& whole(std::uint64_t number);
  // Ends the row, which has to have a cell for every heading (std::logic_error).
  void end_row();
  const std::string& text() const { return text_; }

 private:
  void separate();

  std::size_t columns_;
  std::size_t cells_ = 0;  // of the row in the making
  std::string text_;
};

// One row a set.
std::string sets_csv(const SetsResult& sets);

// One row a face and mode for all readings, and one for each set or pair of sets.
std::string kinematics_csv(const Job& job);

// One row a face and set that is free to slide; one row a face and pair of sets whose line
// daylights.
std::string planes_csv(const Job& job);
std::string wedges_csv(const Job& job);

}  // namespace brink
