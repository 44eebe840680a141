#include "brink/plot/cairo_painter.hpp"

#include <cairo/cairo-pdf.h>
#include <cairo/cairo-svg.h>
#include <cairo/cairo.h>
#include <fmt/chrono.h>
#include <fmt/format.h>
#include <pango/pangocairo.h>

#include <array>
#include <cmath>
#include <ctime>
#include <memory>

#include "brink/base/error.hpp"
#include "brink/record/document.hpp"
#include "svg_text.hpp"

namespace brink::plot {

namespace {

constexpr double kPointsPerMm = 72.0 / 25.4;
constexpr const char* kFont = "DejaVu Sans";

template <auto Free>
struct Freed {
  template <typename T>
  void operator()(T* handle) const {
    Free(handle);
  }
};
using SurfaceHandle = std::unique_ptr<cairo_surface_t, Freed<cairo_surface_destroy>>;
using ContextHandle = std::unique_ptr<cairo_t, Freed<cairo_destroy>>;
using FontOptionsHandle = std::unique_ptr<cairo_font_options_t, Freed<cairo_font_options_destroy>>;
using LayoutHandle = std::unique_ptr<PangoLayout, Freed<g_object_unref>>;
using PangoContextHandle = std::unique_ptr<PangoContext, Freed<g_object_unref>>;
using FontHandle = std::unique_ptr<PangoFontDescription, Freed<pango_font_description_free>>;
using Utf8Handle = std::unique_ptr<char, Freed<g_free>>;

void require_success(cairo_status_t status) {
  if (status == CAIRO_STATUS_SUCCESS) return;
  throw Error(ErrorKind::argument, {},
              fmt::format("the drawing library failed: {}", cairo_status_to_string(status)));
}

cairo_status_t append(void* bytes, const unsigned char* data, unsigned length) {
  static_cast<std::string*>(bytes)->append(reinterpret_cast<const char*>(data), length);
  return CAIRO_STATUS_SUCCESS;
}

void set_colour(cairo_t* cr, const Colour& c) {
  cairo_set_source_rgb(cr, c.red / 255.0, c.green / 255.0, c.blue / 255.0);
}

// The drawing library's Bezier arcs are off by 4e-6 of the radius over 45 degrees, but by 3e-4 over
// 90.
void trace_arc(cairo_t* cr, const ArcTo& arc) {
  const int parts = std::max(1, static_cast<int>(std::ceil(std::abs(arc.sweep.deg()) / 45.0)));
  for (int i = 0; i < parts; ++i) {
    const double from = (arc.start + arc.sweep * (static_cast<double>(i) / parts)).rad();
    const double to = (arc.start + arc.sweep * ((i + 1.0) / parts)).rad();
    const auto trace = arc.sweep.deg() >= 0.0 ? cairo_arc : cairo_arc_negative;
    trace(cr, arc.centre.x_mm, arc.centre.y_mm, arc.radius_mm, from, to);
  }
}

struct Tracer {
  cairo_t* cr;
  void operator()(const MoveTo& s) const { cairo_move_to(cr, s.to.x_mm, s.to.y_mm); }
  void operator()(const LineTo& s) const { cairo_line_to(cr, s.to.x_mm, s.to.y_mm); }
  void operator()(const ArcTo& s) const { trace_arc(cr, s); }
  void operator()(const ClosePath&) const { cairo_close_path(cr); }
};

void set_stroke(cairo_t* cr, const Stroke& stroke) {
  set_colour(cr, stroke.colour);
  cairo_set_line_width(cr, stroke.width_mm);
  cairo_set_dash(cr, stroke.dash_mm.data(), static_cast<int>(stroke.dash_mm.size()), 0.0);
  cairo_set_line_cap(cr, stroke.round_caps ? CAIRO_LINE_CAP_ROUND : CAIRO_LINE_CAP_BUTT);
}

void paint(cairo_t* cr, const Path& path) {
  cairo_new_path(cr);
  for (const Step& step : path.steps) std::visit(Tracer{cr}, step);
  if (path.fill) {
    set_colour(cr, *path.fill);
    cairo_set_fill_rule(cr, CAIRO_FILL_RULE_EVEN_ODD);
    cairo_fill_preserve(cr);
  }
  if (path.stroke) {
    set_stroke(cr, *path.stroke);
    cairo_stroke(cr);
  }
  cairo_new_path(cr);
}

// Corners of the filled shapes for a disc of diameter 1 with the same area, from the centre.
std::vector<std::array<double, 2>> corners(Shape shape) {
  switch (shape) {
    case Shape::square:
      return {{-0.443, -0.443}, {0.443, -0.443}, {0.443, 0.443}, {-0.443, 0.443}};
    case Shape::diamond:
      return {{0.0, -0.627}, {0.627, 0.0}, {0.0, 0.627}, {-0.627, 0.0}};
    case Shape::triangle:
      return {{0.0, -0.777}, {0.673, 0.389}, {-0.673, 0.389}};
    case Shape::wedge:
      return {{0.0, 0.777}, {0.673, -0.389}, {-0.673, -0.389}};
    default:
      return {};
  }
}

// One outline for all symbols: a quarter of the bytes of one outline each, and much faster.
void paint_symbols_filled(cairo_t* cr, const Symbols& symbols) {
  const auto shape = corners(symbols.shape);
  for (const Point& p : symbols.centres) {
    for (std::size_t i = 0; i < shape.size(); ++i) {
      const double x = p.x_mm + symbols.size_mm * shape[i][0];
      const double y = p.y_mm + symbols.size_mm * shape[i][1];
      i == 0 ? cairo_move_to(cr, x, y) : cairo_line_to(cr, x, y);
    }
    cairo_close_path(cr);
  }
  set_colour(cr, symbols.colour);
  cairo_set_fill_rule(cr, CAIRO_FILL_RULE_WINDING);
  cairo_fill(cr);
}

void paint_symbols_stroked(cairo_t* cr, const Symbols& symbols) {
  const double half = symbols.size_mm / 2.0;
  const double slant = half * 0.8;
  for (const Point& p : symbols.centres) {
    const auto line = [&](double dx, double dy) {
      cairo_move_to(cr, p.x_mm - dx, p.y_mm - dy);
      cairo_line_to(cr, p.x_mm + dx, p.y_mm + dy);
    };
    if (symbols.shape == Shape::cross) {
      line(half, 0.0);
      line(0.0, half);
    } else if (symbols.shape == Shape::saltire) {
      line(slant, slant);
      line(slant, -slant);
    } else if (symbols.shape == Shape::ring) {
      cairo_new_sub_path(cr);
      trace_arc(cr, {p, half - symbols.line_mm / 2.0, {}, Angle::degrees(360.0)});
      cairo_close_path(cr);
    } else {
      line(0.0, 0.0);  // a dot: a line of no length with round caps
    }
  }
  const bool dot = symbols.shape == Shape::disc;
  set_stroke(cr, {symbols.colour, dot ? symbols.size_mm : symbols.line_mm, {}, dot});
  cairo_stroke(cr);
}

void paint(cairo_t* cr, const Symbols& symbols) {
  cairo_new_path(cr);
  corners(symbols.shape).empty() ? paint_symbols_stroked(cr, symbols)
                                 : paint_symbols_filled(cr, symbols);
}

// `text` without broken UTF-8, which would silently stop the drawing, and without line breaks.
std::string clean(const std::string& text) {
  const Utf8Handle valid(g_utf8_make_valid(text.data(), static_cast<gssize>(text.size())));
  std::string out(valid.get());
  for (char& c : out) {
    if (static_cast<unsigned char>(c) < 0x20) c = ' ';
  }
  return out;
}

PangoAlignment alignment(Anchor anchor) {
  return anchor == Anchor::start    ? PANGO_ALIGN_LEFT
         : anchor == Anchor::middle ? PANGO_ALIGN_CENTER
                                    : PANGO_ALIGN_RIGHT;
}

int pango_units(double mm) {
  return static_cast<int>(std::lround(mm * PANGO_SCALE));
}
double millimetres(int units) {
  return static_cast<double>(units) / PANGO_SCALE;
}

// Glyphs stay where the outline says: no hinting, no rounding to whole units, which here are
// millimetres.
LayoutHandle lay_out(cairo_t* cr, const Text& text) {
  const PangoContextHandle context(pango_cairo_create_context(cr));
  const FontOptionsHandle options(cairo_font_options_create());
  cairo_font_options_set_hint_style(options.get(), CAIRO_HINT_STYLE_NONE);
  cairo_font_options_set_hint_metrics(options.get(), CAIRO_HINT_METRICS_OFF);
  cairo_font_options_set_antialias(options.get(), CAIRO_ANTIALIAS_GRAY);
  pango_cairo_context_set_font_options(context.get(), options.get());
  pango_context_set_round_glyph_positions(context.get(), FALSE);
  LayoutHandle layout(pango_layout_new(context.get()));
  const FontHandle font(pango_font_description_new());
  pango_font_description_set_family(font.get(), kFont);
  pango_font_description_set_absolute_size(font.get(), text.style.size_mm * PANGO_SCALE);
  pango_font_description_set_weight(font.get(),
                                    text.style.bold ? PANGO_WEIGHT_BOLD : PANGO_WEIGHT_NORMAL);
  pango_layout_set_font_description(layout.get(), font.get());
  const std::string words = clean(text.text);
  pango_layout_set_text(layout.get(), words.data(), static_cast<int>(words.size()));
  if (text.width_mm > 0.0) {
    pango_layout_set_width(layout.get(), pango_units(text.width_mm));
    pango_layout_set_wrap(layout.get(), PANGO_WRAP_WORD_CHAR);
    pango_layout_set_height(layout.get(), -text.most_lines);
    pango_layout_set_ellipsize(layout.get(), PANGO_ELLIPSIZE_END);
    pango_layout_set_alignment(layout.get(), alignment(text.anchor));
  }
  return layout;
}

// The painter of one file: what it collects while painting goes into the file afterwards.
class Painter {
 public:
  explicit Painter(cairo_surface_t* surface) : cr_(cairo_create(surface)) {}

