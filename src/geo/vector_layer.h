#pragma once
// Features of a vector layer as a plan names them, each checked and carried to the map. Private to geo.

#include <ogrsf_frmts.h>

#include <filesystem>
#include <memory>
#include <string>
#include <vector>

#include "geo/crs.h"
#include "geo/open_dataset.h"
#include "sunfall/grid.h"

namespace sunfall {

struct LayerRequest {
  std::filesystem::path file;
  std::string layer;   // empty: the file's only layer
  std::string filter;  // in the words of SQL's WHERE; empty: all features
  std::string table;   // the plan's table that asks, "plots", for remedies
};

// How messages speak of a feature.
struct FeatureWords {
  std::string kind;  // "a plot"
  std::string name;  // "plot 'P3'"
  std::string all;   // "plots"
  std::string shape = "polygon";
};

class VectorLayer {
 public:
  // Throws Error(data): a missing layer (names those that exist), no CRS, a filter that cannot be read.
  VectorLayer(const LayerRequest& request, const GridFrame& frame);

  // "plots.gpkg layer 'plots'"
  const std::string& where() const { return where_; }
  const OGRFeatureDefn& definition() const { return *layer_->GetLayerDefn(); }
  // The field's place. Throws Error(data) that names those that exist; `key` is the plan's: "plots.id".
  int field(const std::string& name, const std::string& key) const;
  // The next feature that the filter selects; nothing at the end.
  OGRFeatureUniquePtr next();
  // Features met so far, selected or not.
  long met() const { return met_; }

  // Its polygons on the map, valid. Throws Error(data).
  std::unique_ptr<OGRMultiPolygon> polygons(const OGRFeature& feature, const FeatureWords& words) const;
  // The geometry without heights and arcs, as drawn. Throws Error(data) where there is none.
  std::unique_ptr<OGRGeometry> plane_geometry(const OGRFeature& feature, const FeatureWords& words) const;
  // A plane geometry carried to the map. Throws Error(data).
  void carry_to_map(OGRGeometry& geometry, const FeatureWords& words) const;
  // "EPSG:4326" where the layer's CRS is not the map's, else empty.
  const std::string& other_crs() const { return other_crs_; }

  [[noreturn]] void refuse(std::string what, const std::string& name, std::string found,
                           std::string remedy) const;

 private:
  bool selected(OGRFeature& feature);

  std::string where_;
  GDALDatasetUniquePtr dataset_;
  OGRLayer* layer_ = nullptr;
  std::unique_ptr<OGRFeatureQuery> filter_;
  Transformation to_map_;
  std::string other_crs_;
  long met_ = 0;
};

// Throws Error(data) where the polygons lie off the map, or a part of them does.
void require_on_map(const VectorLayer& layer, const OGRMultiPolygon& polygons, const GridFrame& frame,
                    const FeatureWords& words);

// Outer rings counter-clockwise, holes clockwise.
std::vector<std::vector<MapPoint>> rings_of(const OGRMultiPolygon& polygons);

}  // namespace sunfall
