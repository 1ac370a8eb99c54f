// The rules themselves: that they tell right from wrong.

#include "architecture/include_rules.h"

#include <gtest/gtest.h>

namespace sunfall::architecture {
namespace {

TEST(IncludeRules, ReadsIncludeLinesOnly) {
  EXPECT_EQ(included_file("#include \"geo/plots.h\""), "geo/plots.h");
  EXPECT_EQ(included_file("  # include <vector>  // why"), "vector");
  EXPECT_EQ(included_file("// #include <vector>"), std::nullopt);
  EXPECT_EQ(included_file("#define include \"x.h\""), std::nullopt);
}

TEST(IncludeRules, ArrowsPointDown) {
  EXPECT_FALSE(include_fault("shade", "geo/raster_source.h"));
  EXPECT_FALSE(include_fault("shade", "sunfall/dome.h"));
  EXPECT_FALSE(include_fault("geo", "geo/plots.h"));
  EXPECT_FALSE(include_fault("light", "core/nearest.h"));
  EXPECT_TRUE(include_fault("geo", "shade/terrain.h"));
  EXPECT_TRUE(include_fault("core", "sunfall/sun.h"));
  EXPECT_TRUE(include_fault("light", "sunfall/dome.h"));
  EXPECT_TRUE(include_fault("map", "report/page.h"));
}

TEST(IncludeRules, LibrariesStayInTheirFolder) {
  EXPECT_FALSE(include_fault("geo", "gdal_priv.h"));
  EXPECT_TRUE(include_fault("report", "gdal_priv.h"));
  EXPECT_TRUE(include_fault("report", "gdal/gdal.h"));
  EXPECT_TRUE(include_fault("map", "ogr_spatialref.h"));
  EXPECT_TRUE(include_fault("app", "cpl_conv.h"));
  EXPECT_TRUE(include_fault("sun", "proj.h"));
  EXPECT_FALSE(include_fault("app", "progress_bar.h"));
  EXPECT_FALSE(include_fault("shade", "embree3/rtcore.h"));
  EXPECT_TRUE(include_fault("map", "embree3/rtcore.h"));
  EXPECT_TRUE(test_include_fault("app", "gdal_priv.h"));
  EXPECT_FALSE(test_include_fault("geo", "gdal_priv.h"));
}

TEST(IncludeRules, NameOnlyLowerFolders) {
  std::set<std::string> lower;
  for (const FolderRule& rule : folder_rules()) {
    for (const std::string& used : rule.may_use) {
      EXPECT_TRUE(lower.count(used)) << rule.folder << " uses " << used << ", which is not below it";
    }
    lower.insert(rule.folder);
  }
}

}  // namespace
}  // namespace sunfall::architecture
