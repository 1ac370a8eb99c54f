#include "geo/tree_canopy.h"

#include <algorithm>
#include <map>
#include <utility>

#include <fmt/format.h>

#include "geo/burn_leaves.h"
#include "geo/shape_index.h"
#include "geo/vector_layer.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// Cells that are gathered at a time, to bound memory.
constexpr int kCellsAtOnce = 1 << 20;
constexpr std::size_t kMostSpecies = 8;  // named in the notes

class TreeCanopy : public CanopySource {
 public:
  explicit TreeCanopy(GridFrame frame)
      : frame_(std::move(frame)), crown_index_(frame_), hedge_index_(frame_) {}

  // False where the shape lies off the map.
  bool add(const Crown& crown) { return add_to(crowns_, crown_index_, crown); }
  bool add(const Hedge& hedge) { return add_to(hedges_, hedge_index_, hedge); }

  float highest_top_m() const override { return highest_m_; }
  CanopyCells read(const CellWindow& window) const override;

 private:
  template <typename Shape>
  bool add_to(std::vector<Shape>& shapes, ShapeIndex& index, const Shape& shape) {
    const CellWindow cells = cells_around(shape, frame_);
    if (cells.columns == 0) return false;
    index.add(static_cast<std::uint32_t>(shapes.size()), cells);
    shapes.push_back(shape);
    highest_m_ = std::max(highest_m_,
                          static_cast<float>(std::max(shape.top_m, shape.base_m + LeafCells::kThinnest_m)));
    return true;
  }

  GridFrame frame_;
  std::vector<Crown> crowns_;
  std::vector<Hedge> hedges_;
  ShapeIndex crown_index_;
  ShapeIndex hedge_index_;
  float highest_m_ = 0.0F;
};

CanopyCells TreeCanopy::read(const CellWindow& window) const {
  const auto stride = static_cast<std::size_t>(window.columns);
  const std::size_t size = stride * static_cast<std::size_t>(window.rows);
  CanopyCells out{window, std::vector<float>(size, 0.0F), std::vector<float>(size, 0.0F),
                  std::vector<float>(size, 0.0F)};
  const CellWindow inside = common_cells(window, {0, 0, frame_.columns, frame_.rows});
  if (inside.columns == 0) return out;
  const int rows_at_once = std::max(1, kCellsAtOnce / inside.columns);
  for (int first = 0; first < inside.rows; first += rows_at_once) {
    const CellWindow strip{inside.column, inside.row + first, inside.columns,
                           std::min(rows_at_once, inside.rows - first)};
    LeafCells leaves(strip);
    for (const std::uint32_t i : crown_index_.near(strip)) burn(crowns_[i], frame_, leaves);
    for (const std::uint32_t i : hedge_index_.near(strip)) burn(hedges_[i], frame_, leaves);
    const CanopyCells part = leaves.cells();
    for (int row = 0; row < strip.rows; ++row) {
      const auto from = static_cast<std::ptrdiff_t>(row) * strip.columns;
      const auto to = static_cast<std::ptrdiff_t>(strip.row + row - window.row) * window.columns +
                      (strip.column - window.column);
      std::copy_n(part.top_m.begin() + from, strip.columns, out.top_m.begin() + to);
      std::copy_n(part.base_m.begin() + from, strip.columns, out.base_m.begin() + to);
      std::copy_n(part.leaf_density.begin() + from, strip.columns, out.leaf_density.begin() + to);
    }
  }
  return out;
}

// A value of each feature, from a number or a field.
class ValueReader {
 public:
  struct Rule {
    std::string key;   // "height", as in the plan
    std::string what;  // "height"
    double least = 0.0;
    double most = 0.0;
    bool least_too = true;  // whether the least value itself will do
    std::string unit;
  };

  ValueReader(const VectorLayer& layer, FeatureValue value, Rule rule)
      : layer_(layer), value_(std::move(value)), rule_(std::move(rule)) {
    if (value_.field.empty()) return;
    const std::string key = "canopy.trees." + rule_.key;
    field_ = layer.field(value_.field, key);
    const OGRFieldDefn& field = *layer.definition().GetFieldDefn(field_);
    const OGRFieldType type = field.GetType();
    if (type == OFTInteger || type == OFTInteger64 || type == OFTReal) return;
    throw Error(ErrorKind::data, {fmt::format("the field '{}' does not hold numbers", value_.field),
                                  layer.where(), OGRFieldDefn::GetFieldTypeName(type),
                                  fmt::format("Name a field of numbers as {}, or convert it", key)});
  }

