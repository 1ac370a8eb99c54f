#pragma once
// How much of the horizon the inputs really cover.
//
// Beyond the data something might stand that nobody told us of. A direction in which the data end
// at distance D counts as covered by D² / (D² + 30²): the share of an even sky, weighted for a
// level receiver, that an unseen obstacle of 30 m (a tall tree, a building) just past the edge
// would leave. Sight is the mean over the directions: 1 where the data reach far all round, about
// one half at the edge of a map without terrain around. (The rule is ours.)

#include <vector>

#include "shade/terrain.h"

namespace sunfall {

inline constexpr double kUnseenObstacle_m = 30.0;

// Sight of the tile's cells, row by row.
std::vector<float> tile_sight(const TerrainTile& tile, double cell_m);

}  // namespace sunfall
