#include "plan/light_table.h"

#include <algorithm>
#include <string>
#include <vector>

#include "plan/grid_table.h"
#include "plan/series_table.h"

namespace sunfall {
namespace {

// The brightest months on Earth bring little more than 30; a monthly sum or W m-2 lies above 50.
const MonthsKey kMonthlyGlobal{
    "monthly_global",
    {0.0, 50.0, "MJ m-2 d-1",
     "Write the mean day's sum on a level plane: kWh m-2 d-1 times 3.6, mean W m-2 times 0.0864"},
    false,
    "none (one source must be given)"};
const FlagKey kClear{"clear", std::nullopt, "none (one source must be given)"};
const MonthsKey kTurbidity{"turbidity",
                           {1.0, 10.0, "Linke", "Clean cold air has about 2, hazy city air 5 and more"},
                           true,
                           "3 in every month"};
const WholeKey kYear{"year", {1950, 2100, "", "The sun is known for these years"}, 2025};

const TableKey kSeries{"series", "none (one source must be given)"};
const TableKey kGrid{"grid", "none (one source must be given)"};

const char* const kOneSource =
    "Give one of monthly_global = [twelve numbers], series = { file = … }, grid = { file = … } and clear = "
    "true";

// The keys of the sources that the plan gives, in the order of the page.
std::vector<std::string> sources_given(const TableReader& table, bool clear) {
  std::vector<std::string> given;
  for (const std::string& name : {kMonthlyGlobal.name, kSeries.name, kGrid.name}) {
    if (table.has(name)) given.push_back(name);
  }
  if (clear) given.push_back(kClear.name);
  return given;
}

}  // namespace

TableShape light_shape() {
  return {"light",
          {kMonthlyGlobal, kSeries, kGrid, kClear, kTurbidity, kYear},
          {},
          {},
          {series_shape(), grid_shape()}};
}

void read_light_table(TableReader& table, Plan& plan) {
  const auto monthly = table.months_if_given(kMonthlyGlobal);
  const bool clear = table.flag_if_given(kClear).value_or(false);
  const auto turbidity = table.months_if_given(kTurbidity);
  auto series = table.table_if_given(kSeries, series_shape());
  auto grid = table.table_if_given(kGrid, grid_shape());
  if ((series || grid) && table.has(kYear.name)) {
    table.refuse(kYear.name, "a series has years of its own", "", "Remove it");
  }
  if (!series && !grid) plan.light_options.year = table.whole(kYear);

  const std::vector<std::string> given = sources_given(table, clear);
  if (given.size() > 1) {
    table.refuse(given.back(), "two sources of light are given", given[0] + " and " + given[1], kOneSource);
  }
  if (given.empty()) {
    table.refuse("", "no source of light is given", table.has(kClear.name) ? "clear = false" : "",
                 kOneSource);
  }
  if (turbidity && !clear) {
    table.refuse(kTurbidity.name, "turbidity is for a cloudless sky only", "", "Remove it");
  }
  plan.light_where = table.where(given.front());
  if (series) {
    plan.light = read_series_table(*series);
    return;
  }
  if (grid) {
    plan.light = read_grid_table(*grid);
    return;
  }
  if (monthly) {
    const bool dark =
        std::all_of(monthly->begin(), monthly->end(), [](double value) { return value == 0.0; });
    if (dark) table.refuse(kMonthlyGlobal.name, "no month has any light", "twelve zeros", "");
    plan.light = MonthlyGlobalSource{*monthly};
    return;
  }
  if (!turbidity) table.note_default(kTurbidity.name, kTurbidity.fallback);
  plan.light = turbidity ? ClearSource{*turbidity} : ClearSource{};
}

}  // namespace sunfall
