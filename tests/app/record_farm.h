#pragma once
// A small farm whose light is an invented station's record, for tests of the program.

#include <gtest/gtest.h>

#include <functional>
#include <nlohmann/json.hpp>

#include "app/small_farm.h"
#include "light/station.h"

namespace sunfall::test {

// The light at the farm's place; its clock is that of Amsterdam.
inline const LightSeries& farm_truth() {
  static const LightSeries series = cloudy_truth(place_at(51.95, 5.77, 13.0), 2025, "+01:00");
  return series;
}

// farm.toml with a record `station.csv` in W m-2 whose stamps name the ends; `keys` tell its columns.
inline void write_record(const SmallFarm& farm, const std::string& record, const std::string& keys) {
  write_text(farm / "station.csv", record);
  write_text(
      farm / "farm.toml",
      "[site]\nground = 'ground.tif'\nclock = 'Europe/Amsterdam'\n[light.series]\nfile = 'station.csv'\n"
      "stamp = 'end'\nunit = 'W m-2'\n" +
          keys);
}

// Each line below the first, changed; change(stamp, the rest with its comma) gives a new rest.
inline std::string changed_lines(
    const std::string& text,
    const std::function<std::string(const std::string&, const std::string&)>& change) {
  std::string out = text.substr(0, text.find('\n') + 1);
  for (std::size_t begin = out.size(); begin < text.size();) {
    const std::size_t end = text.find('\n', begin);
    const std::size_t comma = text.find(',', begin);
    const std::string stamp = text.substr(begin, comma - begin);
    out += stamp + change(stamp, text.substr(comma, end - comma)) + '\n';
    begin = end + 1;
  }
  return out;
}

inline Outcome vet_farm(const SmallFarm& farm, std::vector<std::string> more = {}) {
  std::vector<std::string> words{"vet", "farm.toml", "--dome", "draft"};
  words.insert(words.end(), more.begin(), more.end());
  return farm.run(words);
}
inline nlohmann::json vet_json(const SmallFarm& farm) {
  const Outcome outcome = vet_farm(farm, {"--json"});
  EXPECT_EQ(outcome.status, 0) << outcome.err;
  return outcome.status == 0 ? nlohmann::json::parse(outcome.out) : nlohmann::json{};
}

}  // namespace sunfall::test
