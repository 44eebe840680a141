#include "set_choice.hpp"

#include "brink/base/error.hpp"
#include "site_tests.hpp"

namespace brink::cli {

void add_set_options(std::vector<Option>& options, SetChoice& target, InputOptions& input) {
  options.push_back(set_column_option(input));
  options.push_back(
      flag_option("--no-sets", "Looks for no sets: all readings together.", target.none));
}

void check_set_options(const SetChoice& choice, const InputOptions& input) {
  if (!choice.none || input.set_column.empty()) return;
  throw Error(ErrorKind::argument, Place{.file = {}, .key = "--no-sets"},
              "is given together with --set-column", {}, "one of the two");
}

SetsResult chosen_sets(const Readings& readings, const SetChoice& choice, const InputOptions& input,
                       std::uint64_t seed, unsigned threads, const std::optional<Site>& site) {
  if (choice.none) {
    SetsResult none;
    none.assignment.assign(readings.size(), 0);
    none.unassigned = readings.size();
    return none;
  }
  FindSetsOptions options;
  options.seed = seed;
  options.threads = threads;
  return sets_with_site(readings, input.set_column, options, site);
}

void record_set_choice(Object& inputs, const SetChoice& choice, const InputOptions& input) {
  inputs.add("set_column", input.set_column.empty() ? Value() : Value(input.set_column));
  inputs.add("find_sets", !choice.none && input.set_column.empty());
}

}  // namespace brink::cli
