// The values a number may have, and how a message says so.
#pragma once

#include <string>

namespace brink {

// An open end is not itself allowed.
struct Interval {
  double low;
  double high;
  bool low_open = false;
  bool high_open = false;
  std::string unit;  // for the message: "degrees", "m"

  bool contains(double value) const;
  std::string text() const;  // "0 to 90 degrees", "above 0 and below 180 degrees", "above 0 m"
};

// Builders: from_to with both ends, between with neither.
Interval from_to(double low, double high, std::string unit = {});
Interval between(double low, double high, std::string unit = {});  // both ends open
Interval above(double low, std::string unit = {});
Interval at_least_value(double low, std::string unit = {});
Interval any_number(std::string unit = {});

}  // namespace brink
