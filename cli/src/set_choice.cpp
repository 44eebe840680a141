#include "set_choice.hpp"

#include "brink/base/error.hpp"

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
                       std::uint64_t seed, unsigned threads) {
  if (choice.none) {
    SetsResult none;
    none.assignment.assign(readings.size(), 0);
    none.unassigned = readings.size();
    return none;
  }
  if (!input.set_column.empty()) return sets_by_column(readings, input.set_column);
  return find_sets(readings, {std::nullopt, seed, threads});
}

void record_set_choice(Object& inputs, const SetChoice& choice, const InputOptions& input) {
  inputs.add("set_column", input.set_column.empty() ? Value() : Value(input.set_column));
  inputs.add("find_sets", !choice.none && input.set_column.empty());
}

}  // namespace brink::cli
