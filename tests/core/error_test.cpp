#include "sunfall/error.h"

#include <gtest/gtest.h>

namespace sunfall {
namespace {

TEST(Error, SaysEverythingOnOneLine) {
  const Error error(ErrorKind::data, {.what = "the raster is in degrees",
                                      .where = "ground.tif",
                                      .found = "EPSG:4326",
                                      .remedy = "reproject it to a grid in metres"});
  EXPECT_STREQ(error.what(),
               "ground.tif: the raster is in degrees (found: EPSG:4326). Reproject it to a grid in metres.");
  EXPECT_EQ(error.kind(), ErrorKind::data);
  EXPECT_EQ(error.parts().where, "ground.tif");
}

TEST(Error, LeavesOutWhatIsEmptyAndEndsWithOneStop) {
  EXPECT_STREQ(Error(ErrorKind::internal, {.what = "a fault", .where = "", .found = "", .remedy = ""}).what(),
               "a fault.");
  EXPECT_STREQ(
      Error(ErrorKind::io, {.what = "full", .where = "disk", .found = "", .remedy = "Free some."}).what(),
      "disk: full. Free some.");
}

// The statuses are the contract of the command line (design, "What a person types").
TEST(Error, HasAnExitStatusForEachKind) {
  EXPECT_EQ(exit_status(ErrorKind::internal), 1);
  EXPECT_EQ(exit_status(ErrorKind::plan), 2);
  EXPECT_EQ(exit_status(ErrorKind::data), 3);
  EXPECT_EQ(exit_status(ErrorKind::io), 4);
  EXPECT_EQ(exit_status(ErrorKind::interrupted), 5);
}

}  // namespace
}  // namespace sunfall
