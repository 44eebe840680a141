// A second way to a wedge's block and factor of safety, sharing no formula with the library:
// corners from systems of three planes, volume and areas by Qhull, reactions from one linear
// system, modes by trying each.
#pragma once

#include <Eigen/Dense>
#include <optional>
#include <random>

#include "brink/mechanics/wedge_equilibrium.hpp"
#include "brink/orientation/intersection.hpp"
#include "reference/qhull_solid.hpp"

namespace brink::reference {

struct TwinResult {
  QhullSolid solid;  // plane 1, plane 2, face, upper, crack
  char mode = 'l';   // b(oth), 1, 2, l(ifts)
  double safety = 0.0;
  double driving = 0.0;
};

inline Vector3 three_planes(const Vector3& a, double ad, const Vector3& b, double bd,
                            const Vector3& c, double cd) {
  Eigen::Matrix3d rows;
  rows << a.transpose(), b.transpose(), c.transpose();
  return rows.fullPivLu().solve(Vector3(ad, bd, cd));
}

inline double passive_part(const Vector3& pull, const Vector3& slide,
                           const std::vector<std::pair<Vector3, double>>& contacts) {
  // Least squares over the contact normals and the direction of movement is exact here.
  Eigen::MatrixXd columns(3, static_cast<int>(contacts.size()) + 2);
  Vector3 sideways = slide.cross(contacts.front().first);
  columns.col(0) = slide;
  for (std::size_t i = 0; i < contacts.size(); ++i) {
    columns.col(static_cast<int>(i) + 1) = -contacts[i].first;
  }
  columns.col(columns.cols() - 1) = contacts.size() == 1 ? sideways : Vector3(Vector3::Zero());
  const Eigen::VectorXd part = columns.fullPivHouseholderQr().solve(pull);
  double sum = -part[0];
  for (std::size_t i = 0; i < contacts.size(); ++i) {
    sum += part[static_cast<int>(i) + 1] * contacts[i].second;
  }
  return sum;
}

inline const MohrCoulomb& mohr(const Strength& strength) {
  return std::get<MohrCoulomb>(strength);
}

inline void drop_cohesion(WedgeCase& w) {
  for (Strength* s : {&w.strength1, &w.strength2}) std::get<MohrCoulomb>(*s).cohesion_kPa = 0;
}

// The case must form a wedge that its crack, where there is one, does not make disappear.
inline TwinResult twin(const WedgeCase& w) {
  const WedgeGeometry& g = w.geometry;
  const Vector3 n1 = upward_normal(g.plane1), n2 = upward_normal(g.plane2);
  const Vector3 f = outward_normal(g.face), u = upward_normal(g.upper);
  const Vector3 up_dip = -dip_vector(g.face.dip, g.face.dip_direction);
  double height = g.size.value;
  const auto ground = [&] { return u.dot(up_dip * (height / up_dip.z())); };
  if (g.size.measure == WedgeMeasure::height_on_plane1) {
    height = 1.0;
    height = g.size.value / three_planes(n1, 0, f, 0, u, ground()).z();
  }
  const double rise = ground();
  const Vector3 a = three_planes(n1, 0, f, 0, u, rise), b = three_planes(n2, 0, f, 0, u, rise);
  const Vector3 back = three_planes(n1, 0, n2, 0, u, rise);
  const Vector3 m1 = n1.dot(b) > 0 ? n1 : Vector3(-n1), m2 = n2.dot(a) > 0 ? n2 : Vector3(-n2);
  std::vector<HalfSpace> spaces{{-m1, 0}, {-m2, 0}, {f, 0}, {u, rise}};
  Vector3 inside = (a + b + back) / 4.0;
  Vector3 mc = Vector3::Zero();
  bool cut = false;
  double deepest = 0.0;
  if (g.crack) {
    const Vector3 p = a + g.crack->distance_m * (back - a).normalized();
    mc = upward_normal(g.crack->plane);
    if (mc.dot(back - a) > 0) mc = -mc;
    for (const Vector3& corner : {a, b, back}) cut = cut || mc.dot(corner - p) < 0;
    if (cut) {
      spaces.push_back({-mc, -mc.dot(p)});
      // A point inside: from the toe a short way towards the middle.
      const double room = mc.dot(-p);
      const double loss = -mc.dot(inside);
      if (loss > 0) inside *= std::min(1.0, 0.5 * room / loss);
      const std::vector<double> corners = qhull_corners(spaces, inside);
      for (std::size_t i = 0; i < corners.size(); i += 3) {
        const Vector3 x(corners[i], corners[i + 1], corners[i + 2]);
        if (std::abs(mc.dot(x - p)) > 1e-7 * back.norm()) continue;
        deepest = std::max(deepest, (rise - u.dot(x)) / u.z());
      }
    }
  }
  TwinResult out;
  out.solid = qhull_solid(spaces, inside);
  out.solid.areas.resize(5, 0.0);

  double u1, u2, uc;
  if (const auto* fill = std::get_if<WaterFill>(&w.water)) {
    u1 = u2 = fill->fill * w.water_unit_weight_kN_m3 * (cut ? deepest / 3 : back.z() / 6);
    uc = cut ? u1 : 0.0;
  } else {
    const auto& p = std::get<WaterPressures>(w.water);
    u1 = p.plane1_kPa, u2 = p.plane2_kPa, uc = p.crack_kPa;
  }
  Vector3 v = *intersection_vector(n1, n2);
  const double weight = w.unit_weight_kN_m3 * out.solid.volume;
  Vector3 r = Vector3(0, 0, -weight) + u1 * out.solid.areas[0] * m1 + u2 * out.solid.areas[1] * m2 +
              uc * out.solid.areas[4] * mc;
  const Vector3 level = Vector3(v.x(), v.y(), 0).normalized();
  const Vector3 shake = w.seismic.trend ? Vector3(std::sin(w.seismic.trend->rad()),
                                                  std::cos(w.seismic.trend->rad()), 0)
                                        : level;
  r += weight * w.seismic.horizontal * shake + Vector3(0, 0, weight * w.seismic.vertical);
  Vector3 bolts = Vector3::Zero();
  for (const auto& load : w.loads) r += load.force_kN * direction(load.towards);
  for (const auto& bolt : w.bolts) bolts += bolt.force_kN * direction(bolt.towards);
  const bool passive = w.bolt_action == BoltAction::passive;
  if (!passive) r += bolts;

  const double t1 = std::tan(mohr(w.strength1).friction.rad()),
               t2 = std::tan(mohr(w.strength2).friction.rad());
  const double k1 = mohr(w.strength1).cohesion_kPa * out.solid.areas[0];
  const double k2 = mohr(w.strength2).cohesion_kPa * out.solid.areas[1];
  Eigen::Matrix3d columns;
  columns << m1, m2, -v;
  const Vector3 x = columns.fullPivLu().solve(-r);
  if (x[0] >= 0 && x[1] >= 0) {
    out.mode = 'b';
    out.driving = std::abs(x[2]);
    const Vector3 slide = x[2] < 0 ? Vector3(-v) : v;
    const double more = passive ? passive_part(bolts, slide, {{m1, t1}, {m2, t2}}) : 0.0;
    out.safety = std::max(k1 + k2 + x[0] * t1 + x[1] * t2 + more, 0.0) / out.driving;
    return out;
  }
  for (const char plane : {'1', '2'}) {
    const Vector3& m = plane == '1' ? m1 : m2;
    const Vector3& other = plane == '1' ? m2 : m1;
    const double press = -r.dot(m), tangent = plane == '1' ? t1 : t2;
    const Vector3 s = r + press * m;
    if (press <= 0 || s.dot(other) <= 0) continue;
    out.mode = plane;
    out.driving = s.norm();
    const double more = passive ? passive_part(bolts, s.normalized(), {{m, tangent}}) : 0.0;
    out.safety = std::max((plane == '1' ? k1 : k2) + press * tangent + more, 0.0) / out.driving;
    return out;
  }
  return out;
}

// Draws wedges of every kind: whole range of dips, overhanging faces, sloping ground, cracks near
// and far, water, shaking, loads and bolts.
class RandomWedges {
 public:
  explicit RandomWedges(unsigned seed) : draw_(seed) {}

