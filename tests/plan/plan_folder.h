#pragma once
// A folder with input files of its own, in which a test writes plans and reads them.

#include <filesystem>
#include <initializer_list>
#include <string>

#include "sunfall/error.h"
#include "sunfall/plan.h"

namespace sunfall::testing {

class PlanFolder {
 public:
  // Holds empty files ground.tif, surface.tif, county.tif, plots.gpkg, station.csv, reanalysis.nc,
  // trees.gpkg and tree_top.tif.
  PlanFolder();
  PlanFolder(const PlanFolder&) = delete;
  PlanFolder& operator=(const PlanFolder&) = delete;
  ~PlanFolder();

  const std::filesystem::path& path() const { return path_; }
  std::filesystem::path plan_file() const { return path_ / "farm.toml"; }
  void write(const std::string& name, const std::string& content) const;
  // Writes farm.toml and reads it.
  Plan read(const std::string& plan) const;
  // Reads farm.toml, which must fail; the folder is cut from the front of `where`.
  struct Fault {
    ErrorKind kind;
    std::string what;
    std::string where;
    std::string found;
    std::string remedy;
    std::string message;
  };
  Fault fault(const std::string& plan) const;
  // The same, with every part as it should be; each must be exactly so.
  void expect_fault(const std::string& plan, const std::string& where, const std::string& what,
                    const std::string& found, const std::string& remedy,
                    ErrorKind kind = ErrorKind::plan) const;
  Fault fault_of_file(const std::filesystem::path& file) const;

 private:
  std::filesystem::path path_;
};

// A whole plan, line by line: [site] stands in line 1 with ground and clock below it, [light] in
// line 4 with its source below it. `more` follows from line 6 on.
std::string plan_with(const std::string& more);
// The same with other lines in [site] (from line 2 on) or in [light] (from line 5 on).
std::string plan_with_site(const std::string& lines);
std::string plan_with_light(const std::string& lines);

}  // namespace sunfall::testing
