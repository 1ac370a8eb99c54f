// Trees and hedges of a vector layer as leaves on the grid.

#include "geo/tree_canopy.h"

#include <gmock/gmock.h>
#include <ogr_spatialref.h>

#include <cmath>
#include <numbers>
#include <thread>

#include <fmt/format.h>

#include "geo/geo_support.h"
#include "geo/vector_file.h"

namespace sunfall::test {
namespace {

using testing::AllOf;
using testing::HasSubstr;

GridFrame field() { return utm_frame(100, 100, 1.0); }

// All values from the fields.
TreesRequest by_fields(const std::filesystem::path& file) {
  return {file, "", "", {0.0, "height"}, {0.0, "base"}, FeatureValue{0.0, "width"}, {0.0, "lad"}, ""};
}

struct Read {
  std::unique_ptr<CanopySource> canopy;
  std::vector<std::string> notes;
};

Read read(const std::vector<TestFeature>& features, const std::function<void(TreesRequest&)>& change = {},
          const GridFrame& frame = field(), const std::string& crs = "EPSG:32631") {
  const TempFolder folder;
  make_things(folder / "trees.gpkg", features, crs);
  TreesRequest request = by_fields(folder / "trees.gpkg");
  if (change) change(request);
  Read result;
  result.canopy = read_tree_canopy(request, frame, result.notes);
  return result;
}

Error::Parts refused(const std::vector<TestFeature>& features,
                     const std::function<void(TreesRequest&)>& change = {}) {
  const Error::Parts parts = refusal(ErrorKind::data, [&] { read(features, change); });
  EXPECT_THAT(parts.where, HasSubstr("trees.gpkg"));
  EXPECT_FALSE(parts.remedy.empty());
  return parts;
}

TestFeature tree(double east, double south, double height = 8.0, const std::string& kind = "lime") {
  return {point(east, south), {{"height", height}, {"base", 2.0}, {"width", 5.0}, {"lad", 0.9}}, kind};
}

TestFeature hedge(const std::string& wkt, const std::string& kind = "hornbeam") {
  return {wkt, {{"height", 3.0}, {"base", 0.5}, {"lad", 2.0}}, kind};
}

double leaf_m2(const CanopyCells& cells, double cell_m) {
  double sum = 0.0;
  for (std::size_t i = 0; i < cells.top_m.size(); ++i)
    sum += double(cells.leaf_density[i]) * (double(cells.top_m[i]) - cells.base_m[i]) * cell_m * cell_m;
  return sum;
}

const double kTree_m2 = 0.9 * 4.0 / 3.0 * std::numbers::pi * 3.0 * 2.5 * 2.5;

TEST(TreeCanopy, HoldsTheLeavesOfItsFeatures) {
  const std::string belt =
      "POLYGON((600060 5799990,600060 5799960,600080 5799960,600080 5799990,600060 5799990),"
      "(600065 5799980,600065 5799970,600070 5799970,600070 5799980,600065 5799980))";
  const std::string two =
      "MULTIPOLYGON(((600005 5799940,600010 5799940,600010 5799930,600005 5799930,600005 5799940)),"
      "((600020 5799940,600025 5799940,600025 5799930,600020 5799930,600020 5799940)))";
  const Read got = read({tree(20, 20),
                         {"MULTIPOINT((600030.5 5799960),(600040 5799960))", tree(0, 0).numbers, ""},
                         hedge(belt),
                         hedge(two)},
                        [](TreesRequest& request) { request.species = "kind"; });
  const CanopyCells cells = got.canopy->read({0, 0, 100, 100});
  const double hedges_m2 = 2.0 * 2.5 * (20 * 30 - 5 * 10 + 2 * 5 * 10);
  EXPECT_NEAR(leaf_m2(cells, 1.0), 3 * kTree_m2 + hedges_m2, 1e-5 * hedges_m2);
  EXPECT_EQ(got.canopy->highest_top_m(), 8.0F);
  const auto density = [&](int column, int row) {
    return cells.leaf_density[static_cast<std::size_t>(row * 100 + column)];
  };
  EXPECT_FLOAT_EQ(density(61, 12), 2.0F);
  EXPECT_EQ(density(67, 25), 0.0F);  // in the hole
  EXPECT_EQ(density(50, 50), 0.0F);
  ASSERT_EQ(got.notes.size(), 1U);
  EXPECT_THAT(got.notes[0], AllOf(HasSubstr("3 trees, 2 polygons"), HasSubstr("2 hornbeam"),
                                  HasSubstr("1 lime"), HasSubstr("1 without"), HasSubstr("labels only")));
}

// The same cells by any window, also off the map and by several threads.
TEST(TreeCanopy, WindowsAgree) {
  std::vector<TestFeature> features = {hedge(rectangle(-5, 40.3, 70.6, 43.9))};
  for (int i = 0; i < 40; ++i) features.push_back(tree(2.5 * i + 0.13, 97.0 - 2.1 * i, 5.0 + 0.1 * i));
  const Read got = read(features);
  const CanopyCells all = got.canopy->read({0, 0, 100, 100});
  const CellWindow windows[] = {{-10, -10, 60, 70}, {37, 41, 63, 2}, {90, 90, 20, 20}, {0, 42, 1, 1}};
  std::vector<CanopyCells> parts(std::size(windows));
  std::vector<std::thread> threads;
  for (std::size_t i = 0; i < std::size(windows); ++i)
    threads.emplace_back([&, i] { parts[i] = got.canopy->read(windows[i]); });
  for (std::thread& thread : threads) thread.join();
  for (const CanopyCells& part : parts) {
    for (int row = 0; row < part.window.rows; ++row) {
      for (int column = 0; column < part.window.columns; ++column) {
        const int c = part.window.column + column, r = part.window.row + row;
        const bool on = c >= 0 && r >= 0 && c < 100 && r < 100;
        const auto i = static_cast<std::size_t>(row * part.window.columns + column);
        const auto k = static_cast<std::size_t>(on ? r * 100 + c : 0);
        EXPECT_EQ(part.leaf_density[i], on ? all.leaf_density[k] : 0.0F);
        EXPECT_EQ(part.top_m[i], on ? all.top_m[k] : 0.0F);
        EXPECT_EQ(part.base_m[i], on ? all.base_m[k] : 0.0F);
      }
    }
  }
}

TEST(TreeCanopy, LeafAreaDoesNotHangOnTheCellSize) {
  for (const double cell : {0.5, 2.0, 25.0}) {
    const int side = static_cast<int>(100.0 / cell);
    const Read got = read({tree(20, 20), tree(22, 21), hedge(rectangle(40, 40, 40.7, 90))}, {},
                          utm_frame(side, side, cell));
    const double exact = 2 * kTree_m2 + 0.7 * 50 * 2.5 * 2.0;
    EXPECT_NEAR(leaf_m2(got.canopy->read({0, 0, side, side}), cell), exact, 1e-4 * exact) << cell;
  }
}

TEST(TreeCanopy, AFilterAndNumbersChoose) {
  const Read got =
      read({tree(20, 20), tree(40, 40, 30.0, "poplar"), tree(60, 60)}, [](TreesRequest& request) {
        request.filter = "kind = 'lime' AND height < 9";
        request.height_m = {4.0, ""};
        request.crown_base_m = {1.0, ""};
        request.crown_width_m = FeatureValue{2.0, ""};
        request.leaf_density = {3.0, ""};
      });
  EXPECT_EQ(got.canopy->highest_top_m(), 4.0F);
  EXPECT_NEAR(leaf_m2(got.canopy->read({0, 0, 100, 100}), 1.0), 2 * 3.0 * 4.0 / 3.0 * std::numbers::pi * 1.5,
              1e-3);
}

TEST(TreeCanopy, AnotherCrsIsCarriedOverAndSaid) {
  OGRSpatialReference from, to;
  from.SetFromUserInput("EPSG:32631");
  to.SetFromUserInput("EPSG:4326");
  from.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  to.SetAxisMappingStrategy(OAMS_TRADITIONAL_GIS_ORDER);
  const std::unique_ptr<OGRCoordinateTransformation> there(OGRCreateCoordinateTransformation(&from, &to));
  double x = 600050.0, y = 5799950.0;
  ASSERT_NE(there->Transform(1, &x, &y), 0);
  TestFeature one = tree(0, 0);
  one.wkt = fmt::format("POINT({:.12f} {:.12f})", x, y);
  const Read got = read({one}, {}, field(), "EPSG:4326");
  const CanopyCells cells = got.canopy->read({0, 0, 100, 100});
  EXPECT_NEAR(leaf_m2(cells, 1.0), kTree_m2, 1e-4 * kTree_m2);
  EXPECT_GT(cells.leaf_density[50 * 100 + 50], 0.0F);
  EXPECT_GT(cells.leaf_density[49 * 100 + 49], 0.0F);
  EXPECT_THAT(got.notes, testing::Contains(AllOf(HasSubstr("EPSG:4326"), HasSubstr("carried to the map"))));
}

TEST(TreeCanopy, WhatLiesOffTheMapIsLeftOutAndCounted) {
  const Read got = read({tree(20, 20), tree(-20, 20), tree(500, 20)});
  EXPECT_NEAR(leaf_m2(got.canopy->read({0, 0, 100, 100}), 1.0), kTree_m2, 1e-4 * kTree_m2);
  EXPECT_THAT(got.notes, testing::Contains(HasSubstr("2 of 3 trees and polygons lie off the map")));
  EXPECT_THAT(refused({tree(-20, 20)}).what, HasSubstr("off the map"));
}

TEST(TreeCanopy, MissingFieldsNameThoseThatExist) {
  const Error::Parts parts =
      refused({tree(20, 20)}, [](TreesRequest& request) { request.height_m.field = "heigth"; });
  EXPECT_EQ(parts.what, "there is no field 'heigth'");
  EXPECT_THAT(parts.found, AllOf(HasSubstr("height"), HasSubstr("width"), HasSubstr("lad")));
  EXPECT_THAT(parts.remedy, AllOf(HasSubstr("canopy.trees.height"), HasSubstr("did you mean 'height'")));
  EXPECT_THAT(refused({tree(20, 20)}, [](TreesRequest& r) { r.leaf_density.field = "kind"; }).what,
              HasSubstr("does not hold numbers"));
  EXPECT_THAT(refused({tree(20, 20)}, [](TreesRequest& r) { r.species = "sort"; }).found, HasSubstr("kind"));
}

TEST(TreeCanopy, ValuesThatCannotBeNameTheirFeature) {
  const auto with = [](const std::string& field, double value) {
    TestFeature odd = tree(30, 30);
    odd.numbers[field] = value;
    return refused({tree(20, 20), odd});
  };
  EXPECT_THAT(with("height", 0.0).what, HasSubstr("height of a tree cannot be"));
  EXPECT_THAT(with("height", 0.0).where, HasSubstr("feature 2"));
  EXPECT_THAT(with("height", 130.0).found, HasSubstr("130 m"));
  EXPECT_THAT(with("height", std::nan("")).what, AllOf(HasSubstr("height")));
  EXPECT_THAT(with("base", 8.0).what, HasSubstr("at or above its height"));
  EXPECT_THAT(with("base", -1.0).what, HasSubstr("crown base of a tree cannot be"));
  EXPECT_THAT(with("width", 0.0).what, HasSubstr("crown width of a tree cannot be"));
  EXPECT_THAT(with("lad", -0.5).found, HasSubstr("-0.5 m2 m-3"));
  EXPECT_THAT(with("lad", 21.0).remedy, HasSubstr("at most 20"));
  TestFeature empty = tree(30, 30);
  empty.numbers.erase("height");
  const Error::Parts parts = refused({empty});
  EXPECT_EQ(parts.what, "a tree has no height");
  EXPECT_THAT(parts.remedy, HasSubstr("height IS NOT NULL"));
  EXPECT_NO_THROW(read({tree(20, 20), empty}, [](TreesRequest& r) { r.filter = "height IS NOT NULL"; }));
}

TEST(TreeCanopy, GeometriesThatAreNeitherPointNorPolygon) {
  EXPECT_THAT(refused({{"LINESTRING(600010 5799990,600020 5799990)", tree(0, 0).numbers, ""}}).remedy,
              HasSubstr("buffer"));
  EXPECT_THAT(refused({{"", tree(0, 0).numbers, ""}}).what, HasSubstr("no geometry"));
  EXPECT_THAT(
      refused(
          {hedge("POLYGON((600010 5799990,600030 5799970,600030 5799990,600010 5799970,600010 5799990))")})
          .found,
      HasSubstr("Self-intersection"));
  EXPECT_THAT(refused({tree(20, 20)}, [](TreesRequest& r) { r.crown_width_m.reset(); }).what,
              HasSubstr("no crown width"));
}

TEST(TreeCanopy, FiltersThatSelectNothingOrCannotBeRead) {
  Error::Parts parts = refused({tree(20, 20)}, [](TreesRequest& r) { r.filter = "height > 50"; });
  EXPECT_EQ(parts.what, "the filter selects nothing");
  EXPECT_THAT(parts.found, HasSubstr("height > 50"));
  for (const char* filter : {"height >", "hight > 3", "height = 1; DROP TABLE things", "height IN (SELECT 1)",
                             "load_extension('x')"}) {
    parts = refused({tree(20, 20)}, [&](TreesRequest& r) { r.filter = filter; });
    EXPECT_THAT(parts.what, HasSubstr("the filter cannot be read")) << filter;
    EXPECT_THAT(parts.remedy, AllOf(HasSubstr("canopy.trees.where"), HasSubstr("height"))) << filter;
  }
  EXPECT_THAT(refused({}).what, HasSubstr("no trees or hedges"));
}

}  // namespace
}  // namespace sunfall::test
