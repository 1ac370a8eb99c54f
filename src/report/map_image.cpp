#include "report/map_image.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

struct Span {
  int begin;
  int end;
};

// The cells that output pixel `i` of `count` touches, out of `cells`.
Span covered(int i, int count, int cells) {
  const auto whole = static_cast<long long>(cells);
  const long long begin = i * whole / count;
  const long long end = ((i + 1) * whole + count - 1) / count;
  return {static_cast<int>(begin), static_cast<int>(end)};
}

double mean_of(const Grid<float>& light, Span columns, Span rows) {
  double sum = 0.0;
  int valid = 0;
  for (int row = rows.begin; row < rows.end; ++row) {
    for (int column = columns.begin; column < columns.end; ++column) {
      const float value = light.at(column, row);
      if (!std::isfinite(value)) continue;
      sum += value;
      ++valid;
    }
  }
  return valid > 0 ? sum / valid : static_cast<double>(kMissing);
}

}  // namespace

PixelImage light_image(const Grid<float>& light, const LightScale& scale, int most_columns, int most_rows) {
  PixelImage image;
  image.width = std::min(light.columns(), std::max(1, most_columns));
  image.height = std::min(light.rows(), std::max(1, most_rows));
  image.pixels.reserve(static_cast<std::size_t>(image.width) * static_cast<std::size_t>(image.height));
  for (int y = 0; y < image.height; ++y) {
    const Span rows = covered(y, image.height, light.rows());
    for (int x = 0; x < image.width; ++x) {
      const double value = mean_of(light, covered(x, image.width, light.columns()), rows);
      image.pixels.push_back(std::isnan(value) ? 0U : opaque_pixel(scale.colour(value)));
    }
  }
  return image;
}

}  // namespace sunfall
