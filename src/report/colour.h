#pragma once
// Colours: the light scale of every picture and style, and what it takes to prove it fair. The scale
// runs from night blue over sage to pale straw. It is a path in CIELAB along which lightness and
// distance grow evenly, so that equal steps of light look like equal steps, in grey print and to
// colour-blind eyes too.

#include <cstdint>
#include <string>
#include <vector>

namespace sunfall {

// sRGB (IEC 61966-2-1), each part from 0 to 1.
struct Colour {
  double red = 0.0;
  double green = 0.0;
  double blue = 0.0;
};

// CIE 1976 L*a*b*, white point D65, 2 degree observer.
struct Lab {
  double lightness = 0.0;
  double a = 0.0;
  double b = 0.0;
};

Lab to_lab(const Colour& colour);
// Parts outside the sRGB gamut are cut off.
Colour from_lab(const Lab& lab);
// CIE 1976 colour difference.
double colour_difference(const Lab& one, const Lab& other);
// Contrast ratio of W3C's accessibility guidelines, 1 to 21; 4.5 is required of small text.
double contrast(const Colour& one, const Colour& other);
// "#rrggbb".
std::string hexadecimal(const Colour& colour);

// The colours of everything that is not light.
namespace ink {
inline constexpr Colour kPaper{1.0, 1.0, 1.0};
inline constexpr Colour kText{0.13, 0.15, 0.17};
inline constexpr Colour kQuiet{0.36, 0.39, 0.42};
inline constexpr Colour kRule{0.80, 0.82, 0.83};
inline constexpr Colour kAccent{0.65, 0.28, 0.11};
inline constexpr Colour kSky{0.36, 0.53, 0.56};
inline constexpr Colour kLand{0.29, 0.33, 0.32};
inline constexpr Colour kAir{0.96, 0.972, 0.978};
inline constexpr Colour kHatch{0.62, 0.64, 0.66};
inline constexpr Colour kHatchGround{0.95, 0.95, 0.95};
}  // namespace ink

// The colour at `share` of the scale, 0 dark to 1 bright; clamped outside.
Colour light_colour(double share);

// Round numbers, 1, 2 or 5 times a power of ten apart.
struct LightScale {
  double maximum = 1.0;  // a multiple of step; the scale starts at 0
  double step = 1.0;

  // The scale that holds `largest` with at most `most_steps` steps; a scale to 1 where `largest` is
  // missing, infinite or not above 0.
  static LightScale holding(double largest, int most_steps = 10);
  Colour colour(double value) const { return light_colour(value / maximum); }
  std::vector<double> ticks() const;
};

// The largest 1, 2 or 5 times a power of ten that is not above `value` (> 0).
double round_down_125(double value);

}  // namespace sunfall
