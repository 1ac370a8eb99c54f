#include "light/flux_unit.h"

#include <cmath>
#include <utility>
#include <vector>

namespace sunfall {
namespace {

using Unit = SeriesSource::Unit;

// Daylight carries about 110 lm per W of global radiation (100 to 120).
constexpr double kLumen_w = 110.0;

constexpr std::pair<Unit, const char*> kNames[] = {
    {Unit::w_m2, "W m-2"},           {Unit::j_m2, "J m-2"},
    {Unit::j_cm2, "J cm-2"},         {Unit::kj_m2, "kJ m-2"},
    {Unit::mj_m2, "MJ m-2"},         {Unit::wh_m2, "Wh m-2"},
    {Unit::kwh_m2, "kWh m-2"},       {Unit::umol_m2_s, "µmol m-2 s-1"},
    {Unit::j_cm2_d, "J cm-2 d-1"},   {Unit::mj_m2_d, "MJ m-2 d-1"},
    {Unit::kwh_m2_d, "kWh m-2 d-1"}, {Unit::mol_m2_d, "mol m-2 d-1"},
};

constexpr std::chrono::seconds kDay{86400};

double joules(Unit unit) {
  switch (unit) {
    case Unit::j_m2: return 1.0;
    case Unit::j_cm2:
    case Unit::j_cm2_d: return 1e4;
    case Unit::kj_m2: return 1e3;
    case Unit::mj_m2:
    case Unit::mj_m2_d: return 1e6;
    case Unit::wh_m2: return 3.6e3;
    case Unit::kwh_m2:
    case Unit::kwh_m2_d: return 3.6e6;
    case Unit::w_m2:
    case Unit::umol_m2_s:
    case Unit::mol_m2_d: break;
  }
  return 0.0;
}

}  // namespace

std::string unit_name(Unit unit) {
  for (const auto& [known, name] : kNames) {
    if (known == unit) return name;
  }
  return "";
}

double flux_per_unit(Unit unit, std::chrono::seconds step) {
  const double energy_j = joules(unit);
  if (unit == Unit::mol_m2_d) return 1e6 / static_cast<double>(step.count());
  return energy_j > 0.0 ? energy_j / static_cast<double>(step.count()) : 1.0;
}

bool is_per_day(Unit unit) {
  return unit == Unit::j_cm2_d || unit == Unit::mj_m2_d || unit == Unit::kwh_m2_d || unit == Unit::mol_m2_d;
}

bool is_quantum(Unit unit) { return unit == Unit::umol_m2_s || unit == Unit::mol_m2_d; }

double rough_w_per_unit(Unit unit, std::chrono::seconds step) {
  return flux_per_unit(unit, step) * (is_quantum(unit) ? kRough_w_umol : 1.0);
}

std::string unit_of_values(double times_too_large, Unit claimed, std::chrono::seconds step) {
  std::vector<std::pair<std::string, double>> candidates{{"lux", 1.0 / kLumen_w}, {"klux", 1e3 / kLumen_w}};
  for (const auto& [unit, name] : kNames) {
    if (unit == claimed || (is_per_day(unit) && step != kDay)) continue;
    candidates.emplace_back(name, rough_w_per_unit(unit, step));
    if (joules(unit) > 0.0 && !is_per_day(unit))
      candidates.back().first += step == kDay ? " d-1" : " per step";
  }
  const double real_w = rough_w_per_unit(claimed, step) / times_too_large;
  std::string nearest;
  double nearest_distance = std::log(1.4);
  for (const auto& [name, unit_w] : candidates) {
    const double distance = std::abs(std::log(unit_w / real_w));
    if (distance >= nearest_distance) continue;
    nearest_distance = distance;
    nearest = name;
  }
  return nearest;
}

}  // namespace sunfall
