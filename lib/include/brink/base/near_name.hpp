// "Did you mean": the known name closest to one that was mistyped.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace brink {

// Fewest insertions, deletions, substitutions and swaps of neighbours that turn `a` into `b`, each
// place edited once (optimal string alignment; Damerau 1964, CACM 7:171). Bytes, ASCII case
// ignored. Cost: product of the lengths.
std::size_t edit_distance(std::string_view a, std::string_view b);

// The name of `known` nearest to `word`, at most one edit in three characters away (and at least
// one edit allowed), or else the only name that begins with `word`; empty where none is near. The
// first wins a tie.
std::string near_name(std::string_view word, const std::vector<std::string>& known);

// " (did you mean 'NAME'?)", or nothing where no name is near.
std::string did_you_mean(std::string_view word, const std::vector<std::string>& known);

}  // namespace brink
