#include "plan/table_rules.h"

#include "plan/canopy_table.h"
#include "plan/dome_table.h"
#include "plan/light_table.h"
#include "plan/output_table.h"
#include "plan/periods_table.h"
#include "plan/plan_table.h"
#include "plan/plots_table.h"
#include "plan/rows_table.h"
#include "plan/site_table.h"

namespace sunfall {

const std::vector<TableRule>& table_rules() {
  static const std::vector<TableRule> rules = {
      {plan_shape(), read_plan_table},  // before all others: it names the plan
      {site_shape(), read_site_table},
      {light_shape(), read_light_table},  // before periods: it sets the year
      {periods_shape(), read_periods_table},
      {plots_shape(), read_plots_table},
      {canopy_shape(), read_canopy_table, true},
      {rows_shape(), read_rows_table, true},
      {dome_shape(), read_dome_table},
      {output_shape(), read_output_table},
  };
  return rules;
}

const std::vector<std::string>& tables_not_built_yet() {
  static const std::vector<std::string> names = {"house", "panels", "choice", "lamps", "screens"};
  return names;
}

std::map<std::string, std::string> homes_of_keys() {
  std::map<std::string, int> count;
  std::map<std::string, std::string> homes;
  const auto add = [&](const TableShape& shape) {
    for (const KeyNote& key : shape.keys) {
      homes[key.name] = shape.name;
      ++count[key.name];
    }
  };
  for (const TableRule& rule : table_rules()) {
    add(rule.shape);
    for (const TableShape& inner : rule.shape.inner) add(inner);
  }
  std::erase_if(homes, [&](const auto& home) { return count[home.first] > 1; });
  return homes;
}

}  // namespace sunfall
