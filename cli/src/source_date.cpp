#include "source_date.hpp"

#include <cstdlib>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"

namespace brink::cli {

std::int64_t source_date() {
  const char* text = std::getenv("SOURCE_DATE_EPOCH");
  if (text == nullptr || *text == '\0') return 0;
  constexpr long long end_of_9999 = 253402300799;
  const auto seconds = parse_integer(text);
  if (seconds && *seconds >= 0 && *seconds <= end_of_9999) return *seconds;
  throw Error(ErrorKind::argument, Place{.key = "SOURCE_DATE_EPOCH"},
              "in the environment is not a date in seconds since 1970", text,
              "a whole number from 0 to 253402300799");
}

}  // namespace brink::cli
