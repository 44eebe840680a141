// SHA-256 of an input file, echoed in every record so that others can tell which bytes were read.
#pragma once

#include <string>
#include <string_view>

namespace brink {

// 64 lower-case hexadecimal digits (FIPS 180-4, by the library nettle).
std::string sha256_hex(std::string_view bytes);

}  // namespace brink
