#pragma once
// Which readings can be light: published limits, closure, spikes, sensors that are stuck or dark by day.

#include <string>
#include <vector>

#include "light/interval_sun.h"
#include "light/readings.h"

namespace sunfall {

// A record made into W m-2 (a quantum sensor's roughly, for the limits).
struct QualityTally {
  long impossible = 0;  // outside the physically possible limits
  long rare = 0;        // above the extremely rare limits; kept
  long open = 0;        // the parts do not sum to the whole
  long spikes = 0;      // far from the readings before and after, to one side of both
  long stuck = 0;       // the same value for hours by day
  long dark = 0;        // no light for hours by day
  long judged = 0;      // readings by day
  long rejected() const { return impossible + open + spikes + stuck + dark; }
  std::string notes() const;
};

// Sets readings that fail to NaN, in all quantities. `watts` is W m-2 of one of the file's unit.
QualityTally judge(Readings& readings, const std::vector<IntervalSun>& suns, double watts);

}  // namespace sunfall
