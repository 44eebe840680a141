// One-page sheets: the main net alone, or with the four small nets of one face.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "brink/kinematics/kinematics.hpp"
#include "brink/plot/stereonet.hpp"

namespace brink::plot {

struct SheetText {
  std::string title;
  std::string subtitle;  // added after the facts of the drawing, where not empty
};

// Facts that head a sheet: number of readings and sets; the face and what it was tested with where
// there is one; projection.
std::string facts_in_words(const NetContent& content, Projection projection,
                           const KinematicsOptions* options, const Face* face);

// Title, wrapped over two lines where it must be, and facts at the top of a page; returns the foot
// of both.
double add_sheet_heading(Group& page, const SheetText& text, const std::string& facts,
                         double width_mm);

// Upright, as wide as A4: title, facts, the net and its key.
Picture net_sheet(const NetContent& content, Projection projection, const SheetText& text);

// A4 across: the main net, and four small nets for the face `face` of `kinematics`.
Picture face_sheet(const NetContent& content, Projection projection, const SheetText& text,
                   const KinematicsResult& kinematics, std::size_t face);

// Pages one below the other, for files that hold one picture.
Picture stacked(const std::vector<Picture>& pages);

}  // namespace brink::plot
