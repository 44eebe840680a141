// Where a command takes the sets of its readings from.
#pragma once

#include <cstdint>
#include <optional>
#include <vector>

#include "brink/record/site.hpp"
#include "brink/sets/sets.hpp"
#include "input.hpp"
#include "options.hpp"

namespace brink::cli {

struct SetChoice {
  bool none = false;  // --no-sets
};

// --set-column and --no-sets.
void add_set_options(std::vector<Option>& options, SetChoice& target, InputOptions& input);

// Throws ErrorKind::argument where both are given. To be called before files are read.
void check_set_options(const SetChoice& choice, const InputOptions& input);

// As a column names them, none, those of the site, or found by the program.
SetsResult chosen_sets(const Readings& readings, const SetChoice& choice, const InputOptions& input,
                       std::uint64_t seed, unsigned threads, const std::optional<Site>& site);

// {set_column, find_sets}, added to what a command echoes.
void record_set_choice(Object& inputs, const SetChoice& choice, const InputOptions& input);

}  // namespace brink::cli
