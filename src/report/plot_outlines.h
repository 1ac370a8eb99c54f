#pragma once
// Plots drawn thin over a map.

#include <vector>

#include "report/canvas.h"
#include "report/contact_sheet.h"

namespace sunfall {

// Outlines within `box`, which shows `frame` mostly in the colour `ground`. An id is written where it
// fits its plot and touches no other text.
void draw_plot_outlines(Canvas& canvas, const Box& box, const GridFrame& frame,
                        const std::vector<PlotOutline>& plots, const Colour& ground);

}  // namespace sunfall
