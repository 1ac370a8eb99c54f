// Prints how far a plan's map lies from the ray oracle: oracle_report PLAN [cells] [azimuths]
#include <fmt/format.h>

#include <cstdlib>

#include "geo/layer_writer.h"
#include "oracle/comparison.h"
#include "sunfall/error.h"

using namespace sunfall;
using namespace sunfall::oracle;

namespace {

void tell(const char* title, const std::vector<MonthShares>& a, const std::vector<MonthShares>& b,
          const MonthShares& open, const std::vector<CellIndex>& cells) {
  fmt::print("{}\n", title);
  for (const auto& [light, name] :
       {std::pair{Light::beam, "beam"}, {Light::sky, "sky"}, {Light::both, "both"}}) {
    for (int month = 0; month < 12; ++month) {
      const Spread s = spread(a, b, open, light, month);
      fmt::print("  {:4} {:2}  {}  at {},{}\n", name, month + 1, told(s), cells[s.worst].column,
                 cells[s.worst].row);
    }
  }
}

}  // namespace

int main(int count, char** words) try {
  start_geo();
  const Ground ground(read_plan(words[1]));
  const std::size_t cells_wanted = count > 2 ? std::strtoul(words[2], nullptr, 10) : 1500;
  const int azimuths = count > 3 ? std::atoi(words[3]) : 1440;
  const MapShares standard(ground, DomeQuality::standard), fine(ground, DomeQuality::fine);
  const std::vector<CellIndex> cells = random_cells(ground, standard, cells_wanted, 20250621);
  const OracleLight light(ground.series, ground.plan.dome.sky, ground.convergence);
  const std::vector<MonthShares> rays = ray_shares(ground, light, cells, azimuths);
  std::vector<MonthShares> in_standard, in_fine;
  for (const CellIndex cell : cells) {
    in_standard.push_back(standard.of(cell));
    in_fine.push_back(fine.of(cell));
  }
  tell("standard - rays, parts of the open field's light", in_standard, rays, light.open(), cells);
  tell("fine - rays", in_fine, rays, light.open(), cells);
  tell("standard - fine", in_standard, in_fine, light.open(), cells);
  return 0;
} catch (const Error& error) {
  fmt::print(stderr, "{}\n", error.what());
  return 1;
}
