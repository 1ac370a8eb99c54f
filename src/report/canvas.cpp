#include "report/canvas.h"

#include <cairo-svg.h>
#include <cairo.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <utility>

#include "core/whole_file.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr const char* kFontFamily = "DejaVu Sans";

cairo_status_t append(void* bytes, const unsigned char* data, unsigned int length) {
  static_cast<std::string*>(bytes)->append(reinterpret_cast<const char*>(data), length);
  return CAIRO_STATUS_SUCCESS;
}

void set_colour(cairo_t* pen, const Colour& colour, double opacity) {
  cairo_set_source_rgba(pen, colour.red, colour.green, colour.blue, opacity);
}

// Unhinted, so that text is as wide in a PNG as in an SVG, whatever the machine's settings.
void set_font_options(cairo_t* pen) {
  cairo_font_options_t* options = cairo_font_options_create();
  cairo_font_options_set_antialias(options, CAIRO_ANTIALIAS_GRAY);
  cairo_font_options_set_hint_style(options, CAIRO_HINT_STYLE_NONE);
  cairo_font_options_set_hint_metrics(options, CAIRO_HINT_METRICS_OFF);
  cairo_set_font_options(pen, options);
  cairo_font_options_destroy(options);
}

void set_line(cairo_t* pen, const LineStyle& style) {
  set_colour(pen, style.colour, style.opacity);
  cairo_set_line_width(pen, style.width);
  cairo_set_line_join(pen, CAIRO_LINE_JOIN_ROUND);
  const std::array<double, 2> dashes{style.dash, style.dash};
  cairo_set_dash(pen, dashes.data(), style.dash > 0.0 ? 2 : 0, 0.0);
}

}  // namespace

struct Canvas::State {
  State(std::filesystem::path name, double w, double h, double s)
      : file(std::move(name)), width(w), height(h), scale(s) {}
  State(const State&) = delete;
  State& operator=(const State&) = delete;
  ~State() {
    if (pen != nullptr) cairo_destroy(pen);
    if (surface != nullptr) cairo_surface_destroy(surface);
  }

  void require(cairo_status_t status) const {
    if (status == CAIRO_STATUS_SUCCESS) return;
    throw Error(ErrorKind::io, {"the picture cannot be drawn", file.string(), cairo_status_to_string(status),
                                "check memory and disk space"});
  }
  void add_rings(const std::vector<std::vector<Point>>& rings) const {
    for (const std::vector<Point>& ring : rings) {
      cairo_new_sub_path(pen);
      for (const Point& point : ring) cairo_line_to(pen, point.x, point.y);
      cairo_close_path(pen);
    }
  }
  void select_font(const TextStyle& style) const {
    cairo_select_font_face(pen, kFontFamily, CAIRO_FONT_SLANT_NORMAL,
                           style.bold ? CAIRO_FONT_WEIGHT_BOLD : CAIRO_FONT_WEIGHT_NORMAL);
    cairo_set_font_size(pen, style.size);
  }

  std::filesystem::path file;
  double width;
  double height;
  double scale;
  bool is_svg = false;
  std::string svg_bytes;
  cairo_surface_t* surface = nullptr;
  cairo_t* pen = nullptr;
  std::vector<WrittenText> texts;
};

Canvas::Canvas(std::filesystem::path file, double width, double height, double scale)
    : state_(std::make_unique<State>(std::move(file), width, height, scale)) {
  State& s = *state_;
  const std::string extension = s.file.extension().string();
  if (extension == ".svg") {
    s.is_svg = true;
    s.surface = cairo_svg_surface_create_for_stream(append, &s.svg_bytes, width, height);
    cairo_svg_surface_set_document_unit(s.surface, CAIRO_SVG_UNIT_PX);
  } else if (extension == ".png") {
    s.surface = cairo_image_surface_create(CAIRO_FORMAT_RGB24, static_cast<int>(std::ceil(width * scale)),
                                           static_cast<int>(std::ceil(height * scale)));
  } else {
    throw Error(ErrorKind::plan, {"a picture is written as PNG or SVG", s.file.string(), extension,
                                  "let the file's name end in .png or .svg"});
  }
  s.require(cairo_surface_status(s.surface));
  s.pen = cairo_create(s.surface);
  s.require(cairo_status(s.pen));
  if (!s.is_svg) cairo_scale(s.pen, scale, scale);
  set_font_options(s.pen);
  fill({0, 0, width, height}, ink::kPaper);
}

