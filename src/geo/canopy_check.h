#pragma once
// Whether the leaves of a canopy stand in the surface already: the same leaves must not shade twice.

#include <cstddef>
#include <optional>
#include <string>

#include "geo/canopy_source.h"
#include "geo/raster_source.h"

namespace sunfall {

struct CanopyInSurface {
  std::size_t leafy = 0;   // cells with leaves whose ground and surface are known
  std::size_t shared = 0;  // of these, whose surface reaches to within 1 m of the top of the leaves
  double fraction() const {
    return leafy == 0 ? 0.0 : static_cast<double>(shared) / static_cast<double>(leafy);
  }
};

// Over the whole map, strip by strip. The grids must agree. Leaves lower than 2 m are not looked at: bare
// ground lies within the error of their top too.
CanopyInSurface canopy_in_surface(const CanopySource& canopy, const RasterSource& ground,
                                  const RasterSource& surface);

// A sentence where half of the leaves or more stand in the surface; `name` is what the plan calls the canopy.
std::optional<std::string> canopy_in_surface_note(const CanopyInSurface& found, const std::string& name);

}  // namespace sunfall