  double of(const OGRFeature& feature, const FeatureWords& words) const {
    if (field_ < 0) return value_.number;
    if (!feature.IsFieldSetAndNotNull(field_)) {
      layer_.refuse(fmt::format("{} has no {}", words.kind, rule_.what), words.name,
                    fmt::format("field '{}' is empty", value_.field),
                    fmt::format("Fill it in, or leave it out with where = \"{} IS NOT NULL\"", value_.field));
    }
    const double value = feature.GetFieldAsDouble(field_);
    const bool enough = rule_.least_too ? value >= rule_.least : value > rule_.least;
    if (enough && value <= rule_.most) return value;  // NaN is neither
    layer_.refuse(fmt::format("the {} of {} cannot be", rule_.what, words.kind), words.name,
                  fmt::format("field '{}' has {:g}{}", value_.field, value, rule_.unit),
                  fmt::format("It must be {} {:g} and at most {:g}{}", rule_.least_too ? "at least" : "above",
                              rule_.least, rule_.most, rule_.unit));
  }

 private:
  const VectorLayer& layer_;
  FeatureValue value_;
  Rule rule_;
  int field_ = -1;
};

// A stranger's label, fit for a terminal.
std::string printable(std::string label) {
  constexpr std::size_t longest = 40;
  if (label.size() > longest) label.resize(longest);
  for (char& letter : label) {
    const auto byte = static_cast<unsigned char>(letter);
    if (byte < 0x20 || byte == 0x7F) letter = '?';
  }
  return label;
}

class TreeReader {
 public:
  TreeReader(const TreesRequest& request, const GridFrame& frame);
  std::unique_ptr<CanopySource> read(std::vector<std::string>& notes);

 private:
  void read_feature(const OGRFeature& feature);
  void read_points(const OGRFeature& feature, OGRGeometry& points, const FeatureWords& words);
  void read_hedge(const OGRFeature& feature, const FeatureWords& words);
  template <typename Shape>
  void fill(const OGRFeature& feature, const FeatureWords& words, Shape& shape) const;
  void keep(bool on_map, long& count) { ++(on_map ? count : off_map_); }
  void require_leaves() const;
  std::string counts() const;

  const TreesRequest& request_;
  VectorLayer layer_;
  ValueReader height_;
  ValueReader base_;
  ValueReader density_;
  std::optional<ValueReader> width_;
  int species_ = -1;
  std::unique_ptr<TreeCanopy> canopy_;
  std::map<std::string, long> labels_;
  long trees_ = 0;
  long hedges_ = 0;
  long off_map_ = 0;
};

TreeReader::TreeReader(const TreesRequest& request, const GridFrame& frame)
    : request_(request),
      layer_({request.file, request.layer, request.filter, "canopy.trees"}, frame),
      height_(layer_, request.height_m, {"height", "height", 0.0, 120.0, false, " m"}),
      base_(layer_, request.crown_base_m, {"crown_base", "crown base", 0.0, 120.0, true, " m"}),
      density_(layer_, request.leaf_density, {"leaf_density", "leaf density", 0.0, 20.0, true, " m2 m-3"}),
      canopy_(std::make_unique<TreeCanopy>(frame)) {
  if (request.crown_width_m) {
    width_.emplace(layer_, *request.crown_width_m,
                   ValueReader::Rule{"crown_width", "crown width", 0.1, 60.0, true, " m"});
  }
  if (!request.species.empty()) species_ = layer_.field(request.species, "canopy.trees.species");
}

template <typename Shape>
void TreeReader::fill(const OGRFeature& feature, const FeatureWords& words, Shape& shape) const {
  shape.top_m = height_.of(feature, words);
  shape.base_m = base_.of(feature, words);
  shape.leaf_density = density_.of(feature, words);
  if (shape.base_m < shape.top_m) return;
  layer_.refuse("the leaves of " + words.kind + " begin at or above its height", words.name,
                fmt::format("crown base {:g} m, height {:g} m", shape.base_m, shape.top_m),
                "Both count from the ground, in metres");
}

void TreeReader::read_points(const OGRFeature& feature, OGRGeometry& points, const FeatureWords& words) {
  if (!width_) {
    layer_.refuse("a tree has no crown width", words.name, points.getGeometryName(),
                  "Give canopy.trees.crown_width, a number in metres or a field");
  }
  Crown crown;
  fill(feature, words, crown);
  crown.width_m = width_->of(feature, words);
  layer_.carry_to_map(points, words);
  const auto add = [&](const OGRPoint& point) {
    crown.centre = {point.getX(), point.getY()};
    keep(canopy_->add(crown), trees_);
  };
  if (wkbFlatten(points.getGeometryType()) == wkbPoint) {
    add(*points.toPoint());
  } else {
    for (const OGRPoint* point : *points.toMultiPoint()) add(*point);
  }
}

