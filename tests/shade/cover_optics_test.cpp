// Covers as a whole: against angle, for even light, measured, with dirt on them.

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "shade/cover_curve.h"
#include "shade/cover_stack.h"
#include "shade/traced_cover.h"
#include "sunfall/covers.h"
#include "sunfall/error.h"

namespace sunfall::testing {
namespace {

Cover sheets_of(int count, double index, double absorption_per_m, double thickness_mm) {
  CoverSheet sheet;
  sheet.index = index;
  sheet.absorption_per_m = absorption_per_m;
  sheet.thickness_m = thickness_mm / 1000.0;
  return {"test", CoverSheets(count, sheet), ""};
}

// Midpoint rule in sin², with every reflection traced.
double even_by_hand(const CoverSheets& sheets) {
  constexpr int kSteps = 4000;
  double sum = 0.0;
  for (int i = 0; i < kSteps; ++i) {
    sum += traced(sheets, std::asin(std::sqrt((i + 0.5) / kSteps)) / kDegree).through / kSteps;
  }
  return sum;
}

TEST(CoverOptics, EvenLightAgainstAnotherRule) {
  for (const Cover& cover : {sheets_of(1, 1.526, 10, 4), sheets_of(2, 1.515, 165, .2),
                             sheets_of(3, 1.526, 0, 4), sheets_of(1, 1.0, 0, 4)}) {
    const double by_hand = even_by_hand(std::get<CoverSheets>(cover.made_of));
    // The midpoint rule's own error at its steep end is below 1e-5.
    EXPECT_NEAR(CoverOptics(cover).hemispherical().total(), by_hand, 2e-5);
  }
}

// 360 steps in the angle against 128 in the cosine, which is held against 400 000 elsewhere.
TEST(CoverOptics, EvenLightIsConverged) {
  for (const double index : {1.1, 1.526, 2.0}) {
    const Cover cover = sheets_of(1, index, 10, 4);
    EXPECT_NEAR(CoverOptics(cover).hemispherical().total(),
                CoverStack(std::get<CoverSheets>(cover.made_of)).scattered_light().scattered, 1e-6);
  }
}

// Worked out apart from this program; four digits.
TEST(CoverOptics, EvenLightOfSeveralSheets) {
  EXPECT_NEAR(CoverOptics(sheets_of(1, 1.526, 0, 4)).hemispherical().total(), .8451, 1e-4);
  EXPECT_NEAR(CoverOptics(sheets_of(2, 1.526, 4, 4)).hemispherical().total(), .7343, 1e-4);
  EXPECT_NEAR(CoverOptics(sheets_of(2, 1.515, 165, .2)).hemispherical().total(), .7087, 1e-4);
  EXPECT_NEAR(CoverOptics(sheets_of(2, 1.586, 20, .7)).hemispherical().total(), .7200, 1e-4);
  EXPECT_NEAR(CoverOptics(sheets_of(3, 1.526, 0, 4)).hemispherical().total(), .7039, 1e-4);
}

TEST(CoverOptics, EndsAtGrazingAndBeyond) {
  const CoverOptics glass(sheets_of(1, 1.526, 10, 4));
  EXPECT_NEAR(glass.perpendicular().total(), .8808, 1e-4);
  EXPECT_EQ(glass.at(Angle::degrees(90)).total(), 0.0);
  EXPECT_EQ(glass.at(Angle::degrees(120)).total(), 0.0);
  EXPECT_EQ(glass.at(Angle::degrees(-60)).total(), glass.at(Angle::degrees(60)).total());
  EXPECT_EQ(glass.at(Angle::radians(std::numeric_limits<double>::quiet_NaN())).total(), 0.0);
}

TEST(CoverOptics, FactorsMultiply) {
  const Cover glass = sheets_of(1, 1.526, 10, 4);
  const CoverOptics clean(glass);
  const CoverOptics dirty(glass, {{"dirt", 0.95, ""}, {"condensation", 0.97, ""}});
  EXPECT_NEAR(dirty.at(Angle::degrees(30)).total(), clean.at(Angle::degrees(30)).total() * 0.95 * 0.97,
              1e-15);
  EXPECT_NEAR(dirty.hemispherical().total(), clean.hemispherical().total() * 0.95 * 0.97, 1e-14);
  for (const double value : {0.0, -0.1, 1.01, 95.0}) {
    EXPECT_THROW(CoverOptics(glass, {{"dirt", value, ""}}), Error) << value;
  }
}

// A Lambert-like cover, T = cos: of even light 2/3 passes. 15-degree readings hold it to 0.3 %.
TEST(CoverOptics, MeasuredCosine) {
  CoverReadings readings;
  for (int angle_deg = 0; angle_deg <= 75; angle_deg += 15) {
    readings.push_back({static_cast<double>(angle_deg), 0.25 * std::cos(angle_deg * kDegree),
                        0.75 * std::cos(angle_deg * kDegree)});
  }
  const CoverOptics optics(Cover{"cosine", readings, ""});
  EXPECT_NEAR(optics.hemispherical().total(), 2.0 / 3.0, 0.003 * 2 / 3);
  EXPECT_NEAR(optics.hemispherical().regular, 0.25 * optics.hemispherical().total(), 1e-12);
}

// Glass measured every 10 degrees gives what the glass gives.
TEST(CoverOptics, MeasuredGlassIsGlass) {
  const CoverOptics glass(sheets_of(1, 1.526, 10, 4));
  CoverReadings readings;
  for (int angle_deg = 0; angle_deg <= 80; angle_deg += 10) {
    readings.push_back({static_cast<double>(angle_deg), glass.at(Angle::degrees(angle_deg)).regular, 0.0});
  }
  const CoverOptics measured(Cover{"measured", readings, ""});
  EXPECT_NEAR(measured.hemispherical().total(), glass.hemispherical().total(), 0.003 * .8066);
  for (int angle_deg = 0; angle_deg <= 75; ++angle_deg) {
    EXPECT_NEAR(measured.at(Angle::degrees(angle_deg)).total(), glass.at(Angle::degrees(angle_deg)).total(),
                0.01)
        << angle_deg;
  }
}

TEST(CoverCurve, StaysBetweenItsReadings) {
  const CoverReadings readings = {{0, .5, .4},  {20, .5, .4}, {21, .1, .79},
                                  {60, .1, .5}, {61, 0, .02}, {85, .01, 0}};
  const CoverCurve curve(readings);
  for (std::size_t i = 0; i + 1 < readings.size(); ++i) {
    const double a = readings[i].regular + readings[i].scattered;
    const double b = readings[i + 1].regular + readings[i + 1].scattered;
    EXPECT_NEAR(curve.at(readings[i].angle_deg).regular, readings[i].regular, 1e-15);
    double last = a;
    for (int k = 1; k <= 50; ++k) {
      const CoverPassage at =
          curve.at(readings[i].angle_deg + (readings[i + 1].angle_deg - readings[i].angle_deg) * k / 50.0);
      EXPECT_GE(at.regular, 0.0);
      EXPECT_GE(at.scattered, 0.0);
      EXPECT_GE((at.total() - last) * (b - a), -1e-15) << i << " " << k;  // the way the readings go
      last = at.total();
    }
  }
  EXPECT_EQ(curve.at(90).total(), 0.0);
  EXPECT_LT(curve.at(89.9).total(), 0.01);
}

struct Refused {
  Cover cover;
  const char* key;
  const char* what;
};

TEST(Covers, RefusesTheImpossible) {
  const auto sheets = [](auto change) {
    CoverSheet sheet;
    change(sheet);
    return Cover{"c", CoverSheets{CoverSheet{}, sheet}, ""};
  };
  const auto readings = [](CoverReadings list) { return Cover{"c", std::move(list), ""}; };
  const Refused cases[] = {
      {sheets([](CoverSheet& s) { s.index = 0.9; }), "index", "must be at least 1 and at most 3"},
      {sheets([](CoverSheet& s) { s.index = std::numeric_limits<double>::quiet_NaN(); }), "index",
       "must be at least 1 and at most 3"},
      {sheets([](CoverSheet& s) { s.thickness_m = 0; }), "thickness_mm", "must be above 0 and at most 100"},
      {sheets([](CoverSheet& s) { s.absorption_per_m = -1; }), "absorption",
       "must be at least 0 and at most 1e+06"},
      {sheets([](CoverSheet& s) { s.haze = 70; }), "haze", "must be at least 0 and at most 1"},
      {sheets([](CoverSheet& s) { s.opaque = 1; }), "opaque", "must be at least 0 and below 1"},
      {sheets([](CoverSheet& s) {
         s.outer_coating = CoverCoating{0.5, 550};
       }),
       "coating_index", "must be at least 1 and at most 3"},
      {sheets([](CoverSheet& s) {
         s.inner_coating = CoverCoating{1.3, 5};
       }),
       "coating_nm", "must be at least 100 and at most 2000"},
      {Cover{"c", CoverSheets{}, ""}, "sheets", "a cover has 1 to 8 sheets"},
      {Cover{"c", CoverSheets(9), ""}, "sheets", "a cover has 1 to 8 sheets"},
      {readings({}), "angle", "the first angle must be 0, the perpendicular"},
      {readings({{10, .9, 0}, {40, .8, 0}, {70, .6, 0}}), "angle",
       "the first angle must be 0, the perpendicular"},
      {readings({{0, .9, 0}, {70, .8, 0}, {40, .6, 0}}), "angle", "the angles must rise"},
      {readings({{0, .9, 0}, {0, .8, 0}, {60, .6, 0}}), "angle", "the angles must rise"},
      {readings({{0, .9, 0}, {60, .8, 0}}), "angle", "needs three angles or more, up to 60 degrees at least"},
      {readings({{0, .9, 0}, {20, .8, 0}, {50, .8, 0}}), "angle",
       "needs three angles or more, up to 60 degrees at least"},
      {readings({{0, 90, 0}, {20, 89, 0}, {60, 80, 0}}), "regular", "must be at least 0 and at most 1"},
      {readings({{0, .9, -.1}, {20, .8, 0}, {60, .8, 0}}), "scattered", "must be at least 0 and at most 1"},
      {readings({{0, .9, .2}, {20, .8, 0}, {60, .8, 0}}), "scattered",
       "more light passes than falls on the cover"},
      {readings({{0, .9, 0}, {20, .8, 0}, {91, .8, 0}}), "angle", "must be at least 0 and at most 90"},
      {readings({{0, .9, 0}, {20, .8, 0}, {90, .1, 0}}), "angle",
       "light passes at 90 degrees, along the cover"},
  };
  for (const Refused& refused : cases) {
    const auto fault = fault_of(refused.cover);
    ASSERT_TRUE(fault) << refused.what;
    EXPECT_EQ(fault->key, refused.key);
    EXPECT_EQ(fault->what, refused.what);
    EXPECT_THROW(CoverOptics{refused.cover}, Error);
  }
  EXPECT_FALSE(fault_of(sheets([](CoverSheet&) {})));
  EXPECT_FALSE(fault_of(readings({{0, .9, 0}, {20, .8, 0}, {90, 0, 0}})));
}

}  // namespace
}  // namespace sunfall::testing
