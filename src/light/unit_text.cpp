#include "light/unit_text.h"

#include <string>
#include <utility>

namespace sunfall {
namespace {

using Unit = SeriesSource::Unit;

constexpr std::pair<const char*, Unit> kUnits[] = {
    {"W", Unit::w_m2},     {"Watt", Unit::w_m2},   {"Watts", Unit::w_m2}, {"watt", Unit::w_m2},
    {"watts", Unit::w_m2}, {"J", Unit::j_m2},      {"Joule", Unit::j_m2}, {"Joules", Unit::j_m2},
    {"joule", Unit::j_m2}, {"joules", Unit::j_m2}, {"kJ", Unit::kj_m2},   {"KJ", Unit::kj_m2},
    {"MJ", Unit::mj_m2},   {"Wh", Unit::wh_m2},    {"kWh", Unit::kwh_m2}, {"KWh", Unit::kwh_m2},
};

// Brackets, blanks and the signs of powers and products say nothing that is needed here.
std::string bare(std::string_view text) {
  std::string out;
  for (const char letter : text) {
    if (std::string_view("[]() *^._").find(letter) == std::string_view::npos) out += letter;
  }
  return out;
}

}  // namespace

std::optional<Unit> unit_of_text(std::string_view text) {
  const std::string unit = bare(text);
  for (const char* photons : {"umolm-2s-1", "µmolm-2s-1", "umol/m2/s", "µmol/m2/s", "umol/m2s", "µmol/m2s"}) {
    if (unit == photons) return Unit::umol_m2_s;
  }
  if (unit == "Jcm-2" || unit == "J/cm2") return Unit::j_cm2;
  for (const auto& [name, known] : kUnits) {
    for (const char* area : {"m-2", "/m2"}) {
      if (unit == std::string(name) + area) return known;
    }
  }
  return std::nullopt;
}

}  // namespace sunfall
