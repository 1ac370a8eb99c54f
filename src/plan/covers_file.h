#pragma once
// The table of covers, a TOML file: [covers.<name>] and [factors.<name>]. read_covers (sunfall/covers.h)
// reads it; docs/covers.md lists its keys.

#include "plan/key_shapes.h"

namespace sunfall {

TableShape cover_shape();
TableShape cover_factor_shape();

}  // namespace sunfall
