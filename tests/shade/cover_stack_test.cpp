// Sheets of covers against printed examples, tables, brute force and the laws that hold for all of them.

#include "shade/cover_stack.h"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <numbers>
#include <random>

#include "shade/cover_surface.h"
#include "shade/traced_cover.h"

namespace sunfall::testing {
namespace {

double cosine(double angle_deg) { return std::cos(angle_deg * kDegree); }

CoverSheet sheet_of(double index, double absorption_per_m = 0.0, double thickness_mm = 4.0) {
  CoverSheet sheet;
  sheet.index = index;
  sheet.absorption_per_m = absorption_per_m;
  sheet.thickness_m = thickness_mm / 1000.0;
  return sheet;
}

double through(const CoverSheets& sheets, double angle_deg) {
  return CoverStack(sheets).at(cosine(angle_deg)).regular;
}

double sum(const StackLight& light) {
  return light.regular + light.scattered + light.reflected + light.absorbed;
}

// Any sheets with coatings, haze, opaque parts and absorption.
CoverSheets some_sheets(std::mt19937& random, bool clear) {
  const auto between = [&](double a, double b) { return std::uniform_real_distribution<>(a, b)(random); };
  CoverSheets sheets(1 + random() % 4);
  for (CoverSheet& sheet : sheets) {
    sheet = sheet_of(between(1.0, 2.0), between(0.0, 60.0), between(0.05, 10.0));
    sheet.opaque = random() % 3 == 0 ? between(0.0, 0.5) : 0.0;
    if (!clear && random() % 2 == 0) sheet.haze = between(0.0, 1.0);
    if (random() % 3 == 0) sheet.outer_coating = CoverCoating{between(1.1, 1.5), between(400, 700)};
    if (random() % 3 == 0) sheet.inner_coating = CoverCoating{between(1.1, 1.5), between(400, 700)};
  }
  return sheets;
}

// Duffie and Beckman, examples 5.1.1, 5.1.2, 5.3.1 and 5.3.2, as remembered from the printed book.
TEST(CoverStack, PrintedExamples) {
  const Surface perpendicular = surface_at(1.526, {}, 1.0, 550);
  EXPECT_NEAR(perpendicular.s.reflected, .0434, 0.5e-4);
  const Surface at60 = surface_at(1.526, {}, cosine(60), 550);
  EXPECT_NEAR((at60.s.reflected + at60.p.reflected) / 2, .093, 0.5e-3);
  const CoverSheet clear = sheet_of(1.526);
  EXPECT_NEAR(through({clear, clear}, 0), .85, 0.5e-2);
  EXPECT_NEAR(through({clear, clear}, 60), .76, 0.5e-2);
  const StackLight one = CoverStack({sheet_of(1.526, 32, 2.3)}).at(cosine(60));
  EXPECT_NEAR(one.regular, .768, 0.5e-3);
  EXPECT_NEAR(one.reflected, .147, 0.5e-3);
  EXPECT_NEAR(one.absorbed, .085, 0.5e-3);
  const CoverSheet tinted = sheet_of(1.526, 37.0, 1.0);
  EXPECT_NEAR(through({tinted, tinted}, 60), .69, 0.5e-2);
}

// The same formulas worked out apart from this program.
TEST(CoverStack, SurfacesOfGlass) {
  const Surface perpendicular = surface_at(1.526, {}, 1.0, 550);
  EXPECT_NEAR(perpendicular.p.reflected, .043362, 1e-6);
  const Surface at60 = surface_at(1.526, {}, cosine(60), 550);
  EXPECT_NEAR(at60.s.reflected, .185478, 1e-6);
  EXPECT_NEAR(at60.p.reflected, .001448, 1e-6);
  EXPECT_NEAR(std::acos(cosine_within(1.526, cosine(60))) / kDegree, 34.5770, 1e-4);
  const double brewster_deg = std::atan(1.526) / kDegree;
  EXPECT_NEAR(surface_at(1.526, {}, cosine(brewster_deg), 550).p.reflected, 0.0, 1e-15);
}

struct TableRow {
  const char* name;
  CoverSheet sheet;
  int count;
  std::array<double, 9> at;
  double even;
  double even_reflected;  // 0: not in the table
};

// Computed apart from this program by the slab formulas of Duffie and Beckman and quadrature; four digits.
const std::array<double, 9> kAngles_deg = {0, 15, 30, 45, 60, 70, 75, 80, 85};
const std::vector<TableRow>& table() {
  static const std::vector<TableRow> rows = {
      {"clear",
       sheet_of(1.526),
       1,
       {.9169, .9168, .9145, .9011, .8421, .7236, .6139, .4554, .2453},
       .8451,
       .1549},
      {"low-iron",
       sheet_of(1.526, 4, 4),
       1,
       {.9023, .9019, .8991, .8848, .8254, .7079, .5995, .4427, .2345},
       .8295,
       .1525},
      {"float",
       sheet_of(1.526, 10, 4),
       1,
       {.8808, .8802, .8764, .8610, .8011, .6851, .5787, .4248, .2200},
       .8066,
       .1492},
      {"K 16",
       sheet_of(1.526, 16, 3.2),
       1,
       {.8710, .8702, .8661, .8501, .7900, .6748, .5693, .4168, .2138},
       .7962,
       .1477},
      {"K 32",
       sheet_of(1.526, 32, 4),
       1,
       {.8064, .8047, .7982, .7790, .7181, .6085, .5097, .3674, .1788},
       .7286,
       .1386},
      {"PE",
       sheet_of(1.515, 165, .2),
       1,
       {.8896, .8890, .8855, .8704, .8105, .6936, .5862, .4310, .2246},
       .8155,
       .1477},
      {"PMMA",
       sheet_of(1.49, 6, 4),
       1,
       {.9034, .9030, .8998, .8851, .8252, .7070, .5981, .4407, .2315},
       .8296,
       .1434},
      {"PC",
       sheet_of(1.586, 20, 4),
       1,
       {.8326, .8316, .8268, .8101, .7511, .6406, .5395, .3931, .1978},
       .7585,
       .1567},
      {"ETFE",
       sheet_of(1.40, 50, .1),
       1,
       {.9412, .9410, .9388, .9258, .8678, .7477, .6351, .4712, .2527},
       .8691,
       .1251},
      {"2 low-iron",
       sheet_of(1.526, 4, 4),
       2,
       {.8196, .8191, .8156, .7996, .7283, .5780, .4485, .2898, .1272},
       .7343,
       .2301},
      {"2 PE",
       sheet_of(1.515, 165, .2),
       2,
       {.7962, .7953, .7906, .7726, .6998, .5520, .4258, .2713, .1135},
       .7087,
       .2196},
      {"2 PC",
       sheet_of(1.586, 20, .7),
       2,
       {.7990, .7986, .7958, .7823, .7184, .5748, .4476, .2900, .1280},
       .7200,
       .2492},
      {"3 clear",
       sheet_of(1.526),
       3,
       {.7862, .7861, .7848, .7749, .7070, .5326, .3898, .2361, .1012},
       .7039,
       .2961},
  };
  return rows;
}

TEST(CoverStack, TableOfAngles) {
  for (const TableRow& row : table()) {
    const CoverStack stack(CoverSheets(row.count, row.sheet));
    for (std::size_t i = 0; i < kAngles_deg.size(); ++i) {
      EXPECT_NEAR(stack.at(cosine(kAngles_deg[i])).regular, row.at[i], 1e-4) << row.name << kAngles_deg[i];
    }
  }
}

// One sheet, in the quadrature for scattered light; several are not that sum, since the light between them
// is taken as even again.
TEST(CoverStack, TableOfEvenLight) {
  for (const TableRow& row : table()) {
    if (row.count > 1) continue;
    const StackLight light = CoverStack({row.sheet}).scattered_light();
    EXPECT_NEAR(light.scattered, row.even, 1e-4) << row.name;
    EXPECT_NEAR(light.reflected, row.even_reflected, 1e-4) << row.name;
    EXPECT_NEAR(sum(light), 1.0, 1e-12) << row.name;  // Simpson's rule is exact for the weight itself
  }
}

// Reflectance of a surface for even light from outside, in closed form (Walsh 1926, as in Duntley 1942; from
// memory, and the same to 1e-9 as a million midpoints), seen on sheets that let nothing through.
TEST(CoverStack, SurfaceInEvenLight) {
  for (const double n : {1.526, 1.5, 4.0 / 3.0}) {
    const double nn = n * n;
    const double walsh = 0.5 + (n - 1) * (3 * n + 1) / (6 * (n + 1) * (n + 1)) +
                         nn * std::pow(nn - 1, 2) / std::pow(nn + 1, 3) * std::log((n - 1) / (n + 1)) -
                         2 * n * nn * (nn + 2 * n - 1) / ((nn + 1) * (nn * nn - 1)) +
                         8 * nn * nn * (nn * nn + 1) / ((nn + 1) * std::pow(nn * nn - 1, 2)) * std::log(n);
    EXPECT_NEAR(CoverStack({sheet_of(n, 1e6, 100)}).scattered_light().reflected, walsh, 1e-6) << n;
  }
}

// Against 400 000 midpoints.
TEST(CoverStack, EvenLightIsConverged) {
  for (const double index : {1.1, 1.526, 2.0}) {
    constexpr int kSteps = 400'000;
    double mean = 0.0;
    for (int i = 0; i < kSteps; ++i) {
      const double mu = (i + 0.5) / kSteps;
      for (const double r : fresnel(index, std::acos(mu) / kDegree)) mean += mu * (1 - r) / (1 + r) / kSteps;
    }
    EXPECT_NEAR(CoverStack({sheet_of(index)}).scattered_light().scattered, mean, 1e-6) << index;
  }
}

// (1 - r)/(1 + (2N - 1) r) for N clear sheets, averaged over polarisations (Duffie and Beckman, eq. 5.1.8).
TEST(CoverStack, ManyClearSheets) {
  for (const double angle_deg : {0.0, 35.0, 60.0, 80.0, 89.0}) {
    const auto r = fresnel(1.526, angle_deg);
    for (int count = 1; count <= 8; ++count) {
      double mean = 0.0;
      for (const double of : r) mean += (1.0 - of) / (1.0 + (2.0 * count - 1.0) * of) / 2.0;
      EXPECT_NEAR(through(CoverSheets(count, sheet_of(1.526)), angle_deg), mean, 1e-12) << angle_deg;
    }
  }
}

TEST(CoverStack, AgreesWithEveryReflectionTraced) {
  std::mt19937 random(20);
  for (int run = 0; run < 200; ++run) {
    CoverSheets sheets = some_sheets(random, true);
    for (CoverSheet& sheet : sheets) {
      sheet.opaque = 0.0;
      sheet.outer_coating = sheet.inner_coating = std::nullopt;
    }
    const double angle_deg = std::uniform_real_distribution<>(0.01, 85.0)(random);
    const TracedLight by_hand = traced(sheets, angle_deg);
    const StackLight light = CoverStack(sheets).at(cosine(angle_deg));
    EXPECT_NEAR(light.regular, by_hand.through, 1e-11) << run << " at " << angle_deg;
    EXPECT_NEAR(light.reflected, by_hand.reflected, 1e-11) << run << " at " << angle_deg;
    EXPECT_NEAR(light.absorbed, by_hand.absorbed, 1e-11) << run << " at " << angle_deg;
  }
}

// Absorption is followed on its own and is not what the others leave.
TEST(CoverStack, LightIsNeitherLostNorMade) {
  std::mt19937 random(21);
  for (int run = 0; run < 300; ++run) {
    CoverSheets sheets = some_sheets(random, true);
    const double angle_deg = std::uniform_real_distribution<>(0.0, 89.99)(random);
    for (const CoverSide side : {CoverSide::outer, CoverSide::inner}) {
      EXPECT_NEAR(sum(CoverStack(sheets).at(cosine(angle_deg), side)), 1.0, 1e-12) << run;
    }
    // What scatters goes through the hemisphere's sum, which holds 1 as well.
    for (CoverSheet& sheet : sheets) sheet.haze = 0.4;
    EXPECT_NEAR(sum(CoverStack(sheets).at(cosine(angle_deg))), 1.0, 1e-12) << run;
  }
}

TEST(CoverStack, PassesAlikeFromBothSides) {
  std::mt19937 random(22);
  for (int run = 0; run < 300; ++run) {
    const CoverStack stack(some_sheets(random, true));
    const double mu = std::uniform_real_distribution<>(0.001, 1.0)(random);
    EXPECT_NEAR(stack.at(mu, CoverSide::outer).regular, stack.at(mu, CoverSide::inner).regular, 1e-12) << run;
  }
}

TEST(CoverStack, Limits) {
  for (const double angle_deg : {0.0, 30.0, 80.0, 89.9}) {
    EXPECT_NEAR(through({sheet_of(1.0)}, angle_deg), 1.0, 1e-14);  // air
    EXPECT_EQ(through({sheet_of(1.5, 1e6, 100)}, angle_deg), 0.0);
    EXPECT_NEAR(CoverStack({sheet_of(1.5, 1e6, 100)}).at(cosine(angle_deg)).reflected,
                (fresnel(1.5, angle_deg)[0] + fresnel(1.5, angle_deg)[1]) / 2, 1e-12);
  }
  EXPECT_LT(through({sheet_of(1.526)}, 89.999), 1e-4);
  EXPECT_GT(through({sheet_of(1.526)}, 89.999), 0.0);
  EXPECT_EQ(CoverStack({sheet_of(1.526)}).at(0.0).regular, 0.0);
  EXPECT_EQ(CoverStack({sheet_of(1.526)}).at(0.0).reflected, 1.0);
}

TEST(CoverStack, ThickerPassesLess) {
  for (const double angle_deg : {0.0, 45.0, 75.0}) {
    double last = 1.0;
    for (double thickness_mm = 0.1; thickness_mm < 50; thickness_mm *= 1.3) {
      const double now = through({sheet_of(1.526, 10, thickness_mm), sheet_of(1.4, 5, 1)}, angle_deg);
      EXPECT_LT(now, last) << thickness_mm;
      last = now;
    }
  }
}

// No plane uncoated sheet of glass passes more than 0.8451 of even light, however clear.
TEST(CoverStack, CeilingOfUncoatedGlass) {
  std::mt19937 random(23);
  for (int run = 0; run < 50; ++run) {
    const double absorption = std::uniform_real_distribution<>(0.0, 40.0)(random);
    EXPECT_LE(CoverStack({sheet_of(1.526, absorption, 0.001 + run * 0.2)}).scattered_light().scattered,
              .84515);
  }
}

// A quarter wave of index c on glass n reflects ((n - c²)/(n + c²))² at its own wavelength: 0.01217 for
// magnesium fluoride, nothing for c = √n (Hecht, Optics, ch. 9; from memory), and half a wave changes
// nothing.
TEST(CoverStack, QuarterWaveCoating) {
  EXPECT_NEAR(surface_at(1.526, CoverCoating{1.38, 550}, 1.0, 550).s.reflected, .01217, 0.5e-5);
  EXPECT_NEAR(surface_at(1.526, CoverCoating{std::sqrt(1.526), 550}, 1.0, 550).p.reflected, 0.0, 1e-15);
  EXPECT_NEAR(surface_at(1.526, CoverCoating{1.38, 1100}, 1.0, 550).s.reflected, .043362, 1e-6);
  EXPECT_NEAR(surface_at(1.526, CoverCoating{1.0, 550}, cosine(50), 550).s.reflected,
              surface_at(1.526, {}, cosine(50), 550).s.reflected, 1e-14);
}

// Thirteen wavelengths against a thousand.
TEST(CoverStack, CoatingOverAllWavelengths) {
  CoverSheet sheet = sheet_of(1.526, 4, 4);
  sheet.outer_coating = sheet.inner_coating = CoverCoating{1.28, 550};
  for (const double angle_deg : {0.0, 60.0, 80.0}) {
    double mean = 0.0;
    constexpr int kSteps = 1000;
    const double passed = std::exp(-0.016 / cosine_within(1.526, cosine(angle_deg)));
    for (int i = 0; i < kSteps; ++i) {
      const Surface face =
          surface_at(1.526, sheet.outer_coating, cosine(angle_deg), 400 + (i + 0.5) * 300 / kSteps);
      for (const SurfaceLight& of : {face.s, face.p}) {
        const double inner = of.reflected * passed;
        mean += of.through * of.through * passed / (1 - inner * inner) / 2 / kSteps;
      }
    }
    EXPECT_NEAR(through({sheet}, angle_deg), mean, 2e-6) << angle_deg;
  }
  EXPECT_GT(CoverStack({sheet}).scattered_light().scattered, .8451);  // what only a coating can do
}

// Of a sheet's light the hazy share is scattered; whole, it goes on as even light, and R and T of even light
// add up between the sheets.
TEST(CoverStack, ScatteredLightGoesOnAsEven) {
  CoverSheet hazy = sheet_of(1.526, 10, 4);
  hazy.haze = 0.3;
  const CoverSheet clear = sheet_of(1.49, 6, 4);
  const double total = through({sheet_of(1.526, 10, 4)}, 50);
  const StackLight alone = CoverStack({hazy}).at(cosine(50));
  EXPECT_NEAR(alone.regular, 0.7 * total, 1e-14);
  EXPECT_NEAR(alone.scattered, 0.3 * total, 1e-14);

  hazy.haze = 1.0;
  const StackLight even_hazy = CoverStack({hazy}).scattered_light();
  const StackLight even_clear = CoverStack({clear}).scattered_light();
  const StackLight both = CoverStack({hazy, clear}).at(cosine(50));
  EXPECT_EQ(both.regular, 0.0);
  EXPECT_NEAR(both.scattered, total * even_clear.scattered / (1 - even_hazy.reflected * even_clear.reflected),
              1e-12);
}

TEST(CoverStack, OpaquePartTakesItsShare) {
  CoverSheet sheet = sheet_of(1.526, 10, 4);
  const StackLight open = CoverStack({sheet}).at(cosine(40));
  sheet.opaque = 0.25;
  const StackLight light = CoverStack({sheet}).at(cosine(40));
  EXPECT_NEAR(light.regular, 0.75 * open.regular, 1e-14);
  EXPECT_NEAR(light.absorbed, 0.75 * open.absorbed + 0.25, 1e-14);
}

}  // namespace
}  // namespace sunfall::testing