  cairo_t* context() { return cr_.get(); }

  void paint_page(const Picture& picture) {
    // All of it, the last dots of a page that isn't a whole number of them wide too.
    cairo_set_source_rgb(cr_.get(), 1.0, 1.0, 1.0);
    cairo_paint(cr_.get());
    cairo_set_line_join(cr_.get(), CAIRO_LINE_JOIN_ROUND);
    paint_group(picture.content);
  }

  const std::vector<PaintedLine>& lines() const { return lines_; }
  std::vector<std::string> take_warnings() { return std::move(warnings_); }

 private:
  void paint_group(const Group& group) {
    for (const Mark& mark : group.marks) {
      if (const auto* path = std::get_if<Path>(&mark.content)) paint(cr_.get(), *path);
      if (const auto* symbols = std::get_if<Symbols>(&mark.content)) paint(cr_.get(), *symbols);
      if (const auto* text = std::get_if<Text>(&mark.content)) paint_text(*text);
      if (const auto* inner = std::get_if<Group>(&mark.content)) paint_group(*inner);
      require_success(cairo_status(cr_.get()));
    }
  }

  void paint_text(const Text& text) {
    const LayoutHandle layout = lay_out(cr_.get(), text);
    if (const int unknown = pango_layout_get_unknown_glyphs_count(layout.get()); unknown > 0) {
      warnings_.push_back(
          fmt::format("drawing: no installed font has all letters of '{}' ({} missing)",
                      printable(clean(text.text)), unknown));
    }
    PangoRectangle box;
    pango_layout_get_extents(layout.get(), nullptr, &box);
    const double width = text.width_mm > 0.0 ? text.width_mm : millimetres(box.width);
    const double left = text.anchor == Anchor::start    ? text.at.x_mm
                        : text.anchor == Anchor::middle ? text.at.x_mm - width / 2.0
                                                        : text.at.x_mm - width;
    const double top = text.at.y_mm - millimetres(pango_layout_get_baseline(layout.get()));
    set_colour(cr_.get(), text.style.colour);
    cairo_move_to(cr_.get(), left, top);
    pango_cairo_show_layout(cr_.get(), layout.get());
    remember_lines(layout.get(), left, top, text.style.size_mm);
  }

