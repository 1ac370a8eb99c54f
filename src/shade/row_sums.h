#pragma once
// The sky's light put through rows without end: what their leaves take and what reaches places between
// them, summed over all directions for many columns (periods, sides, azimuths) at once.

#include <span>
#include <vector>

#include "shade/row_sky.h"
#include "sunfall/rows.h"

namespace sunfall {

// Light by node and step, all columns of a direction side by side.
struct RowColumns {
  std::size_t count = 0;
  std::vector<double> level;  // [node][step][column]

  // Columns: for each sky its right, then its left light of the chosen periods.
  RowColumns(std::span<const RowSky> skies, std::span<const std::size_t> periods);
  const double* at(int node, int step) const {
    return &level[(static_cast<std::size_t>(node) * RowSky::kSteps + step) * count];
  }
};

struct RowSums {
  std::vector<double> taken;               // [column], mol m-2 d-1 of ground
  std::vector<std::vector<double>> place;  // [place][column], as if all light came from the right
};

// Periods that share a leafing share one passage.
struct LeafingGroup {
  double leafing = 1.0;
  std::vector<std::size_t> periods;
};
std::vector<LeafingGroup> leafing_groups(const std::vector<Period>& periods,
                                         const std::array<double, 12>& leafing);

// Light for rows in one state of leaf.
struct LeafLight {
  LeafingGroup group;
  RowColumns columns;
};
std::vector<LeafLight> leaf_lights(std::span<const RowSky> skies, const std::vector<Period>& periods,
                                   const std::array<double, 12>& leafing);

// One for each of `lights`: paths are followed once for all states of leaf. Places are distances from the
// middle of a row to the right, all at one height above the ground.
std::vector<RowSums> sum_over_sky(const CropRows& rows, std::span<const LeafLight> lights,
                                  std::span<const double> across_m, double height_m);

// Places that lie as mirror images of each other: what comes from the left at one is what would come
// from the right at the other.
inline std::size_t mirrored(std::size_t place, std::size_t count) { return count - 1 - place; }

// Throws Error(plan).
void require_sound(const CropRows& rows, const std::array<double, 12>& leafing);

}  // namespace sunfall
