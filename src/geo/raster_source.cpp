#include "geo/raster_source.h"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <utility>

#include <fmt/format.h>

#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/height_raster.h"

namespace sunfall {
namespace {

// Cells count as square and upright within this part of their side.
constexpr double kSquareTolerance = 1e-4;
// What small skews and unequal sides may add up to over the whole raster, in cells.
constexpr double kMostDrift_cells = 0.5;
constexpr double kUnitTolerance = 1e-9;

const char* const kMakeNorthUp =
    "Make it north up with square cells: gdalwarp -tr CELL CELL -r bilinear IN.tif OUT.tif";

[[noreturn]] void refuse(const HeightRaster& raster, std::string what, std::string found,
                         std::string remedy) {
  throw Error(ErrorKind::data, {std::move(what), raster.where(), std::move(found), std::move(remedy)});
}

// "gdalwarp -t_srs EPSG:32631 …" for the UTM zone around the raster's middle.
std::string projecting_command(const HeightRaster& raster, const OGRSpatialReference& crs) {
  std::string code = "EPSG:CODE";
  if (raster.transform()) {
    GdalGuard guard;
    const auto& t = *raster.transform();
    double x = t[0] + 0.5 * raster.columns() * t[1] + 0.5 * raster.rows() * t[2];
    double y = t[3] + 0.5 * raster.columns() * t[4] + 0.5 * raster.rows() * t[5];
    OGRSpatialReference globe;
    globe.importFromEPSG(4326);
    globe.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
    const Transformation to_globe = transformation(crs, globe, raster.where());
    if (to_globe->Transform(1, &x, &y) != 0 && std::abs(y) <= 90.0) code = utm_code(x, y);
  }
  return fmt::format("Project it to metres: gdalwarp -t_srs {} -tr CELL CELL -r bilinear IN.tif OUT.tif",
                     code);
}

const OGRSpatialReference& checked_crs(const HeightRaster& raster) {
  if (!raster.crs()) {
    refuse(raster, "the raster has no coordinate reference system", "none",
           "Declare the one that it was made in: gdal_edit.py -a_srs EPSG:CODE FILE");
  }
  const OGRSpatialReference& crs = *raster.crs();
  if (crs.IsGeographic()) {
    refuse(raster, "the raster is in degrees", crs_label(crs), projecting_command(raster, crs));
  }
  if (!crs.IsProjected()) {
    refuse(raster, "the raster's coordinate reference system is not a projected one", crs_label(crs),
           "Project it to metres: gdalwarp -t_srs EPSG:CODE IN.tif OUT.tif");
  }
  const char* unit = nullptr;
  const double unit_m = crs.GetLinearUnits(&unit);
  if (std::abs(unit_m - 1.0) > kUnitTolerance) {
    refuse(raster, "the raster's map unit is not the metre",
           fmt::format("{}, unit '{}' of {} m", crs_label(crs), unit != nullptr ? unit : "unknown", unit_m),
           projecting_command(raster, crs));
  }
  return crs;
}

void check_transform(const HeightRaster& raster, const std::array<double, 6>& t) {
  const double cell = std::max(std::abs(t[1]), std::abs(t[5]));
  const double skew = std::max(std::abs(t[2]), std::abs(t[4])) / cell;
  const double skew_cells =
      std::max(std::abs(t[2]) * raster.rows(), std::abs(t[4]) * raster.columns()) / cell;
  if (!(skew <= kSquareTolerance && skew_cells <= kMostDrift_cells)) {
    refuse(raster, "the raster is rotated",
           fmt::format("row and column shear {} and {} m a cell", t[2], t[4]), kMakeNorthUp);
  }
  if (!(t[1] > 0.0) || !(t[5] < 0.0)) {
    refuse(raster, "the raster is not north up",
           fmt::format("a column leads {} m east, a row {} m north", t[1], t[5]), kMakeNorthUp);
  }
  const double difference = std::abs(t[1] + t[5]) / t[1];
  if (difference > kSquareTolerance || difference * raster.rows() > kMostDrift_cells) {
    refuse(raster, "the raster's cells are not square", fmt::format("{} m wide, {} m high", t[1], -t[5]),
           kMakeNorthUp);
  }
}

GridFrame checked_frame(const HeightRaster& raster) {
  GdalGuard guard;
  const OGRSpatialReference& crs = checked_crs(raster);
  if (!raster.transform()) {
    refuse(raster, "the raster does not say where it lies", "no geotransform",
           "Give its corners: gdal_edit.py -a_ullr WEST NORTH EAST SOUTH FILE");
  }
  const std::array<double, 6>& t = *raster.transform();
  check_transform(raster, t);
  return {raster.columns(), raster.rows(), t[0], t[3], t[1], wkt_of(crs)};
}

}  // namespace

struct RasterSource::State {
  std::filesystem::path file;
  std::string role;
  HeightRaster raster;
  GridFrame frame;
};

RasterSource::RasterSource(std::unique_ptr<State> state) : state_(std::move(state)) {}
RasterSource::RasterSource(RasterSource&&) noexcept = default;
RasterSource& RasterSource::operator=(RasterSource&&) noexcept = default;
RasterSource::~RasterSource() = default;

RasterSource RasterSource::open(const std::filesystem::path& file, const std::string& role,
                                RasterMeaning meaning) {
  HeightRaster raster(file, role, meaning);
  GridFrame frame = checked_frame(raster);
  return RasterSource(std::make_unique<State>(State{file, role, std::move(raster), std::move(frame)}));
}

const GridFrame& RasterSource::frame() const { return state_->frame; }
const std::filesystem::path& RasterSource::file() const { return state_->file; }
const std::string& RasterSource::role() const { return state_->role; }

Grid<float> RasterSource::read(const CellWindow& window) const {
  const GridFrame& whole = state_->frame;
  GridFrame frame = whole;
  frame.columns = window.columns;
  frame.rows = window.rows;
  frame.west = whole.west + window.column * whole.cell_m;
  frame.north = whole.north - window.row * whole.cell_m;

  const std::int64_t west = std::max(0, window.column);
  const std::int64_t north = std::max(0, window.row);
  const std::int64_t east =
      std::min<std::int64_t>(whole.columns, std::int64_t{window.column} + window.columns);
  const std::int64_t south = std::min<std::int64_t>(whole.rows, std::int64_t{window.row} + window.rows);
  Grid<float> heights(std::move(frame), kMissing);
  if (east <= west || south <= north) return heights;
  const CellWindow inside{static_cast<int>(west), static_cast<int>(north), static_cast<int>(east - west),
                          static_cast<int>(south - north)};
  float* first = &heights.at(inside.column - window.column, inside.row - window.row);
  state_->raster.read(inside, first, static_cast<std::size_t>(window.columns));
  return heights;
}

}  // namespace sunfall