  WedgeCase next() {
    WedgeCase w;
    w.geometry.plane1 = {degrees(5, 90), degrees(0, 360)};
    w.geometry.plane2 = {degrees(5, 90), degrees(0, 360)};
    w.geometry.face = {degrees(20, 120), degrees(0, 360)};
    w.geometry.upper = {degrees(0, 30), degrees(0, 360)};
    w.geometry.size = {chance(0.3) ? WedgeMeasure::height_on_plane1 : WedgeMeasure::height,
                       number(2, 60)};
    if (chance(0.5)) {
      w.geometry.crack = TensionCrack{{degrees(50, 90), degrees(0, 360)}, number(0, 40)};
    }
    w.unit_weight_kN_m3 = number(20, 30);
    w.strength1 = MohrCoulomb{chance(0.3) ? 0.0 : number(0, 80), degrees(0, 60)};
    w.strength2 = MohrCoulomb{chance(0.3) ? 0.0 : number(0, 80), degrees(0, 60)};
    if (chance(0.5)) w.water = WaterFill{number(0, 1)};
    if (chance(0.25)) w.water = WaterPressures{number(0, 120), number(0, 120), number(0, 120)};
    if (chance(0.3)) w.seismic.horizontal = number(0, 0.4);
    if (chance(0.15)) w.seismic.trend = degrees(0, 360);
    if (chance(0.2)) w.seismic.vertical = number(-0.2, 0.2);
    for (auto* forces : {&w.loads, &w.bolts}) {
      while (chance(0.3)) {
        forces->push_back({number(0, 5000), {degrees(0, 360), degrees(-90, 90)}});
      }
    }
    if (chance(0.5)) w.bolt_action = BoltAction::passive;
    return w;
  }
  double number(double from, double to) {
    return std::uniform_real_distribution<double>(from, to)(draw_);
  }
  Angle degrees(double from, double to) { return Angle::degrees(number(from, to)); }
  bool chance(double p) { return number(0, 1) < p; }

 private:
  std::mt19937_64 draw_;
};

}  // namespace brink::reference
