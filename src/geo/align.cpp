// Whether rasters share a grid, and what to type when they do not.

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/height_raster.h"
#include "geo/raster_source.h"

namespace sunfall {
namespace {

constexpr double kCornerTolerance_cells = 0.01;
// Points along each edge when an extent is carried into another CRS, where straight edges bend.
constexpr int kEdgePoints = 101;

MapBox box_of(const GridFrame& frame) {
  return {frame.west, frame.north - frame.rows * frame.cell_m, frame.west + frame.columns * frame.cell_m,
          frame.north};
}

std::string grid_text(const GridFrame& frame, const OGRSpatialReference& crs) {
  return fmt::format("{}, {} x {} cells of {} m from {} east, {} north", crs_label(crs), frame.columns,
                     frame.rows, frame.cell_m, frame.west, frame.north);
}

std::string aligning_command(const RasterSource& other, const RasterSource& reference,
                             const OGRSpatialReference& crs) {
  const GridFrame& frame = reference.frame();
  const MapBox box = box_of(frame);
  return fmt::format("gdalwarp -t_srs {} -te {} {} {} {} -tr {} {} -r bilinear {} aligned.tif",
                     crs_argument(crs, reference.file().string()), box.west, box.south, box.east, box.north,
                     frame.cell_m, frame.cell_m, other.file().string());
}

std::string difference(const GridFrame& found, const GridFrame& needed, bool crs_agrees) {
  if (!crs_agrees) return "coordinate reference system";
  const double tolerance_m = kCornerTolerance_cells * needed.cell_m;
  if (std::abs(found.cell_m - needed.cell_m) * std::max(needed.columns, needed.rows) > tolerance_m) {
    return "cell size";
  }
  const MapBox a = box_of(found);
  const MapBox b = box_of(needed);
  const double corner_m = std::max({std::abs(a.west - b.west), std::abs(a.south - b.south),
                                    std::abs(a.east - b.east), std::abs(a.north - b.north)});
  if (corner_m > tolerance_m || found.columns != needed.columns || found.rows != needed.rows) return "extent";
  return {};
}

}  // namespace

void require_same_grid(const RasterSource& other, const RasterSource& reference) {
  const GridFrame& found = other.frame();
  const GridFrame& needed = reference.frame();
  const OGRSpatialReference found_crs = crs_from_wkt(found.crs_wkt);
  const OGRSpatialReference needed_crs = crs_from_wkt(needed.crs_wkt);
  const std::string differs = difference(found, needed, same_crs(found_crs, needed_crs));
  if (differs.empty()) return;
  throw Error(ErrorKind::data,
              {fmt::format("the raster is not on the grid of {}: another {}", reference.role(), differs),
               raster_where(other.file(), other.role()),
               fmt::format("{}; needed {}", grid_text(found, found_crs), grid_text(needed, needed_crs)),
               "Align it: " + aligning_command(other, reference, needed_crs)});
}

MapBox extent_in(const std::filesystem::path& source, const std::string& role, const GridFrame& frame) {
  const HeightRaster raster(source, role);
  raster.require_place();
  GdalGuard guard;
  const std::array<double, 6>& t = *raster.transform();
  const double x[] = {0.0, static_cast<double>(raster.columns())};
  const double y[] = {0.0, static_cast<double>(raster.rows())};
  MapBox own{HUGE_VAL, HUGE_VAL, -HUGE_VAL, -HUGE_VAL};
  for (const double column : x) {
    for (const double row : y) {
      const double east = t[0] + column * t[1] + row * t[2];
      const double north = t[3] + column * t[4] + row * t[5];
      own = {std::min(own.west, east), std::min(own.south, north), std::max(own.east, east),
             std::max(own.north, north)};
    }
  }
  const Transformation there = transformation(*raster.crs(), crs_from_wkt(frame.crs_wkt), raster.where());
  MapBox box;
  if (there->TransformBounds(own.west, own.south, own.east, own.north, &box.west, &box.south, &box.east,
                             &box.north, kEdgePoints) == 0) {
    guard.fail(ErrorKind::data, "the raster's extent cannot be carried to the ground's map", raster.where(),
               "Project it to the CRS of ground with gdalwarp");
  }
  const double area = (box.east - box.west) * (box.north - box.south);
  box.cell_m = std::sqrt(area / (static_cast<double>(raster.columns()) * raster.rows()));
  return box;
}

}  // namespace sunfall
