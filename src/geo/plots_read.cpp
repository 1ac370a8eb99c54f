// Plots in: the polygons of a vector layer, each checked before anything is computed on it.

#include <memory>
#include <unordered_map>
#include <utility>

#include <fmt/format.h>

#include "geo/plots.h"
#include "geo/vector_layer.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

class PlotReader {
 public:
  PlotReader(const PlotsRequest& request, const GridFrame& frame);
  std::vector<Plot> read();

 private:
  Plot read_plot(const OGRFeature& feature);
  std::string read_id(const OGRFeature& feature);

  const GridFrame& frame_;
  VectorLayer layer_;
  int id_field_ = -1;
  int crop_field_ = -1;
  std::unordered_map<std::string, GIntBig> seen_ids_;
};

PlotReader::PlotReader(const PlotsRequest& request, const GridFrame& frame)
    : frame_(frame), layer_({request.file, request.layer, "", "plots"}, frame) {
  id_field_ = layer_.field(request.id_field, "plots.id");
  if (request.crop_field) crop_field_ = layer_.field(*request.crop_field, "plots.crop");
}

std::vector<Plot> PlotReader::read() {
  std::vector<Plot> plots;
  while (const OGRFeatureUniquePtr feature = layer_.next()) plots.push_back(read_plot(*feature));
  if (plots.empty()) {
    throw Error(ErrorKind::data, {"the layer holds no plots", layer_.where(), "0 features",
                                  "Draw at least one polygon, or leave [plots] out"});
  }
  return plots;
}

std::string PlotReader::read_id(const OGRFeature& feature) {
  const std::string place = fmt::format("feature {}", feature.GetFID());
  std::string id = feature.IsFieldSetAndNotNull(id_field_) ? feature.GetFieldAsString(id_field_) : "";
  if (id.find_first_not_of(" \t") == std::string::npos) {
    layer_.refuse("a plot has no id", place, "an empty id", "Give each plot an id of its own");
  }
  const auto [first, is_new] = seen_ids_.emplace(id, feature.GetFID());
  if (!is_new) {
    layer_.refuse("two plots have the same id", place,
                  fmt::format("'{}', also feature {}", id, first->second), "Give each plot an id of its own");
  }
  return id;
}

Plot PlotReader::read_plot(const OGRFeature& feature) {
  Plot plot;
  plot.id = read_id(feature);
  if (crop_field_ >= 0 && feature.IsFieldSetAndNotNull(crop_field_))
    plot.crop = feature.GetFieldAsString(crop_field_);
  const FeatureWords words{"a plot", fmt::format("plot '{}'", plot.id), "plots"};
  const std::unique_ptr<OGRMultiPolygon> polygons = layer_.polygons(feature, words);
  require_on_map(layer_, *polygons, frame_, words);
  plot.rings = rings_of(*polygons);
  plot.area_m2 = polygons->get_Area();
  return plot;
}

}  // namespace

std::vector<Plot> read_plots(const PlotsRequest& request, const GridFrame& frame) {
  return PlotReader(request, frame).read();
}

}  // namespace sunfall
