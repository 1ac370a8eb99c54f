// Layers against one another: seasons, the year, the darkest month, shares.

#include <gtest/gtest.h>

#include <fmt/format.h>

#include <algorithm>
#include <array>

#include "map/loss_table.h"
#include "map/map_run.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {
namespace {

using std::chrono::day, std::chrono::month;

constexpr std::array<double, 12> kDays{31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};  // 2025

// Rough ground with a winter that runs over New Year.
class RoughYear : public ::testing::Test {
 protected:
  static constexpr std::size_t kWinter = 12;
  static void SetUpTestSuite() {
    SceneOptions options;
    options.columns = 120;
    options.rows = 90;
    options.receiver_height_m = 0.5;
    options = centred(options, 25831, 4.0, 52.0);
    scene_ =
        std::make_unique<Scene>([](double e, double n) { return rough_height(e, n); }, std::nullopt, options);
    Plan plan = clear_plan(*scene_, options);
    plan.periods.push_back({"winter", month{12} / day{1}, month{2} / day{28}});
    plan.output.shares = true;
    light_ = std::make_unique<PlanLight>(light_of_plan(plan));
    run_ = std::make_unique<MapRun>(plan, *light_);
    for (std::size_t m = 0; m < 12; ++m) months_.push_back(run_->dli(light_->dome.periods[m].name));
  }
  static void TearDownTestSuite() {
    run_.reset();
    light_.reset();
    scene_.reset();
    months_.clear();
  }
  static std::size_t cells() { return months_.front().values().size(); }
  static double month_dli(std::size_t m, std::size_t cell) { return months_[m].values()[cell]; }

  static inline std::unique_ptr<Scene> scene_;
  static inline std::unique_ptr<PlanLight> light_;
  static inline std::unique_ptr<MapRun> run_;
  static inline std::vector<Grid<float>> months_;
};

// A share's table entries are rounded to half a unit of the column for every look; the light of
// a period may err by so much.
double table_rounding(const DomeLight& light, std::size_t period) {
  const std::vector<Look> looks = looks_of(light);
  const LossTable table(light, looks);
  const double half_units = 0.5 * static_cast<double>(looks.size());
  return half_units * (table.units()[period] * light.beam.open[period] +
                       table.units()[light.periods.size() + period] * light.sky.open[period]);
}

TEST_F(RoughYear, SeasonOverNewYearIsTheMeanOfItsMonths) {
  const double days = kDays[11] + kDays[0] + kDays[1];
  const Grid<float> winter = run_->dli("winter");
  double bound =
      2.0 * kDliRounding + table_rounding(light_->dome, kWinter) + kFloatRounding * run_->open_dli(kWinter);
  for (const std::size_t m : {11U, 0U, 1U}) bound += kDays[m] / days * table_rounding(light_->dome, m);
  EXPECT_LT(bound, 0.01 * run_->open_dli(kWinter));  // else the test would say little
  for (std::size_t cell = 0; cell < cells(); ++cell) {
    const double mean =
        (kDays[11] * month_dli(11, cell) + kDays[0] * month_dli(0, cell) + kDays[1] * month_dli(1, cell)) /
        days;
    ASSERT_NEAR(winter.values()[cell], mean, bound) << cell;
  }
}

TEST_F(RoughYear, YearIsTheMeanOfItsDays) {
  const Grid<float> year = run_->dli("year");
  double open = 0.0;
  for (std::size_t m = 0; m < 12; ++m) open += kDays[m] / 365.0 * run_->open_dli(m);
  EXPECT_NEAR(run_->result().open.year, open, 1e-9 * open);
  for (std::size_t cell = 0; cell < cells(); ++cell) {
    double mean = 0.0;
    for (std::size_t m = 0; m < 12; ++m) mean += kDays[m] / 365.0 * month_dli(m, cell);
    ASSERT_NEAR(year.values()[cell], mean, 2.0 * kDliRounding + kFloatRounding * open) << cell;
  }
}

// Rounding keeps order, so the least of the rounded months is the rounded least. Where two months
// round alike either may be the darkest.
TEST_F(RoughYear, DarkestMonthIsTheLeastOfTwelve) {
  const Grid<float> lowest = run_->layer("dli-lowest.tif"), number = run_->layer("dli-lowest-month.tif");
  for (std::size_t cell = 0; cell < cells(); ++cell) {
    double least = month_dli(0, cell);
    for (std::size_t m = 1; m < 12; ++m) least = std::min(least, month_dli(m, cell));
    ASSERT_EQ(lowest.values()[cell], least) << cell;
    const auto darkest = static_cast<std::size_t>(number.values()[cell]);
    ASSERT_EQ(month_dli(darkest - 1, cell), least) << cell;
  }
}

TEST_F(RoughYear, SharesTimesTheOpenFieldAreTheLight) {
  const OpenField& open = run_->result().open;
  for (std::size_t p = 0; p < open.beam.size(); ++p) {
    const std::string name = light_->dome.periods[p].name;
    const Grid<float> beam = run_->layer("share-beam-" + name + ".tif"),
                      sky = run_->layer("share-sky-" + name + ".tif"), dli = run_->dli(name);
    const double bound = (kShareRounding + kFloatRounding) * (open.beam[p] + open.sky[p]) + kDliRounding;
    double least_beam = 1.0;
    for (std::size_t cell = 0; cell < cells(); ++cell) {
      ASSERT_NEAR(dli.values()[cell], open.beam[p] * beam.values()[cell] + open.sky[p] * sky.values()[cell],
                  bound)
          << name << " cell " << cell;
      least_beam = std::min<double>(least_beam, beam.values()[cell]);
    }
    EXPECT_LT(least_beam, 0.8) << name;  // the ground does cast shade
  }
}

// No reflection, a level plane: nothing can be gained.
TEST_F(RoughYear, NoCellGetsMoreThanTheOpenField) {
  const TileShares shares = whole_shares(*scene_, light_->dome);
  for (const float share : shares.shares) {
    ASSERT_LE(share, 1.0F);
    ASSERT_GE(share, 0.0F);
  }
  for (std::size_t m = 0; m < 12; ++m) {
    for (const float dli : months_[m].values()) ASSERT_LE(dli, run_->open_dli(m) + kDliRounding);
  }
}

}  // namespace
}  // namespace sunfall::testing