Canvas::Canvas(Canvas&&) noexcept = default;
Canvas& Canvas::operator=(Canvas&&) noexcept = default;
Canvas::~Canvas() = default;

double Canvas::width() const { return state_->width; }
double Canvas::height() const { return state_->height; }
double Canvas::scale() const { return state_->scale; }
const std::vector<Canvas::WrittenText>& Canvas::texts() const { return state_->texts; }

void Canvas::fill(const Box& box, const Colour& colour, double opacity) {
  set_colour(state_->pen, colour, opacity);
  cairo_rectangle(state_->pen, box.x, box.y, box.width, box.height);
  cairo_fill(state_->pen);
}

void Canvas::outline(const Box& box, const LineStyle& style) {
  set_line(state_->pen, style);
  cairo_rectangle(state_->pen, box.x, box.y, box.width, box.height);
  cairo_stroke(state_->pen);
}

void Canvas::line(const std::vector<Point>& points, const LineStyle& style) {
  set_line(state_->pen, style);
  for (const Point& point : points) cairo_line_to(state_->pen, point.x, point.y);
  cairo_stroke(state_->pen);
}

void Canvas::fill_rings(const std::vector<std::vector<Point>>& rings, const Colour& colour, double opacity) {
  state_->add_rings(rings);
  set_colour(state_->pen, colour, opacity);
  cairo_set_fill_rule(state_->pen, CAIRO_FILL_RULE_EVEN_ODD);
  cairo_fill(state_->pen);
}

void Canvas::outline_rings(const std::vector<std::vector<Point>>& rings, const LineStyle& style) {
  state_->add_rings(rings);
  set_line(state_->pen, style);
  cairo_stroke(state_->pen);
}

void Canvas::dot(Point centre, double radius, const Colour& colour) {
  set_colour(state_->pen, colour, 1.0);
  cairo_new_sub_path(state_->pen);
  cairo_arc(state_->pen, centre.x, centre.y, radius, 0.0, 6.283185307179586);
  cairo_fill(state_->pen);
}

void Canvas::hatch(const Box& box) {
  constexpr double kGap = 9.0;
  const Clip clip(*this, box);
  fill(box, ink::kHatchGround);
  for (double x = box.x - box.height; x < box.right(); x += kGap) {
    cairo_move_to(state_->pen, x, box.bottom());
    cairo_line_to(state_->pen, x + box.height, box.y);
  }
  set_line(state_->pen, {1.5, ink::kHatch});
  cairo_stroke(state_->pen);
}

void Canvas::image(const Box& box, const PixelImage& image) {
  if (image.width == 0 || image.height == 0) return;
  // cairo only reads these pixels; for 32 bits a row needs no padding.
  auto* bytes = reinterpret_cast<unsigned char*>(const_cast<std::uint32_t*>(image.pixels.data()));
  cairo_surface_t* source = cairo_image_surface_create_for_data(bytes, CAIRO_FORMAT_ARGB32, image.width,
                                                                image.height, image.width * 4);
  cairo_t* pen = state_->pen;
  cairo_save(pen);
  cairo_rectangle(pen, box.x, box.y, box.width, box.height);
  cairo_clip(pen);
  cairo_translate(pen, box.x, box.y);
  cairo_scale(pen, box.width / image.width, box.height / image.height);
  cairo_set_source_surface(pen, source, 0.0, 0.0);
  cairo_pattern_set_filter(cairo_get_source(pen), CAIRO_FILTER_NEAREST);
  cairo_paint(pen);
  cairo_restore(pen);
  // An SVG surface keeps the source until it is finished: it must not outlive the pixels.
  cairo_surface_finish(source);
  cairo_surface_destroy(source);
}

