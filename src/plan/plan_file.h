#pragma once
// Which file a plan or another table came from, and how messages say where in it something stands.

#include <filesystem>
#include <string>

namespace sunfall {

struct PlanFile {
  std::filesystem::path path;  // as given on the command line
  std::string called = "the plan";
  std::string page = "docs/plan.md";  // which tells how to write it

  // Where relative paths of the plan start; empty for the current folder.
  std::filesystem::path folder() const { return path.parent_path(); }
  // "farm.toml:12 site.clock". Line 0 leaves the line out, an empty key leaves the key out.
  std::string where(long line, const std::string& key) const;
};

// `table`.`key`, with a key that TOML would have to quote shown in quotes; an empty key leaves the
// table alone.
std::string joined_key(const std::string& table, const std::string& key);

}  // namespace sunfall
