#include "geo/plot_area.h"

#include <fmt/format.h>

#include "geo/gdal_guard.h"
#include "geo/vector_layer.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// Neighbours that share an edge overlap by their last digits; beyond this part of a cell they really do.
constexpr double kOverlap_cells = 0.01;

// Where polygons overlap, rings no longer tell inside from outside.
void require_apart(const VectorLayer& layer, const OGRMultiPolygon& all, const OGRMultiPolygon& next,
                   const GridFrame& frame, const FeatureWords& words) {
  const GdalGuard guard;
  const std::unique_ptr<OGRGeometry> common(all.Intersection(&next));
  const double shared_m2 = common ? OGR_G_Area(OGRGeometry::ToHandle(common.get())) : 0.0;
  if (shared_m2 <= kOverlap_cells * frame.cell_m * frame.cell_m) return;
  layer.refuse("polygons of the plot overlap", words.name,
               fmt::format("{:.2f} m2 shared with those before", shared_m2),
               "Select one of them, or cut the overlap away");
}

}  // namespace

PlotArea read_area(const AreaRequest& request, const GridFrame& frame) {
  VectorLayer layer({request.file, request.layer, request.filter, request.table}, frame);
  OGRMultiPolygon all;
  while (const OGRFeatureUniquePtr feature = layer.next()) {
    const FeatureWords words{"a plot", fmt::format("feature {}", feature->GetFID()), "plots"};
    const std::unique_ptr<OGRMultiPolygon> polygons = layer.polygons(*feature, words);
    require_on_map(layer, *polygons, frame, words);
    require_apart(layer, all, *polygons, frame, words);
    for (const OGRPolygon* polygon : *polygons) all.addGeometry(polygon);
  }
  if (all.IsEmpty()) {
    const bool filtered = layer.met() > 0;
    throw Error(
        ErrorKind::data,
        {filtered ? "the filter selects nothing" : "the layer holds no plots", layer.where(),
         filtered ? fmt::format("none of {} features has {}", layer.met(), request.filter) : "0 features",
         filtered ? fmt::format("Mend {}.where", request.table) : "Draw the plot as a polygon"});
  }
  PlotArea area{rings_of(all), all.get_Area(), {}};
  const double cell_m2 = frame.cell_m * frame.cell_m;
  if (area.area_m2 < cell_m2) {
    throw Error(ErrorKind::data, {"the plot is smaller than a cell of the map", layer.where(),
                                  fmt::format("{:.2f} m2, a cell has {:.2f} m2", area.area_m2, cell_m2),
                                  "Check the polygon and the layer's CRS, or give a finer ground"});
  }
  if (!layer.other_crs().empty())
    area.notes.push_back(
        fmt::format("{} is in {} and was carried to the map's CRS.", layer.where(), layer.other_crs()));
  return area;
}

}  // namespace sunfall
