// Plots in: the polygons of a vector layer, each checked before anything is computed on it.

#include <ogrsf_frmts.h>

#include <algorithm>
#include <cmath>
#include <memory>
#include <unordered_map>
#include <utility>

#include <fmt/format.h>

#include "core/nearest.h"
#include "geo/crs.h"
#include "geo/gdal_guard.h"
#include "geo/open_dataset.h"
#include "geo/plots.h"

namespace sunfall {
namespace {

// A plot's edge may reach this far over the map's edge before it counts as lying off it; plots are
// often drawn along the raster's border and stored with fewer digits.
constexpr double kEdgeTolerance_cells = 0.01;

std::string list_of(const std::vector<std::string>& names) {
  return fmt::format("{}", fmt::join(names, ", "));
}

std::string did_you_mean(const std::string& name, const std::vector<std::string>& known) {
  const std::string nearest = nearest_name(name, known);
  return nearest.empty() ? std::string() : fmt::format("; did you mean '{}'?", nearest);
}

OGRLayer& find_layer(GDALDataset& dataset, const PlotsRequest& request) {
  std::vector<std::string> names;
  for (OGRLayer* layer : dataset.GetLayers()) {
    if (layer->GetName() == request.layer) return *layer;
    names.emplace_back(layer->GetName());
  }
  if (request.layer.empty() && names.size() == 1) return *dataset.GetLayer(0);
  const std::string where = request.file.string();
  if (names.empty()) {
    throw Error(ErrorKind::data,
                {"the file holds no layers", where, "", "Give a file with a layer of polygons"});
  }
  if (request.layer.empty()) {
    throw Error(ErrorKind::data,
                {"the file holds several layers", where, list_of(names), "Name one as plots.layer"});
  }
  throw Error(ErrorKind::data, {fmt::format("there is no layer '{}'", request.layer), where, list_of(names),
                                "Name one of those as plots.layer" + did_you_mean(request.layer, names)});
}

int find_field(const OGRFeatureDefn& definition, const std::string& field, const char* key,
               const std::string& where) {
  std::vector<std::string> names;
  for (int i = 0; i < definition.GetFieldCount(); ++i) {
    names.emplace_back(definition.GetFieldDefn(i)->GetNameRef());
    if (names.back() == field) return i;
  }
  throw Error(ErrorKind::data, {fmt::format("there is no field '{}'", field), where,
                                names.empty() ? "no fields" : list_of(names),
                                fmt::format("Name one of those as {}", key) + did_you_mean(field, names)});
}

class PlotReader {
 public:
  PlotReader(const PlotsRequest& request, const GridFrame& frame);
  std::vector<Plot> read();

 private:
  Plot read_plot(OGRFeature& feature);
  std::string read_id(const OGRFeature& feature);
  std::unique_ptr<OGRMultiPolygon> checked_polygons(OGRFeature& feature, const std::string& plot);
  void require_on_map(const OGRMultiPolygon& polygons, const std::string& plot) const;
  [[noreturn]] void refuse(std::string what, const std::string& plot, std::string found,
                           std::string remedy) const {
    throw Error(ErrorKind::data,
                {std::move(what), fmt::format("{}, {}", where_, plot), std::move(found), std::move(remedy)});
  }

