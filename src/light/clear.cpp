#include "light/clear.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "light/clear_sky.h"
#include "sun/atmosphere.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kCleanDryAir = 1.0;
constexpr double kThickestHaze = 12.0;

void check(const std::array<double, 12>& linke_turbidity, const std::string& where) {
  for (std::size_t month = 0; month < 12; ++month) {
    const double value = linke_turbidity[month];
    if (value >= kCleanDryAir && value <= kThickestHaze) continue;
    throw Error(
        ErrorKind::plan,
        {.what = fmt::format("the Linke turbidity of {} is not one of an atmosphere", month_name(month)),
         .where = where,
         .found = fmt::format("{}", value),
         .remedy = "give a value from 1 (clean dry air) to 12 (thick haze); 2 to 5 is usual"});
  }
}

std::string describe(const std::array<double, 12>& linke_turbidity) {
  const auto [least, most] = std::minmax_element(linke_turbidity.begin(), linke_turbidity.end());
  const std::string range = *least == *most ? fmt::format("{:.1f}", *least)
                                            : fmt::format("{:.1f} to {:.1f} by month", *least, *most);
  return "cloudless sky (Ineichen and Perez 2002), Linke turbidity " + range;
}

}  // namespace

void fill_clear_sky(LightSeries& series, const std::array<double, 12>& linke_turbidity) {
  const std::vector<int> months = months_of_days(series);
  const double pressure_pa = standard_pressure_pa(series.place.height_m);
  for (std::size_t i = 0; i < series.steps.size(); ++i) {
    const double mean_sine = series.sun.mean_sine[i];
    if (mean_sine <= 0.0) continue;
    // One elevation stands for the step: that of its mean sine, so that energy is kept.
    const Angle elevation = Angle::radians(std::asin(std::min(1.0, mean_sine)));
    const ClearSky sky =
        clear_sky({.extraterrestrial_normal_w_m2 = series.sun.normal_w_m2[i],
                   .sine_of_elevation = mean_sine,
                   .air_mass = air_mass(elevation + refraction(elevation, pressure_pa)),
                   .height_m = series.place.height_m,
                   .linke_turbidity = linke_turbidity[static_cast<std::size_t>(months[i / kStepsPerDay])]});
    const double beam_w_m2 = sky.beam_normal_w_m2 * mean_sine;
    series.steps[i].beam_w = static_cast<float>(beam_w_m2);
    series.steps[i].sky_w = static_cast<float>(std::max(0.0, sky.global_w_m2 - beam_w_m2));
  }
}

LightSeries make_series(const ClearSource& source, const LightRequest& request) {
  check(source.linke_turbidity, request.where);
  LightSeries series = open_series(request);
  fill_clear_sky(series, source.linke_turbidity);
  series.description = describe(source.linke_turbidity);
  series.is_ceiling = true;
  series.notes.push_back("a sky without a cloud all year: a ceiling, not a forecast");
  add_photons(series);
  return series;
}

}  // namespace sunfall
