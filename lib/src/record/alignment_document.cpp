#include "brink/record/alignment_document.hpp"

#include <utility>

#include "brink/record/csv_tables.hpp"
#include "brink/record/steepest_document.hpp"

namespace brink {

namespace {

const char* side_of(const SegmentCut& cut) {
  return cut.left ? "left" : "right";
}

const char* cut_name(CutSide cut) {
  switch (cut) {
    case CutSide::left:
      return "left";
    case CutSide::right:
      return "right";
    default:
      return "both";
  }
}

Value segment_value(const AlignmentSegment& segment, const SetsResult& sets) {
  Array cuts;
  for (const SegmentCut& cut : segment.cuts) {
    Object object{{"side", side_of(cut)}};
    const Object face = steepest_face_object(cut.face, sets);
    for (const auto& [key, value] : face.members()) object.add(key, value);
    cuts.emplace_back(std::move(object));
  }
  return Object{{"from_chainage_m", segment.from_chainage_m},
                {"to_chainage_m", segment.to_chainage_m},
                {"bearing_deg", segment.bearing.deg()},
                {"cuts", std::move(cuts)}};
}

}  // namespace

Object alignment_inputs(const AlignmentOptions& options) {
  Object inputs{{"cut", cut_name(options.cut)}, {"tolerance_deg", options.tolerance.deg()}};
  const Object search = steepest_inputs(options.search);
  for (const auto& [key, value] : search.members()) {
    if (key != "every_deg" && key != "azimuths_deg") inputs.add(key, value);
  }
  return inputs;
}

Value alignment_result(const AlignmentResult& result, const SetsResult& sets) {
  Array segments;
  for (const AlignmentSegment& segment : result.segments) {
    segments.push_back(segment_value(segment, sets));
  }
  return Object{{"closed", result.centreline.closed},
                {"points", std::uint64_t{result.centreline.points.size()}},
                {"segments", std::move(segments)},
                {"sets", known_sets_value(sets)}};
}

std::string alignment_csv(const AlignmentResult& result, const SetsResult& sets) {
  std::vector<std::string> headings{"from_chainage_m", "to_chainage_m", "bearing_deg", "side"};
  const std::vector<std::string> face = steepest_headings();
  headings.insert(headings.end(), face.begin(), face.end());
  CsvTable table(headings);
  for (const AlignmentSegment& segment : result.segments) {
    for (const SegmentCut& cut : segment.cuts) {
      table.cell(segment.from_chainage_m).cell(segment.to_chainage_m).cell(segment.bearing.deg());
      table.cell(side_of(cut));
      add_steepest_cells(table, cut.face, sets);
      table.end_row();
    }
  }
  return table.text();
}

}  // namespace brink
