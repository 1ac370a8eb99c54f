#include "sun/atmosphere.h"

#include <gtest/gtest.h>

namespace sunfall {
namespace {

constexpr double kSeaLevel_pa = 101325.0;

// ICAO standard atmosphere (1993), rounded to the table's 0.1 hPa or its own rounding.
TEST(Atmosphere, HasTheStandardPressure) {
  EXPECT_NEAR(standard_pressure_pa(0.0), 101325.0, 0.1);
  EXPECT_NEAR(standard_pressure_pa(1000.0), 89874.6, 5.0);
  EXPECT_NEAR(standard_pressure_pa(3000.0), 70108.5, 5.0);
  EXPECT_NEAR(standard_pressure_pa(-400.0), 106223.0, 10.0);
  EXPECT_GT(standard_pressure_pa(50000.0), 0.0);
}

// Saemundsson's formula at 1010 mbar and 10 °C gives 28.98' at the horizon (closed form of the
// formula); at sea level the pressure is 1013.25 mbar.
TEST(Atmosphere, RefractsAtTheHorizon) {
  const double horizon_min = 60.0 * refraction(Angle::degrees(0.0), kSeaLevel_pa).degrees();
  EXPECT_NEAR(horizon_min, 28.98 * 1013.25 / 1010.0, 0.01);
  EXPECT_LT(refraction(Angle::degrees(0.0), standard_pressure_pa(3000.0)),
            refraction(Angle::degrees(0.0), kSeaLevel_pa) * 0.7);
}

TEST(Atmosphere, NeverTurnsTheSunsPathBack) {
  Angle before = Angle::degrees(-10.0);
  for (double elevation_deg = -9.99; elevation_deg <= 90.0; elevation_deg += 0.01) {
    const Angle apparent =
        Angle::degrees(elevation_deg) + refraction(Angle::degrees(elevation_deg), kSeaLevel_pa);
    EXPECT_GT(apparent, before) << elevation_deg;
    EXPECT_GE(refraction(Angle::degrees(elevation_deg), kSeaLevel_pa).radians(), 0.0) << elevation_deg;
    before = apparent;
  }
}

TEST(Atmosphere, FadesWithoutAJump) {
  EXPECT_EQ(refraction(Angle::degrees(-2.5), kSeaLevel_pa).radians(), 0.0);
  EXPECT_EQ(refraction(Angle::degrees(-60.0), kSeaLevel_pa).radians(), 0.0);
  for (double elevation_deg = -3.0; elevation_deg < 1.0; elevation_deg += 0.001) {
    const double step_deg = (refraction(Angle::degrees(elevation_deg + 0.001), kSeaLevel_pa) -
                             refraction(Angle::degrees(elevation_deg), kSeaLevel_pa))
                                .degrees();
    EXPECT_LT(std::abs(step_deg), 0.001) << elevation_deg;
  }
}

}  // namespace
}  // namespace sunfall
