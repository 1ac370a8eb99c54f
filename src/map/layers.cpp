#include "map/layers.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "core/lowest_month.h"
#include "core/month_names.h"

namespace sunfall {
namespace {

constexpr double kDliQuantum = 1.0 / 128.0;
constexpr double kShareQuantum = 1.0 / 4096.0;
constexpr const char* kDliUnit = "mol m-2 d-1";

std::string day_text(std::chrono::month_day day) {
  const std::string month = kMonthNames[static_cast<unsigned>(day.month()) - 1];
  return fmt::format("{} {}", static_cast<unsigned>(day.day()), month.substr(0, 3));
}

// The darkest month of each cell: its light, and its number.
void lowest(const TileLight& light, std::vector<float>* dli, std::vector<float>* month) {
  const std::size_t cells = light.year.size();
  for (std::size_t cell = 0; cell < cells; ++cell) {
    const int least = lowest_month_of([&](int m) { return light.dli[static_cast<std::size_t>(m)][cell]; });
    if (dli) (*dli)[cell] = least < 0 ? kMissing : light.dli[static_cast<std::size_t>(least)][cell];
    if (month) (*month)[cell] = least < 0 ? kMissing : static_cast<float>(least + 1);
  }
}

void share_values(const TileLight& light, std::size_t column, std::vector<float>& values) {
  for (std::size_t cell = 0; cell < values.size(); ++cell) {
    values[cell] = light.shares->usable[cell] ? light.shares->of(cell)[column] : kMissing;
  }
}

}  // namespace

std::string period_title(const Period& period) {
  if (period.name.size() == 2 && period.name[0] <= '1' && period.name[0] >= '0') {
    const int month = std::stoi(period.name);
    if (month >= 1 && month <= 12) return month_name(static_cast<std::size_t>(month - 1));
  }
  return fmt::format("{} ({} to {})", period.name, day_text(period.from), day_text(period.to));
}

TileLight light_of(const TileShares& shares, const OpenField& open) {
  TileLight light;
  light.shares = &shares;
  const std::size_t cells = shares.usable.size(), count = open.beam.size();
  light.dli.assign(count, std::vector<float>(cells, kMissing));
  light.year.assign(cells, kMissing);
  std::vector<float> beam(open.beam.begin(), open.beam.end()), sky(open.sky.begin(), open.sky.end());
  std::array<float, 12> weight{};
  for (std::size_t m = 0; m < 12; ++m) weight[m] = static_cast<float>(open.month_part[m]);
  for (std::size_t cell = 0; cell < cells; ++cell) {
    if (!shares.usable[cell]) continue;
    const float* share = shares.of(cell);
    float sum = 0.0F;
    for (std::size_t p = 0; p < count; ++p) {
      const float value = beam[p] * share[p] + sky[p] * share[count + p];
      light.dli[p][cell] = value;
      if (p < 12) sum += weight[p] * value;
    }
    light.year[cell] = sum;
  }
  const TileCrops& crops = shares.crops;
  if (!crops.cells.empty()) light.taken.assign(count + 1, std::vector<float>(cells, kMissing));
  for (std::size_t slot = 0; slot < crops.cells.size(); ++slot) {
    const float* right = crops.taken.data() + slot * 2 * static_cast<std::size_t>(crops.columns);
    const float* left = right + crops.columns;
    float sum = 0.0F;
    for (std::size_t p = 0; p < count; ++p) {
      const float value = beam[p] * (right[p] + left[p]) + sky[p] * (right[count + p] + left[count + p]);
      light.taken[p][crops.cells[slot]] = value;
      if (p < 12) sum += weight[p] * value;
    }
    light.taken[count][crops.cells[slot]] = sum;
  }
  return light;
}

std::vector<LayerRecipe> layers_of(const Plan& plan, const std::vector<Period>& periods,
                                   const std::map<std::string, std::string>& provenance) {
  std::vector<LayerRecipe> layers;
  const auto add = [&](LayerSpec spec, auto fill) {
    spec.provenance = provenance;
    spec.provenance["SUNFALL_ROUNDING"] =
        spec.quantum > 0.0 ? fmt::format("values rounded to 1/{:.0f}", 1.0 / spec.quantum) : "none";
    layers.push_back({std::move(spec), fill});
  };
  for (std::size_t p = 0; p < periods.size(); ++p) {
    add({"dli-" + periods[p].name + ".tif", "Daily light integral, " + period_title(periods[p]), kDliUnit,
         kDliQuantum},
        [p](const TileLight& light, std::vector<float>& values) { values = light.dli[p]; });
  }
  add({"dli-year.tif", "Daily light integral, mean of the year", kDliUnit, kDliQuantum},
      [](const TileLight& light, std::vector<float>& values) { values = light.year; });
  add({"dli-lowest.tif", "Daily light integral of the darkest month", kDliUnit, kDliQuantum},
      [](const TileLight& light, std::vector<float>& values) { lowest(light, &values, nullptr); });
  add({"dli-lowest-month.tif", "Darkest month, 1 to 12", "month", 0.0, true},
      [](const TileLight& light, std::vector<float>& values) { lowest(light, nullptr, &values); });
  add({"sight.tif", "How much of the horizon the inputs cover, 1 = all", "1", kShareQuantum},
      [](const TileLight& light, std::vector<float>& values) { values = light.sight; });
  for (std::size_t p = 0; !plan.rows.empty() && p <= periods.size(); ++p) {
    const bool year = p == periods.size();
    add({fmt::format("taken-{}.tif", year ? "year" : periods[p].name),
         "Light taken by crop rows per area of ground, " +
             (year ? "mean of the year" : period_title(periods[p])),
         kDliUnit, kDliQuantum},
        [p](const TileLight& light, std::vector<float>& values) {
          if (light.taken.empty())
            std::fill(values.begin(), values.end(), kMissing);
          else
            values = light.taken[p];
        });
  }
  if (plan.output.percentiles) {
    for (std::size_t i = 0; i < kYearPercents.size(); ++i) {
      for (std::size_t p = 0; p <= periods.size(); ++p) {
        const bool year = p == periods.size();
        add({fmt::format("dli-{}-p{}.tif", year ? "year" : periods[p].name, kYearPercents[i]),
             fmt::format("P{} over the years of the daily light integral, {}", kYearPercents[i],
                         year ? "mean of the year" : period_title(periods[p])),
             kDliUnit, kDliQuantum},
            [i, p](const TileLight& light, std::vector<float>& values) { values = light.over_years[i][p]; });
      }
    }
  }
  if (!plan.output.shares) return layers;
  for (const bool beam : {true, false}) {
    for (std::size_t p = 0; p < periods.size(); ++p) {
      const std::size_t column = beam ? p : periods.size() + p;
      add({fmt::format("share-{}-{}.tif", beam ? "beam" : "sky", periods[p].name),
           fmt::format("Share of the open field's {} light, {}", beam ? "beam" : "sky",
                       period_title(periods[p])),
           "1", kShareQuantum},
          [column](const TileLight& light, std::vector<float>& values) {
            share_values(light, column, values);
          });
    }
  }
  return layers;
}

}  // namespace sunfall