Box Canvas::measure(Point baseline, const std::string& text, const TextStyle& style) const {
  state_->select_font(style);
  cairo_text_extents_t size;
  cairo_text_extents(state_->pen, clean_text(text).c_str(), &size);
  cairo_font_extents_t font;
  cairo_font_extents(state_->pen, &font);
  const double shift = style.align == Align::left     ? 0.0
                       : style.align == Align::centre ? -0.5 * size.x_advance
                                                      : -size.x_advance;
  // The font's own height above the baseline would count room for accents that few letters have.
  return {baseline.x + shift, baseline.y - 0.76 * style.size, size.x_advance,
          0.76 * style.size + font.descent};
}

Box Canvas::text(Point baseline, const std::string& text, const TextStyle& style) {
  const Box box = measure(baseline, text, style);
  const std::string clean = clean_text(text);
  if (style.rim) {
    cairo_move_to(state_->pen, box.x, baseline.y);
    cairo_text_path(state_->pen, clean.c_str());
    set_line(state_->pen, {0.24 * style.size, *style.rim, 0.85});
    cairo_stroke(state_->pen);
  }
  set_colour(state_->pen, style.colour, 1.0);
  cairo_move_to(state_->pen, box.x, baseline.y);
  cairo_show_text(state_->pen, clean.c_str());
  cairo_new_path(state_->pen);
  state_->texts.push_back({text, style.size, box});
  return box;
}

std::string Canvas::fitted(const std::string& text, double width, const TextStyle& style) const {
  // No sheet is wide enough for more; it bounds the work on an absurdly long name.
  constexpr std::size_t kMostBytes = 1000;
  std::string cut = clean_text(text.substr(0, kMostBytes));
  if (text.size() <= kMostBytes && measure({}, cut, style).width <= width) return cut;
  while (!cut.empty()) {
    // One character of UTF-8: its continuation bytes, then its first byte.
    while (!cut.empty() && (static_cast<unsigned char>(cut.back()) & 0xC0U) == 0x80U) cut.pop_back();
    if (!cut.empty()) cut.pop_back();
    while (!cut.empty() && cut.back() == ' ') cut.pop_back();
    if (measure({}, cut + "…", style).width <= width) break;
  }
  return cut + "…";
}

bool Canvas::is_free(const Box& box) const {
  return std::none_of(state_->texts.begin(), state_->texts.end(),
                      [&](const WrittenText& text) { return text.box.overlaps(box); });
}

Canvas::Clip::Clip(Canvas& canvas, const Box& box) : canvas_(canvas) {
  cairo_save(canvas_.state_->pen);
  cairo_rectangle(canvas_.state_->pen, box.x, box.y, box.width, box.height);
  cairo_clip(canvas_.state_->pen);
}
Canvas::Clip::~Clip() { cairo_restore(canvas_.state_->pen); }

void Canvas::save() {
  State& s = *state_;
  s.require(cairo_status(s.pen));
  std::string bytes;
  if (s.is_svg) {
    cairo_surface_finish(s.surface);
    s.require(cairo_surface_status(s.surface));
    bytes = std::move(s.svg_bytes);
  } else {
    cairo_surface_flush(s.surface);
    s.require(cairo_surface_write_to_png_stream(s.surface, append, &bytes));
  }
  write_whole_file(s.file, bytes);
}

std::uint32_t opaque_pixel(const Colour& colour) {
  const auto byte = [](double part) {
    return static_cast<std::uint32_t>(std::lround(std::clamp(part, 0.0, 1.0) * 255.0));
  };
  return 0xFF000000U | (byte(colour.red) << 16U) | (byte(colour.green) << 8U) | byte(colour.blue);
}

}  // namespace sunfall
