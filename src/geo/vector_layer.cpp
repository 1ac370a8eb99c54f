#include "geo/vector_layer.h"

#include <algorithm>
#include <utility>

#include <fmt/format.h>

#include "core/nearest.h"
#include "geo/gdal_guard.h"

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

OGRLayer& find_layer(GDALDataset& dataset, const LayerRequest& request) {
  std::vector<std::string> names;
  for (OGRLayer* layer : dataset.GetLayers()) {
    if (layer->GetName() == request.layer) return *layer;
    names.emplace_back(layer->GetName());
  }
  if (request.layer.empty() && names.size() == 1) return *dataset.GetLayer(0);
  const std::string where = request.file.string();
  if (names.empty()) {
    throw Error(ErrorKind::data,
                {"the file holds no layers", where, "", "Give a file with a layer of features"});
  }
  if (request.layer.empty()) {
    throw Error(ErrorKind::data, {"the file holds several layers", where, list_of(names),
                                  "Name one as " + request.table + ".layer"});
  }
  throw Error(ErrorKind::data,
              {fmt::format("there is no layer '{}'", request.layer), where, list_of(names),
               "Name one of those as " + request.table + ".layer" + did_you_mean(request.layer, names)});
}

// Compiled here and not by the driver, so that the words mean the same in files of every kind, and no
// database runs what a stranger wrote.
std::unique_ptr<OGRFeatureQuery> compiled(const LayerRequest& request, OGRFeatureDefn& definition,
                                          const std::string& where) {
  if (request.filter.empty()) return nullptr;
  GdalGuard guard;
  auto query = std::make_unique<OGRFeatureQuery>();
  if (query->Compile(&definition, request.filter.c_str()) == OGRERR_NONE) return query;
  std::vector<std::string> names;
  for (int i = 0; i < definition.GetFieldCount(); ++i)
    names.emplace_back(definition.GetFieldDefn(i)->GetNameRef());
  guard.fail(ErrorKind::data, fmt::format("the filter cannot be read: {}", request.filter), where,
             fmt::format("Mend {}.where; texts stand in single quotes, and the fields are {}", request.table,
                         names.empty() ? "none" : list_of(names)));
}

}  // namespace

VectorLayer::VectorLayer(const LayerRequest& request, const GridFrame& frame)
    : where_(request.file.string()),
      dataset_(open_vector(request.file, where_)),
      layer_(&find_layer(*dataset_, request)) {
  where_ = fmt::format("{} layer '{}'", request.file.string(), layer_->GetName());
  const OGRSpatialReference* crs = layer_->GetSpatialRef();
  if (crs == nullptr) {
    throw Error(ErrorKind::data, {"the layer has no coordinate reference system", where_, "none",
                                  "Declare it: ogr2ogr -a_srs EPSG:CODE OUT.gpkg IN"});
  }
  filter_ = compiled(request, *layer_->GetLayerDefn(), where_);
  const OGRSpatialReference own = plane_part(*crs);
  const OGRSpatialReference map = crs_from_wkt(frame.crs_wkt);
  to_map_ = transformation(own, map, where_);
  if (!same_crs(own, map)) other_crs_ = crs_label(own);
  layer_->ResetReading();
}

int VectorLayer::field(const std::string& name, const std::string& key) const {
  std::vector<std::string> names;
  for (int i = 0; i < definition().GetFieldCount(); ++i) {
    names.emplace_back(definition().GetFieldDefn(i)->GetNameRef());
    if (names.back() == name) return i;
  }
  throw Error(ErrorKind::data, {fmt::format("there is no field '{}'", name), where_,
                                names.empty() ? "no fields" : list_of(names),
                                fmt::format("Name one of those as {}", key) + did_you_mean(name, names)});
}

bool VectorLayer::selected(OGRFeature& feature) {
  if (!filter_) return true;
  GdalGuard guard;
  const bool yes = filter_->Evaluate(&feature) != 0;
  if (guard.failed()) guard.fail(ErrorKind::data, "the filter cannot be applied", where_, "Mend the filter");
  return yes;
}

OGRFeatureUniquePtr VectorLayer::next() {
  while (true) {
    GdalGuard guard;
    OGRFeatureUniquePtr feature(layer_->GetNextFeature());
    if (guard.failed()) {
      guard.fail(ErrorKind::data, "a feature cannot be read", where_,
                 "Repair the file, or export the layer again");
    }
    if (!feature) return feature;
    ++met_;
    if (selected(*feature)) return feature;
  }
}

