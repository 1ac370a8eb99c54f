#pragma once
// Invented country to measure on: hills, farmyards with gabled roofs, hedges with gaps, woods and
// single trees, all from fixed seeds, 1 m cells. Wherever a window of it is cut out, it looks alike.

#include <filesystem>
#include <vector>

namespace sunfall::bench {

// A square of it on disk, with a plan that maps it: ground and surface, twelve months.
struct Country {
  int side = 0;  // cells
  std::filesystem::path folder;
  std::filesystem::path ground() const { return folder / "ground.tif"; }
  std::filesystem::path surface() const { return folder / "surface.tif"; }
  std::filesystem::path plan() const { return folder / "plan.toml"; }
  double cells() const { return double(side) * side; }
};

// Squares of these sides, in folders of their own.
std::vector<Country> countries_in(const std::filesystem::path& folder, const std::vector<int>& sides);
void write_countries(const std::vector<Country>& countries);

}  // namespace sunfall::bench
