#pragma once
// The plan: one TOML file that names every input and every choice, read into typed values.
// Unknown keys are errors that name the nearest known key; every error tells file, line and key.

#include <array>
#include <filesystem>
#include <optional>
#include <string>
#include <vector>

#include "sunfall/crop_rows.h"
#include "sunfall/dome.h"
#include "sunfall/grid.h"
#include "sunfall/light.h"
#include "sunfall/time.h"

namespace sunfall {

enum class ReceiverPlane { level, ground };

struct SitePlan {
  std::filesystem::path ground;                     // resolved against the plan's folder
  std::optional<std::filesystem::path> surface;     // top of everything solid
  std::optional<std::filesystem::path> far_ground;  // coarser terrain around
  double receiver_height_m = 0.5;
  ReceiverPlane receiver_plane = ReceiverPlane::level;
  Clock clock;
};

struct PlotsPlan {
  std::filesystem::path file;
  std::string layer;  // empty: the file's only layer
  std::string id = "id";
  std::optional<std::string> crop;  // field that names each plot's crop
};

// Features of a vector layer.
struct AreaPlan {
  std::filesystem::path file;
  std::string layer;  // empty: the file's only layer
  std::string where;  // a filter on the layer's fields; empty: all
};

struct RowsPlan {
  std::string name;   // may be empty
  std::string where;  // "farm.toml:30 rows.area", for errors found later
  AreaPlan area;
  Azimuth azimuth;
  CropRows rows;
  std::array<double, 12> leafing = {1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1};  // share of full leaf, by month
};

// The same everywhere, or what a raster says of each cell.
struct NumberOrFile {
  double number = 0.0;
  std::optional<std::filesystem::path> file;
};

// The same for all features, or what a field says of each.
struct NumberOrField {
  double number = 0.0;
  std::string field;  // empty: the number
};

// Points: trees, each crown an ellipsoid. Polygons: hedges and belts, upright walls of leaf.
struct TreesPlan {
  AreaPlan layer;
  NumberOrField height_m;                      // top of the leaves above the ground
  NumberOrField crown_base_m;                  // lowest leaves above the ground
  std::optional<NumberOrField> crown_width_m;  // of points
  std::optional<NumberOrField> leaf_density;   // nothing: by the windbreak's porosity
  std::string species;                         // field of labels; empty: none
};

// Leaf density by what is seen straight through: porosity = exp(-G · clumping · density · width).
struct WindbreakPlan {
  double optical_porosity = 0.5;  // 0.01 to 1, level view, full leaf
  double width_m = 0.0;           // of the leaves, along the view
  std::string where;              // "farm.toml:34 canopy.optical_porosity"
};

// Leaves in one and the same state by month. Either `trees`, or top, base and leaf_density.
struct CanopyPlan {
  std::string name;    // may be empty
  std::string where;   // "farm.toml:30 canopy", for errors found later
  NumberOrFile top_m;  // above the ground
  NumberOrFile base_m;
  std::optional<NumberOrFile> leaf_density;  // m2 m-3; nothing: by the windbreak's porosity
  std::optional<TreesPlan> trees;
  std::optional<WindbreakPlan> windbreak;
  double leaf_angle = 1.0;  // these three as in CropRows
  double clumping = 1.0;
  double absorptance = 0.85;
  std::array<double, 12> leafing = {1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1};  // share of full leaf, by month
};

struct DomePlan {
  DomeQuality quality = DomeQuality::standard;
  SkyModel sky = SkyModel::clearness;
};

struct OutputPlan {
  bool shares = false;            // share-beam-MM.tif and share-sky-MM.tif
  bool percentiles = false;       // dli-MM-p10.tif, -p50 and -p90 over the years of a series
  std::string percentiles_where;  // "farm.toml:30 output.percentiles", for faults found later
};

struct Plan {
  std::filesystem::path file;  // as given
  std::string name;            // [plan] name, else the file's stem
  SitePlan site;
  LightSource light;
  std::string light_where;  // "farm.toml:9 light.monthly_global", for errors found later
  LightOptions light_options;
  std::vector<Period> periods;  // the twelve months, then named seasons in the plan's order
  std::optional<PlotsPlan> plots;
  std::vector<CanopyPlan> canopy;
  std::vector<RowsPlan> rows;
  DomePlan dome;
  OutputPlan output;
  std::vector<std::string> defaults;  // "site.receiver_height = 0.5 m": what the plan left open
};

// Throws Error(plan).
Plan read_plan(const std::filesystem::path& file);

}  // namespace sunfall
