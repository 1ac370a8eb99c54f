#include "plan/light_table.h"

#include <algorithm>
#include <string>
#include <vector>

#include "plan/days_table.h"
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
const TableKey kSunshine{"sunshine", "none (one source must be given)"};
const TableKey kTemperature{"temperature", "none (one source must be given)"};

using Days = MonthlyGlobalSource::Days;
const ChoiceKey<Days> kDays{"days", {{"mean", Days::mean}, {"varied", Days::varied}}, Days::mean};
const WholeKey kYears{"years", {1, 100, "", "Thirty years show how much a year may differ"}, 1};
const WholeKey kSeed{"seed", {0, 1000000, "", "Any whole number will do"}, 1};
const NumberKey kPersistence{
    "persistence", {0.0, 0.9, "", "0 makes each day without regard to the one before"}, 0.29};
const ChoiceKey<DaySplit> kDaySplit{
    "day_split",
    {{"erbs", DaySplit::erbs}, {"collares-pereira", DaySplit::collares_pereira}},
    DaySplit::erbs};

const char* const kOneSource =
    "Give one of monthly_global = [twelve numbers], series = { file = … }, grid = { file = … }, sunshine = { "
    "file = … }, temperature = { file = … } and clear = true";

// The keys of the sources that the plan gives, in the order of the page.
std::vector<std::string> sources_given(const TableReader& table, bool clear) {
  std::vector<std::string> given;
  for (const std::string& name :
       {kMonthlyGlobal.name, kSeries.name, kGrid.name, kSunshine.name, kTemperature.name}) {
    if (table.has(name)) given.push_back(name);
  }
  if (clear) given.push_back(kClear.name);
  return given;
}

// What the keys of monthly means say.
MonthlyGlobalSource monthly_source(TableReader& table, const std::array<double, 12>& means) {
  const bool dark = std::all_of(means.begin(), means.end(), [](double value) { return value == 0.0; });
  if (dark) table.refuse(kMonthlyGlobal.name, "no month has any light", "twelve zeros", "");
  MonthlyGlobalSource source;
  source.global_mj_m2_d = means;
  source.days = table.choice(kDays);
  source.split = table.choice(kDaySplit);
  if (source.days == Days::varied) {
    source.years = table.whole(kYears);
    source.seed = table.whole(kSeed);
    source.persistence = table.number(kPersistence);
    return source;
  }
  for (const std::string& name : {kYears.name, kSeed.name, kPersistence.name}) {
    if (table.has(name))
      table.refuse(name, "is for days that vary only", "", "Remove it, or give days = \"varied\"");
  }
  return source;
}

void refuse_given(const TableReader& table, const std::vector<std::string>& names, const std::string& what) {
  for (const std::string& name : names) {
    if (table.has(name)) table.refuse(name, what, "", "Remove it");
  }
}

}  // namespace

TableShape light_shape() {
  return {"light",
          {kMonthlyGlobal, kSeries, kGrid, kSunshine, kTemperature, kClear, kDays, kYears, kSeed,
           kPersistence, kDaySplit, kTurbidity, kYear},
          {},
          {},
          {series_shape(), grid_shape(), sunshine_shape(), temperature_shape()}};
}

void read_light_table(TableReader& table, Plan& plan) {
  const auto monthly = table.months_if_given(kMonthlyGlobal);
  const bool clear = table.flag_if_given(kClear).value_or(false);
  const auto turbidity = table.months_if_given(kTurbidity);
  auto series = table.table_if_given(kSeries, series_shape());
  auto grid = table.table_if_given(kGrid, grid_shape());
  auto sunshine = table.table_if_given(kSunshine, sunshine_shape());
  auto temperature = table.table_if_given(kTemperature, temperature_shape());
  const bool is_record = series || grid || sunshine || temperature;
  if (is_record) refuse_given(table, {kYear.name}, "a series has years of its own");
  if (!is_record) plan.light_options.year = table.whole(kYear);

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
  if (monthly) {
    plan.light = monthly_source(table, *monthly);
    return;
  }
  refuse_given(table, {kDays.name, kYears.name, kSeed.name, kPersistence.name}, "is for monthly_global only");
  if (series) {
    SeriesSource source = read_series_table(*series);
    if (source.stamp == SeriesSource::Stamp::day) {
      source.day_split = table.choice(kDaySplit);
    } else {
      refuse_given(table, {kDaySplit.name}, "is for days and months, and the series has shorter steps");
    }
    plan.light = source;
    return;
  }
  if (grid) {
    refuse_given(table, {kDaySplit.name}, "is for days and months, and the grid has shorter steps");
    plan.light = read_grid_table(*grid);
    return;
  }
  if (sunshine) {
    SunshineSource source = read_sunshine_table(*sunshine);
    source.split = table.choice(kDaySplit);
    plan.light = source;
    return;
  }
  if (temperature) {
    TemperatureSource source = read_temperature_table(*temperature);
    source.split = table.choice(kDaySplit);
    plan.light = source;
    return;
  }
  refuse_given(table, {kDaySplit.name}, "a cloudless sky is not split");
  if (!turbidity) table.note_default(kTurbidity.name, kTurbidity.fallback);
  plan.light = turbidity ? ClearSource{*turbidity} : ClearSource{};
}

}  // namespace sunfall
