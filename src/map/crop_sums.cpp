#include "map/crop_sums.h"

#include <algorithm>

namespace sunfall {
namespace {

void make_room(CropLight& light, std::size_t periods) {
  for (auto* values : {&light.came, &light.taken_right, &light.taken_left}) values->resize(periods, 0.0);
}

}  // namespace

void CropSums::add(std::size_t tile, const TileShares& shares, const OpenField& open) {
  const TileCrops& crops = shares.crops;
  if (crops.cells.empty()) return;
  const std::size_t periods = open.beam.size(), columns = static_cast<std::size_t>(crops.columns);
  std::vector<CropLight>& sums = by_tile_[tile];
  sums.resize(crops_);
  for (std::size_t slot = 0; slot < crops.cells.size(); ++slot) {
    CropLight& sum = sums[static_cast<std::size_t>(crops.numbers[slot])];
    make_room(sum, periods);
    ++sum.cells;
    const float* right = crops.taken.data() + slot * 2 * columns;
    const float* came = crops.came.data() + slot * columns;
    const auto light = [&](const float* share, std::size_t p) {
      return open.beam[p] * double(share[p]) + open.sky[p] * double(share[periods + p]);
    };
    for (std::size_t p = 0; p < periods; ++p) {
      sum.came[p] += light(came, p);
      sum.taken_right[p] += light(right, p);
      sum.taken_left[p] += light(right + columns, p);
    }
  }
}

std::vector<CropLight> CropSums::means(std::size_t periods) const {
  std::vector<CropLight> means(crops_);
  for (std::size_t crop = 0; crop < crops_; ++crop) {
    CropLight& mean = means[crop];
    make_room(mean, periods);
    for (const auto& tile : by_tile_) {
      if (tile.empty() || tile[crop].cells == 0) continue;
      mean.cells += tile[crop].cells;
      for (std::size_t p = 0; p < periods; ++p) {
        mean.came[p] += tile[crop].came[p];
        mean.taken_right[p] += tile[crop].taken_right[p];
        mean.taken_left[p] += tile[crop].taken_left[p];
      }
    }
    for (auto* values : {&mean.came, &mean.taken_right, &mean.taken_left}) {
      for (double& value : *values) value /= double(std::max<std::size_t>(mean.cells, 1));
    }
  }
  return means;
}

}  // namespace sunfall
