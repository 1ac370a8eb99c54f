#include "plan/toml_text.h"

#include <fmt/format.h>
#include <algorithm>

#include "plan/words.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

std::string remedy_for(std::string_view description) {
  if (description.find("redefine") != std::string_view::npos) return "A key or table may stand only once";
  return "Mend the line; texts and dates stand in quotes, lists in [ ]";
}

}  // namespace

toml::table parse_toml(std::string_view text, const PlanFile& file) {
  try {
    return toml::parse(text);
  } catch (const toml::parse_error& fault) {
    const toml::source_position at = fault.source().begin;
    const std::string where = fmt::format("{}:{}:{}", file.path.string(), at.line, at.column);
    throw Error(ErrorKind::plan, {file.called + " is not valid TOML", where,
                                  harmless(fault.description(), 200), remedy_for(fault.description())});
  }
}

std::string described(const toml::node& node) {
  switch (node.type()) {
    case toml::node_type::string: return "a string: " + in_quotes(node.as_string()->get());
    case toml::node_type::integer: return fmt::format("a whole number: {}", node.as_integer()->get());
    case toml::node_type::floating_point: return "a number: " + plain(node.as_floating_point()->get());
    case toml::node_type::boolean: return node.as_boolean()->get() ? "true" : "false";
    case toml::node_type::array: return fmt::format("a list of {}", node.as_array()->size());
    case toml::node_type::table: return "a table";
    case toml::node_type::date: return "a date without quotes";
    case toml::node_type::time: return "a time without quotes";
    case toml::node_type::date_time: return "a date and time without quotes";
    case toml::node_type::none: break;
  }
  return "nothing";
}

std::vector<toml::key> keys_in_order(const toml::table& table) {
  std::vector<toml::key> keys;
  for (const auto& entry : table) keys.push_back(entry.first);
  std::sort(keys.begin(), keys.end(), [](const toml::key& a, const toml::key& b) {
    const toml::source_position p = a.source().begin;
    const toml::source_position q = b.source().begin;
    return p.line != q.line ? p.line < q.line : p.column < q.column;
  });
  return keys;
}

}  // namespace sunfall
