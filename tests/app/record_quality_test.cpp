// What is wrong with the values of a record, through the program: each fault is told with what, where, found
// and remedy.

#include <gmock/gmock.h>

#include "app/record_farm.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;
using testing::Not;

const std::string kGlobalOnly = "global = 'ghi'\n";

const std::string& hours() {
  static const std::string text = logged(farm_truth(), {.columns = "g"});
  return text;
}

double number_of(const std::string& rest) { return std::stod(rest.substr(1)); }
std::string rest_of(double value) { return "," + std::to_string(value); }
bool within(const std::string& stamp, const char* from, const char* to) {
  return stamp >= from && stamp < to;
}
// The hours that end from 10 to 15 o'clock.
bool is_noon(const std::string& stamp) { return stamp.substr(11, 2) >= "10" && stamp.substr(11, 2) <= "15"; }

void expect_fault(const std::string& record, const std::vector<std::string>& parts,
                  const std::string& keys = kGlobalOnly) {
  SCOPED_TRACE(parts.front());
  const SmallFarm farm;
  write_record(farm, record, keys);
  expect_refused(vet_farm(farm), 3, parts);
}

std::string notes_of(const std::string& record, const std::string& keys = kGlobalOnly) {
  const SmallFarm farm;
  write_record(farm, record, keys);
  return vet_json(farm)["notes"].dump();
}

TEST(RecordQuality, LightByNight) {
  expect_fault(
      changed_lines(hours(), [](const std::string&,
                                const std::string& rest) { return rest_of(number_of(rest) + 30.0); }),
      {"there is light while the sun is down", "station.csv",
       "(found: above 20 W m-2 in 100 % of the readings by night)",
       "Are the stamps, the clock and the place right?"});
  // A lamp in a few nights is no reason to refuse a year.
  EXPECT_EQ(notes_of(changed_lines(hours(),
                                   [](const std::string& stamp, const std::string& rest) {
                                     return within(stamp, "2025-03-01T00", "2025-03-06T00")
                                                ? rest_of(number_of(rest) + 30.0)
                                                : rest;
                                   }))
                .find("while the sun is down"),
            std::string::npos);
}

TEST(RecordQuality, PartsThatDoNotSumToTheWhole) {
  const std::string three = "global = 'ghi'\ndiffuse = 'dhi'\nbeam = 'dni'\n";
  const std::string good = logged(farm_truth(), {.columns = "gdb"});
  // The beam's sensor points elsewhere in May: 40 % of it is lost.
  const std::string bad = changed_lines(good, [](const std::string& stamp, const std::string& rest) {
    if (!within(stamp, "2025-05-01T00", "2025-06-01T00")) return rest;
    const std::size_t last = rest.rfind(',');
    return rest.substr(0, last) + rest_of(0.6 * number_of(rest.substr(last)));
  });
  expect_fault(bad,
               {"more than 10 % of a month's daylight is missing", "station.csv", "2025: May",
                "whose parts do not sum to the whole", "Mend the record"},
               three);
  EXPECT_THAT(notes_of(good, three), Not(HasSubstr("sum to the whole")));
}

TEST(RecordQuality, ASensorThatStoodStill) {
  const auto stuck = [](const char* to) {
    return changed_lines(hours(), [to](const std::string& stamp, const std::string& rest) {
      return within(stamp, "2025-06-10T00", to) ? rest_of(310.5) : rest;
    });
  };
  expect_fault(stuck("2025-06-17T00"),
               {"more than 10 % of a month's daylight is missing", "station.csv", "2025: June 2",
                "from a sensor that stood still", "allow_gaps = true"});
  EXPECT_THAT(notes_of(stuck("2025-06-12T00")), HasSubstr("from a sensor that stood still"));
}

TEST(RecordQuality, Spikes) {
  // A dropped reading at noon, in each of three days of July.
  const auto dropped = [](const char* to) {
    return changed_lines(hours(), [to](const std::string& stamp, const std::string& rest) {
      const bool hit =
          within(stamp, "2025-07-01T00", to) && stamp.substr(11, 2) == "13" && number_of(rest) > 0.0;
      return hit ? rest_of(5000.0) : rest;
    });
  };
  EXPECT_THAT(notes_of(dropped("2025-07-04T00")),
              HasSubstr("these were rejected: 3 beyond what is physically possible"));
  // Half of what comes in outside the air, then none, then half: a cable, not a cloud.
  const std::string dips = changed_lines(hours(), [](const std::string& stamp, const std::string& rest) {
    if (!within(stamp, "2025-07-01T00", "2025-07-21T00") || !is_noon(stamp)) return rest;
    const int hour = std::stoi(stamp.substr(11, 2));
    return rest_of(hour % 2 == 0 ? 930.0 : 15.0);
  });
  expect_fault(dips, {"more than 10 % of a month's daylight is missing", "station.csv", "July",
                      "that jump away from both neighbours", "Mend the record"});
}

TEST(RecordQuality, UnitsThatChangeWithinTheFile) {
  const auto times = [](double factor) {
    return changed_lines(hours(), [factor](const std::string& stamp, const std::string& rest) {
      return within(stamp, "2025-07-01T02", "2026-01-02") ? rest_of(factor * number_of(rest)) : rest;
    });
  };
  expect_fault(times(3.6), {"the values of some months do not fit the unit W m-2", "station.csv",
                            "the clearest hours of July 2025 and", "those of other months do not",
                            "look like kJ m-2 per step there; bring the file to one unit"});
  expect_fault(times(1e-3),
               {"more than 10 % of a month's daylight is missing", "dark by day", "Mend the record"});
}

TEST(RecordQuality, BrighterThanTheSkyCanBe) {
  const std::string notes =
      notes_of(changed_lines(hours(), [](const std::string& stamp, const std::string& rest) {
        return within(stamp, "2025-08-10T10", "2025-08-10T13") ? rest_of(2500.0) : rest;
      }));
  EXPECT_THAT(notes, HasSubstr("beyond what is physically possible"));
  EXPECT_THAT(notes, HasSubstr("limits after Long and Shi 2008"));
  EXPECT_THAT(notes, HasSubstr("2025: August 0.7 %"));  // three of the month's 450 hours with the sun up
}

// Five of June's thirty days, which are a little shorter than those after them.
TEST(RecordQuality, MonthsWithGaps) {
  const std::string lost = changed_lines(hours(), [](const std::string& stamp, const std::string& rest) {
    return within(stamp, "2025-06-05T00", "2025-06-10T00") ? std::string(",") : rest;
  });
  expect_fault(lost, {"more than 10 % of a month's daylight is missing", "station.csv", "2025: June 16.6 %",
                      "Mend the record or cut the file to whole years, or give allow_gaps = true"});
  EXPECT_THAT(notes_of(lost, kGlobalOnly + "allow_gaps = true\n"),
              HasSubstr("Missing daylight was filled with the mean clearness of the same time on the days "
                        "around, or in other years: 2025: June 16.6 %"));
}

}  // namespace
}  // namespace sunfall::test
