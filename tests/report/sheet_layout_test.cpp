// Maps of any shape share a page without touching.

#include "report/sheet_layout.h"

#include <gtest/gtest.h>

#include <cmath>

#include "report/furniture.h"

namespace sunfall {
namespace {

TEST(SheetLayout, ChoosesTheArrangementByShape) {
  EXPECT_EQ(lay_out({12, 1.2}).columns, 4);
  EXPECT_EQ(lay_out({12, 2.2}).columns, 3);
  EXPECT_EQ(lay_out({12, 0.3}).columns, 6);
  EXPECT_EQ(lay_out({12, 7.0}).columns, 2);
  EXPECT_EQ(lay_out({1, 1.2}).columns, 1);
}

TEST(SheetLayout, NothingTouchesAndNothingLeavesThePage) {
  for (const int maps : {1, 5, 12}) {
    for (double aspect = 0.005; aspect < 300.0; aspect *= 1.3) {
      const SheetLayout layout = lay_out({maps, aspect});
      const Box page = Box{0, 0, layout.width, layout.height}.grown(-kPageMargin + 1e-6);
      EXPECT_LE(layout.width, 2400.0);
      EXPECT_LE(layout.height, 1700.0);
      EXPECT_EQ(layout.width, std::floor(layout.width));
      EXPECT_EQ(layout.height, std::floor(layout.height));
      EXPECT_TRUE(page.holds(layout.side));
      EXPECT_GT(layout.map_width, 0.0) << aspect;
      EXPECT_NEAR(layout.map_width / layout.map_height, aspect, 1e-9 * aspect);
      for (int i = 0; i < maps; ++i) {
        const Box panel{layout.map(i).x, layout.map(i).y, layout.panel_width,
                        layout.map_height + layout.caption_height};
        EXPECT_TRUE(page.holds(panel)) << aspect << " map " << i;
        EXPECT_FALSE(panel.overlaps(layout.side)) << aspect;
        EXPECT_DOUBLE_EQ(layout.caption(i).y, layout.map(i).bottom());
        for (int j = 0; j < i; ++j) {
          const Box other{layout.map(j).x, layout.map(j).y, layout.panel_width,
                          layout.map_height + layout.caption_height};
          EXPECT_FALSE(panel.overlaps(other)) << aspect << " maps " << i << ", " << j;
        }
      }
    }
  }
}

}  // namespace
}  // namespace sunfall
