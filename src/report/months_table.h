#pragma once
// One place's light month by month, beam and sky apart, as bars with their numbers.

#include <string>
#include <vector>

#include "report/canvas.h"

namespace sunfall {

// Daily light integrals, mol m-2 d-1.
struct MonthLight {
  std::string name;  // "Jan"; also "Year"
  double beam = 0.0;
  double sky = 0.0;
  double open_field = 0.0;  // beam and sky of the open field together
};

// Fills `box` from its top. Returns the y below.
double draw_months_table(Canvas& canvas, const Box& box, const std::vector<MonthLight>& months);

}  // namespace sunfall
