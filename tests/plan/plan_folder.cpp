#include "plan/plan_folder.h"

#include <gtest/gtest.h>
#include <unistd.h>

#include <fstream>

namespace sunfall::testing {

namespace fs = std::filesystem;

PlanFolder::PlanFolder() {
  std::string pattern = (fs::temp_directory_path() / "sunfall-plan-XXXXXX").string();
  if (mkdtemp(pattern.data()) == nullptr) throw std::runtime_error("no temporary folder");
  path_ = pattern;
  for (const char* name : {"ground.tif", "surface.tif", "county.tif", "plots.gpkg", "station.csv", "reanalysis.nc",
                           "trees.gpkg", "tree_top.tif"})
    write(name, "");
}

PlanFolder::~PlanFolder() {
  std::error_code ignored;
  fs::remove_all(path_, ignored);
}

void PlanFolder::write(const std::string& name, const std::string& content) const {
  std::ofstream(path_ / name, std::ios::binary) << content;
}

Plan PlanFolder::read(const std::string& plan) const {
  write("farm.toml", plan);
  return read_plan(plan_file());
}

PlanFolder::Fault PlanFolder::fault(const std::string& plan) const {
  write("farm.toml", plan);
  return fault_of_file(plan_file());
}

void PlanFolder::expect_fault(const std::string& plan, const std::string& where, const std::string& what,
                              const std::string& found, const std::string& remedy, ErrorKind kind) const {
  const Fault met = fault(plan);
  EXPECT_EQ(met.where, where) << plan;
  EXPECT_EQ(met.what, what) << plan;
  EXPECT_EQ(met.found, found) << plan;
  EXPECT_EQ(met.remedy, remedy) << plan;
  EXPECT_EQ(exit_status(met.kind), exit_status(kind)) << plan;
}

PlanFolder::Fault PlanFolder::fault_of_file(const fs::path& file) const {
  try {
    read_plan(file);
  } catch (const Error& error) {
    const Error::Parts& parts = error.parts();
    std::string where = parts.where;
    const std::string start = path_.string() + "/";
    if (where.rfind(start, 0) == 0) where.erase(0, start.size());
    return {error.kind(), parts.what, where, parts.found, parts.remedy, error.what()};
  }
  ADD_FAILURE() << "the plan was read without an error";
  return {ErrorKind::internal, "", "", "", "", ""};
}

std::string plan_with(const std::string& more) {
  return "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n[light]\nclear = true\n" + more;
}

std::string plan_with_site(const std::string& lines) {
  return "[site]\n" + lines + "\n[light]\nclear = true\n";
}

std::string plan_with_light(const std::string& lines) {
  return "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n[light]\n" + lines + "\n";
}

}  // namespace sunfall::testing
