// Means over the cycle of rows: closed forms of opaque hedges and of closed canopies, and sums over many
// places.

#include "shade/row_cycle.h"

#include <gtest/gtest.h>

#include <cmath>
#include <random>

#include "shade/marched_rows.h"
#include "shade/row_leaves.h"
#include "shade/some_rows.h"

namespace sunfall {
namespace {

using testing::grid;
using testing::kDegree;
using testing::kSections;
using testing::rows_of;

constexpr double kOpaque = 1e6;  // optical depth of a metre

// A rectangular hedge that lets nothing through shades [w + h |sin Δ| / tan e] / P of the ground: its
// shadow's width over the spacing. Edges of the shadow are 1e-6 m soft.
TEST(RowCycle, OpaqueHedgesInTheBeam) {
  const CropRows rows = rows_of(RowSection::box, 4.0, 2.0, 1.0);
  struct Case {
    double elevation_deg, from_row_deg, shaded;
  };
  for (const Case& c : {Case{90, 0, .25}, Case{45, 90, .75}, Case{45, 30, .5}, Case{30, 0, .25},
                        Case{60, 90, .53868}, Case{20, 90, 1.0}, Case{45, -90, .75}, Case{45, 210, .5}}) {
    const RowRay ray = row_ray(grid(0), grid(c.from_row_deg), std::tan(c.elevation_deg * kDegree));
    EXPECT_NEAR(cycle_passage(rows, ray, kOpaque, 0.0), 1.0 - c.shaded, 1e-5)
        << c.elevation_deg << " " << c.from_row_deg;
  }
}

// An opaque ellipse's shadow is 2 sqrt(a² + (c cot e)²) wide, a wedge's the larger of its base and what its
// edge throws beyond (textbook geometry).
TEST(RowCycle, OpaqueEllipsesAndWedgesInTheBeam) {
  for (const double elevation_deg : {25.0, 45.0, 80.0}) {
    const double cot = 1.0 / std::tan(elevation_deg * kDegree);
    const RowRay ray = row_ray(grid(0), grid(90), 1.0 / cot);
    const CropRows ellipse = rows_of(RowSection::ellipse, 8.0, 3.0, 1.2, 0.5);
    EXPECT_NEAR(cycle_passage(ellipse, ray, kOpaque, 0.0), 1.0 - 2.0 * std::hypot(0.6, 1.25 * cot) / 8.0,
                1e-4);
    const CropRows wedge = rows_of(RowSection::wedge, 8.0, 3.0, 1.2, 0.5);
    EXPECT_NEAR(cycle_passage(wedge, ray, kOpaque, 0.0), 1.0 - (0.6 + std::max(0.6, 2.5 * cot)) / 8.0, 1e-5);
  }
}

// Rows as wide as their spacing are a closed canopy of leaves; the whole sky's light through it is
// 2 E3(L/2) for spherical leaves and an even sky. Values from the exponential integral.
TEST(RowCycle, ClosedCanopyUnderAnEvenSky) {
  CropRows rows = rows_of(RowSection::box, 2.0, 1.0, 2.0);
  const double areas[] = {.25, .5, 1, 2, 3, 4, 6};
  const double passed[] = {.79755, .64937, .44321, .21938, .11348, .06027, .01786};
  for (int i = 0; i < 7; ++i) {
    rows.leaf_density = areas[i];
    rows.absorptance = 1.0;
    const RowLeaves leaves(rows, 1.0);
    double sum = 0.0;
    constexpr int kSteps = 4000;  // midpoint in the squared sine, by which level light counts
    for (int k = 0; k < kSteps; ++k) {
      const double sine = std::sqrt((k + 0.5) / kSteps);
      const RowRay ray = row_ray(grid(0), grid(17.0 * k), sine / std::sqrt(1.0 - sine * sine));
      sum += cycle_passage(rows, ray, leaves.depth(ray.sine), 0.0) / kSteps;
    }
    EXPECT_NEAR(sum, passed[i], 1e-5) << areas[i];
  }
}

// Any section, direction, height and reach against the plain mean over 20 000 places. The plain mean errs by
// at most one place at each jump (rays along the rows: 4 of 20 000), by far less elsewhere; the quadrature of
// ellipses by 1e-4, the others by rounding.
TEST(RowCycle, MeanOverManyPlaces) {
  std::mt19937 random(7);
  const auto between = [&](double low, double high) {
    return std::uniform_real_distribution<double>(low, high)(random);
  };
  constexpr int kPlaces = 20'000;
  for (int trial = 0; trial < 300; ++trial) {
    const double spacing = between(1.5, 5.0), base = trial % 4 ? between(0.0, 1.0) : 0.0;
    const CropRows rows = rows_of(kSections[trial % 3], spacing, base + between(0.5, 3.0),
                                  trial % 5 ? spacing * between(0.1, 1.0) : spacing, base);
    const double light_deg = trial % 7 ? between(0.0, 360.0) : 180.0;
    const RowRay ray = row_ray(grid(0), grid(light_deg), std::tan(between(3.0, 90.0) * kDegree));
    const double depth = std::exp(between(std::log(0.05), std::log(20.0)));
    const double height = trial % 3 ? 0.0 : between(0.0, rows.height_m);
    const RowReach reach = trial % 2 ? RowReach{} : RowReach{between(0.0, 2.0), between(2.0, 8.0)};
    double sum = 0.0;
    for (int i = 0; i < kPlaces; ++i) {
      const double across = spacing * (i + 0.5) / kPlaces;
      sum += std::exp(-depth * row_path(rows, ray, across, height, reach)) / kPlaces;
    }
    EXPECT_NEAR(cycle_passage(rows, ray, depth, height, reach), sum, light_deg == 180.0 ? 2.5e-4 : 1e-4)
        << trial;
  }
}

// The mean over the cycle of what passes explicit rows, walked ray by ray.
TEST(RowCycle, MeanOfRaysWalkedThroughExplicitRows) {
  std::mt19937 random(11);
  const auto between = [&](double low, double high) {
    return std::uniform_real_distribution<double>(low, high)(random);
  };
  for (const RowSection section : kSections) {
    for (const double light_deg : {90.0, 40.0, 12.0}) {
      for (const double elevation_deg : {20.0, 50.0}) {
        testing::ExplicitRows rows{rows_of(section, 3.0, 2.6, 1.3, 0.5)};
        for (int k = -8; k <= 8; ++k) rows.middles.push_back(3.0 * k);
        const double tangent = std::tan(elevation_deg * kDegree), depth = 0.8;
        double sum = 0.0;
        constexpr int kRays = 1000;  // one in each stretch of 3 mm
        for (int i = 0; i < kRays; ++i) {
          const double across = 3.0 * (i + between(0.0, 1.0)) / kRays;
          sum += std::exp(-depth * rows.walk(across, 0.0, 0.0, light_deg * kDegree, tangent, 2e-3)) / kRays;
        }
        const RowRay ray = row_ray(grid(0), grid(light_deg), tangent);
        EXPECT_NEAR(cycle_passage(rows.rows, ray, depth, 0.0) / sum, 1.0, 0.005);
      }
    }
  }
}

// Thin leaves: all passes but depth × leaf area; denser leaves pass less, and opaque ones no more than their
// shadow leaves.
TEST(RowCycle, DenserPassesLess) {
  for (const RowSection section : kSections) {
    CropRows rows = rows_of(section, 3.0, 2.6, 1.3, 0.5);
    rows.leaf_density = 1.0;
    for (const double light_deg : {0.0, 25.0, 90.0}) {
      for (const double elevation_deg : {10.0, 35.0, 90.0}) {
        const RowRay ray = row_ray(grid(0), grid(light_deg), std::tan(elevation_deg * kDegree));
        const double thin = 1e-6;
        EXPECT_NEAR((1.0 - cycle_passage(rows, ray, thin, 0.0)) / (thin * leaf_area_index(rows) / ray.sine),
                    1.0, 2e-4);
        EXPECT_EQ(cycle_passage(rows, ray, 0.0, 0.0), 1.0);
        double before = 1.0;
        for (double depth = 0.01; depth < 1e4; depth *= 1.7) {
          const double now = cycle_passage(rows, ray, depth, 0.0);
          EXPECT_LE(now, before + 1e-12);
          before = now;
        }
      }
    }
  }
}

}  // namespace
}  // namespace sunfall
