#include "spacing_text.hpp"

#include <algorithm>
#include <optional>

#include "brink/base/number.hpp"
#include "text_table.hpp"

namespace brink::cli {

namespace {

std::string cell(const std::optional<double>& value, int decimals) {
  return value ? fixed(*value, decimals) : "";
}

void add_summary(TextTable& table, const std::string& name, const char* what,
                 const std::optional<LengthSummary>& summary, const std::string& isrm_class) {
  if (!summary) return;
  table.add_row({name, what, std::to_string(summary->count), fixed(summary->mean, 2),
                 fixed(summary->median, 2), cell(summary->deviation, 2), isrm_class});
}

std::string sets_table(const JointLengths& lengths, const std::vector<std::string>& names) {
  TextTable table({{"set", Align::left},
                   {"length", Align::left},
                   {"number"},
                   {"mean"},
                   {"median"},
                   {"deviation"},
                   {"ISRM 1978", Align::left}});
  for (std::size_t s = 0; s < names.size(); ++s) {
    if (s < lengths.spacing.sets.size()) {
      const SetSpacing& set = lengths.spacing.sets[s];
      add_summary(table, names[s], "true spacing, m", set.spacing_m, set.isrm_class);
    }
    if (s < lengths.persistence.size()) {
      const MeasuredColumn& set = lengths.persistence[s];
      add_summary(table, names[s], "persistence, m", set.summary, set.isrm_class);
    }
    if (s < lengths.aperture.size()) {
      const MeasuredColumn& set = lengths.aperture[s];
      add_summary(table, names[s], "aperture, mm", set.summary, set.isrm_class);
    }
  }
  return table.empty() ? "" : table.text() + '\n';
}

std::string traverses_table(const SpacingResult& spacing) {
  if (spacing.traverses.empty()) return {};
  TextTable table({{"traverse", Align::left},
                   {"joints"},
                   {"span, m"},
                   {"joints a metre"},
                   {"RQD estimate, %"}});
  for (const TraverseFrequency& traverse : spacing.traverses) {
    table.add_row({traverse.name, std::to_string(traverse.count), fixed(traverse.span_m, 2),
                   cell(traverse.frequency_per_m, 2), cell(traverse.rqd_percent, 0)});
  }
  return table.text() + '\n';
}

}  // namespace

std::string spacing_text(const JointLengths& lengths, const std::vector<std::string>& names) {
  return sets_table(lengths, names) + traverses_table(lengths.spacing);
}

}  // namespace brink::cli
