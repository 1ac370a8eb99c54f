#pragma once
// The standard atmosphere as far as light needs it: pressure by height, and refraction.

#include "sunfall/angle.h"

namespace sunfall {

// ICAO standard atmosphere, Pa; heights above 11 km are taken as 11 km.
double standard_pressure_pa(double height_m);

// What refraction adds to a geometric elevation, at a pressure and 10 °C:
// Saemundsson's formula as in Reda and Andreas (2004, eq. 42). It fades out smoothly between
// -0.83 degrees, where the last of the sun has set, and -2.5 degrees.
Angle refraction(Angle geometric_elevation, double pressure_pa);

}  // namespace sunfall
