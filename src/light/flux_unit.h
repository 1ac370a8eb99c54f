#pragma once
// Units of a record, and what a record is when its values do not fit the unit it claims.

#include <chrono>
#include <string>

#include "sunfall/light.h"

namespace sunfall {

std::string unit_name(SeriesSource::Unit unit);

bool is_per_day(SeriesSource::Unit unit);  // the unit's name says so
bool is_quantum(SeriesSource::Unit unit);  // photons

// Mean W m-2 over a step per one of the unit; for photons, mean µmol m-2 s-1.
double flux_per_unit(SeriesSource::Unit unit, std::chrono::seconds step);

// What W m-2 a photon flux of 1 µmol m-2 s-1 comes with, near enough for limits (2.02 µmol per J).
inline constexpr double kRough_w_umol = 1.0 / 2.02;

// W m-2 per one of the unit, whatever it counts, near enough for limits.
double rough_w_per_unit(SeriesSource::Unit unit, std::chrono::seconds step);

// Guesses the unit that a record really has from how many times too large its flux is: "lux",
// "J m-2 per step", … Empty where none fits.
std::string unit_of_values(double times_too_large, SeriesSource::Unit claimed, std::chrono::seconds step);

}  // namespace sunfall
