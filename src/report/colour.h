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

// The colours of everything that is not light, as bytes, which every renderer rounds alike.
namespace ink {
constexpr Colour of(int red, int green, int blue) { return {red / 255.0, green / 255.0, blue / 255.0}; }
inline constexpr Colour kPaper = of(255, 255, 255);
inline constexpr Colour kText = of(33, 38, 43);
inline constexpr Colour kQuiet = of(92, 99, 107);
inline constexpr Colour kRule = of(204, 209, 212);
inline constexpr Colour kAccent = of(166, 71, 28);
inline constexpr Colour kSky = of(92, 135, 143);
inline constexpr Colour kLand = of(74, 84, 82);
inline constexpr Colour kAir = of(245, 248, 250);
inline constexpr Colour kHatch = of(128, 133, 138);
inline constexpr Colour kHatchGround = of(242, 242, 242);
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
