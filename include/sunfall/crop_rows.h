#pragma once
// Parallel rows of a crop, as a plan describes them: hedges of leaf in orchards, vineyards, soft fruit and
// tall vegetables. A row is a section of leaf drawn along its direction; leaves are spread evenly in it.
// What rows do to light is in rows.h.

#include <optional>
#include <string>

namespace sunfall {

// box:     `width` wide from base to height
// ellipse: upright, `width` wide halfway between base and height
// wedge:   `width` wide at the base, narrowing evenly to an edge at the height
enum class RowSection { box, ellipse, wedge };

struct CropRows {
  double spacing_m = 3.5;  // from the middle of a row to that of the next; above 0 to 100
  double height_m = 3.2;   // top of the leaves above the ground; to 50
  double width_m = 1.4;    // at most the spacing
  double base_m = 0.6;     // lowest leaves above the ground; from 0 to below the height
  RowSection section = RowSection::box;
  double leaf_density = 1.6;  // m2 of leaf (one side) per m3 of section, 0 to 20
  double leaf_angle = 1.0;    // Campbell's (1986) x: 1 spherical, below it upright, above it flat; 0.1 to 10
  double clumping = 1.0;      // above 0 to 1: the part of the leaf area that works as if it stood at random
  double absorptance = 0.85;  // of a leaf, 400-700 nm, above 0 to 1; 0.80 to 0.85 in handbooks
};

// The first thing that makes rows impossible or absurd; nothing where all is well.
struct RowFault {
  std::string key;  // as in a plan: "width"
  std::string what;
  std::string found;
  std::string remedy;  // may be empty
};
std::optional<RowFault> fault_of(const CropRows& rows);

// m2 of leaf per m2 of ground, alleys counted in.
double leaf_area_index(const CropRows& rows);

}  // namespace sunfall
