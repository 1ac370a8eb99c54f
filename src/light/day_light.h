#pragma once
// What every source of daily values shares: from the light of days to the finished series.

#include <limits>
#include <string>
#include <vector>

#include "light/open_series.h"

namespace sunfall {

// Sums over a day's steps of mean W m-2, or of photons in µmol m-2 s-1; NaN where not known.
struct DayLight {
  double global = std::numeric_limits<double>::quiet_NaN();
  double sky = std::numeric_limits<double>::quiet_NaN();
};

struct DayLightOptions {
  DaySplit split = DaySplit::erbs;
  bool photons = false;
  bool allow_gaps = false;
  std::string file;      // for messages
  std::string rejected;  // what of the record counts as missing though it is there, in words
};

// Lays the days over the series' steps, splits those of which only the global is known, fills days that are
// not known (gaps.h), and adds the photons. Notes what was split and filled.
void fill_days(LightSeries& series, const std::vector<DayLight>& days, const DayLightOptions& options);

}  // namespace sunfall
