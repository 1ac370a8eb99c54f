#pragma once
// Units as files write them.

#include <optional>
#include <string_view>

#include "sunfall/light.h"

namespace sunfall {

// "W m**-2", "W/m^2", "[W/(m^2)]", "J m-2", "umol m-2 s-1" …; nothing where it is none of light.
std::optional<SeriesSource::Unit> unit_of_text(std::string_view text);

}  // namespace sunfall
