#include "plan/plan_document.h"

#include <fstream>
#include <regex>
#include <sstream>

namespace sunfall::testing {
namespace {

std::string trimmed(const std::string& text) {
  const std::size_t first = text.find_first_not_of(' ');
  if (first == std::string::npos) return "";
  return text.substr(first, text.find_last_not_of(' ') - first + 1);
}

std::vector<std::string> cells_of(const std::string& row) {
  std::vector<std::string> cells;
  std::istringstream stream(row.substr(1));  // after the first bar
  for (std::string cell; std::getline(stream, cell, '|');) cells.push_back(trimmed(cell));
  return cells;
}

}  // namespace

std::string plan_page() {
  std::ifstream stream(SUNFALL_PLAN_PAGE);
  std::ostringstream text;
  text << stream.rdbuf();
  return text.str();
}

std::vector<TableShape> documented_tables(const std::string& page) {
  static const std::regex heading("##+ `\\[+([^\\]]+)\\]+`");
  static const std::regex row("\\| `.*\\|");
  std::vector<TableShape> tables;
  std::istringstream stream(page);
  for (std::string line; std::getline(stream, line);) {
    std::smatch match;
    if (std::regex_match(line, match, heading)) tables.push_back({match[1], {}});
    if (!std::regex_match(line, row) || tables.empty()) continue;
    const std::vector<std::string> cells = cells_of(line);
    if (cells.size() != 6) throw std::runtime_error("not six cells: " + line);
    const std::string key = cells[0].substr(1, cells[0].size() - 2);
    tables.back().keys.push_back({key, cells[1], cells[2], cells[3], cells[4]});
  }
  return tables;
}

std::vector<std::string> example_plans(const std::string& page) {
  std::vector<std::string> plans;
  const std::string begin = "```toml\n";
  const std::string end = "```\n";
  for (std::size_t at = page.find(begin); at != std::string::npos; at = page.find(begin, at)) {
    at += begin.size();
    plans.push_back(page.substr(at, page.find(end, at) - at));
  }
  return plans;
}

}  // namespace sunfall::testing
