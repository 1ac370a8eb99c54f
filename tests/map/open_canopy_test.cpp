// From the plan's leaves to the grid's.

#include "map/open_canopy.h"

#include <gmock/gmock.h>

#include <cmath>
#include <numbers>

#include "geo/geo_support.h"
#include "geo/vector_file.h"

namespace sunfall::test {
namespace {

using testing::HasSubstr;

// Leaves turned every way show half their area whatever the direction; upright ones, to which Campbell's
// distribution tends as x goes to 0, show 2/π of it from the side.
TEST(Windbreak, PorosityMakesTheDensityOfBeerAndLambert) {
  EXPECT_NEAR(windbreak_leaf_density({0.5, 3.0, ""}, 1.0, 1.0), std::numbers::ln2 / (0.5 * 3.0), 1e-12);
  EXPECT_NEAR(windbreak_leaf_density({0.5, 3.0, ""}, 1.0, 0.8), std::numbers::ln2 / (0.5 * 0.8 * 3.0), 1e-12);
  EXPECT_NEAR(windbreak_leaf_density({0.2, 2.0, ""}, 1e-4, 1.0),
              std::log(5.0) / (2.0 / std::numbers::pi * 2.0), 1e-3);
  EXPECT_EQ(windbreak_leaf_density({1.0, 3.0, ""}, 1.0, 1.0), 0.0);
}

class OpenCanopy : public testing::Test {
 protected:
  OpenCanopy() {
    RasterOrder order;
    order.columns = order.rows = 20;
    make_raster(folder_ / "ground.tif", order);
  }
  std::unique_ptr<CanopySource> open(const CanopyPlan& canopy) {
    return open_canopy(canopy, RasterSource::open(folder_ / "ground.tif", "ground"), notes_);
  }
  TempFolder folder_;
  std::vector<std::string> notes_;
};

TEST_F(OpenCanopy, AWindbreakOfNumbers) {
  CanopyPlan plan;
  plan.top_m.number = 6.0;
  plan.base_m.number = 1.0;
  plan.windbreak = {0.5, 3.0, "farm.toml:8 canopy.optical_porosity"};
  const CanopyCells cells = open(plan)->read({3, 3, 1, 1});
  EXPECT_FLOAT_EQ(cells.leaf_density[0], static_cast<float>(std::numbers::ln2 / 1.5));
  EXPECT_EQ(cells.top_m[0], 6.0F);
  EXPECT_EQ(cells.base_m[0], 1.0F);
  ASSERT_EQ(notes_.size(), 1U);
  EXPECT_THAT(notes_[0], HasSubstr("makes 0.462 m2 of leaf per m3"));
}

TEST_F(OpenCanopy, AWindbreakDenserThanLeavesIsRefused) {
  CanopyPlan plan;
  plan.top_m.number = 6.0;
  plan.windbreak = {0.02, 0.3, "farm.toml:8 canopy.optical_porosity"};
  const Error::Parts parts = refusal(ErrorKind::plan, [&] { open(plan); });
  EXPECT_EQ(parts.where, "farm.toml:8 canopy.optical_porosity");
  EXPECT_THAT(parts.found, HasSubstr("26.1 m2 m-3"));  // ln 50 / (0.5 · 0.3)
}

TEST_F(OpenCanopy, TreesAndHedgesOfALayer) {
  make_things(folder_ / "trees.gpkg", {{point(55, 55), {{"height", 8.0}, {"width", 4.0}}, "lime"},
                                       {rectangle(100, 100, 110, 140), {{"height", 3.0}}, "hornbeam"}});
  CanopyPlan plan;
  plan.trees = TreesPlan{{folder_ / "trees.gpkg", "", ""}, {0.0, "height"},        {1.0, ""},
                         NumberOrField{0.0, "width"},      NumberOrField{1.2, ""}, "kind"};
  const auto canopy = open(plan);
  const CanopyCells cells = canopy->read({0, 0, 20, 20});
  double leaf_m2 = 0.0;
  for (std::size_t i = 0; i < cells.top_m.size(); ++i)
    leaf_m2 += 100.0 * cells.leaf_density[i] * (double(cells.top_m[i]) - cells.base_m[i]);
  EXPECT_NEAR(leaf_m2, 1.2 * (4.0 / 3.0 * std::numbers::pi * 3.5 * 4.0 + 400.0 * 2.0), 0.01);
  EXPECT_EQ(canopy->highest_top_m(), 8.0F);
  EXPECT_THAT(notes_, testing::ElementsAre(HasSubstr("1 tree, 1 polygon")));
}

}  // namespace
}  // namespace sunfall::test
