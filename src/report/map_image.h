#pragma once
// A grid of light as pixels.

#include "report/canvas.h"
#include "sunfall/grid.h"

namespace sunfall {

// One pixel per cell, or fewer pixels, each the mean of the cells that it covers, where the grid is
// larger than `most_columns` × `most_rows`. A missing cell is transparent, and so is a pixel that
// covers nothing else.
PixelImage light_image(const Grid<float>& light, const LightScale& scale, int most_columns, int most_rows);

}  // namespace sunfall
