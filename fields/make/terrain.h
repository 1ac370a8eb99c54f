#pragma once
// The bare ground of the invented farm Alder Reach and of the county around it, one function for
// both, so that the two rasters agree where they meet.

#include "shapes.h"

namespace alder_reach {

// Height in metres. Good for some kilometres around the farm.
double ground_height(Point point);

}  // namespace alder_reach
