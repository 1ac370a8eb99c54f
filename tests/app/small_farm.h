#pragma once
// A farm of a few thousand cells in a folder of its own, and what a run of it must and must not leave.

#include <filesystem>
#include <functional>
#include <string>
#include <vector>

#include "app/run_program.h"
#include "geo/geo_support.h"

namespace sunfall::test {

inline constexpr int kFarmSide = 64;  // cells of 2 m

// 64 × 64 cells of 2 m near 52 degrees north: a slope of 1 in 20 that rises to the north-west.
RasterOrder farm_ground();
// The same with a wall 6 m high along the middle column.
RasterOrder farm_surface();

// "[light]" with twelve believable months.
extern const std::string kMonthlyLight;

class SmallFarm {
 public:
  // Makes ground.tif, surface.tif and farm.toml.
  SmallFarm();

  const std::filesystem::path& path() const { return folder_.path(); }
  std::filesystem::path operator/(const std::string& name) const { return folder_ / name; }
  std::vector<std::string> names() const { return folder_.names(); }
  // farm.toml with ground and clock, `site` below them, and `more` below the light.
  void write_plan(const std::string& site = "", const std::string& more = "") const;
  // Two square plots and, where asked for, one more feature as GeoJSON text.
  void write_plots(const std::string& feature = "") const;

  // Starts in the farm's folder: `map farm.toml --dome draft -o run` and more words.
  Outcome run(const std::vector<std::string>& arguments, RunOptions options = {}) const;
  Outcome map(const std::vector<std::string>& more = {}, RunOptions options = {}) const;

 private:
  TempFolder folder_;
};

inline const std::string kPlotsTable = "[plots]\nfile = 'plots.geojson'\n";

// A refusal: the status, nothing on standard output, and one message that holds every one of `parts`.
// Progress may stand before it.
void expect_refused(const Outcome& outcome, int status, const std::vector<std::string>& parts);

// The same from vet, map and spot; map and spot leave the farm's folder as it was.
void expect_all_refuse(const SmallFarm& farm, int status, const std::vector<std::string>& parts);

// A finished run: no hidden files, and every layer as the summary says, to the byte.
void expect_whole_run(const std::filesystem::path& folder);

}  // namespace sunfall::test
