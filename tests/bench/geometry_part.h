#pragma once
// Geometry and light of a whole map as the program does it, with nothing written; and its answers held
// against a plain march.

#include <functional>
#include <vector>

#include "bench/figures.h"
#include "map/tile_solver.h"
#include "oracle/comparison.h"

namespace sunfall::bench {

// The light of one cell, kept while a map passes.
struct CellLight {
  CellIndex cell;
  bool usable = false;        // a receiver stands there
  std::vector<float> shares;  // beam of every period, then sky
  std::vector<float> dli;     // of every period, then the year
};

// The shares of every tile in turn, on all cores; `take` is called from several threads. The tiles are
// those of the map command.
Cost solve_tiles(const oracle::Ground& ground, const DomeLight& light,
                 const std::function<void(const TileShares&)>& take);

// Shares and daily light of the whole map, and those of `cells` kept.
Cost geometry_and_light(const oracle::Ground& ground, const DomeLight& light, std::vector<CellLight>& cells);

// Different cells from a fixed seed.
std::vector<CellLight> some_cells(const GridFrame& frame, std::size_t count);

// Beam and sky of the usable cells against horizons marched line by line.
void check_against_march(const oracle::Ground& ground, const DomeLight& light,
                         const std::vector<CellLight>& cells, Findings& findings);

// The limits that maps are held to against rays: differences as parts of the open field's light, the
// mean over the cells and what 95 of 100 cells keep.
inline constexpr double kMeanLimit = 0.003;
inline constexpr double kMostCellsLimit = 0.015;

}  // namespace sunfall::bench
