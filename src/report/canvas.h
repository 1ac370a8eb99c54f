#pragma once
// A sheet to draw on, thin over cairo: PNG or SVG by the file's extension. Units are picture units
// (pixels of a PNG at scale 1), x to the right, y down. Every text's box is kept, so that a layout
// can keep clear of what is already written and a test can prove that nothing overlaps.

#include <cstdint>
#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include "report/colour.h"

namespace sunfall {

struct Point {
  double x = 0.0;
  double y = 0.0;
};

struct Box {
  double x = 0.0;
  double y = 0.0;
  double width = 0.0;
  double height = 0.0;

  double right() const { return x + width; }
  double bottom() const { return y + height; }
  Point middle() const { return {x + 0.5 * width, y + 0.5 * height}; }
  Box grown(double margin) const {
    return {x - margin, y - margin, width + 2.0 * margin, height + 2.0 * margin};
  }
  bool holds(const Box& inner) const {
    return inner.x >= x && inner.y >= y && inner.right() <= right() && inner.bottom() <= bottom();
  }
  bool overlaps(const Box& other) const {
    return x < other.right() && other.x < right() && y < other.bottom() && other.y < bottom();
  }
};

enum class Align { left, centre, right };

struct TextStyle {
  double size = 20.0;
  bool bold = false;
  Colour colour = ink::kText;
  Align align = Align::left;
  std::optional<Colour> rim{};  // around the letters, for text on a picture
};

struct LineStyle {
  double width = 1.0;
  Colour colour = ink::kText;
  double opacity = 1.0;
  double dash = 0.0;  // length of dashes and gaps; 0 draws it through
};

// Pixels row by row, 0xAARRGGBB, premultiplied by alpha.
struct PixelImage {
  int width = 0;
  int height = 0;
  std::vector<std::uint32_t> pixels;
};
std::uint32_t opaque_pixel(const Colour& colour);

class Canvas {
 public:
  // `scale` pixels of a PNG per unit. Throws Error(plan) for another extension than .png or .svg.
  Canvas(std::filesystem::path file, double width, double height, double scale = 1.0);
  Canvas(Canvas&&) noexcept;
  Canvas& operator=(Canvas&&) noexcept;
  ~Canvas();

  double width() const;
  double height() const;
  double scale() const;

  void fill(const Box& box, const Colour& colour, double opacity = 1.0);
  void outline(const Box& box, const LineStyle& style);
  void line(const std::vector<Point>& points, const LineStyle& style);
  // Rings fill by the even-odd rule.
  void fill_rings(const std::vector<std::vector<Point>>& rings, const Colour& colour, double opacity = 1.0);
  void outline_rings(const std::vector<std::vector<Point>>& rings, const LineStyle& style);
  void dot(Point centre, double radius, const Colour& colour);
  // The mark of "no value": slanting strokes.
  void hatch(const Box& box);
  // Every pixel as one rectangle, never smoothed.
  void image(const Box& box, const PixelImage& image);

  // Writes at the baseline point and returns the text's box.
  Box text(Point baseline, const std::string& text, const TextStyle& style);
  Box measure(Point baseline, const std::string& text, const TextStyle& style) const;
  // The text, cut with an ellipsis to fit the width.
  std::string fitted(const std::string& text, double width, const TextStyle& style) const;
  // True where `box` would touch no text so far.
  bool is_free(const Box& box) const;

  // What is drawn while the guard lives shows only within the box.
  class Clip {
   public:
    Clip(Canvas& canvas, const Box& box);
    Clip(const Clip&) = delete;
    Clip& operator=(const Clip&) = delete;
    ~Clip();

   private:
    Canvas& canvas_;
  };

  struct WrittenText {
    std::string text;
    double size;
    Box box;
  };
  const std::vector<WrittenText>& texts() const;

  // Writes the file whole or not at all. Nothing can be drawn afterwards. Throws Error(io).
  void save();

 private:
  struct State;
  std::unique_ptr<State> state_;
};

// Text that cairo takes: broken UTF-8 becomes U+FFFD, control characters become spaces.
std::string clean_text(const std::string& text);

}  // namespace sunfall
