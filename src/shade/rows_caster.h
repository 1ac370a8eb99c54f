#pragma once
// A plot of crop rows in the map: rows of one direction within an outline, following a plane of ground.
//
// For one direction of light all receivers of a plot share a small table: leaf depth against their place
// across the rows and the distance to where their ray leaves the plot. A cell reads its depth there; rows end
// where the outline does, and cells beside the plot are shaded by it. Where cells are larger than a third of
// the spacing, a cell has the mean over the cycle of rows of what passes, else the mean over its own width.

#include <array>
#include <memory>
#include <vector>

#include "shade/caster.h"
#include "shade/row_leaves.h"
#include "shade/row_plot.h"

namespace sunfall {

struct RowsInputs {
  int number = 0;                            // among the plan's rows
  std::vector<std::vector<MapPoint>> rings;  // of the plot, on the map's CRS
  GridAzimuth azimuth;
  CropRows rows;
  double leafing = 1.0;                // share of full leaf
  std::array<double, 12> months = {};  // 1 where that share holds, 0 where it does not
  double receiver_height_m = 0.5;
  bool one_state = false;  // `leafing` is the state, `months` where it holds
};

class RowsCaster : public Caster {
 public:
  // Keeps `terrain` by reference. The ground's plane is fitted to the cells of the plot.
  RowsCaster(const RowsInputs& inputs, const Terrain& terrain);

  const std::array<double, 12>& leafing() const override { return inputs_.months; }
  std::optional<int> crop() const override { return inputs_.number; }
  bool one_state() const override { return inputs_.one_state; }
  std::unique_ptr<CasterTile> tile(const TerrainTile& tile) const override;

  struct Plane {
    MapPoint middle;
    double height_m = 0.0;  // there
    GroundPlane rise;
    double at(MapPoint place) const {
      return height_m + rise.rise_east * (place.east - middle.east) +
             rise.rise_north * (place.north - middle.north);
    }
  };
  const RowPlot& plot() const { return plot_; }
  const RowsInputs& inputs() const { return inputs_; }
  const RowLeaves& leaves() const { return leaves_; }
  const Plane& plane() const { return plane_; }
  // To the box of the plot.
  double away_m(MapPoint place) const;
  // Whether cells are too wide to have a place across the rows.
  static bool whole_cycle(double cell_m, const CropRows& rows) { return cell_m > rows.spacing_m / 3.0; }
  double cell_m() const { return terrain_.frame().cell_m; }

 private:
  RowsInputs inputs_;
  const Terrain& terrain_;
  RowPlot plot_;
  RowLeaves leaves_;
  Plane plane_;
  CellWindow box_;  // of the plot
};

}  // namespace sunfall
