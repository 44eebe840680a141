#include "brink/plot/picture.hpp"

#include <cmath>
#include <initializer_list>
#include <utility>

#include "brink/base/error.hpp"

namespace brink::plot {

namespace {

template <typename... Visitors>
struct Overloaded : Visitors... {
  using Visitors::operator()...;
};
template <typename... Visitors>
Overloaded(Visitors...) -> Overloaded<Visitors...>;

void require_finite(std::initializer_list<double> values) {
  for (const double value : values) {
    if (!std::isfinite(value)) {
      throw Error(ErrorKind::argument, {}, "a mark of the drawing has a place that is no number");
    }
  }
}

void check_step(const Step& step) {
  std::visit(Overloaded{[](const MoveTo& s) {
                          require_finite({s.to.x_mm, s.to.y_mm});
                        },
                        [](const LineTo& s) {
                          require_finite({s.to.x_mm, s.to.y_mm});
                        },
                        [](const ArcTo& s) {
                          require_finite({s.centre.x_mm, s.centre.y_mm, s.radius_mm, s.start.deg(),
                                          s.sweep.deg()});
                        },
                        [](const ClosePath&) {}},
             step);
}

void check_mark(const Mark& mark) {
  std::visit(
      Overloaded{[](const Path& path) {
                   for (const Step& step : path.steps) check_step(step);
                   if (path.stroke) require_finite({path.stroke->width_mm});
                 },
                 [](const Symbols& symbols) {
                   require_finite({symbols.size_mm, symbols.line_mm});
                   for (const Point& p : symbols.centres) require_finite({p.x_mm, p.y_mm});
                 },
                 [](const Text& text) {
                   require_finite({text.at.x_mm, text.at.y_mm, text.style.size_mm, text.width_mm});
                 },
                 [](const Group& group) {
                   for (const Mark& inner : group.marks) check_mark(inner);
                 }},
      mark.content);
}

void move(Point& point, double right_mm, double down_mm) {
  point.x_mm += right_mm;
  point.y_mm += down_mm;
}

void move(Step& step, double right_mm, double down_mm) {
  std::visit(Overloaded{[&](MoveTo& s) { move(s.to, right_mm, down_mm); },
                        [&](LineTo& s) { move(s.to, right_mm, down_mm); },
                        [&](ArcTo& s) { move(s.centre, right_mm, down_mm); }, [](ClosePath&) {}},
             step);
}

void move(Group& group, double right_mm, double down_mm) {
  for (Mark& mark : group.marks) {
    std::visit(Overloaded{[&](Path& path) {
                            for (Step& step : path.steps) move(step, right_mm, down_mm);
                          },
                          [&](Symbols& symbols) {
                            for (Point& p : symbols.centres) move(p, right_mm, down_mm);
                          },
                          [&](Text& text) { move(text.at, right_mm, down_mm); },
                          [&](Group& inner) { move(inner, right_mm, down_mm); }},
               mark.content);
  }
}

void add_sentence(std::string& text, const std::string& sentence) {
  if (sentence.empty()) return;
  if (!text.empty()) text += text.back() == '.' ? " " : ". ";
  text += sentence;
}

void describe(const Group& group, std::string& text) {
  add_sentence(text, group.title);
  add_sentence(text, group.description);
  for (const Mark& mark : group.marks) {
    if (const auto* inner = std::get_if<Group>(&mark.content)) describe(*inner, text);
  }
}

std::vector<Step> steps_through(const std::vector<Point>& points) {
  std::vector<Step> steps;
  for (const Point& point : points) {
    if (steps.empty()) {
      steps.emplace_back(MoveTo{point});
    } else {
      steps.emplace_back(LineTo{point});
    }
  }
  return steps;
}

}  // namespace

void add(Group& group, Path mark) {
  group.marks.emplace_back().content.emplace<Path>(std::move(mark));
}
void add(Group& group, Symbols mark) {
  group.marks.emplace_back().content.emplace<Symbols>(std::move(mark));
}
void add(Group& group, Text mark) {
  group.marks.emplace_back().content.emplace<Text>(std::move(mark));
}
void add(Group& group, Group mark) {
  group.marks.emplace_back().content.emplace<Group>(std::move(mark));
}

Path polyline(const std::vector<Point>& points, Stroke stroke) {
  return {steps_through(points), std::move(stroke), {}};
}

Path polygon(const std::vector<Point>& points) {
  Path path{steps_through(points), {}, {}};
  if (!points.empty()) path.steps.emplace_back(ClosePath{});
  return path;
}

Path segment(Point from, Point to, Stroke stroke) {
  return polyline({from, to}, std::move(stroke));
}

Path circle(Point centre, double radius_mm) {
  return {{ArcTo{centre, radius_mm, {}, Angle::degrees(360.0)}, ClosePath{}}, {}, {}};
}

Group moved(Group group, double right_mm, double down_mm) {
  move(group, right_mm, down_mm);
  return group;
}

void check(const Picture& picture) {
  require_finite({picture.width_mm, picture.height_mm});
  if (picture.width_mm <= 0.0 || picture.height_mm <= 0.0) {
    throw Error(ErrorKind::argument, {}, "the page of the drawing has no area");
  }
  for (const Mark& mark : picture.content.marks) check_mark(mark);
}

std::string description_of(const Picture& picture) {
  std::string text;
  add_sentence(text, picture.content.description);
  for (const Mark& mark : picture.content.marks) {
    if (const auto* group = std::get_if<Group>(&mark.content)) describe(*group, text);
  }
  return text;
}

}  // namespace brink::plot
