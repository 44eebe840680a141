// Leaving readings out by the value in a column.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace brink {

// One condition on a column: any of some values, or a range of numbers.
struct Filter {
  enum class Kind { values, range };
  std::string text;     // as the user wrote it, for messages
  std::string heading;  // as the user wrote it; compared by heading_key()
  Kind kind = Kind::values;
  std::vector<std::string> values;
  // Inclusive ends of the range; infinite where it is open.
  double from = 0.0;
  double to = 0.0;
};

// "kind=joint,bedding", "trace_length>=2", "trace_length<=5", "position=10..25". Error(argument)
// for anything else.
Filter parse_filter(std::string_view text);

// Whether a cell passes. Values are compared as numbers where both are numbers (1 and 1.0 are the
// same), otherwise letter by letter; an empty value in the list stands for an empty cell. A cell
// that is not a number is in no range. `decimal_comma`: whether "2,5" is a number.
bool passes(const Filter& filter, std::string_view cell, bool decimal_comma);

}  // namespace brink
