// The four kinematic tests, on unit vectors. Every limit becomes a sine and a cosine once for a
// face; the tests themselves are products and comparisons.
//
// Sources: Markland 1972 (Imperial College rock mechanics research report 19) and Hoek & Bray 1981,
// ch. 7 and 8, for sliding; Goodman & Bray 1976 and Goodman 1989 for toppling; the two ingredients
// of block toppling, steep lines into the slope and bases that daylight, in Hudson & Harrison 1997,
// pp. 319-320. The exact limit of block toppling is derived here: a base square to a column that
// plunges p dips 90 - p out of the slope, and must be flatter than the face.
//
// Ties (base/ties.hpp): daylighting and "steeper than 90 - face dip" are strict; friction, the slip
// limit and the windows of azimuth include their limit. Friction, dips, plunges and azimuths are
// compared as angles, daylighting and the slip limit as dot products.
//
// Properties, for every normal n and line v: n and -n give the same answer, v and -v too; turning
// everything about the vertical changes nothing; a plane or line that passes still passes with a
// wider tolerance, and a sliding test that fails still fails with more friction.
#pragma once

#include "brink/orientation/face.hpp"

namespace brink {

enum class Mode { planar_sliding, wedge_sliding, flexural_toppling, block_toppling };

// What the tests compare with, beside the face.
struct ModeSettings {
  Plane upper = kLevelGround;
  Angle friction;                                   // 0 <= friction < 90
  Angle strike_tolerance = Angle::degrees(20.0);    // 0..180
  Angle toppling_tolerance = Angle::degrees(30.0);  // 0..180
};

// Directions within an angle of an azimuth, as sign tests against the window's edges. A window of
// 180 degrees to each side holds every direction.
struct AzimuthWindow {
  double sin_azimuth;  // of its middle
  double cos_azimuth;
  double sin_half;  // of the half width, the tie included
  double cos_half;
};

// A limit L on a slope, for testing tan(plunge) against tan(L) by products. The sign of
// sin(L) is kept, so that every plunge is beyond a limit below horizontal.
struct SlopeLimit {
  double signed_sin_squared;
  double cos_squared;
};

// Everything the tests need about one face. Ties are already inside the limits.
struct FaceLimits {
  Vector3 face_normal;
  Vector3 upper_normal;
  Vector3 slip_normal;  // n(face dip - friction, face direction)
  AzimuthWindow strike_window;
  AzimuthWindow toppling_window;  // about the face's direction + 180
  SlopeLimit friction;            // inclusive
  SlopeLimit column;              // strict: 90 - face dip
  bool face_above_friction;
};

// Values are taken as they are; test_kinematics checks ranges.
FaceLimits prepare_limits(const Face& face, const ModeSettings& settings);

// Tests on a plane of unit normal `n` (either sense). A vertical plane has two dip directions and
// passes where either does; a horizontal one has none and passes nothing.
bool planar_sliding(const FaceLimits& limits, const Vector3& n);
bool flexural_toppling(const FaceLimits& limits, const Vector3& n);
// A base on which columns can topple: the plane's dip vector daylights within the strike
// tolerance. Below the friction angle the blocks stand on it and tip; from it up they slide too
// (planar_sliding is true).
bool toppling_base(const FaceLimits& limits, const Vector3& n);

// Tests on a line of unit vector `v` (either sense). A horizontal line has two trends and passes
// where either does; a vertical line has none and passes no test on a trend.
bool wedge_sliding(const FaceLimits& limits, const Vector3& v);
bool block_toppling(const FaceLimits& limits, const Vector3& v);
// The line daylights, in either sense where it is horizontal; its plunge does not count.
bool line_daylights(const FaceLimits& limits, const Vector3& v);

}  // namespace brink
