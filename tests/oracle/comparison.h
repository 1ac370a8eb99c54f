#pragma once
// The map's own shares beside the oracle's, cell by cell.

#include <span>
#include <string>
#include <vector>

#include "oracle/oracle_light.h"
#include "oracle/ray_surface.h"
#include "shade/terrain.h"
#include "sunfall/dome.h"
#include "sunfall/plan.h"

namespace sunfall::oracle {

// A plan opened as the map command opens it.
struct Ground {
  explicit Ground(Plan opened);
  Plan plan;
  LightSeries series;
  Angle convergence;  // of the middle of the map
  Terrain terrain;
};

// Shares of the whole map, tile by tile as the map is made.
class MapShares {
 public:
  MapShares(const Ground& ground, DomeQuality quality, int tile_cells = 512);
  bool usable(CellIndex cell) const { return usable_[at(cell)] != 0; }
  const MonthShares& of(CellIndex cell) const { return shares_[at(cell)]; }

 private:
  std::size_t at(CellIndex cell) const { return static_cast<std::size_t>(cell.row) * columns_ + cell.column; }
  int columns_;
  std::vector<char> usable_;
  std::vector<MonthShares> shares_;
};

// `count` different usable cells; the same for the same seed.
std::vector<CellIndex> random_cells(const Ground& ground, const MapShares& shares, std::size_t count,
                                    unsigned seed);

// The oracle's shares of some cells: the mean over both ways to cut the surface into triangles.
std::vector<MonthShares> ray_shares(const Ground& ground, const OracleLight& light,
                                    std::span<const CellIndex> cells, int azimuths);

// Differences of two lists of shares, as parts of the open field's daily light of the month.
struct Spread {
  double bias = 0.0;  // mean of a - b
  double mean = 0.0;  // of the magnitudes
  double median = 0.0;
  double p95 = 0.0;
  double most = 0.0;
  std::size_t worst = 0;  // where the largest is
};
enum class Light { beam, sky, both };
Spread spread(const std::vector<MonthShares>& a, const std::vector<MonthShares>& b, const MonthShares& open,
              Light light, int month);
std::string told(const Spread& spread);

}  // namespace sunfall::oracle
