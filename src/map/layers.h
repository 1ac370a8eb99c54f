#pragma once
// The layers of a run: what each holds and how it follows from a tile's shares. Another layer is
// one entry in layers_of().

#include <functional>
#include <vector>

#include "geo/layer_writer.h"
#include "map/tile_solver.h"
#include "map/years.h"
#include "sunfall/map.h"
#include "sunfall/plan.h"

namespace sunfall {

// Light of a tile: for every period, then for the year, DLI per cell (missing where there is no
// receiver), and the shares and sight behind it.
struct TileLight {
  const TileShares* shares = nullptr;
  std::vector<std::vector<float>> dli;  // [period][cell]
  std::vector<float> year;
  std::vector<float> sight;
  std::vector<std::vector<float>> taken;  // [period, then the year][cell] by crop rows; missing elsewhere
  TilePercentiles over_years;             // where they are wanted, else empty
};
TileLight light_of(const TileShares& shares, const OpenField& open);

struct LayerRecipe {
  LayerSpec spec;
  std::function<void(const TileLight& light, std::vector<float>& values)> fill;
};
std::vector<LayerRecipe> layers_of(const Plan& plan, const std::vector<Period>& periods,
                                   const std::map<std::string, std::string>& provenance);

// A period for people: "January", or "season (15 Apr to 30 Sep)".
std::string period_title(const Period& period);

}  // namespace sunfall
