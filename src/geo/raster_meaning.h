#pragma once
// What the cells of a raster count, and what they can hold.

namespace sunfall {

struct RasterMeaning {
  const char* value;   // "height": what messages call one
  const char* values;  // "Heights"
  const char* unit;    // " m", with its blank
  bool is_height;      // then the raster's own unit must be the metre
  double least;
  double most;

  // Above the sea or the ellipsoid. The shore of the Dead Sea lies at -430 m, Everest at 8849 m.
  static constexpr RasterMeaning height() { return {"height", "Heights", " m", true, -500.0, 9000.0}; }
  // Above the ground. The tallest trees reach 116 m; differences of two surveys are a few metres off.
  static constexpr RasterMeaning height_of_leaves() {
    return {"height above the ground", "Heights of leaves above the ground", " m", true, -10.0, 120.0};
  }
  // One side of the leaves, m2 in a m3.
  static constexpr RasterMeaning leaf_density() {
    return {"leaf density", "Leaf densities", " m2 m-3", false, 0.0, 20.0};
  }
};

}  // namespace sunfall
