// Leaves given by rasters and numbers.

#include "geo/grid_canopy.h"

#include <gmock/gmock.h>

#include <thread>

#include "geo/geo_support.h"

namespace sunfall::test {
namespace {

using testing::AllOf;
using testing::HasSubstr;

constexpr double kNo = -9999.0;

// Rasters of 4 × 3 cells, row by row.
class GridCanopy : public testing::Test {
 protected:
  GridCanopy() { make_raster(folder_ / "ground.tif", {}); }
  std::filesystem::path raster(const std::string& name, std::vector<double> values, RasterOrder order = {}) {
    order.values = std::move(values);
    order.nodata = kNo;
    make_raster(folder_ / name, order);
    return folder_ / name;
  }
  std::unique_ptr<CanopySource> open(const GridValue& top, const GridValue& base, const GridValue& density) {
    const RasterSource ground = RasterSource::open(folder_ / "ground.tif", "ground");
    return open_grid_canopy({top, base, density, "farm.toml:30 canopy"}, ground, notes_);
  }
  Error::Parts refused(const GridValue& top, const GridValue& base, const GridValue& density) {
    return refusal(ErrorKind::data, [&] { open(top, base, density); });
  }
  TempFolder folder_;
  std::vector<std::string> notes_;
  const std::vector<double> tops_ = {8, 8, 0, kNo, 1, 2, 3, -0.4, 5, 6, 7, 12};
};

TEST_F(GridCanopy, ReadsRastersByWindow) {
  const auto canopy = open({0, raster("top.tif", tops_)}, {1.5, {}},
                           {0, raster("lad.tif", {1, 0, 1, 1, 1, 1, 1, 1, kNo, 2, 0.5, 1})});
  EXPECT_EQ(canopy->highest_top_m(), 12.0F);
  const CanopyCells cells = canopy->read({-1, 0, 6, 4});
  EXPECT_EQ(cells.window, (CellWindow{-1, 0, 6, 4}));
  // Leaves where top and density have values above 0 and the top stands above 1.5 m; off the map nothing.
  EXPECT_EQ(cells.leaf_density, (std::vector<float>{0, 1, 0, 0,    0, 0,  //
                                                    0, 0, 1, 1,    0, 0,  //
                                                    0, 0, 2, 0.5F, 1, 0,  //
                                                    0, 0, 0, 0,    0, 0}));
  EXPECT_EQ(cells.top_m, (std::vector<float>{0, 8, 0, 0, 0,  0,  //
                                             0, 0, 2, 3, 0,  0,  //
                                             0, 0, 6, 7, 12, 0,  //
                                             0, 0, 0, 0, 0,  0}));
  for (std::size_t i = 0; i < cells.base_m.size(); ++i)
    EXPECT_EQ(cells.base_m[i], cells.leaf_density[i] > 0 ? 1.5F : 0.0F) << i;
  // One of the seven cells with a top and a density ends below the base.
  ASSERT_EQ(notes_.size(), 1U);
  EXPECT_THAT(notes_[0], AllOf(HasSubstr("farm.toml:30 canopy"), HasSubstr("14.3 %")));
}

TEST_F(GridCanopy, NumbersStandForEveryCell) {
  const auto canopy = open({4, {}}, {1, {}}, {0.7, {}});
  EXPECT_EQ(canopy->highest_top_m(), 4.0F);
  const CanopyCells cells = canopy->read({2, 1, 4, 1});
  EXPECT_EQ(cells.top_m, (std::vector<float>{4, 4, 0, 0}));
  EXPECT_EQ(cells.base_m, (std::vector<float>{1, 1, 0, 0}));
  EXPECT_EQ(cells.leaf_density, (std::vector<float>{0.7F, 0.7F, 0, 0}));
  EXPECT_TRUE(notes_.empty());
}

TEST_F(GridCanopy, SeveralThreadsReadTheSame) {
  const auto canopy = open({0, raster("top.tif", tops_)}, {0, {}}, {1, {}});
  const CanopyCells once = canopy->read({0, 0, 4, 3});
  std::vector<CanopyCells> got(8);
  std::vector<std::thread> threads;
  for (CanopyCells& cells : got) threads.emplace_back([&] { cells = canopy->read({0, 0, 4, 3}); });
  for (std::thread& thread : threads) thread.join();
  for (const CanopyCells& cells : got) EXPECT_EQ(cells.top_m, once.top_m);
}

TEST_F(GridCanopy, AnotherGridTellsHowToAlign) {
  RasterOrder shifted;
  shifted.transform[0] += 5.0;
  Error::Parts parts = refused({0, raster("top.tif", tops_, shifted)}, {0, {}}, {1, {}});
  EXPECT_THAT(parts.what, HasSubstr("not on the grid of ground: another extent"));
  EXPECT_THAT(parts.where, HasSubstr("top.tif (canopy.top)"));
  EXPECT_THAT(parts.remedy, HasSubstr("gdalwarp"));
  RasterOrder elsewhere;
  elsewhere.crs = "EPSG:32632";
  parts = refused({3, {}}, {0, {}}, {0, raster("lad.tif", tops_, elsewhere)});
  EXPECT_THAT(parts.what, HasSubstr("coordinate reference system"));
  EXPECT_THAT(parts.where, HasSubstr("canopy.leaf_density"));
}

TEST_F(GridCanopy, ABaseAboveItsTopNamesTheCell) {
  std::vector<double> bases(12, 0.5);
  bases[6] = 3.25;
  const GridValue top{0, raster("top.tif", tops_)};
  const Error::Parts parts = refused(top, {0, raster("base.tif", bases)}, {1, {}});
  EXPECT_THAT(parts.what, HasSubstr("base of the leaves lies above their top"));
  EXPECT_THAT(parts.where,
              AllOf(HasSubstr("base.tif"), HasSubstr("column 2, row 1"), HasSubstr("600025.000")));
  EXPECT_EQ(parts.found, "base 3.25 m, top 3 m");
  bases[6] = kNo;
  EXPECT_THAT(refused(top, {0, raster("base2.tif", bases)}, {1, {}}).what, HasSubstr("have no base"));
  bases[6] = 3.0;  // nothing between base and top: no leaves
  EXPECT_NO_THROW(open(top, {0, raster("base3.tif", bases)}, {1, {}}));
  // Where no leaves are, a base may be anything.
  bases[3] = kNo;
  bases[2] = 50.0;
  EXPECT_NO_THROW(open(top, {0, raster("base4.tif", bases)}, {1, {}}));
}

TEST_F(GridCanopy, ValuesThatCannotBeNameTheirCell) {
  std::vector<double> values(12, 1.0);
  values[5] = 20.5;
  Error::Parts parts = refused({3, {}}, {0, {}}, {0, raster("lad.tif", values)});
  EXPECT_EQ(parts.what, "a leaf density cannot be");
  EXPECT_THAT(parts.where, HasSubstr("column 1, row 1"));
  EXPECT_EQ(parts.found, "20.5 m2 m-3");
  values[5] = -0.1;
  EXPECT_EQ(refused({3, {}}, {0, {}}, {0, raster("lad2.tif", values)}).what, "a leaf density cannot be");
  values[5] = 250.0;  // a height above the sea
  parts = refused({0, raster("top.tif", values)}, {0, {}}, {1, {}});
  EXPECT_EQ(parts.what, "a height above the ground cannot be");
  EXPECT_THAT(parts.remedy, HasSubstr("above the ground lie within -10 to 120 m"));
  // A density carries a unit of its own, a height must be metres.
  RasterOrder unit;
  unit.unit = "m2 m-3";
  values[5] = 1.0;
  EXPECT_NO_THROW(open({3, {}}, {0, {}}, {0, raster("lad3.tif", values, unit)}));
  unit.unit = "ft";
  EXPECT_THAT(refused({0, raster("top2.tif", values, unit)}, {0, {}}, {1, {}}).what, HasSubstr("metres"));
}

TEST_F(GridCanopy, NoLeavesAtAll) {
  EXPECT_EQ(refused({0, raster("top.tif", std::vector<double>(12, kNo))}, {0, {}}, {1, {}}).what,
            "the canopy holds no leaves");
  EXPECT_THAT(refused({0, raster("top2.tif", tops_)}, {15, {}}, {1, {}}).found, HasSubstr("any of 9 cells"));
  EXPECT_THAT(refused({4, {}}, {0, {}}, {0, {}}).where, HasSubstr("farm.toml:30"));
}

}  // namespace
}  // namespace sunfall::test
