// Numbers in text: finite decimals in, shortest round trip out, the same in every locale.
#pragma once

#include <optional>
#include <string>
#include <string_view>

namespace brink {

// The finite decimal that fills `text` whole, an optional sign and exponent included. Nothing for
// blanks, "nan", "inf", hexadecimal, a value that overflows, or anything left over.
std::optional<double> parse_decimal(std::string_view text);

// Whole number, same rules; no sign but '-'.
std::optional<long long> parse_integer(std::string_view text);

// Fewest digits that read back as the same double; "0" for both zeros. `value` must be finite.
std::string shortest(double value);

// Rounded to `decimals` places (0 to 17), never "-0".
std::string fixed(double value, int decimals);

}  // namespace brink
