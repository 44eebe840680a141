#include "brink/record/spacing_document.hpp"

namespace brink {

namespace {

// `unit` ends the keys: "_m", "_mm".
void add_summary(Object& object, const LengthSummary& summary, const std::string& unit) {
  object.add("count", std::uint64_t{summary.count});
  object.add("mean" + unit, summary.mean);
  object.add("median" + unit, summary.median);
  object.add("deviation" + unit, summary.deviation);
}

Value spacing_value(const std::vector<SetSpacing>& sets, std::size_t set) {
  if (set >= sets.size() || !sets[set].spacing_m) return nullptr;
  Object object;
  add_summary(object, *sets[set].spacing_m, "_m");
  object.add("frequency_per_m", sets[set].frequency_per_m);
  object.add("isrm_class", sets[set].isrm_class);
  return object;
}

Value column_value(const std::vector<MeasuredColumn>& sets, std::size_t set,
                   const std::string& unit) {
  if (set >= sets.size() || !sets[set].summary) return nullptr;
  Object object{{"column", sets[set].heading}};
  add_summary(object, *sets[set].summary, unit);
  object.add("isrm_class", sets[set].isrm_class);
  return object;
}

}  // namespace

Object joint_lengths_of_set(const JointLengths& lengths, std::size_t set) {
  return Object{{"spacing", spacing_value(lengths.spacing.sets, set)},
                {"persistence", column_value(lengths.persistence, set, "_m")},
                {"aperture", column_value(lengths.aperture, set, "_mm")}};
}

Value traverse_frequencies(const SpacingResult& spacing) {
  Array list;
  for (const TraverseFrequency& traverse : spacing.traverses) {
    list.push_back(Object{{"traverse", traverse.name},
                          {"count", std::uint64_t{traverse.count}},
                          {"span_m", traverse.span_m},
                          {"frequency_per_m", traverse.frequency_per_m},
                          {"rqd_percent", traverse.rqd_percent}});
  }
  return list;
}

}  // namespace brink
