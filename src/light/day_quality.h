#pragma once
// Which days of a daily record of radiation can be.

#include <string>
#include <vector>

#include "light/interval_sun.h"
#include "light/readings.h"

namespace sunfall {

struct DayTally {
  long days = 0;
  long impossible = 0;  // negative, or more than comes in above the air
  long open = 0;        // whose parts do not sum to the whole: by 15 %, or a diffuse 10 % above the global
  long dark = 0;        // under half a per cent of what comes in
  long stuck = 0;       // the same value for five days or longer

  std::string note() const;  // empty where nothing was rejected
};

// Days that cannot be become missing. `watts` is the mean W m-2 of one of the file's unit, near enough for
// photons. A trace (0.05 MJ) in polar night and a thermopile's −4 W m-2 pass.
DayTally judge_days(Readings& readings, const std::vector<IntervalSun>& suns, double watts);

}  // namespace sunfall
