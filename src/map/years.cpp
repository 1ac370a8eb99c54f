#include "map/years.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>

#include "core/clones.h"
#include "core/quantile.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr int kLanes = 64;  // cells side by side

// The parts of a year's days that its months have.
std::array<double, 12> month_parts(const std::vector<OpenYear>& years) {
  std::array<double, 12> days{};
  double all = 0.0;
  for (const OpenYear& year : years) {
    for (std::size_t m = 0; m < 12; ++m) {
      days[m] += year.days[m];
      all += year.days[m];
    }
  }
  for (double& part : days) part /= all;
  return days;
}

void take_year(OpenField& open, const std::vector<OpenYear>& years) {
  // Made years do not stand for years: nothing behind this tells them apart.
  if (years.empty() || !years.front().made) open.years = years;
  open.month_part = month_parts(years);
  for (std::size_t m = 0; m < 12; ++m) open.year += open.month_part[m] * (open.beam[m] + open.sky[m]);
}

using Comparators = std::vector<std::pair<int, int>>;

// Batcher's odd-even merge sort (Knuth, The Art of Computer Programming 3, 5.2.2, algorithm M): which places
// of `count` to put in order, one pair after another, whatever the values. So many cells sort together.
Comparators sorting_network(int count) {
  Comparators pairs;
  for (int p = 1; p < count; p *= 2) {
    for (int k = p; k >= 1; k /= 2) {
      for (int j = k % p; j + k < count; j += 2 * k) {
        for (int i = 0; i < k && i + j + k < count; ++i) {
          if ((i + j) / (2 * p) == (i + j + k) / (2 * p)) pairs.emplace_back(i + j, i + j + k);
        }
      }
    }
  }
  return pairs;
}

using Lanes = std::array<float, kLanes>;

SUNFALL_CLONES void put_in_order(float* __restrict low, float* __restrict high) {
  for (int lane = 0; lane < kLanes; ++lane) {
    const float a = low[lane], b = high[lane];
    low[lane] = std::min(a, b);
    high[lane] = std::max(a, b);
  }
}

SUNFALL_CLONES void mix(const float* __restrict beam_share, const float* __restrict sky_share, float beam,
                        float sky, float* __restrict dli) {
  for (int lane = 0; lane < kLanes; ++lane) dli[lane] = beam * beam_share[lane] + sky * sky_share[lane];
}

SUNFALL_CLONES void add_scaled(const float* __restrict values, float scale, float* __restrict sums) {
  for (int lane = 0; lane < kLanes; ++lane) sums[lane] += scale * values[lane];
}

// Percentiles of up to kLanes cells at a time.
class LanePercentiles {
 public:
  explicit LanePercentiles(const OpenField& open) : open_(open), months_(open.years.size()) {
    for (std::size_t y = 0; y < open.years.size(); ++y) months_[y] = month_parts({open.years[y]});
    values_.resize(open.years.size());
    year_.resize(open.years.size());
  }

  void take(const TileShares& shares, std::size_t first, std::size_t cells, TilePercentiles& out) {
    const std::size_t periods = open_.beam.size();
    gather(shares, first, cells);
    for (Lanes& sums : year_) sums.fill(0.0F);
    for (std::size_t p = 0; p < periods; ++p) {
      std::size_t count = 0;
      for (std::size_t y = 0; y < open_.years.size(); ++y) {
        const OpenYear& year = open_.years[y];
        if (year.days[p] == 0) continue;
        float* dli = values_[count++].data();
        mix(columns_[p].data(), columns_[periods + p].data(), static_cast<float>(year.beam[p]),
            static_cast<float>(year.sky[p]), dli);
        if (p < 12) add_scaled(dli, static_cast<float>(months_[y][p]), year_[y].data());
      }
      give(values_, count, p, shares, first, cells, out);
    }
    give(year_, year_.size(), periods, shares, first, cells, out);
  }

 private:
  void gather(const TileShares& shares, std::size_t first, std::size_t cells) {
    columns_.resize(static_cast<std::size_t>(shares.columns));
    for (std::size_t lane = 0; lane < cells; ++lane) {
      const float* of = shares.of(first + lane);
      const bool usable = shares.usable[first + lane] != 0;
      for (std::size_t c = 0; c < columns_.size(); ++c) columns_[c][lane] = usable ? of[c] : 0.0F;
    }
  }

  const Comparators& network(std::size_t count) {
    if (count != network_of_) network_ = sorting_network(static_cast<int>(count));
    network_of_ = count;
    return network_;
  }

  // Sorts the years of each lane and reads their percentiles off.
  void give(std::vector<Lanes>& values, std::size_t count, std::size_t period, const TileShares& shares,
            std::size_t first, std::size_t cells, TilePercentiles& out) {
    if (count < kLeastYears) return;
    for (const auto& [low, high] : network(count)) {
      put_in_order(values[static_cast<std::size_t>(low)].data(),
                   values[static_cast<std::size_t>(high)].data());
    }
    for (std::size_t i = 0; i < kYearPercents.size(); ++i) {
      const QuantilePlace place = quantile_place(count, kYearPercents[i] / 100.0);
      const auto part = static_cast<float>(place.part);
      float* to = out[i][period].data() + first;
      for (std::size_t lane = 0; lane < cells; ++lane) {
        const float below = values[place.below][lane], above = values[place.above][lane];
        // Not past the upper one by rounding.
        if (shares.usable[first + lane]) to[lane] = std::min(below + part * (above - below), above);
      }
    }
  }