  const GridFrame& frame_;
  std::string where_;
  GDALDatasetUniquePtr dataset_;
  OGRLayer& layer_;
  int id_field_ = -1;
  int crop_field_ = -1;
  OGRSpatialReference map_crs_;
  Transformation to_map_;
  std::unordered_map<std::string, GIntBig> seen_ids_;
};

PlotReader::PlotReader(const PlotsRequest& request, const GridFrame& frame)
    : frame_(frame),
      where_(request.file.string()),
      dataset_(open_vector(request.file, where_)),
      layer_(find_layer(*dataset_, request)),
      map_crs_(crs_from_wkt(frame.crs_wkt)) {
  where_ = fmt::format("{} layer '{}'", request.file.string(), layer_.GetName());
  const OGRFeatureDefn& definition = *layer_.GetLayerDefn();
  id_field_ = find_field(definition, request.id_field, "plots.id", where_);
  if (request.crop_field) crop_field_ = find_field(definition, *request.crop_field, "plots.crop", where_);
  const OGRSpatialReference* crs = layer_.GetSpatialRef();
  if (crs == nullptr) {
    throw Error(ErrorKind::data, {"the layer has no coordinate reference system", where_, "none",
                                  "Declare it: ogr2ogr -a_srs EPSG:CODE OUT.gpkg IN"});
  }
  to_map_ = transformation(plane_part(*crs), map_crs_, where_);
}

std::vector<Plot> PlotReader::read() {
  std::vector<Plot> plots;
  layer_.ResetReading();
  while (true) {
    GdalGuard guard;
    const OGRFeatureUniquePtr feature(layer_.GetNextFeature());
    if (guard.failed())
      guard.fail(ErrorKind::data, "a plot cannot be read", where_,
                 "Repair the file, or export the layer again");
    if (!feature) break;
    plots.push_back(read_plot(*feature));
  }
  if (plots.empty()) {
    throw Error(ErrorKind::data, {"the layer holds no plots", where_, "0 features",
                                  "Draw at least one polygon, or leave [plots] out"});
  }
  return plots;
}

std::string PlotReader::read_id(const OGRFeature& feature) {
  const std::string place = fmt::format("feature {}", feature.GetFID());
  std::string id = feature.IsFieldSetAndNotNull(id_field_) ? feature.GetFieldAsString(id_field_) : "";
  if (id.find_first_not_of(" \t") == std::string::npos) {
    refuse("a plot has no id", place, "an empty id", "Give each plot an id of its own");
  }
  const auto [first, is_new] = seen_ids_.emplace(id, feature.GetFID());
  if (!is_new) {
    refuse("two plots have the same id", place, fmt::format("'{}', also feature {}", id, first->second),
           "Give each plot an id of its own");
  }
  return id;
}

std::unique_ptr<OGRMultiPolygon> PlotReader::checked_polygons(OGRFeature& feature, const std::string& plot) {
  const OGRGeometry* drawn = feature.GetGeometryRef();
  if (drawn == nullptr || drawn->IsEmpty()) {
    refuse("a plot has no polygon", plot, "an empty geometry", "Draw it, or delete the row");
  }
  GdalGuard guard;
  // Arcs become short straight edges; heights of the corners play no part.
  std::unique_ptr<OGRGeometry> plane(drawn->getLinearGeometry());
  plane->flattenTo2D();
  const OGRwkbGeometryType type = wkbFlatten(plane->getGeometryType());
  if (type != wkbPolygon && type != wkbMultiPolygon) {
    refuse("a plot is not a polygon", plot, drawn->getGeometryName(), "Draw plots as polygons");
  }
  guard.clear();
  if (!plane->IsValid()) {
    refuse("a plot's polygon is invalid", plot, guard.message().empty() ? "no reason known" : guard.message(),
           "Redraw it, or repair the layer: ogr2ogr -makevalid OUT.gpkg IN");
  }
  if (plane->transform(to_map_.get()) != OGRERR_NONE) {
    refuse("a plot cannot be carried to the map", plot, guard.message(),
           "Check the layer's coordinate reference system");
  }
  return std::unique_ptr<OGRMultiPolygon>(
      OGRGeometryFactory::forceToMultiPolygon(plane.release())->toMultiPolygon());
}

void PlotReader::require_on_map(const OGRMultiPolygon& polygons, const std::string& plot) const {
  const double south = frame_.north - frame_.rows * frame_.cell_m;
  const double east = frame_.west + frame_.columns * frame_.cell_m;
  const double tolerance_m = kEdgeTolerance_cells * frame_.cell_m;
  OGREnvelope box;
  polygons.getEnvelope(&box);
  if (box.MinX >= frame_.west - tolerance_m && box.MaxX <= east + tolerance_m &&
      box.MinY >= south - tolerance_m && box.MaxY <= frame_.north + tolerance_m) {
    return;
  }
  OGRLinearRing border;
  border.addPoint(frame_.west, south);
  border.addPoint(east, south);
  border.addPoint(east, frame_.north);
  border.addPoint(frame_.west, frame_.north);
  border.closeRings();
  OGRPolygon map;
  map.addRing(&border);
  GdalGuard guard;
  const std::unique_ptr<OGRGeometry> common(polygons.Intersection(&map));
  double on_map_m2 = 0.0;
  if (common && common->getGeometryType() != wkbUnknown)
    on_map_m2 = OGR_G_Area(OGRGeometry::ToHandle(common.get()));
  const double percent = 100.0 * on_map_m2 / polygons.get_Area();
  refuse(
      percent > 0.0 ? "a plot lies partly off the map" : "a plot lies off the map", plot,
      fmt::format(
          "{:.1f} % of it is on the map; it spans {:.2f} to {:.2f} east and {:.2f} to {:.2f} north, the map "
          "{:.2f} to {:.2f} and {:.2f} to {:.2f}",
          percent, box.MinX, box.MaxX, box.MinY, box.MaxY, frame_.west, east, south, frame_.north),
      "Give a ground raster that covers all plots, cut the plot at the map's edge, or check the layer's CRS");
}

std::vector<MapPoint> ring_of(const OGRLinearRing& drawn, bool outer) {
  std::vector<MapPoint> ring;
  for (int i = 0; i < drawn.getNumPoints(); ++i) ring.push_back({drawn.getX(i), drawn.getY(i)});
  const bool clockwise = drawn.isClockwise() != 0;
  if (clockwise == outer) std::reverse(ring.begin(), ring.end());
  return ring;
}

Plot PlotReader::read_plot(OGRFeature& feature) {
  Plot plot;
  plot.id = read_id(feature);
  if (crop_field_ >= 0 && feature.IsFieldSetAndNotNull(crop_field_))
    plot.crop = feature.GetFieldAsString(crop_field_);
  const std::string name = fmt::format("plot '{}'", plot.id);
  const std::unique_ptr<OGRMultiPolygon> polygons = checked_polygons(feature, name);
  require_on_map(*polygons, name);
  for (const OGRPolygon* polygon : *polygons) {
    bool outer = true;
    for (const OGRLinearRing* ring : *polygon) {
      plot.rings.push_back(ring_of(*ring, outer));
      outer = false;
    }
  }
  plot.area_m2 = polygons->get_Area();
  return plot;
}

}  // namespace

std::vector<Plot> read_plots(const PlotsRequest& request, const GridFrame& frame) {
  return PlotReader(request, frame).read();
}

}  // namespace sunfall
