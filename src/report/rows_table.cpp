#include "report/rows_table.h"

#include <fmt/format.h>

#include "report/tables.h"

namespace sunfall {

std::string rows_name(const Plan& plan, std::size_t number) {
  const std::string& name = plan.rows[number].name;
  return name.empty() ? fmt::format("rows {}", number + 1) : name;
}

void write_rows_csv(const std::filesystem::path& file, const Plan& plan, const MapResult& maps) {
  CsvTable table({"rows", "period", "area_m2", "came_mol_m2_d", "taken_mol_m2_d", "taken_part",
                  "taken_from_right_mol_m2_d", "taken_from_left_mol_m2_d"});
  const double cell_m2 = maps.frame.cell_m * maps.frame.cell_m;
  for (std::size_t crop = 0; crop < maps.crops.size(); ++crop) {
    const CropLight& light = maps.crops[crop];
    if (light.cells == 0) continue;
    for (std::size_t p = 0; p < maps.periods.size(); ++p) {
      const double right = light.taken_right[p], left = light.taken_left[p], came = light.came[p];
      table.add({rows_name(plan, crop), maps.periods[p].name, csv_number(cell_m2 * double(light.cells), 0),
                 csv_number(came, 3), csv_number(right + left, 3),
                 csv_number(came > 0.0 ? (right + left) / came : kMissing, 4), csv_number(right, 3),
                 csv_number(left, 3)});
    }
  }
  table.write(file);
}

}  // namespace sunfall