  void remember_lines(PangoLayout* layout, double left, double top, double size_mm) {
    const std::string_view words = pango_layout_get_text(layout);
    std::unique_ptr<PangoLayoutIter, Freed<pango_layout_iter_free>> at(
        pango_layout_get_iter(layout));
    do {
      const PangoLayoutLine* line = pango_layout_iter_get_line_readonly(at.get());
      PangoRectangle box;
      pango_layout_iter_get_line_extents(at.get(), nullptr, &box);
      if (line->length == 0) continue;
      lines_.push_back({std::string(words.substr(static_cast<std::size_t>(line->start_index),
                                                 static_cast<std::size_t>(line->length))),
                        left + millimetres(box.x),
                        top + millimetres(pango_layout_iter_get_baseline(at.get())),
                        millimetres(box.width), size_mm});
    } while (pango_layout_iter_next_line(at.get()));
  }

  ContextHandle cr_;
  std::vector<PaintedLine> lines_;
  std::vector<std::string> warnings_;
};

void finish(cairo_surface_t* surface) {
  cairo_surface_finish(surface);
  require_success(cairo_surface_status(surface));
}

void set_document_facts(cairo_surface_t* surface, const std::string& title, std::int64_t seconds) {
  const std::string date =
      fmt::format("{:%Y-%m-%dT%H:%M:%SZ}", fmt::gmtime(static_cast<std::time_t>(seconds)));
  const std::string creator = fmt::format("brink {}", version());
  cairo_pdf_surface_set_metadata(surface, CAIRO_PDF_METADATA_TITLE, clean(title).c_str());
  cairo_pdf_surface_set_metadata(surface, CAIRO_PDF_METADATA_CREATOR, creator.c_str());
  cairo_pdf_surface_set_metadata(surface, CAIRO_PDF_METADATA_CREATE_DATE, date.c_str());
  cairo_pdf_surface_set_metadata(surface, CAIRO_PDF_METADATA_MOD_DATE, date.c_str());
}

void add_outline_entry(cairo_surface_t* surface, const std::string& title, std::size_t page) {
  cairo_pdf_surface_add_outline(surface, CAIRO_PDF_OUTLINE_ROOT, clean(title).c_str(),
                                fmt::format("page={}", page).c_str(), CAIRO_PDF_OUTLINE_FLAG_OPEN);
}

}  // namespace

Painted paint_svg(const Picture& picture, std::string_view id_prefix) {
  check(picture);
  std::string svg;
  const SurfaceHandle surface(
      cairo_svg_surface_create_for_stream(append, &svg, picture.width_mm, picture.height_mm));
  cairo_svg_surface_set_document_unit(surface.get(), CAIRO_SVG_UNIT_MM);
  Painter painter(surface.get());
  painter.paint_page(picture);
  finish(surface.get());
  const std::string own = with_own_ids(svg, id_prefix);
  return {with_words(own, id_prefix, clean(picture.content.title), clean(description_of(picture)),
                     painter.lines()),
          painter.take_warnings()};
}

Painted paint_pdf(const std::vector<Picture>& pages, std::int64_t seconds) {
  if (pages.empty()) throw Error(ErrorKind::argument, {}, "a PDF needs at least one page");
  for (const Picture& page : pages) check(page);
  std::string pdf;
  const SurfaceHandle surface(cairo_pdf_surface_create_for_stream(
      append, &pdf, pages[0].width_mm * kPointsPerMm, pages[0].height_mm * kPointsPerMm));
  set_document_facts(surface.get(), pages[0].content.title, seconds);
  Painter painter(surface.get());
  cairo_scale(painter.context(), kPointsPerMm, kPointsPerMm);
  cairo_tag_begin(painter.context(), "Document", nullptr);
  for (std::size_t i = 0; i < pages.size(); ++i) {
    cairo_pdf_surface_set_size(surface.get(), pages[i].width_mm * kPointsPerMm,
                               pages[i].height_mm * kPointsPerMm);
    painter.paint_page(pages[i]);
    if (pages.size() > 1) add_outline_entry(surface.get(), pages[i].content.title, i + 1);
    cairo_show_page(painter.context());
  }
  cairo_tag_end(painter.context(), "Document");
  finish(surface.get());
  return {std::move(pdf), painter.take_warnings()};
}

Painted paint_png(const Picture& picture, double dots_per_mm) {
  check(picture);
  constexpr double kMostDots = 20000.0;
  const double width = std::ceil(picture.width_mm * dots_per_mm);
  const double height = std::ceil(picture.height_mm * dots_per_mm);
  if (!(width >= 1.0 && width <= kMostDots && height >= 1.0 && height <= kMostDots)) {
    throw Error(ErrorKind::argument, {}, "the image's size in dots is out of range",
                fmt::format("{:.0f} x {:.0f}", width, height), "1 to 20000 a side");
  }
  const SurfaceHandle surface(cairo_image_surface_create(
      CAIRO_FORMAT_RGB24, static_cast<int>(width), static_cast<int>(height)));
  require_success(cairo_surface_status(surface.get()));
  Painter painter(surface.get());
  cairo_scale(painter.context(), dots_per_mm, dots_per_mm);
  painter.paint_page(picture);
  std::string png;
  require_success(cairo_surface_write_to_png_stream(surface.get(), append, &png));
  return {std::move(png), painter.take_warnings()};
}

TextSize measure(const Text& text) {
  const SurfaceHandle surface(cairo_image_surface_create(CAIRO_FORMAT_A8, 1, 1));
  const ContextHandle cr(cairo_create(surface.get()));
  const LayoutHandle layout = lay_out(cr.get(), text);
  PangoRectangle box;
  pango_layout_get_extents(layout.get(), nullptr, &box);
  return {millimetres(box.width), millimetres(box.height),
          millimetres(pango_layout_get_baseline(layout.get())),
          pango_layout_get_line_count(layout.get()),
          pango_layout_is_ellipsized(layout.get()) != FALSE};
}

}  // namespace brink::plot
