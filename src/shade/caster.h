#pragma once
// The seam for everything that lets a part of the light through: leaves, rows of a crop. (What is solid
// raises the terrain's heights instead, see terrain.h.)
//
// A caster tells how deep its leaves lie along straight rays, all of one direction at a time; casters that
// are in leaf at the same times add up. What passes is exp(-leafing · depth), so months with other leafing
// need no other rays. Another caster is one file pair and one line in make_casters (map/casters.cpp).

#include <array>
#include <cstdint>
#include <memory>
#include <optional>
#include <span>

#include "shade/terrain.h"
#include "sunfall/angle.h"

namespace sunfall {

// Optical depth in integers: 4096 to the unit, at most 65535 (e^-16 passes). Sums saturate.
using Depth = std::uint16_t;
inline constexpr float kDepthUnits = 4096.0F;

// Of the light that falls on level ground in the open from one direction, what a crop's leaves take, by
// the side of the row that it comes from (right and left of the row's azimuth).
struct CropTaken {
  float right = 0.0F;
  float left = 0.0F;
  // The part of the period that this caster stands for; 1 but where a crop is several casters.
  float leafed = 1.0F;
};

// A caster's view of one tile.
class CasterTile {
 public:
  virtual ~CasterTile() = default;

  // No ray towards this azimuth is touched whose elevation has a tangent above what this gives; 0 where
  // none is touched at all. A bound, cheap to find.
  virtual float highest_tangent(GridAzimuth azimuth) = 0;

  // Adds to every cell of the tile's window, row by row, the optical depth at full leaf along the ray
  // from its receiver towards `azimuth` at the elevation of that tangent. Rays end nowhere: whatever of the
  // caster lies along them counts. False: nothing was added.
  virtual bool add_depth(GridAzimuth azimuth, float tangent, std::span<Depth> depth) = 0;

  // Only of crops: the cells of the tile that the crop stands on, and what it takes there at a share of full
  // leaf.
  virtual std::span<const std::uint32_t> crop_cells() const { return {}; }
  virtual CropTaken taken(GridAzimuth, float /*tangent*/, double /*leafing*/) { return {}; }
};

class Caster {
 public:
  virtual ~Caster() = default;

  // Share of full leaf by month, 0 to 1.
  virtual const std::array<double, 12>& leafing() const = 0;

  // Of a crop, whose part of the light is wanted for itself, its number among the plan's rows.
  virtual std::optional<int> crop() const { return std::nullopt; }

  // Whether it stands for one state of leaf of a crop that is several casters: leafing() is then the part of
  // a month in which it holds.
  virtual bool one_state() const { return false; }

  // nullptr where no cell of the tile can be touched. May be called from several threads; what it
  // gives is used by one thread and must not outlive `tile`.
  virtual std::unique_ptr<CasterTile> tile(const TerrainTile& tile) const = 0;
};

}  // namespace sunfall
