#include "plan/days_table.h"

#include "plan/record_keys.h"

namespace sunfall {
namespace {

const TextKey kTime{"time", "date", ""};

const TextKey kHours{"hours", "sunshine_hours", ""};
const NumberKey kAs{"a_s", {0.0, 0.6, "", "FAO-56 gives 0.25 where nothing is known of the place"}, 0.25};
const NumberKey kBs{"b_s", {0.1, 0.9, "", "FAO-56 gives 0.50 where nothing is known of the place"}, 0.5};
// Air without a cloud passes 0.75 at sea level, and hardly more than this on the highest fields.
constexpr double kMostOfBoth = 0.9;

const TextKey kTMin{"t_min", "t_min", ""};
const TextKey kTMax{"t_max", "t_max", ""};
const NumberKey kKrs{"k_rs", {0.1, 0.3, "", "FAO-56 gives 0.16 inland and 0.19 at a coast"}, 0.16};

}  // namespace

TableShape sunshine_shape() {
  return {"light.sunshine",
          {kCsvFile, kTime, kHours, kAs, kBs, kCsvDelimiter, kCsvDecimal, kAllowGaps, kCsvLatitude,
           kCsvLongitude}};
}

SunshineSource read_sunshine_table(TableReader& table) {
  SunshineSource source;
  read_csv_keys(table, kTime, source);
  source.hours = table.text(kHours);
  source.a_s = table.number(kAs);
  source.b_s = table.number(kBs);
  source.allow_gaps = table.flag(kAllowGaps);
  if (source.a_s + source.b_s > kMostOfBoth) {
    table.refuse("", "a_s and b_s sum to the clearness of a cloudless day, at most 0.9",
                 plain(source.a_s + source.b_s), "FAO-56 gives 0.25 and 0.50");
  }
  table.finish();
  return source;
}

TableShape temperature_shape() {
  return {"light.temperature",
          {kCsvFile, kTime, kTMin, kTMax, kKrs, kCsvDelimiter, kCsvDecimal, kAllowGaps, kCsvLatitude,
           kCsvLongitude}};
}

TemperatureSource read_temperature_table(TableReader& table) {
  TemperatureSource source;
  read_csv_keys(table, kTime, source);
  source.t_min = table.text(kTMin);
  source.t_max = table.text(kTMax);
  source.k_rs = table.number(kKrs);
  source.allow_gaps = table.flag(kAllowGaps);
  if (source.t_min == source.t_max) {
    table.refuse(kTMax.name, "one column is named twice", in_quotes(source.t_max),
                 "Name the columns of the lowest and of the highest temperature");
  }
  table.finish();
  return source;
}

}  // namespace sunfall
