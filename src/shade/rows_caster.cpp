#include "shade/rows_caster.h"

#include <Eigen/Dense>
#include <algorithm>
#include <cmath>

#include "shade/row_cycle.h"
#include "shade/row_paths.h"

namespace sunfall {
namespace {

// Rows count as far as this elevation lets their tops be seen: a tangent of 1.5 degrees.
constexpr double kLowestTangent = 0.026;
// So far below the plane of the rows' ground a receiver beside the plot is still shaded.
constexpr double kMostDrop_m = 10.0;
constexpr int kPhases = 16;
constexpr int kReaches = 8;
// Places across a cell that its depth is the mean of.
constexpr int kPlaces = 3;
constexpr double kBlack = 16.0;
constexpr double kSteepest = 1.0e9;

CellWindow box_of(const std::vector<std::vector<MapPoint>>& rings, const GridFrame& frame) {
  double west = 1e300, east = -1e300, south = 1e300, north = -1e300;
  for (const auto& ring : rings) {
    for (const MapPoint& point : ring) {
      west = std::min(west, point.east), east = std::max(east, point.east);
      south = std::min(south, point.north), north = std::max(north, point.north);
    }
  }
  const auto cell = [&](double metres) { return static_cast<int>(std::floor(metres / frame.cell_m)); };
  const int column = cell(west - frame.west), row = cell(frame.north - north);
  return {column, row, cell(east - frame.west) - column + 1, cell(frame.north - south) - row + 1};
}

CellWindow common(const CellWindow& a, const CellWindow& b) {
  const int west = std::max(a.column, b.column), north = std::max(a.row, b.row);
  return {west, north, std::min(a.column + a.columns, b.column + b.columns) - west,
          std::min(a.row + a.rows, b.row + b.rows) - north};
}

// Least squares over the plot's cells, at most some ten thousand of them.
RowsCaster::Plane plane_of(const RowPlot& plot, const CellWindow& box, const Terrain& terrain) {
  const GridFrame& frame = terrain.frame();
  const CellWindow inside = common(box, {0, 0, frame.columns, frame.rows});
  RowsCaster::Plane plane;
  if (inside.columns <= 0 || inside.rows <= 0) return plane;
  plane.middle = frame.centre({inside.column + inside.columns / 2, inside.row + inside.rows / 2});
  const Grid<float> ground = terrain.ground(inside);
  const int stride =
      std::max(1, static_cast<int>(std::sqrt(double(inside.columns) * inside.rows / 10'000.0)));
  Eigen::Matrix3d normal = Eigen::Matrix3d::Zero();
  Eigen::Vector3d right = Eigen::Vector3d::Zero();
  for (const bool in_plot : {true, false}) {
    for (int row = 0; row < inside.rows; row += stride) {
      for (int column = 0; column < inside.columns; column += stride) {
        const MapPoint place = frame.centre({inside.column + column, inside.row + row});
        const float height = ground.at(column, row);
        if (std::isnan(height) || (in_plot && !plot.contains(place))) continue;
        const Eigen::Vector3d terms(1.0, place.east - plane.middle.east, place.north - plane.middle.north);
        normal += terms * terms.transpose();
        right += terms * double(height);
      }
    }
    // A plot between the cells looked at takes the ground of its box.
    if (normal(0, 0) >= 3.0) break;
  }
  if (normal(0, 0) == 0.0) return plane;
  const Eigen::Vector3d fit = normal.completeOrthogonalDecomposition().solve(right);
  plane.height_m = fit(0);
  plane.rise = {fit(1), fit(2)};
  return plane;
}

class RowsTile : public CasterTile {
 public:
  RowsTile(const RowsCaster& caster, const TerrainTile& tile, const CellWindow& cells, const GridFrame& frame)
      : caster_(caster), rows_(caster.inputs().rows) {
    const double height = caster.inputs().receiver_height_m;
    for (int row = cells.row; row < cells.row + cells.rows; ++row) {
      for (int column = cells.column; column < cells.column + cells.columns; ++column) {
        Cell cell;
        cell.place = frame.centre({column, row});
        cell.index = static_cast<std::size_t>(row - tile.window.row) * tile.window.columns +
                     (column - tile.window.column);
        if (!tile.usable[cell.index]) continue;
        cell.across_m = caster.plot().across_m(cell.place);
        cell.inside = caster.plot().contains(cell.place);
        if (cell.inside) crop_cells_.push_back(static_cast<std::uint32_t>(cell.index));
        // Within the plot receivers stand above the rows' own ground; beside it their height counts
        // from the plane that the rows follow.
        const std::size_t eye =
            static_cast<std::size_t>(row - tile.receiver_window.row) * tile.receiver_window.columns +
            (column - tile.receiver_window.column);
        cell.above_m =
            cell.inside ? 0.0 : double(tile.receivers[eye]) - caster.plane().at(cell.place) - height;
        if (!cell.inside && !reaches(cell)) continue;
        cells_.push_back(cell);
      }
    }
  }
  bool empty() const { return cells_.empty(); }

  float highest_tangent(GridAzimuth azimuth) override {
    face(azimuth);
    if (!crop_cells_.empty()) return static_cast<float>(kSteepest);
    return seen_.empty() ? 0.0F : seen_.front().steepest;
  }

  bool add_depth(GridAzimuth azimuth, float tangent, std::span<Depth> depth) override {
    face(azimuth);
    const RowRay ray = row_ray(caster_.plot().azimuth(), azimuth, tangent, caster_.plane().rise);
    if (ray.meets_ground() || seen_.empty()) return false;
    const double height = caster_.inputs().receiver_height_m;
    const double far = std::min(farthest_leaf_m(rows_, ray, height), rows_.height_m / kLowestTangent);
    if (far <= 0.0) return false;
    fill_table(ray, far);
    bool added = false;
    for (const Seen& seen : seen_) {
      if (seen.steepest < tangent) break;
      const Cell& cell = cells_[seen.cell];
      // The same ray where it passes the height that the table is made for.
      const double back = cell.above_m / ray.rise;
      const double across = cell.across_m - ray.lean * cell.above_m;
      const double to = std::min(seen.to_m + back, far), from = std::max(seen.from_m + back, 0.0);
      if (to <= from) continue;
      const double found = table_at(across, to / far) - (from > 0.0 ? table_at(across, from / far) : 0.0);
      const auto units = static_cast<std::uint32_t>(std::max(0.0, found) * double(kDepthUnits) + 0.5);
      if (units == 0) continue;
      Depth& sum = depth[cell.index];
      sum = static_cast<Depth>(std::min<std::uint32_t>(sum + units, 65535));
      added = true;
    }
    return added;
  }

  std::span<const std::uint32_t> crop_cells() const override { return crop_cells_; }

  // Rows without end: what enters a plot from its sides is not counted to the cells there.
  CropTaken taken(GridAzimuth azimuth, float tangent, double leafing) override {
    const GridAzimuth rows = caster_.plot().azimuth();
    const RowRay ray = row_ray(rows, azimuth, tangent, caster_.plane().rise);
    if (ray.meets_ground()) return {};
    const RowLeaves& leaves = caster_.leaves();
    const double passes = cycle_passage(rows_, ray, leafing * leaves.depth(ray.sine), 0.0);
    const double taken = (1.0 - passes) * (1.0 - leaves.reflected(ray.sine));
    const double side = sin(azimuth.from_grid_north - rows.from_grid_north);
    // Straight ahead or behind is of neither side.
    if (std::abs(side) < 1e-9) return {static_cast<float>(0.5 * taken), static_cast<float>(0.5 * taken)};
    return side > 0.0 ? CropTaken{static_cast<float>(taken), 0.0F}
                      : CropTaken{0.0F, static_cast<float>(taken)};
  }

 private:
  struct Cell {
    std::size_t index = 0;
    MapPoint place;
    double across_m = 0.0;
    double above_m = 0.0;  // of the receiver, over its height in the plot
    bool inside = false;
  };
  struct Seen {
    std::size_t cell;
    double from_m, to_m;
    float steepest;  // no ray of a tangent above it meets the rows here
  };

  double steepest_ground() const {
    return std::hypot(caster_.plane().rise.rise_east, caster_.plane().rise.rise_north);
  }

  // Whether rows can be seen from a cell beside the plot above the lowest elevation that counts.
  bool reaches(const Cell& cell) const {
    const double rise = rows_.height_m - caster_.inputs().receiver_height_m - cell.above_m;
    const double away = caster_.away_m(cell.place);
    return rise + steepest_ground() * away > kLowestTangent * away;
  }

  // Where the rays towards an azimuth run through the plot, the same for all elevations.
  void face(GridAzimuth azimuth) {
    if (faced_ && faced_->from_grid_north.radians() == azimuth.from_grid_north.radians()) return;
    faced_ = azimuth;
    seen_.clear();
    const double most = (rows_.height_m + kMostDrop_m) / kLowestTangent;
    for (std::size_t i = 0; i < cells_.size(); ++i) {
      const Cell& cell = cells_[i];
      caster_.plot().stretches(cell.place, azimuth, most, stretches_);
      for (const RowReach& reach : stretches_) {
        const double rise = rows_.height_m - caster_.inputs().receiver_height_m - cell.above_m;
        const double steepest = reach.from_m > 0.0 ? rise / reach.from_m + steepest_ground() : kSteepest;
        if (steepest > 0.0) seen_.push_back({i, reach.from_m, reach.to_m, static_cast<float>(steepest)});
      }
    }
    std::sort(seen_.begin(), seen_.end(), [](const Seen& a, const Seen& b) {
      return a.steepest != b.steepest ? a.steepest > b.steepest : a.cell < b.cell;
    });
  }

  // Optical depth of the mean of what passes, by place across the rows and part of the way to the farthest
  // leaf.
  void fill_table(const RowRay& ray, double far) {
    const double per_m = caster_.leaves().depth(ray.sine);
    const double height = caster_.inputs().receiver_height_m;
    const double cell = caster_.cell_m();
    const bool whole_cycle = RowsCaster::whole_cycle(cell, rows_);
    phases_ = whole_cycle ? 1 : kPhases;
    for (int reach = 0; reach <= kReaches; ++reach) {
      const RowReach of_ray{0.0, far * reach / kReaches};
      for (int phase = 0; phase < phases_; ++phase) {
        double passes = 0.0;
        if (whole_cycle) {
          passes = cycle_passage(rows_, ray, per_m, height, of_ray);
        } else {
          for (int place = 0; place < kPlaces; ++place) {
            const double across = rows_.spacing_m * phase / kPhases + cell * ((place + 0.5) / kPlaces - 0.5);
            passes += std::exp(-per_m * row_path(rows_, ray, across, height, of_ray)) / kPlaces;
          }
        }
        table_[reach][phase] = std::min(kBlack, -std::log(std::max(passes, 1e-7)));
      }
    }
  }
  double table_at(double across, double part) const {
    const double reach = std::min(part, 1.0) * kReaches;
    const int low = std::min(static_cast<int>(reach), kReaches - 1);
    const double f = reach - low;
    const double turn = across / rows_.spacing_m;
    const double phase = (turn - std::floor(turn)) * phases_;
    const int left = std::min(static_cast<int>(phase), phases_ - 1), right = (left + 1) % phases_;
    const double g = phase - left;
    const auto mix = [&](const std::array<double, kPhases>& row) {
      return row[static_cast<std::size_t>(left)] * (1 - g) + row[static_cast<std::size_t>(right)] * g;
    };
    return mix(table_[static_cast<std::size_t>(low)]) * (1 - f) +
           mix(table_[static_cast<std::size_t>(low) + 1]) * f;
  }

  const RowsCaster& caster_;
  const CropRows& rows_;
  std::vector<Cell> cells_;
  std::vector<std::uint32_t> crop_cells_;
  std::optional<GridAzimuth> faced_;
  std::vector<Seen> seen_;
  RowStretches stretches_;
  int phases_ = 1;
  std::array<std::array<double, kPhases>, kReaches + 1> table_;
};

}  // namespace

RowsCaster::RowsCaster(const RowsInputs& inputs, const Terrain& terrain)
    : inputs_(inputs),
      terrain_(terrain),
      plot_(inputs.rings, inputs.azimuth, inputs.rows.spacing_m),
      leaves_(inputs.rows, inputs.leafing),
      box_(box_of(inputs.rings, terrain.frame())) {
  plane_ = plane_of(plot_, box_, terrain_);
}

double RowsCaster::away_m(MapPoint place) const {
  const GridFrame& frame = terrain_.frame();
  const double west = frame.west + box_.column * frame.cell_m, east = west + box_.columns * frame.cell_m;
  const double north = frame.north - box_.row * frame.cell_m, south = north - box_.rows * frame.cell_m;
  return std::hypot(std::max({0.0, west - place.east, place.east - east}),
                    std::max({0.0, south - place.north, place.north - north}));
}

std::unique_ptr<CasterTile> RowsCaster::tile(const TerrainTile& tile) const {
  const int reach =
      static_cast<int>(std::ceil((inputs_.rows.height_m + kMostDrop_m) / kLowestTangent / cell_m()));
  const CellWindow wide{box_.column - reach, box_.row - reach, box_.columns + 2 * reach,
                        box_.rows + 2 * reach};
  const CellWindow cells = common(wide, tile.window);
  if (cells.columns <= 0 || cells.rows <= 0) return nullptr;
  auto view = std::make_unique<RowsTile>(*this, tile, cells, terrain_.frame());
  if (view->empty()) return nullptr;
  return view;
}

}  // namespace sunfall
