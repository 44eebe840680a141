// A cursor over one normalised notation text, in capitals.
#pragma once

#include <optional>
#include <string>
#include <string_view>

#include "brink/orientation/notation.hpp"

namespace brink {

class NotationScanner {
 public:
  // `text` must be normalised, in capitals, and outlive the scanner.
  NotationScanner(std::string_view text, DecimalComma comma) : rest_(text), comma_(comma) {}

  bool at_end() const { return rest_.empty(); }
  char peek() const { return rest_.empty() ? '\0' : rest_.front(); }
  bool skip_blanks();  // whether there were any
  bool take(std::string_view piece);
  // A run of letters A-Z, possibly empty.
  std::string_view take_letters();
  // Degrees with an optional sign, degree mark or word, and minutes. Nothing where no number stands
  // here or the minutes reach 60; the cursor is then anywhere.
  std::optional<double> take_degrees();

  NotationScanner fork() const { return *this; }

 private:
  std::optional<double> take_number();
  std::optional<double> take_minutes();

  std::string_view rest_;
  DecimalComma comma_;
};

// Letters to capitals, ASCII only.
std::string in_capitals(std::string text);

}  // namespace brink
