// The committed inputs of the demo farm against the functions that made them, and against what a
// farm must be for the demo to make sense.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <functional>
#include <numbers>
#include <string>
#include <vector>

#include "buildings.h"
#include "geo/geodesy.h"
#include "geo/layer_writer.h"
#include "geo/plots.h"
#include "geo/raster_source.h"
#include "terrain.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

const fs::path kFarm = fs::path(SUNFALL_FIELDS) / "alder-reach";
// Heights are rounded to multiples of this: half of it is the rounding, the other half is left for
// machines whose sines differ in the last bit.
constexpr double kQuantum_m = 1.0 / 64.0;

Grid<float> heights(const std::string& file) {
  start_geo();
  const RasterSource source = RasterSource::open(kFarm / file, file);
  return source.read({0, 0, source.frame().columns, source.frame().rows});
}

alder_reach::Point farm_point(MapPoint point) { return {point.east - 690900.0, point.north - 5759000.0}; }

// The largest difference between the grid and the function, metres.
double largest_difference_m(const Grid<float>& grid,
                            const std::function<double(alder_reach::Point)>& height) {
  double largest = 0.0;
  for (int row = 0; row < grid.rows(); ++row) {
    for (int column = 0; column < grid.columns(); ++column) {
      const double made = height(farm_point(grid.frame().centre({column, row})));
      const double difference = std::abs(static_cast<double>(grid.at(column, row)) - made);
      if (!(difference <= largest)) largest = difference;  // a missing cell counts as well
    }
  }
  return largest;
}

std::vector<Plot> plots(const GridFrame& frame) {
  return read_plots({kFarm / "plots.gpkg", "plots", "id", "crop"}, frame);
}

TEST(AlderReach, GroundIsWhatTheGeneratorMakes) {
  const Grid<float> ground = heights("ground.tif");
  EXPECT_EQ(ground.columns(), 720);
  EXPECT_EQ(ground.rows(), 600);
  EXPECT_EQ(crs_name(ground.frame()).find("EPSG:25831"), 0u) << crs_name(ground.frame());
  EXPECT_LE(largest_difference_m(ground, alder_reach::ground_height), kQuantum_m);
}

TEST(AlderReach, SurfaceIsWhatTheGeneratorMakes) {
  const std::vector<alder_reach::Solid> solids = alder_reach::farm_solids();
  const auto height = [&](alder_reach::Point point) { return surface_height(point, solids); };
  EXPECT_LE(largest_difference_m(heights("surface.tif"), height), kQuantum_m);
}

// Cells of the county that hold the farm are the mean of the ground's 25 × 25; the generator takes
// 25 samples where the ground has 625, so the two agree but for what is smaller than a sample, at
// most the ditch: 1.2 m deep, 5 m of the cell's 25 m wide.
TEST(AlderReach, CountyAgreesWithTheGround) {
  const Grid<float> ground = heights("ground.tif");
  const Grid<float> county = heights("county.tif");
  int compared = 0;
  for (int row = 0; row < county.rows(); ++row) {
    for (int column = 0; column < county.columns(); ++column) {
      const MapPoint centre = county.frame().centre({column, row});
      const int left = static_cast<int>(std::lround(centre.east - 12.5 - ground.frame().west));
      const int top = static_cast<int>(std::lround(ground.frame().north - centre.north - 12.5));
      if (left < 0 || top < 0 || left + 25 > ground.columns() || top + 25 > ground.rows()) continue;
      double sum = 0.0;
      for (int i = 0; i < 625; ++i) sum += ground.at(left + i % 25, top + i / 25);
      EXPECT_NEAR(county.at(column, row), sum / 625.0, 0.25) << "column " << column << ", row " << row;
      ++compared;
    }
  }
  EXPECT_EQ(compared, 28 * 24);
}

TEST(AlderReach, SolidsStandAsHighAsTheirPlansSay) {
  const Grid<float> ground = heights("ground.tif");
  const Grid<float> surface = heights("surface.tif");
  // By name, the height above the ground's own foot, from the farm's description.
  const auto highest_above_m = [&](alder_reach::Point from, alder_reach::Point to) {
    float highest = 0.0F;
    for (int y = static_cast<int>(from.y); y < static_cast<int>(to.y); ++y) {
      for (int x = static_cast<int>(from.x); x < static_cast<int>(to.x); ++x) {
        highest = std::max(highest, surface.at(x, 599 - y) - ground.at(x, 599 - y));
      }
    }
    return highest;
  };
  // A cell's middle misses a ridge by at most half a cell: 0.5 m × 6 m in 8 m of the barn's roof; the
  // silo's cone falls 1.6 m in 3.2 m, its tip by at most 0.71 m from a cell's middle.
  EXPECT_NEAR(highest_above_m({401, 345}, {438, 370}), 12.0, 0.4) << "barn";
  EXPECT_NEAR(highest_above_m({441, 362}, {448, 370}), 14.0, 0.4) << "silo";
  EXPECT_NEAR(highest_above_m({575, 490}, {630, 500}), 3.6, 2 * kQuantum_m) << "hedge";
  EXPECT_NEAR(highest_above_m({498, 423}, {554, 470}), 2.2, 2 * kQuantum_m) << "garden wall";
}

TEST(AlderReach, PlotsLieOnOpenGround) {
  const Grid<float> ground = heights("ground.tif");
  const Grid<float> surface = heights("surface.tif");
  const std::vector<Plot> farm = plots(ground.frame());
  ASSERT_EQ(farm.size(), 10u);
  const std::vector<std::vector<CellIndex>> cells = cells_of_plots(farm, ground.frame());
  for (std::size_t i = 0; i < farm.size(); ++i) {
    EXPECT_FALSE(farm[i].crop.empty()) << farm[i].id;
    EXPECT_GT(cells[i].size(), 200u) << farm[i].id;
    int covered = 0;
    for (const CellIndex& cell : cells[i]) {
      covered += surface.at(cell.column, cell.row) > ground.at(cell.column, cell.row) + 0.5F ? 1 : 0;
    }
    EXPECT_EQ(covered, 0) << farm[i].id << " lies under something solid";
  }
}

// Convergence at the farm's middle by the spherical relation tan(c) = tan(longitude from the central
// meridian) × sin(latitude); the ellipsoid changes it by less than a hundredth of a degree.
TEST(AlderReach, GridNorthIsVisiblyNotTrueNorth) {
  const GridFrame frame = heights("ground.tif").frame();
  const GeoPlace place = geo_place(frame, frame.middle());
  const Angle from_meridian = place.place.longitude - Angle::degrees(3.0);
  const double spherical_deg =
      std::atan(tan(from_meridian) * sin(place.place.latitude)) * 180.0 / std::numbers::pi;
  EXPECT_NEAR(place.convergence.degrees(), spherical_deg, 0.01);
  EXPECT_GT(place.convergence.degrees(), 2.0);
}

TEST(AlderReach, FilesStaySmall) {
  std::uintmax_t bytes = 0;
  for (const fs::directory_entry& entry : fs::recursive_directory_iterator(SUNFALL_FIELDS)) {
    if (entry.is_regular_file()) bytes += entry.file_size();
  }
  EXPECT_LT(bytes, 3'000'000u);
}

}  // namespace
}  // namespace sunfall
