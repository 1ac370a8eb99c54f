#pragma once
// Smooth noise that is the same on every machine: no library's random numbers, a fixed seed.

namespace alder_reach {

// Gradient noise after Perlin (2002, "Improving noise"): about -1 to 1, mean 0, features of size 1.
double noise(double x, double y, unsigned seed);

// A sum of `octaves` of noise, each half as large and half as strong as the one before.
double layered_noise(double x, double y, unsigned seed, int octaves);

}  // namespace alder_reach
