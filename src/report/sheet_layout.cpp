#include "report/sheet_layout.h"

#include <algorithm>
#include <cmath>
#include <initializer_list>

#include "report/furniture.h"

namespace sunfall {
namespace {

constexpr double kSideWidth = 350.0;
constexpr double kSideGap = 72.0;
constexpr double kGapX = 44.0;
constexpr double kGapY = 40.0;
constexpr double kLeastPanel = 230.0;  // narrower would not hold a caption
constexpr double kLeastMapHeight = 8.0;
constexpr double kLeastWidth = 1500.0;   // the heading's needs
constexpr double kLeastHeight = 1320.0;  // the legend column's needs
constexpr double kWideCaption = 330.0;   // from here on the caption takes two lines instead of three
constexpr double kWideCaptionHeight = 72.0;
constexpr double kNarrowCaptionHeight = 98.0;

// The largest maps in so many columns; map_width is 0 where they do not fit.
SheetLayout arrange(const SheetRequest& request, int columns) {
  SheetLayout layout;
  layout.columns = columns;
  layout.rows = (request.maps + columns - 1) / columns;
  layout.gap_x = kGapX;
  layout.gap_y = kGapY;
  const double room_x = request.most_width - 2.0 * kPageMargin - kSideWidth - kSideGap;
  const double room_y = request.most_height - 2.0 * kPageMargin - kHeadingHeight;
  const double panel = (room_x - (columns - 1) * kGapX) / columns;
  if (panel < kLeastPanel) return layout;
  // Maps that the height makes narrower may need the taller caption, which leaves less height.
  for (const double caption : {kWideCaptionHeight, kNarrowCaptionHeight}) {
    const double tallest = (room_y - (layout.rows - 1) * kGapY) / layout.rows - caption;
    if (tallest < kLeastMapHeight) continue;
    layout.caption_height = caption;
    layout.map_width = std::min(panel, tallest * request.aspect);
    layout.map_height = layout.map_width / request.aspect;
    layout.panel_width = std::max(layout.map_width, std::min(panel, kLeastPanel));
    if (layout.panel_width >= kWideCaption) break;
  }
  return layout;
}

// The page around the maps. A page that the legend or the heading makes larger than the maps need
// spreads them.
void fit_page(SheetLayout& layout) {
  const double maps_x = layout.columns * layout.panel_width;
  const double maps_y = layout.rows * (layout.map_height + layout.caption_height);
  const double frame_x = 2.0 * kPageMargin + kSideWidth + kSideGap;
  const double frame_y = 2.0 * kPageMargin + kHeadingHeight;
  // Whole pixels, or the last row and column would be half covered.
  layout.width = std::ceil(std::max(kLeastWidth, frame_x + maps_x + (layout.columns - 1) * layout.gap_x));
  layout.height = std::ceil(std::max(kLeastHeight, frame_y + maps_y + (layout.rows - 1) * layout.gap_y));
  if (layout.columns > 1) layout.gap_x = (layout.width - frame_x - maps_x) / (layout.columns - 1);
  if (layout.rows > 1) layout.gap_y = (layout.height - frame_y - maps_y) / (layout.rows - 1);
  const double top = kPageMargin + kHeadingHeight;
  layout.side = {layout.width - kPageMargin - kSideWidth, top, kSideWidth, layout.height - kPageMargin - top};
}

}  // namespace

Box SheetLayout::map(int index) const {
  const int column = index % columns;
  const int row = index / columns;
  return {kPageMargin + column * (panel_width + gap_x),
          kPageMargin + kHeadingHeight + row * (map_height + caption_height + gap_y), map_width, map_height};
}

Box SheetLayout::caption(int index) const {
  const Box above = map(index);
  return {above.x, above.bottom(), panel_width, caption_height};
}

SheetLayout lay_out(const SheetRequest& request) {
  SheetLayout best;
  for (const int columns : {4, 3, 6, 2, 1}) {
    if (columns > request.maps) continue;
    const SheetLayout layout = arrange(request, columns);
    if (layout.map_width > best.map_width) best = layout;
  }
  fit_page(best);
  return best;
}

}  // namespace sunfall
