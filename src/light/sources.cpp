// Where light sources are registered. Another source is one alternative of LightSource, one file
// pair that overloads make_series, and one line here.

#include "light/clear.h"
#include "light/grid.h"
#include "light/monthly.h"
#include "light/series.h"
#include "light/sunshine.h"
#include "light/temperature.h"

#include <variant>

namespace sunfall {

std::vector<std::filesystem::path> files_of(const LightSource& source) {
  return std::visit(
      [](const auto& alternative) -> std::vector<std::filesystem::path> {
        if constexpr (requires { alternative.file; }) return {alternative.file};
        return {};
      },
      source);
}

LightSeries make_light(const LightSource& source, const Place& place, const Clock& clock,
                       const LightOptions& options, const std::string& where) {
  const LightRequest request{place, clock, options, where};
  return std::visit([&request](const auto& alternative) { return make_series(alternative, request); },
                    source);
}

}  // namespace sunfall
