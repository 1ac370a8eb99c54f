#pragma once
// Invented leaves on invented ground, and the depth of leaves along one ray by brute force.

#include <algorithm>
#include <array>
#include <cmath>
#include <functional>
#include <limits>
#include <memory>
#include <vector>

#include "map/scene.h"
#include "shade/canopy.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {

struct Column {
  double base_m = 0.0, top_m = 0.0, density = 0.0;
};
// East and north are metres from the middle of the map, as in Height.
using Leaves = std::function<Column(double east, double north)>;

class MadeCanopy : public CanopySource {
 public:
  MadeCanopy(GridFrame frame, const Leaves& leaves) : frame_(std::move(frame)) {
    const MapPoint middle = frame_.middle();
    for (int row = 0; row < frame_.rows; ++row) {
      for (int column = 0; column < frame_.columns; ++column) {
        const MapPoint centre = frame_.centre({column, row});
        columns_.push_back(leaves(centre.east - middle.east, centre.north - middle.north));
        if (columns_.back().density > 0.0)
          highest_ = std::max(highest_, static_cast<float>(columns_.back().top_m));
      }
    }
  }
  float highest_top_m() const override { return highest_; }
  CanopyCells read(const CellWindow& window) const override {
    CanopyCells out{window, {}, {}, {}};
    for (int row = window.row; row < window.row + window.rows; ++row) {
      for (int column = window.column; column < window.column + window.columns; ++column) {
        const Column here = at(column, row);
        out.top_m.push_back(static_cast<float>(here.top_m));
        out.base_m.push_back(static_cast<float>(here.base_m));
        out.leaf_density.push_back(static_cast<float>(here.density));
      }
    }
    return out;
  }
  Column at(int column, int row) const {
    if (column < 0 || row < 0 || column >= frame_.columns || row >= frame_.rows) return {};
    return columns_[static_cast<std::size_t>(row) * frame_.columns + column];
  }
  const GridFrame& frame() const { return frame_; }

 private:
  GridFrame frame_;
  std::vector<Column> columns_;
  float highest_ = 0.0F;
};

// Ground and leaves of a map.
struct CanopyMap {
  CanopyMap(const Height& ground, const Leaves& leaves, const SceneOptions& options = {})
      : scene(ground, {}, options),
        source(std::make_shared<MadeCanopy>(scene.terrain().frame(), leaves)),
        heights(scene.terrain().ground({0, 0, options.columns, options.rows})),
        receiver_height_m(options.receiver_height_m) {}

  CellWindow whole() const { return {0, 0, heights.columns(), heights.rows()}; }
  double eye_m(int column, int row) const {
    return static_cast<double>(heights.at(column, row)) + receiver_height_m;
  }
  Canopy canopy(const CanopyOptions& options = {}) const { return {source, scene.terrain(), options}; }
  // Depths of a tile in units of 1; empty where nothing was added.
  std::vector<double> depths(const Canopy& caster, const CellWindow& window, double azimuth_deg,
                             double tangent) const {
    const TerrainTile terrain = scene.terrain().tile(window);
    const auto tile = caster.tile(terrain);
    if (!tile) return {};
    std::vector<Depth> depth(terrain.usable.size());
    if (!tile->add_depth({Angle::degrees(azimuth_deg)}, static_cast<float>(tangent), depth)) return {};
    return {[&] {
      std::vector<double> out;
      for (const Depth d : depth) out.push_back(d / double(kDepthUnits));
      return out;
    }()};
  }

  // Leaf area that a ray meets per area across it, m2/m2: density times metres, summed cell by cell from
  // border to border, each cell's leaves a box on its ground.
  double leaf_along(int column, int row, double azimuth_deg, double tangent) const {
    return leaf_along(column, row, eye_m(column, row), azimuth_deg, tangent);
  }
  double leaf_along(int column, int row, double eye, double azimuth_deg, double tangent) const {
    const double a = azimuth_deg * std::numbers::pi / 180.0;
    const double east = std::sin(a), south = -std::cos(a), cell_m = heights.frame().cell_m;
    const double rise = tangent * cell_m, length = std::hypot(cell_m, rise);  // per cell of distance
    const auto border_after = [](double place, double step, double t) {
      if (std::abs(step) < 1e-12) return 1e9;
      const double at = place + step * t;
      const double border = step > 0 ? std::floor(at + 0.5 + 1e-9) + 0.5 : std::ceil(at - 0.5 - 1e-9) - 0.5;
      return (border - place) / step;
    };
    double sum = 0.0;
    for (double t = 0.0; t < 1600.0;) {
      const double next =
          std::max(std::min(border_after(column, east, t), border_after(row, south, t)), t + 1e-7);
      const double middle = 0.5 * (t + next);
      const int c = static_cast<int>(std::floor(column + east * middle + 0.5));
      const int r = static_cast<int>(std::floor(row + south * middle + 0.5));
      if (c < 0 || r < 0 || c >= heights.columns() || r >= heights.rows()) break;
      const Column leaf = source->at(c, r);
      const double ground = heights.at(c, r);
      if (leaf.density > 0.0 && !std::isnan(ground)) {
        const double low = ground + leaf.base_m - eye, high = ground + leaf.top_m - eye;
        const double from = rise > 1e-12 ? std::max(t, low / rise) : t;
        const double to = rise > 1e-12 ? std::min(next, high / rise) : next;
        if (rise > 1e-12 ? to > from : low <= 0.0 && high > 0.0) sum += leaf.density * (to - from) * length;
      }
      t = next;
    }
    return sum;
  }

  Scene scene;
  std::shared_ptr<MadeCanopy> source;
  Grid<float> heights;
  double receiver_height_m;
};

inline double sine_of(double tangent) { return tangent / std::hypot(1.0, tangent); }

// Crowns at random: ellipsoids, about a tenth of the ground.
inline Column random_crown(double east, double north) {
  constexpr double kSpacing = 16.0;
  Column out;
  const int x = static_cast<int>(std::floor(east / kSpacing)),
            y = static_cast<int>(std::floor(north / kSpacing));
  for (int i = x - 1; i <= x + 1; ++i) {
    for (int j = y - 1; j <= y + 1; ++j) {
      if (noise(i + 700, j) < 0.4) continue;
      const double radius = 2.0 + 3.0 * noise(i, j + 300), half = 2.0 + 3.5 * noise(i + 40, j + 90);
      const double middle = 1.0 + half + 2.0 * noise(i, j);
      const double across =
          std::hypot(east - (i + noise(i + 9, j)) * kSpacing, north - (j + noise(i, j + 9)) * kSpacing);
      if (across >= radius) continue;
      const double tall = half * std::sqrt(1.0 - across * across / (radius * radius));
      if (middle + tall > out.top_m) out = {middle - tall, middle + tall, 0.4 + 0.8 * noise(i + 5, j + 5)};
    }
  }
  return out;
}

}  // namespace sunfall::testing
