#pragma once
// The keys that records share, and those of them that stand in CSV files. Private to the plan.

#include "plan/key_shapes.h"
#include "plan/table_reader.h"
#include "sunfall/light.h"

namespace sunfall {

inline const PathKey kCsvFile{"file", ""};
inline const ChoiceKey<char> kCsvDelimiter{
    "delimiter", {{"auto", '\0'}, {",", ','}, {";", ';'}, {"tab", '\t'}}, '\0'};
inline const ChoiceKey<char> kCsvDecimal{"decimal", {{".", '.'}, {",", ','}}, '.'};
inline const TextKey kCsvLatitude{"latitude", std::nullopt, "none (the record's place is not checked)"};
inline const TextKey kCsvLongitude{"longitude", std::nullopt, "none (the record's place is not checked)"};

inline const FlagKey kAllowGaps{"allow_gaps", false, ""};
inline const FlagKey kTrustClock{"trust_clock", false, ""};
inline const ChoiceKey<SeriesSource::Split> kHourSplit{
    "split",
    {{"logistic", SeriesSource::Split::logistic}, {"erbs", SeriesSource::Split::erbs}},
    SeriesSource::Split::logistic};

// Takes the keys of a CSV file, the column of stamps among them, into a source that has their members.
template <typename Source>
void read_csv_keys(TableReader& table, const TextKey& time, Source& source) {
  source.file = table.path(kCsvFile);
  source.time = table.text(time);
  source.delimiter = table.choice(kCsvDelimiter);
  source.decimal = table.choice(kCsvDecimal);
  source.latitude = table.optional_text(kCsvLatitude).value_or("");
  source.longitude = table.optional_text(kCsvLongitude).value_or("");
  if (source.latitude.empty() != source.longitude.empty()) {
    const TextKey& given = source.latitude.empty() ? kCsvLongitude : kCsvLatitude;
    const TextKey& missing = source.latitude.empty() ? kCsvLatitude : kCsvLongitude;
    table.refuse(given.name, "a place is both latitude and longitude", "no " + missing.name,
                 "Name the columns of both, or remove it");
  }
  if (!source.latitude.empty() && source.latitude == source.longitude)
    table.refuse(kCsvLongitude.name, "one column is named twice", "", "Name each quantity's own column");
}

}  // namespace sunfall
