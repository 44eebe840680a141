// The date that goes into files.
#pragma once

#include <cstdint>

namespace brink::cli {

// Seconds since 1970 (UTC) from the environment's SOURCE_DATE_EPOCH, as reproducible-builds.org
// defines it, so that the same inputs give the same bytes; 0 (1 January 1970) where it isn't set.
// Error(argument) where it is set to anything but a whole number from 0 to the year 9999.
std::int64_t source_date();

}  // namespace brink::cli
