#include <algorithm>

#include "plan/plan_text.h"
#include "plan/table_rules.h"
#include "plan/toml_text.h"
#include "plan/words.h"
#include "sunfall/error.h"
#include "sunfall/plan.h"

namespace sunfall {
namespace {

std::vector<std::string> table_names() {
  std::vector<std::string> names;
  for (const TableRule& rule : table_rules()) names.push_back(rule.shape.name);
  return names;
}

bool holds(const std::vector<std::string>& names, const std::string& name) {
  return std::find(names.begin(), names.end(), name) != names.end();
}

bool may_be_many(const std::string& name) {
  for (const TableRule& rule : table_rules()) {
    if (rule.shape.name == name) return rule.many;
  }
  return false;
}

void refuse_top_level(const toml::key& key, const toml::node& node, const Reading& reading) {
  const std::string name(key.str());
  const std::string where = reading.file.where(line_of(key), joined_key("", name));
  const std::vector<std::string> known = table_names();
  if (holds(known, name)) {
    if (may_be_many(name)) {
      if (node.is_array_of_tables()) return;
      throw Error(ErrorKind::plan, {"must be one or more tables of an array", where, described(node),
                                    "Write [[" + name + "]]"});
    }
    if (node.is_table()) return;
    throw Error(ErrorKind::plan, {"must be one table", where, described(node), "Write [" + name + "]"});
  }
  if (holds(tables_not_built_yet(), name)) {
    throw Error(ErrorKind::plan, {"this version does not know the table yet", where, "",
                                  "Remove it to run without, or use a later version"});
  }
  const auto home = reading.homes.find(name);
  if (home != reading.homes.end() && !node.is_table()) {
    throw Error(ErrorKind::plan,
                {"the key stands outside its table", where, "", "It belongs in [" + home->second + "]"});
  }
  throw Error(ErrorKind::plan, {node.is_table() ? "unknown table" : "unknown key outside of any table", where,
                                "", did_you_mean(name, known)});
}

TableReader open_table(const toml::table& root, const TableShape& shape, Reading& reading) {
  const auto entry = root.find(shape.name);
  if (entry == root.end()) return {reading, shape, nullptr, 0};
  return {reading, shape, entry->second.as_table(), line_of(entry->first)};
}

// All tables of an array, in the plan's order.
void read_each(const toml::table& root, const TableRule& rule, Reading& reading, Plan& plan) {
  const toml::node* node = root.get(rule.shape.name);
  if (node == nullptr) return;
  for (const toml::node& element : *node->as_array()) {
    TableReader table(reading, rule.shape, element.as_table(),
                      static_cast<long>(element.source().begin.line));
    rule.read(table, plan);
    table.finish();
  }
}

}  // namespace

Plan read_plan(const std::filesystem::path& path) {
  Reading reading{{path}, homes_of_keys(), {}};
  const toml::table root = parse_toml(read_plan_text(reading.file), reading.file);
  for (const toml::key& key : keys_in_order(root)) refuse_top_level(key, *root.get(key.str()), reading);
  Plan plan;
  plan.file = path;
  for (const TableRule& rule : table_rules()) {
    if (rule.many) {
      read_each(root, rule, reading, plan);
      continue;
    }
    TableReader table = open_table(root, rule.shape, reading);
    rule.read(table, plan);
    table.finish();
  }
  plan.defaults = std::move(reading.defaults);
  return plan;
}

}  // namespace sunfall
