// Where light sources are registered. Another source is one alternative of LightSource, one file
// pair that overloads make_series, and one line here.

#include "light/clear.h"
#include "light/monthly.h"
#include "light/series.h"

#include <variant>

namespace sunfall {

LightSeries make_light(const LightSource& source, const Place& place, const Clock& clock,
                       const LightOptions& options, const std::string& where) {
  const LightRequest request{place, clock, options, where};
  return std::visit([&request](const auto& alternative) { return make_series(alternative, request); },
                    source);
}

}  // namespace sunfall
