#pragma once
// summary.json: what a run was made of and what came out, for programs. Missing numbers are null.

#include <array>
#include <filesystem>
#include <string>
#include <utility>
#include <vector>

#include "core/fingerprint.h"
#include "map/geometry_record.h"
#include "map/years.h"
#include "sunfall/grid.h"

namespace sunfall {

struct Summary {
  struct Input {
    std::string path;  // as the plan writes it
    Fingerprint print;
  };
  struct Layer {
    std::string file;
    std::string description;
    std::string unit;
    Fingerprint print;
  };
  struct PeriodLight {
    Period period;
    double beam = kMissing;  // of the open field
    double sky = kMissing;
  };
  struct YearLight {
    int year = 0;
    std::array<double, 12> beam_month{};
    std::array<double, 12> sky_month{};
    double dli_year = kMissing;
  };
  struct PlotLight {
    std::string id;
    double area_m2 = 0.0;
    std::array<double, 12> dli_month_mean{};
    std::array<double, 12> dli_month_p10{};
    int lowest_month = 0;                     // 1 to 12: the month of the lowest mean; 0 where there is none
    std::vector<YearPercentiles> over_years;  // of the mean, the months and last the year; or empty
  };

  std::string plan;
  std::string version;
  GeometryRecord geometry;
  std::string shares_from;  // the folder of the finished run whose shares were used; or empty
  std::vector<Input> inputs;
  struct {
    double longitude = kMissing;
    double latitude = kMissing;
    double convergence_deg = kMissing;
  } place;
  struct {
    std::string description;
    bool is_ceiling = false;
    double umol_per_joule = kMissing;  // photons per joule of global radiation, over the year
  } light;
  struct {
    int sectors = 0;
    int bands = 0;
  } dome;
  struct {  // mol m-2 d-1
    std::array<double, 12> dli_month{};
    double dli_year = kMissing;
    std::array<double, 12> beam_part_month{};
    std::vector<PeriodLight> periods;
    std::vector<YearLight> years;             // empty for one year
    std::vector<YearPercentiles> over_years;  // the months and last the year; or empty
  } open_field;
  struct {
    int columns = 0;
    int rows = 0;
    double cell_m = kMissing;
    double valid_fraction = kMissing;
  } grid;
  std::vector<PlotLight> plots;
  std::vector<Layer> layers;
  std::vector<std::pair<std::string, double>> timings_s;  // stage and seconds, in the run's order
  std::vector<std::string> notes;                         // every assumption made for the user
};

// 1 to 12, of equals as core/lowest_month.h; 0 where all are missing.
int lowest_month(const std::array<double, 12>& by_month);

std::string summary_json(const Summary& summary);
// Whole or not at all. Throws Error(io).
void write_summary(const std::filesystem::path& file, const Summary& summary);

}  // namespace sunfall