std::unique_ptr<OGRGeometry> VectorLayer::plane_geometry(const OGRFeature& feature,
                                                         const FeatureWords& words) const {
  const OGRGeometry* drawn = feature.GetGeometryRef();
  if (drawn == nullptr || drawn->IsEmpty()) {
    refuse(words.kind + " has no " + words.shape, words.name, "an empty geometry",
           "Draw it, or delete the row");
  }
  const GdalGuard guard;
  std::unique_ptr<OGRGeometry> plane(drawn->getLinearGeometry());
  plane->flattenTo2D();
  return plane;
}

void VectorLayer::carry_to_map(OGRGeometry& geometry, const FeatureWords& words) const {
  const GdalGuard guard;
  if (geometry.transform(to_map_.get()) == OGRERR_NONE) return;
  refuse(words.kind + " cannot be carried to the map", words.name, guard.message(),
         "Check the layer's coordinate reference system");
}

std::unique_ptr<OGRMultiPolygon> VectorLayer::polygons(const OGRFeature& feature,
                                                       const FeatureWords& words) const {
  std::unique_ptr<OGRGeometry> plane = plane_geometry(feature, words);
  const OGRwkbGeometryType type = wkbFlatten(plane->getGeometryType());
  if (type != wkbPolygon && type != wkbMultiPolygon) {
    refuse(words.kind + " is not a polygon", words.name, feature.GetGeometryRef()->getGeometryName(),
           fmt::format("Draw {} as polygons", words.all));
  }
  GdalGuard guard;
  if (!plane->IsValid()) {
    refuse(words.kind + "'s polygon is invalid", words.name,
           guard.message().empty() ? "no reason known" : guard.message(),
           "Redraw it, or repair the layer: ogr2ogr -makevalid OUT.gpkg IN");
  }
  carry_to_map(*plane, words);
  return std::unique_ptr<OGRMultiPolygon>(
      OGRGeometryFactory::forceToMultiPolygon(plane.release())->toMultiPolygon());
}

void VectorLayer::refuse(std::string what, const std::string& name, std::string found,
                         std::string remedy) const {
  throw Error(ErrorKind::data,
              {std::move(what), fmt::format("{}, {}", where_, name), std::move(found), std::move(remedy)});
}

void require_on_map(const VectorLayer& layer, const OGRMultiPolygon& polygons, const GridFrame& frame,
                    const FeatureWords& words) {
  const double south = frame.north - frame.rows * frame.cell_m;
  const double east = frame.west + frame.columns * frame.cell_m;
  const double tolerance_m = kEdgeTolerance_cells * frame.cell_m;
  OGREnvelope box;
  polygons.getEnvelope(&box);
  if (box.MinX >= frame.west - tolerance_m && box.MaxX <= east + tolerance_m &&
      box.MinY >= south - tolerance_m && box.MaxY <= frame.north + tolerance_m) {
    return;
  }
  OGRLinearRing border;
  border.addPoint(frame.west, south);
  border.addPoint(east, south);
  border.addPoint(east, frame.north);
  border.addPoint(frame.west, frame.north);
  border.closeRings();
  OGRPolygon map;
  map.addRing(&border);
  GdalGuard guard;
  const std::unique_ptr<OGRGeometry> common(polygons.Intersection(&map));
  double on_map_m2 = 0.0;
  if (common && common->getGeometryType() != wkbUnknown)
    on_map_m2 = OGR_G_Area(OGRGeometry::ToHandle(common.get()));
  const double percent = 100.0 * on_map_m2 / polygons.get_Area();
  layer.refuse(
      words.kind + (percent > 0.0 ? " lies partly off the map" : " lies off the map"), words.name,
      fmt::format(
          "{:.1f} % of it is on the map; it spans {:.2f} to {:.2f} east and {:.2f} to {:.2f} north, the map "
          "{:.2f} to {:.2f} and {:.2f} to {:.2f}",
          percent, box.MinX, box.MaxX, box.MinY, box.MaxY, frame.west, east, south, frame.north),
      "Give a ground raster that covers all " + words.all +
          ", cut it at the map's edge, or check the layer's CRS");
}

namespace {

std::vector<MapPoint> ring_of(const OGRLinearRing& drawn, bool outer) {
  std::vector<MapPoint> ring;
  for (int i = 0; i < drawn.getNumPoints(); ++i) ring.push_back({drawn.getX(i), drawn.getY(i)});
  const bool clockwise = drawn.isClockwise() != 0;
  if (clockwise == outer) std::reverse(ring.begin(), ring.end());
  return ring;
}

}  // namespace

std::vector<std::vector<MapPoint>> rings_of(const OGRMultiPolygon& polygons) {
  std::vector<std::vector<MapPoint>> rings;
  for (const OGRPolygon* polygon : polygons) {
    bool outer = true;
    for (const OGRLinearRing* ring : *polygon) {
      rings.push_back(ring_of(*ring, outer));
      outer = false;
    }
  }
  return rings;
}

}  // namespace sunfall
