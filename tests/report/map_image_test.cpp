// A grid becomes pixels of the right colours.

#include "report/map_image.h"

#include <gtest/gtest.h>

namespace sunfall {
namespace {

const LightScale kScale{40.0, 5.0};

Grid<float> grid(int columns, int rows, const std::vector<float>& values) {
  Grid<float> result(GridFrame{columns, rows, 0, 0, 1.0, ""});
  result.values() = values;
  return result;
}

TEST(LightImage, ASmallGridKeepsItsCells) {
  const PixelImage image = light_image(grid(3, 2, {0, 10, 20, 30, 40, 50}), kScale, 100, 100);
  ASSERT_EQ(image.width, 3);
  ASSERT_EQ(image.height, 2);
  for (int i = 0; i < 6; ++i) EXPECT_EQ(image.pixels[i], opaque_pixel(light_colour(i * 10.0 / 40.0))) << i;
}

TEST(LightImage, ALargeGridIsAveraged) {
  const PixelImage image = light_image(grid(4, 2, {0, 10, 20, 20, 10, 20, 40, 0}), kScale, 2, 1);
  ASSERT_EQ(image.width, 2);
  ASSERT_EQ(image.height, 1);
  EXPECT_EQ(image.pixels[0], opaque_pixel(kScale.colour(10.0)));
  EXPECT_EQ(image.pixels[1], opaque_pixel(kScale.colour(20.0)));
}

TEST(LightImage, MissingIsLeftOutOfMeansAndTransparentAlone) {
  const PixelImage image = light_image(grid(4, 1, {kMissing, 12, kMissing, kMissing}), kScale, 2, 1);
  EXPECT_EQ(image.pixels[0], opaque_pixel(kScale.colour(12.0)));
  EXPECT_EQ(image.pixels[1], 0U);
}

TEST(LightImage, EveryCellOfALargeGridIsSeen) {
  // 7 cells on 3 pixels: a lone bright cell must show wherever it stands.
  for (int bright = 0; bright < 7; ++bright) {
    std::vector<float> values(7, 0.0F);
    values[bright] = 40.0F;
    const PixelImage image = light_image(grid(7, 1, values), kScale, 3, 1);
    int changed = 0;
    for (const auto pixel : image.pixels) changed += pixel != opaque_pixel(kScale.colour(0.0)) ? 1 : 0;
    EXPECT_GE(changed, 1) << bright;
  }
}

}  // namespace
}  // namespace sunfall
