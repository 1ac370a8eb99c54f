#pragma once
// What stands around a picture's maps and charts: heading, notes, legend, scale bar, north arrow.

#include <string>

#include "report/canvas.h"

namespace sunfall {

// What every picture says about itself.
struct PictureText {
  std::string title;        // the plan's name
  std::string place;        // "5.6654° E, 51.9692° N · EPSG:25831"
  std::string light;        // the light's source in one line
  bool is_ceiling = false;  // a cloudless ceiling; shown as a badge
};

inline constexpr double kPageMargin = 96.0;
inline constexpr double kHeadingHeight = 136.0;  // from the margin down to what follows
// With no-break spaces, so that a wrapped text keeps it together.
inline constexpr const char* kDliUnit = "mol\u00A0m⁻²\u00A0d⁻¹";

// Title, what it shows, and the place, across the top.
void draw_heading(Canvas& canvas, const PictureText& text, const std::string& subject);

// Words wrapped into lines of at most `width`; the last of `most_lines` is cut. Returns the y below.
double draw_paragraph(Canvas& canvas, Point top_left, double width, const std::string& text,
                      const TextStyle& style, int most_lines = 6);

// An upright colour scale with its ticks. Returns the y below.
double draw_legend(Canvas& canvas, Point top_left, double height, const LightScale& scale,
                   const std::string& quantity, const std::string& unit);

// A bar of round length, at most `most_width` long. Returns the y below.
double draw_scale_bar(Canvas& canvas, Point top_left, double most_width, double units_per_metre);

// An arrow to true north on a map whose grid north is up. `convergence_deg` is the bearing of grid
// north, clockwise from true north. Returns the y below.
double draw_north_arrow(Canvas& canvas, Point top_left, double convergence_deg);

// Says that a picture shows a cloudless ceiling. Returns the y below.
double draw_ceiling_badge(Canvas& canvas, Point top_left, double width);

// "12.3", or "no value" where missing.
std::string light_text(double value);
// A tick's number with the decimals that its step needs.
std::string tick_text(double value, double step);
// "250 m", "2 km".
std::string length_text(double length_m);

}  // namespace sunfall
