#pragma once
// Maps on paper: the twelve months on one shared scale, or one layer alone.

#include <filesystem>
#include <string>
#include <vector>

#include "report/furniture.h"
#include "sunfall/grid.h"

namespace sunfall {

struct PlotOutline {
  std::string id;
  std::vector<std::vector<MapPoint>> rings;
};

// What stands beneath a map, of its cells at full resolution; mol m-2 d-1, missing where no cell
// has a value.
struct MapNumbers {
  double mean = kMissing;
  double least = kMissing;
  double most = kMissing;
  double open_field = kMissing;
};

// A map's picture may be a preview, coarser than the layer that its numbers come from.
struct MapPanel {
  std::string name;  // "January"
  Grid<float> light;
  MapNumbers numbers;
};

// What the maps of a page share. All lie on the same frame.
struct MapContext {
  PictureText text;
  std::string quantity = "Daily light integral";
  double convergence_deg = 0.0;  // bearing of grid north, clockwise from true north
  std::vector<PlotOutline> plots;
};

struct ContactSheet {
  MapContext context;
  std::vector<MapPanel> months;  // twelve
};

struct SingleMap {
  MapContext context;
  std::string subject;  // "Light of the year"
  MapPanel map;
};

// PNG or SVG by the file's extension. Throws Error(io).
void draw_contact_sheet(const std::filesystem::path& file, const ContactSheet& sheet);
void draw_map(const std::filesystem::path& file, const SingleMap& map);

// The drawing before it is saved. `maps` must not be empty.
Canvas paint_maps(const std::filesystem::path& file, const MapContext& context, const std::string& subject,
                  const std::vector<MapPanel>& maps);

// One scale for all maps of a sheet, from 0 to a round number above every cell and open field.
LightScale shared_scale(const std::vector<MapPanel>& maps);

// Mean, least and most of a grid's cells.
MapNumbers numbers_of(const Grid<float>& light, double open_field);

}  // namespace sunfall
