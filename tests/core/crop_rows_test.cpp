#include "sunfall/crop_rows.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <limits>
#include <string>

namespace sunfall {
namespace {

// Every bad value has its message; the plan and the study both ask here.
TEST(CropRows, FaultsAreNamed) {
  const auto fault = [](auto change) {
    CropRows rows;
    change(rows);
    const auto found = fault_of(rows);
    return found ? found->key + ": " + found->what : std::string();
  };
  EXPECT_EQ(fault([](CropRows&) {}), "");
  using ::testing::HasSubstr;
  EXPECT_THAT(fault([](CropRows& r) { r.width_m = 3.6; }), HasSubstr("wider than their spacing"));
  EXPECT_THAT(fault([](CropRows& r) { r.base_m = 3.2; }), HasSubstr("base: the leaves begin"));
  EXPECT_THAT(fault([](CropRows& r) { r.leaf_density = -0.1; }),
              HasSubstr("leaf_density must be at least 0"));
  EXPECT_THAT(fault([](CropRows& r) { r.leaf_density = 20.1; }), HasSubstr("at most 20 m2 m-3"));
  EXPECT_THAT(fault([](CropRows& r) { r.spacing_m = 0.0; }), HasSubstr("spacing must be above 0"));
  EXPECT_THAT(fault([](CropRows& r) { r.height_m = std::numeric_limits<double>::quiet_NaN(); }),
              HasSubstr("height must be above 0"));
  EXPECT_THAT(fault([](CropRows& r) { r.clumping = 0.0; }), HasSubstr("clumping must be above 0"));
  EXPECT_THAT(fault([](CropRows& r) { r.absorptance = 1.01; }), HasSubstr("absorptance"));
  EXPECT_THAT(fault([](CropRows& r) { r.leaf_angle = 0.0; }), HasSubstr("leaf_angle must be at least 0.1"));
}

// By hand: 1.5 m² a cubic metre in 1 m × 2 m of frame, rows 3 m apart; an ellipse fills π/4 of it, a wedge
// half.
TEST(CropRows, LeafAreaIndex) {
  CropRows rows;
  rows.spacing_m = 3.0;
  rows.width_m = 1.0;
  rows.base_m = 0.5;
  rows.height_m = 2.5;
  rows.leaf_density = 1.5;
  EXPECT_NEAR(leaf_area_index(rows), 1.0, 1e-12);
  rows.section = RowSection::ellipse;
  EXPECT_NEAR(leaf_area_index(rows), 0.785398, 1e-6);
  rows.section = RowSection::wedge;
  EXPECT_NEAR(leaf_area_index(rows), 0.5, 1e-12);
}

}  // namespace
}  // namespace sunfall
