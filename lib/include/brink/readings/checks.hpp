// What a careful person notices when leafing through readings: slips of the hand, habits of the
// eye, and gaps of the method. Every check warns and names lines; none changes data.
//
// Each threshold is set by the chance of a false alarm on readings that have nothing wrong: below
// one in two files for exchanged numbers (a bound; far fewer in practice), one in twenty for turned
// observers, one in a thousand for the others. The argument stands at each check in the source.
#pragma once

#include <span>
#include <string>
#include <vector>

#include "brink/readings/readings.hpp"

namespace brink {

// All checks below that the columns of `readings` allow, in their order.
std::vector<std::string> check_readings(const Readings& readings);

// Rows that stand twice: the same plane at the same position of the same traverse, or with the same
// id; where there are neither positions nor ids, whole blocks of rows that repeat another block.
std::vector<std::string> check_duplicates(const Readings& readings);

// Readings whose dip and direction would fit the others far better in each other's place. Found
// where strays are few: among many, an exchanged reading is one more stray. Up to 20,000 readings:
// more come from instruments, not from pencils.
std::vector<std::string> check_swapped(const Readings& readings);

// Observers (column observer, else traverse, else file) whose directions fit the others' readings
// only when turned by 180 degrees. Up to 20,000 readings.
std::vector<std::string> check_reversed(const Readings& readings);

// Dips or directions heaped on multiples of 5 or 10 degrees, with the share.
std::vector<std::string> check_heaping(const Readings& readings);

// Sets (column set) that only one of several traverses meets.
std::vector<std::string> check_single_traverse_sets(const Readings& readings);

// Readings within 15 degrees of the line of their own traverse (columns traverse_trend and
// traverse_plunge, or the azimuth and inclination of an AGS4 traverse): it meets few of such
// planes, and each stands for many.
std::vector<std::string> check_blind_zones(const Readings& readings);

}  // namespace brink
