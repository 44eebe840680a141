// The one error type of the library: what stopped the work, where, and what would be accepted.
//
// A rejected reading, a wedge that does not form or a block that lifts are ordinary results, not
// errors.
#pragma once

#include <cstddef>
#include <stdexcept>
#include <string>
#include <string_view>

namespace brink {

// Who has to act, and so the exit status of the program.
enum class ErrorKind {
  input,     // a data or site file is wrong: status 1
  argument,  // a value handed to a function or an option is out of its range: status 2
  file,      // a file or folder could not be read or written: status 3
};

// Where in the input. Lines and columns count from 1; 0 or empty means unknown or not applicable.
struct Place {
  std::string file = {};
  std::size_t line = 0;
  std::size_t column = 0;
  std::string key = {};  // heading of the column, key of the site file, or name of the option
};

// "file:12:3: dip: " with the unknown parts left out; empty for an empty place.
std::string to_string(const Place& place);

class Error : public std::runtime_error {
 public:
  // `what_is_wrong` is a clause without a full stop; `value` is the offending text as it stood (may
  // be empty); `accepted` says what would be accepted (may be empty). what() is one line made of
  // all of them: "pit.csv:7:1: dip: '120' is above 90; accepted: 0 to 90 degrees".
  Error(ErrorKind kind, Place place, std::string_view what_is_wrong, std::string_view value = {},
        std::string_view accepted = {});

  ErrorKind kind() const noexcept { return kind_; }
  const Place& place() const noexcept { return place_; }
  const std::string& value() const noexcept { return value_; }
  const std::string& accepted() const noexcept { return accepted_; }

 private:
  ErrorKind kind_;
  Place place_;
  std::string value_;
  std::string accepted_;
};

// `text` fit for one line of a message: control bytes and broken UTF-8 shown as \xNN, cut after
// `max_bytes` with "...".
std::string printable(std::string_view text, std::size_t max_bytes = 72);

}  // namespace brink
