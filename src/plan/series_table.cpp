#include "plan/series_table.h"

#include "light/flux_unit.h"
#include "plan/record_keys.h"

namespace sunfall {
namespace {

using Stamp = SeriesSource::Stamp;
using Unit = SeriesSource::Unit;

const TextKey kTime{"time", "time", ""};
const ChoiceKey<Stamp> kStamp{
    "stamp",
    {{"begin", Stamp::begin}, {"middle", Stamp::middle}, {"end", Stamp::end}, {"day", Stamp::day}},
    Stamp::end,
    true};
const TextKey kGlobal{"global", std::nullopt, "none (no such column)"};
const TextKey kDiffuse{"diffuse", std::nullopt, "none (no such column)"};
const TextKey kBeam{"beam", std::nullopt, "none (no such column)"};
const ChoiceKey<Unit> kUnit{"unit",
                            {{"W m-2", Unit::w_m2},
                             {"J m-2", Unit::j_m2},
                             {"J cm-2", Unit::j_cm2},
                             {"kJ m-2", Unit::kj_m2},
                             {"MJ m-2", Unit::mj_m2},
                             {"Wh m-2", Unit::wh_m2},
                             {"kWh m-2", Unit::kwh_m2},
                             {"µmol m-2 s-1", Unit::umol_m2_s},
                             {"umol m-2 s-1", Unit::umol_m2_s},
                             {"J cm-2 d-1", Unit::j_cm2_d},
                             {"MJ m-2 d-1", Unit::mj_m2_d},
                             {"kWh m-2 d-1", Unit::kwh_m2_d},
                             {"mol m-2 d-1", Unit::mol_m2_d}},
                            Unit::w_m2,
                            true};
const FlagKey kUtc{"utc", false, ""};

// What the file's light is must follow from the plan, before the file is read.
void check_columns(const TableReader& table, const SeriesSource& source) {
  const bool parts = !source.diffuse.empty() && !source.beam.empty();
  if (source.global.empty() && !parts) {
    table.refuse("", "no column of global radiation is named", "",
                 "Add global = \"<the column's name>\", or both diffuse and beam");
  }
  const bool photons = is_quantum(source.unit);
  if (photons && source.global.empty()) {
    table.refuse(kUnit.name, "photons are taken as global, with or without diffuse", "no global",
                 "Name the column of the level quantum sensor as global");
  }
  if (photons && !source.beam.empty()) {
    table.refuse(kBeam.name, "photons are taken as global, with or without diffuse", "beam", "Remove it");
  }
  const auto same = [](const std::string& a, const std::string& b) { return !a.empty() && a == b; };
  if (same(source.global, source.diffuse) || same(source.global, source.beam) ||
      same(source.diffuse, source.beam)) {
    table.refuse("", "one column is named twice", "", "Name each quantity's own column");
  }
}

// A day is known by its date: it has no clock, and its split is that of days.
void check_days(const TableReader& table, const SeriesSource& source) {
  if (source.stamp != Stamp::day) {
    if (!is_per_day(source.unit)) return;
    table.refuse(kUnit.name, "a unit per day is for a daily record", in_quotes(kUnit.name_of(source.unit)),
                 "Give stamp = \"day\" if each line is a day's");
  }
  if (table.has(kHourSplit.name)) {
    table.refuse(kHourSplit.name, "this split is for hours", "stamp = \"day\"",
                 "Remove it; [light] day_split is for days");
  }
  for (const std::string& name : {kUtc.name, kTrustClock.name}) {
    if (table.has(name)) {
      table.refuse(name, "a daily record has no clock: its days are dates of the place's standard time",
                   "stamp = \"day\"", "Remove it");
    }
  }
}

}  // namespace

TableShape series_shape() {
  return {"light.series",
          {kCsvFile, kTime, kStamp, kGlobal, kDiffuse, kBeam, kUnit, kCsvDelimiter, kCsvDecimal, kUtc,
           kHourSplit, kAllowGaps, kTrustClock, kCsvLatitude, kCsvLongitude}};
}

SeriesSource read_series_table(TableReader& table) {
  SeriesSource source;
  read_csv_keys(table, kTime, source);
  source.stamp = table.choice(kStamp);
  source.global = table.optional_text(kGlobal).value_or("");
  source.diffuse = table.optional_text(kDiffuse).value_or("");
  source.beam = table.optional_text(kBeam).value_or("");
  source.unit = table.choice(kUnit);
  source.allow_gaps = table.flag(kAllowGaps);
  check_days(table, source);
  if (source.stamp != Stamp::day) {
    source.utc = table.flag(kUtc);
    source.split = table.choice(kHourSplit);
    source.trust_clock = table.flag(kTrustClock);
  }
  check_columns(table, source);
  table.finish();
  return source;
}

}  // namespace sunfall
