#pragma once
// A raster style for any GIS: OGC Styled Layer Descriptor 1.0.0 (OGC 02-070).

#include <filesystem>
#include <string>

#include "report/colour.h"

namespace sunfall {

struct RasterStyle {
  std::string name = "dli";                    // of the layer and the style
  std::string title = "Daily light integral";  // may hold any text
  std::string unit = "mol m-2 d-1";
  LightScale scale;
  double nodata = -9999.0;  // drawn transparent
};

// Entries lie a quarter of a legend step apart at most, so that a ramp between them keeps to the
// light scale.
std::string raster_sld(const RasterStyle& style);
// Whole or not at all. Throws Error(io).
void write_raster_sld(const std::filesystem::path& file, const RasterStyle& style);

}  // namespace sunfall
