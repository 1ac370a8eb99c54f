// The light scale is even, and everyone can read it.

#include "report/colour.h"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <random>

namespace sunfall {
namespace {

Colour rounded(const Colour& colour) {
  const auto byte = [](double part) { return std::round(part * 255.0) / 255.0; };
  return {byte(colour.red), byte(colour.green), byte(colour.blue)};
}

// CIELAB (D65) of sRGB's primaries and white, as colour calculators print them.
TEST(Colour, LabOfThePrimariesIsAsPublished) {
  const auto expect_lab = [](const Colour& colour, const Lab& lab) {
    EXPECT_NEAR(to_lab(colour).lightness, lab.lightness, 0.01);
    EXPECT_NEAR(to_lab(colour).a, lab.a, 0.02);
    EXPECT_NEAR(to_lab(colour).b, lab.b, 0.02);
  };
  expect_lab({1, 0, 0}, {53.2408, 80.0925, 67.2032});
  expect_lab({0, 1, 0}, {87.7347, -86.1827, 83.1793});
  expect_lab({0, 0, 1}, {32.2970, 79.1875, -107.8602});
  expect_lab({1, 1, 1}, {100.0, 0.0, 0.0});
  expect_lab({0, 0, 0}, {0.0, 0.0, 0.0});
}

TEST(Colour, LabGoesThereAndBack) {
  // The two 7-digit matrices invert each other to about 1e-6 in linear light, steepest (× 12.92) at black.
  for (double red = 0.0; red <= 1.0; red += 0.25) {
    for (double green = 0.0; green <= 1.0; green += 0.25) {
      for (double blue = 0.0; blue <= 1.0; blue += 0.25) {
        const Colour back = from_lab(to_lab({red, green, blue}));
        EXPECT_NEAR(back.red, red, 2e-5);
        EXPECT_NEAR(back.green, green, 2e-5);
        EXPECT_NEAR(back.blue, blue, 2e-5);
      }
    }
  }
}

// W3C's guidelines: black on white is 21:1; #777777 on white falls just short of 4.5 and #767676 passes.
TEST(Colour, ContrastIsTheGuidelines) {
  const Colour white{1, 1, 1};
  EXPECT_NEAR(contrast({0, 0, 0}, white), 21.0, 1e-9);
  EXPECT_NEAR(contrast(white, {0, 0, 0}), 21.0, 1e-9);
  const double seven = 0x77 / 255.0;
  const double six = 0x76 / 255.0;
  EXPECT_NEAR(contrast({seven, seven, seven}, white), 4.48, 0.005);
  EXPECT_NEAR(contrast({six, six, six}, white), 4.54, 0.005);
}

TEST(LightScale, LightnessRisesEvenlyInBytes) {
  const double low = to_lab(light_colour(0.0)).lightness;
  const double high = to_lab(light_colour(1.0)).lightness;
  EXPECT_GT(high - low, 75.0);
  double before = -1.0;
  for (int i = 0; i <= 1000; ++i) {
    const double share = i / 1000.0;
    const Colour colour = light_colour(share);
    const Lab lab = to_lab(rounded(colour));
    // Rounding moves each part by half a byte at most; the stops' straight pieces add a trace.
    double rounding = 0.01;
    for (double Colour::*part : {&Colour::red, &Colour::green, &Colour::blue}) {
      Colour moved = colour;
      moved.*part += 0.5 / 255.0;
      rounding += std::abs(to_lab(moved).lightness - to_lab(colour).lightness);
    }
    EXPECT_NEAR(lab.lightness, low + (high - low) * share, rounding) << share;
    if (i % 10 == 0) {
      EXPECT_GT(lab.lightness, before) << share;
      before = lab.lightness;
    }
  }
}

TEST(LightScale, EqualStepsLookEquallyLarge) {
  double least = 1e9;
  double most = 0.0;
  for (int i = 0; i < 10; ++i) {
    const double step =
        colour_difference(to_lab(light_colour(i / 10.0)), to_lab(light_colour((i + 1) / 10.0)));
    least = std::min(least, step);
    most = std::max(most, step);
  }
  // A tenth's chord is shorter than its path where the path bends, here by up to 5 %.
  EXPECT_LT(most / least, 1.06) << least << " to " << most;
}

TEST(LightScale, StaysWithinTheGamutAndItsEnds) {
  for (int i = 0; i <= 100; ++i) {
    const Colour colour = light_colour(i / 100.0);
    for (const double part : {colour.red, colour.green, colour.blue}) {
      EXPECT_GT(part, 0.0);  // a cut part would be exactly 0 or 1
      EXPECT_LT(part, 1.0);
    }
  }
  EXPECT_EQ(hexadecimal(light_colour(-3.0)), hexadecimal(light_colour(0.0)));
  EXPECT_EQ(hexadecimal(light_colour(7.0)), hexadecimal(light_colour(1.0)));
  EXPECT_EQ(hexadecimal({1.0, 0.5, 0.0}), "#ff8000");
}

// Machado, Oliveira and Fernandes (2009), "A physiologically-based model for simulation of color
// vision deficiency", severity 1.0: matrices on linear RGB (the digits agree in three public copies).
using Matrix = std::array<std::array<double, 3>, 3>;
constexpr Matrix kProtanopia{
    {{0.152286, 1.052583, -0.204868}, {0.114503, 0.786281, 0.099216}, {-0.003882, -0.048116, 1.051998}}};
constexpr Matrix kDeuteranopia{
    {{0.367322, 0.860646, -0.227968}, {0.280085, 0.672501, 0.047413}, {-0.011820, 0.042940, 0.968881}}};
constexpr Matrix kTritanopia{
    {{1.255528, -0.076749, -0.178779}, {-0.078411, 0.930809, 0.147602}, {0.004733, 0.691367, 0.303900}}};

Colour as_seen(const Colour& colour, const Matrix& matrix) {
  const auto linear = [](double c) { return c <= 0.04045 ? c / 12.92 : std::pow((c + 0.055) / 1.055, 2.4); };
  const auto coded = [](double c) {
    c = std::clamp(c, 0.0, 1.0);
    return c <= 0.0031308 ? 12.92 * c : 1.055 * std::pow(c, 1.0 / 2.4) - 0.055;
  };
  const std::array<double, 3> in{linear(colour.red), linear(colour.green), linear(colour.blue)};
  std::array<double, 3> out{};
  for (int row = 0; row < 3; ++row) {
    for (int column = 0; column < 3; ++column) out[row] += matrix[row][column] * in[column];
  }
  return {coded(out[0]), coded(out[1]), coded(out[2])};
}

TEST(LightScale, TenthsAreToldApartByColourBlindEyes) {
  // A just noticeable difference is about 2.3 (Mahy, Van Eycken and Oosterlinck 1994); three of
  // them are seen at a glance.
  constexpr double kAtAGlance = 3.0 * 2.3;
  for (const Matrix& eye : {kProtanopia, kDeuteranopia, kTritanopia}) {
    for (int i = 0; i < 10; ++i) {
      const Lab one = to_lab(as_seen(rounded(light_colour(i / 10.0)), eye));
      const Lab next = to_lab(as_seen(rounded(light_colour((i + 1) / 10.0)), eye));
      EXPECT_GT(colour_difference(one, next), kAtAGlance) << "tenth " << i;
      EXPECT_GT(next.lightness, one.lightness) << "tenth " << i;
    }
  }
}

TEST(LightScale, TextAndMarksStandOut) {
  // W3C's guidelines: 4.5 for text, 3 for large text and for marks.
  EXPECT_GT(contrast(ink::kText, ink::kPaper), 7.0);
  EXPECT_GT(contrast(ink::kQuiet, ink::kPaper), 4.5);
  EXPECT_GT(contrast(ink::kAccent, ink::kPaper), 4.5);
  EXPECT_GT(contrast(ink::kHatch, ink::kHatchGround), 3.0);
  for (int i = 0; i <= 100; ++i) {
    const Colour ground = light_colour(i / 100.0);
    EXPECT_GT(std::max(contrast(ink::kText, ground), contrast(ink::kPaper, ground)), 3.0) << i;
    // "No value" is never taken for a value.
    EXPECT_GT(colour_difference(to_lab(ground), to_lab(ink::kHatchGround)), 20.0) << i;
  }
}

TEST(LightScale, HasRoundTicks) {
  const auto expect_scale = [](double largest, double maximum, double step) {
    const LightScale scale = LightScale::holding(largest);
    EXPECT_NEAR(scale.maximum, maximum, 1e-9 * maximum) << largest;
    EXPECT_NEAR(scale.step, step, 1e-9 * step) << largest;
  };
  expect_scale(38.2, 40.0, 5.0);
  expect_scale(40.0, 40.0, 5.0);
  expect_scale(40.1, 45.0, 5.0);
  expect_scale(4.2, 4.5, 0.5);
  expect_scale(20.0, 20.0, 2.0);
  expect_scale(20.1, 25.0, 5.0);
  expect_scale(100.0, 100.0, 10.0);
  expect_scale(0.07, 0.07, 0.01);
  for (const double nothing : std::vector<double>{0.0, -1.0, std::nan(""), INFINITY})
    EXPECT_EQ(LightScale::holding(nothing).maximum, 1.0);
  EXPECT_EQ(LightScale::holding(40.0).ticks(), (std::vector<double>{0, 5, 10, 15, 20, 25, 30, 35, 40}));
}

TEST(LightScale, HoldsAnyLargestValueTightly) {
  std::mt19937 random(11);
  std::uniform_real_distribution<double> exponent(-4.0, 5.0);
  for (int i = 0; i < 5000; ++i) {
    const double largest = std::pow(10.0, exponent(random));
    const LightScale scale = LightScale::holding(largest);
    EXPECT_GE(scale.maximum, largest * (1.0 - 1e-9));
    EXPECT_LT(scale.maximum - scale.step, largest);
    EXPECT_LE(scale.maximum / scale.step, 10.0 + 1e-9);
    const double digit = scale.step / std::pow(10.0, std::floor(std::log10(scale.step) + 1e-9));
    EXPECT_TRUE(std::abs(digit - 1) < 1e-9 || std::abs(digit - 2) < 1e-9 || std::abs(digit - 5) < 1e-9)
        << digit;
  }
}

TEST(RoundDown, GivesOneTwoFive) {
  for (const auto& [value, rounded_down] : {std::pair{1.0, 1.0},
                                            {1.99, 1.0},
                                            {2.0, 2.0},
                                            {4.9, 2.0},
                                            {5.0, 5.0},
                                            {9.99, 5.0},
                                            {10.0, 10.0},
                                            {0.2, 0.2},
                                            {0.05, 0.05},
                                            {330.0, 200.0},
                                            {0.00071, 0.0005}}) {
    EXPECT_NEAR(round_down_125(value), rounded_down, 1e-12 * rounded_down) << value;
  }
}

}  // namespace
}  // namespace sunfall
