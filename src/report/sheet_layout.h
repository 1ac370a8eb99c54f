#pragma once
// How maps of one shape share a page: heading on top, maps in rows, a column for the legend on the
// right. The page shrinks to what the maps need.

#include "report/canvas.h"

namespace sunfall {

struct SheetLayout {
  double width = 0.0;
  double height = 0.0;
  int columns = 1;
  int rows = 1;
  double map_width = 0.0;
  double map_height = 0.0;
  double panel_width = 0.0;  // a map's caption may be wider than the map
  double caption_height = 0.0;
  double gap_x = 0.0;
  double gap_y = 0.0;
  Box side;  // the legend's column

  Box map(int index) const;      // panels fill row by row
  Box caption(int index) const;  // beneath the map
};

struct SheetRequest {
  int maps = 12;
  double aspect = 1.0;         // a map's width over its height
  double most_width = 2400.0;  // of the page
  double most_height = 1700.0;
};

// The arrangement that draws the maps largest.
SheetLayout lay_out(const SheetRequest& request);

}  // namespace sunfall