void TreeReader::read_hedge(const OGRFeature& feature, const FeatureWords& words) {
  Hedge hedge;
  fill(feature, words, hedge);
  hedge.rings = rings_of(*layer_.polygons(feature, words));
  keep(canopy_->add(hedge), hedges_);
}

void TreeReader::read_feature(const OGRFeature& feature) {
  const std::string name = fmt::format("feature {}", feature.GetFID());
  const std::unique_ptr<OGRGeometry> drawn =
      layer_.plane_geometry(feature, {"a tree or hedge", name, "trees", "geometry"});
  switch (wkbFlatten(drawn->getGeometryType())) {
    case wkbPoint:
    case wkbMultiPoint: read_points(feature, *drawn, {"a tree", name, "trees", "point"}); break;
    case wkbPolygon:
    case wkbMultiPolygon: read_hedge(feature, {"a hedge", name, "hedges"}); break;
    default:
      layer_.refuse(
          "neither a point nor a polygon", name, drawn->getGeometryName(),
          "Draw trees as points, and hedges as polygons as wide as their leaves, for instance with a buffer "
          "of half their width around the line");
  }
  if (species_ >= 0) {
    const bool given = feature.IsFieldSetAndNotNull(species_);
    ++labels_[printable(given ? feature.GetFieldAsString(species_) : "")];
  }
}

void TreeReader::require_leaves() const {
  if (trees_ + hedges_ > 0) return;
  if (off_map_ > 0) {
    throw Error(ErrorKind::data,
                {"all trees and hedges lie off the map", layer_.where(), fmt::format("{} of them", off_map_),
                 "Check the layer's coordinate reference system"});
  }
  const bool filtered = layer_.met() > 0;
  throw Error(
      ErrorKind::data,
      {filtered ? "the filter selects nothing" : "the layer holds no trees or hedges", layer_.where(),
       filtered ? fmt::format("none of {} features has {}", layer_.met(), request_.filter) : "0 features",
       filtered ? "Mend canopy.trees.where" : "Draw some, or leave the table out"});
}

// "213 trees, 4 hedges; by 'species': 120 lime, 93 alder, 4 without"
std::string TreeReader::counts() const {
  std::string words = fmt::format("{} tree{}, {} polygon{} of leaves", trees_, trees_ == 1 ? "" : "s",
                                  hedges_, hedges_ == 1 ? "" : "s");
  if (species_ < 0) return words;
  std::vector<std::pair<long, std::string>> sorted;
  for (const auto& [label, count] : labels_) sorted.emplace_back(-count, label.empty() ? "without" : label);
  std::sort(sorted.begin(), sorted.end());
  words += fmt::format("; features by '{}': ", request_.species);
  for (std::size_t i = 0; i < std::min(sorted.size(), kMostSpecies); ++i)
    words += fmt::format("{}{} {}", i == 0 ? "" : ", ", -sorted[i].first, sorted[i].second);
  if (sorted.size() > kMostSpecies) words += fmt::format(" and {} more", sorted.size() - kMostSpecies);
  return words + " (labels only, the light does not depend on them)";
}

std::unique_ptr<CanopySource> TreeReader::read(std::vector<std::string>& notes) {
  while (const OGRFeatureUniquePtr feature = layer_.next()) read_feature(*feature);
  require_leaves();
  notes.push_back(fmt::format("{}: {}.", layer_.where(), counts()));
  if (!layer_.other_crs().empty())
    notes.push_back(
        fmt::format("{} is in {} and was carried to the map's CRS.", layer_.where(), layer_.other_crs()));
  if (off_map_ > 0) {
    notes.push_back(fmt::format("{}: {} of {} trees and polygons lie off the map and are left out.",
                                layer_.where(), off_map_, off_map_ + trees_ + hedges_));
  }
  if (width_ && trees_ == 0)
    notes.push_back(fmt::format("{} holds polygons only, so crown_width is not used.", layer_.where()));
  return std::move(canopy_);
}

}  // namespace

std::unique_ptr<CanopySource> read_tree_canopy(const TreesRequest& request, const GridFrame& frame,
                                               std::vector<std::string>& notes) {
  return TreeReader(request, frame).read(notes);
}

}  // namespace sunfall
