#pragma once
// The dome: the sky above a cell, cut into sectors of equal azimuth and bands of equal solid angle
// (bands are uniform in the sine of elevation, so they are finest near the horizon, where shade
// is decided). A sector holds several lines, so that thin things far away cast fans and not spokes;
// a band holds several steps, so that a horizon inside it counts in part.

#include <string>
#include <vector>

#include "sunfall/angle.h"
#include "sunfall/light.h"

namespace sunfall {

enum class DomeQuality { draft, standard, fine };
enum class SkyModel { clearness, isotropic, overcast };

struct Dome {
  int sectors = 72;
  int bands = 30;
  int lines_per_sector = 6;
  int steps_per_band = 4;
  // Horizons are looked for along as many directions in a sector as its low sun asks for: none stands
  // for more than this part of any period's beam from below 30 degrees.
  double beam_per_look = 0.015;

  static Dome of(DomeQuality quality);
  int lines() const { return sectors * lines_per_sector; }
  int steps() const { return bands * steps_per_band; }
  // The azimuth at the middle of a line's share of the sector. Line 0 starts at true north.
  Azimuth line_azimuth(int line) const { return {Angle::degrees(360.0 * (line + 0.5) / lines())}; }
};

// A named stretch of the year, both days included; from > to runs over New Year.
struct Period {
  std::string name;  // "01" … "12" for the months, else the plan's own name
  std::chrono::month_day from;
  std::chrono::month_day to;
};
std::vector<Period> month_periods();
bool holds(const Period& period, std::chrono::month_day day);

// The open field of one calendar year of a series: the mean day's photons on a level plane per period,
// mol m-2 d-1, and the number of days behind it. A period's days are those of the year itself, also where
// it runs over New Year. Without a day in the year (29 February) its light is missing (NaN).
struct OpenYear {
  int year = 0;
  std::vector<double> beam;
  std::vector<double> sky;
  std::vector<int> days;
  bool made = false;  // a made year: it does not stand for a year, and percentiles over such say nothing
};
std::vector<OpenYear> open_years(const LightSeries& series, const std::vector<Period>& periods);

// For each period, the mean daily photons (mol m-2 d-1) that arrive in the open from each line
// and step. Arrays are [line][step][period], flat.
//   level:  falling on a level plane
//   facing: falling on a vertical plane that faces the line's azimuth
struct DomeLight {
  struct Part {
    std::vector<double> level;
    std::vector<double> facing;
    std::vector<double> open;  // [period]: the sum of level over the dome
  };
  Dome dome;
  std::vector<Period> periods;
  Part beam;
  Part sky;
  std::vector<OpenYear> years;  // of the series, in their order

  std::size_t index(int line, int step, std::size_t period) const {
    return (static_cast<std::size_t>(line) * static_cast<std::size_t>(dome.steps()) +
            static_cast<std::size_t>(step)) *
               periods.size() +
           period;
  }
};

// Beam light is shared bilinearly between the neighbouring lines and steps of the sun's path;
// nothing is lost or made: open equals the series' own mean to 1e-6.
DomeLight make_dome_light(const LightSeries& series, const Dome& dome, SkyModel sky,
                          const std::vector<Period>& periods);

}  // namespace sunfall
