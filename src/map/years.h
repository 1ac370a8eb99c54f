#pragma once
// Years apart: what the open field and a place get in each year of a series, and percentiles over them.
//
// A place's shares are those of the mean dome light, so that a year's DLI is
//   open beam(year) × beam share + open sky(year) × sky share.
// Geometry is not solved again for each year; docs/light.md says what that costs.

#include <array>
#include <span>
#include <string>
#include <vector>

#include "map/tile_solver.h"
#include "sunfall/map.h"

namespace sunfall {

// Percentiles over years are of definition 7 (core/quantile.h): those of the tables of plots, of R and of
// common spreadsheets; never beyond the darkest and the brightest year.
inline constexpr std::array<int, 3> kYearPercents{10, 50, 90};
using YearPercentiles = std::array<double, 3>;

// With fewer years a tenth says nothing at all, and with fewer than ten little.
inline constexpr int kLeastYears = 3;
inline constexpr int kEnoughYears = 10;

// Of the mean day of each period and of the year, over all years.
OpenField open_field(const DomeLight& light);
// The same from the years alone, without a dome; equal to 1e-6.
OpenField open_field(const std::vector<OpenYear>& years);

inline bool has_percentiles(const OpenField& open) { return open.years.size() >= kLeastYears; }

// Missing years (NaN) are left out; missing where fewer than kLeastYears are left.
YearPercentiles percentiles_over_years(std::vector<double> by_year);

// DLI of a place in one year: of every period, then of the year. `shares`: beam of every period, then sky.
std::vector<double> dli_in_year(const OpenYear& year, std::span<const double> shares);
// [period, the year last], for a place; for the open field, whose shares are 1.
std::vector<YearPercentiles> percentiles_of(const OpenField& open, std::span<const double> shares);
std::vector<YearPercentiles> percentiles_of(const OpenField& open);

// [percent][period, the year last][cell]
using TilePercentiles = std::array<std::vector<std::vector<float>>, 3>;
TilePercentiles percentiles_of(const OpenField& open, const TileShares& shares);

// Throws Error(plan) where years are made, and where a period lies in too few of them for percentiles;
// `where` is the key that asks for them.
void require_years(const std::vector<OpenYear>& years, const std::vector<Period>& periods,
                   const std::string& where);

}  // namespace sunfall
