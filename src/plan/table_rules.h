#pragma once
// Every table that a plan may hold. Another table is one file pair and one line in table_rules().

#include <map>
#include <string>
#include <vector>

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/plan.h"

namespace sunfall {

struct TableRule {
  TableShape shape;
  // Called once per plan, also where the plan lacks the table (then all its keys are absent); where there may
  // be `many`, [[name]], once for each that the plan holds.
  void (*read)(TableReader& table, Plan& plan);
  bool many = false;
};

// In the order in which they are read: a table may use what an earlier one left in the plan.
const std::vector<TableRule>& table_rules();

// Tables that later versions will know. To ignore one would draw a map without its shade or its
// advice, so a plan that holds one is refused.
const std::vector<std::string>& tables_not_built_yet();

// Each known key and the table that it belongs in; keys that stand in several tables are left out.
std::map<std::string, std::string> homes_of_keys();

}  // namespace sunfall
