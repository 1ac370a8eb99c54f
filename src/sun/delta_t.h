#pragma once
// Terrestrial time, in which the planets move, from UTC, by which clocks run.

#include "sunfall/time.h"

namespace sunfall {

// TT - UTC in seconds, with UT1 taken as UTC. From 1972 to 2026 by the table of leap seconds;
// before by the polynomials of Espenak and Meeus (2006) for Delta T; after it the last value of the
// table plus the growth that the polynomials foretell. One second more or less moves the sun by
// 1.1e-5 degrees, so that the guess matters little even in 2100.
double tt_minus_utc_s(UtcTime time);

// Delta T by the polynomials alone, s; `year` with fraction, 1941 to 2150.
double polynomial_delta_t_s(double year);

}  // namespace sunfall