  const OpenField& open_;
  std::vector<std::array<double, 12>> months_;  // [year]
  std::vector<Lanes> columns_;                  // shares
  std::vector<Lanes> values_;                   // [year] of one period
  std::vector<Lanes> year_;                     // [year]
  Comparators network_;
  std::size_t network_of_ = 0;
};

}  // namespace

OpenField open_field(const DomeLight& light) {
  OpenField open;
  open.beam = light.beam.open;
  open.sky = light.sky.open;
  take_year(open, light.years);
  return open;
}

OpenField open_field(const std::vector<OpenYear>& years) {
  OpenField open;
  const std::size_t periods = years.front().beam.size();
  for (std::size_t p = 0; p < periods; ++p) {
    double beam = 0.0, sky = 0.0, days = 0.0;
    for (const OpenYear& year : years) {
      if (year.days[p] == 0) continue;
      beam += year.days[p] * year.beam[p];
      sky += year.days[p] * year.sky[p];
      days += year.days[p];
    }
    open.beam.push_back(days > 0.0 ? beam / days : 0.0);
    open.sky.push_back(days > 0.0 ? sky / days : 0.0);
  }
  take_year(open, years);
  return open;
}

YearPercentiles percentiles_over_years(std::vector<double> by_year) {
  std::erase_if(by_year, [](double value) { return std::isnan(value); });
  YearPercentiles out;
  out.fill(kMissing);
  if (by_year.size() < kLeastYears) return out;
  std::sort(by_year.begin(), by_year.end());
  for (std::size_t i = 0; i < out.size(); ++i) out[i] = quantile(by_year, kYearPercents[i] / 100.0);
  return out;
}

std::vector<double> dli_in_year(const OpenYear& year, std::span<const double> shares) {
  const std::size_t periods = year.beam.size();
  const std::array<double, 12> months = month_parts({year});
  std::vector<double> dli;
  double whole = 0.0;
  for (std::size_t p = 0; p < periods; ++p) {
    dli.push_back(year.beam[p] * shares[p] + year.sky[p] * shares[periods + p]);
    if (p < 12) whole += months[p] * dli[p];
  }
  dli.push_back(whole);
  return dli;
}

std::vector<YearPercentiles> percentiles_of(const OpenField& open, std::span<const double> shares) {
  std::vector<std::vector<double>> by_year;
  for (const OpenYear& year : open.years) by_year.push_back(dli_in_year(year, shares));
  std::vector<YearPercentiles> out;
  for (std::size_t p = 0; p <= open.beam.size(); ++p) {
    std::vector<double> values;
    for (const std::vector<double>& year : by_year) values.push_back(year[p]);
    out.push_back(percentiles_over_years(std::move(values)));
  }
  return out;
}

std::vector<YearPercentiles> percentiles_of(const OpenField& open) {
  return percentiles_of(open, std::vector<double>(2 * open.beam.size(), 1.0));
}

TilePercentiles percentiles_of(const OpenField& open, const TileShares& shares) {
  const std::size_t cells = shares.usable.size();
  TilePercentiles out;
  for (auto& layers : out) layers.assign(open.beam.size() + 1, std::vector<float>(cells, kMissing));
  LanePercentiles lanes(open);
  for (std::size_t first = 0; first < cells; first += kLanes)
    lanes.take(shares, first, std::min<std::size_t>(kLanes, cells - first), out);
  return out;
}

void require_years(const std::vector<OpenYear>& years, const std::vector<Period>& periods,
                   const std::string& where) {
  const std::string remedy = fmt::format(
      "Give [light.series] a record of {} years or more, of which {} or more tell much better, or leave the "
      "key out",
      kLeastYears, kEnoughYears);
  if (!years.empty() && years.front().made) {
    throw Error(
        ErrorKind::plan,
        {"made years have no percentiles: every month keeps its mean in each of them", where,
         fmt::format("{} made year{}", years.size(), years.size() == 1 ? "" : "s"),
         fmt::format("Leave the key out, or give [light.series] a record of {} years or more", kLeastYears)});
  }
  if (years.size() < kLeastYears) {
    throw Error(ErrorKind::plan,
                {"there are too few years for percentiles over them", where,
                 fmt::format("light of {} year{}", years.size(), years.size() == 1 ? "" : "s"), remedy});
  }
  for (std::size_t p = 0; p < periods.size(); ++p) {
    const auto with_days =
        std::count_if(years.begin(), years.end(), [p](const OpenYear& year) { return year.days[p] > 0; });
    if (with_days >= kLeastYears) continue;
    throw Error(ErrorKind::plan,
                {"a range lies in too few of the years for percentiles over them", where,
                 fmt::format("{} in {} of {} years", periods[p].name, with_days, years.size()), remedy});
  }
}

}  // namespace sunfall
