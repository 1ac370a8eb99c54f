#pragma once
// The main job: from a plan to light maps in a run folder.

#include <array>
#include <filesystem>
#include <map>
#include <string>
#include <vector>

#include "sunfall/dome.h"
#include "sunfall/grid.h"
#include "sunfall/plan.h"
#include "sunfall/progress.h"

namespace sunfall {

struct MapOptions {
  int jobs = 0;                               // worker threads; 0 for as many as the machine has
  int tile_cells = 512;                       // side of a tile
  bool reverse_tiles = false;                 // last tile first; the result does not depend on it
  std::vector<std::vector<CellIndex>> plots;  // cells of each plot, sorted by row, then column
};

// The open field: what falls on level ground with nothing around it.
struct OpenField {
  std::vector<double> beam;  // mol m-2 d-1 per period
  std::vector<double> sky;
  double year = 0.0;                    // beam and sky over the year's mean day
  std::array<double, 12> month_part{};  // of the series' days: what a month counts for in the year
  std::vector<OpenYear> years;          // each year alone
};

// What a plot of crop rows takes, mean over its cells; mol per m2 of ground and day, per period.
struct CropLight {
  std::size_t cells = 0;
  std::vector<double> came;         // at the tops of the rows
  std::vector<double> taken_right;  // of it, from the right of the rows' azimuth
  std::vector<double> taken_left;
};

struct MapLayer {
  std::string file_name;
  std::string description;
  std::string unit;
};

struct MapResult {
  GridFrame frame;
  std::vector<MapLayer> layers;
  std::vector<Period> periods;
  OpenField open;
  std::vector<std::vector<double>> plot_shares;  // [plot][beam of every period, then sky]: mean of its cells
  std::vector<CropLight> crops;                  // by the plan's rows
  std::string shares_from;                       // the finished run's folder; empty where geometry was solved
  std::vector<std::string> notes;                // assumptions that were made for the user
  double valid_fraction = 0.0;                   // cells with a value
  double mean_sight = 0.0;
  std::map<std::string, double> seconds;  // per stage
};

// Writes the rasters of the plan into `folder`, each whole or not at all. Light must be made for
// the plan's place and its periods. Throws Error; on interruption, Error(interrupted).
MapResult make_maps(const Plan& plan, const DomeLight& light,
                    const std::map<std::string, std::string>& provenance, const std::filesystem::path& folder,
                    const MapOptions& options, Progress& progress);

}  // namespace sunfall
