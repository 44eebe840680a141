// Colours, line weights and text sizes of every drawing.
//
// Sets differ by shape as well as colour, and the colours' lightness alternates, so that a grey
// print or colour-blind eyes still tell them apart. One warm colour is kept for what can move.
#pragma once

#include <array>
#include <cstddef>

#include "brink/plot/picture.hpp"

namespace brink::plot::style {

inline constexpr Colour kInk{0x20, 0x24, 0x2C};
inline constexpr Colour kMuted{0x68, 0x6E, 0x79};  // second-rank text, readings in no set
inline constexpr Colour kFaint{0xD4, 0xD8, 0xDE};  // the net's grid
inline constexpr Colour kPale{0xA9, 0xB0, 0xBA};   // what is drawn for comparison only
inline constexpr Colour kWhite{0xFF, 0xFF, 0xFF};
inline constexpr Colour kHazard{0xB5, 0x36, 0x0F};  // admissible: region, readings, counts

// Steps of density, from the lowest level up: a cool grey that a print keeps apart.
inline constexpr std::array<Colour, 5> kTints{{{0xF1, 0xF4, 0xF7},
                                               {0xE1, 0xE7, 0xED},
                                               {0xCE, 0xD7, 0xE0},
                                               {0xB9, 0xC5, 0xD1},
                                               {0xA3, 0xB2, 0xC1}}};
inline constexpr Colour kTintEdge{0x9A, 0xA9, 0xB8};

struct SetStyle {
  Colour colour;
  Shape shape;
};
// Of the set with this number, from 1; 48 are distinct.
constexpr SetStyle set_style(std::size_t set) {
  constexpr std::array<Colour, 8> colours{{{0x1D, 0x56, 0x93},
                                           {0xBC, 0x7A, 0x0B},
                                           {0x12, 0x75, 0x62},
                                           {0x8C, 0x3F, 0x8F},
                                           {0x5B, 0x92, 0xC9},
                                           {0x6A, 0x4A, 0x33},
                                           {0x83, 0x92, 0x24},
                                           {0x4A, 0x3C, 0x8C}}};
  constexpr std::array<Shape, 6> shapes{Shape::disc,    Shape::triangle, Shape::square,
                                        Shape::diamond, Shape::wedge,    Shape::saltire};
  const std::size_t i = set - 1;
  return {colours[i % colours.size()], shapes[(i + i / 24) % shapes.size()]};
}

inline constexpr double kTitle_mm = 5.6;
inline constexpr double kShortTitle_mm = 4.2;  // of a long title, before it takes two lines
inline constexpr double kHeading_mm = 3.5;
inline constexpr double kLabel_mm = 3.2;
inline constexpr double kText_mm = 2.9;
inline constexpr double kNote_mm = 2.6;

inline constexpr double kHairline_mm = 0.09;
inline constexpr double kThin_mm = 0.18;
inline constexpr double kLine_mm = 0.38;
inline constexpr double kFace_mm = 0.75;

constexpr TextStyle text(double size_mm, Colour colour = kInk, bool bold = false) {
  return {size_mm, bold, colour};
}

}  // namespace brink::plot::style
