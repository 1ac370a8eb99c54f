// The table of covers that comes along: it reads, and its covers pass what such covers are known to pass.

#include "sunfall/covers.h"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <fstream>
#include <map>
#include <numbers>
#include <string>

namespace sunfall {
namespace {

namespace fs = std::filesystem;

const fs::path kTable = fs::path(SUNFALL_FIELDS) / "covers.toml";

TEST(Covers, AreFound) { EXPECT_TRUE(fs::equivalent(own_covers(), kTable)); }

struct Known {
  double perpendicular_least, perpendicular_most;
  double even_least, even_most;
};

// Ranges that data sheets and handbooks give, from memory, with a hundredth to each side for their rounding;
// the webs of twin wall are simplified, which the table says, so its upper end is higher. No net or screen:
// no such range is known to us.
TEST(Covers, PassWhatSuchCoversPass) {
  const CoverTable table = read_covers(kTable);
  const std::map<std::string, Known> known = {
      {"float glass 4 mm", {.89, .91, .82, .83}},
      {"low-iron glass 4 mm", {.90, .92, .83, .845}},
      {"coated glass 4 mm", {.96, .97, .89, .91}},
      {"PE film", {.88, .91, .80, .82}},
      {"ETFE film", {.93, .95, .86, .88}},
      {"PMMA 4 mm", {.90, .92, .82, .84}},
      {"polycarbonate twin wall 10 mm", {.76, .80, .61, .68}},
  };
  for (const auto& [name, range] : known) {
    const CoverOptics optics(table.cover(name, "test"));
    const double perpendicular = optics.perpendicular().total();
    const double even = optics.hemispherical().total();
    EXPECT_GE(perpendicular, range.perpendicular_least - .01) << name;
    EXPECT_LE(perpendicular, range.perpendicular_most + .01) << name;
    EXPECT_GE(even, range.even_least - .01) << name;
    EXPECT_LE(even, range.even_most + .01) << name;
  }
}

TEST(Covers, AreAllUsable) {
  const CoverTable table = read_covers(kTable);
  EXPECT_GE(table.covers.size(), 11u);
  for (const Cover& cover : table.covers) {
    const CoverOptics optics(cover);
    EXPECT_GT(optics.perpendicular().total(), optics.hemispherical().total()) << cover.name;
    EXPECT_FALSE(cover.source.empty()) << cover.name;
  }
}

// docs/covers.md prints what the covers pass; a change of the table must change the page.
TEST(Covers, AreAsThePageSays) {
  std::ifstream file(SUNFALL_COVERS_PAGE);
  std::map<std::string, std::string> rows;
  for (std::string line; std::getline(file, line);) {
    const std::size_t end = line.find(" | ");
    if (line.rfind("| ", 0) == 0 && end != std::string::npos) rows[line.substr(2, end - 2)] = line;
  }
  for (const Cover& cover : read_covers(kTable).covers) {
    const CoverOptics optics(cover);
    char row[200];
    std::snprintf(row, sizeof row, "| %s | %.3f | %.3f | %.3f | %.2f |", cover.name.c_str(),
                  optics.perpendicular().total(), optics.at(Angle::degrees(60)).total(),
                  optics.hemispherical().total(),
                  optics.hemispherical().scattered / optics.hemispherical().total());
    EXPECT_EQ(rows[cover.name], row);
  }
}

// Every number has its source beside it: a comment, or a thickness that the name itself says.
TEST(Covers, HaveASourceBesideEveryValue) {
  std::ifstream file(kTable);
  int values = 0;
  for (std::string line; std::getline(file, line);) {
    const bool number =
        line.find(" = ") != std::string::npos && line.find('"') == std::string::npos && line[0] != '#';
    if (!number || line.rfind("thickness_mm = 4", 0) == 0 || line.rfind("sheets", 0) == 0) continue;
    ++values;
    EXPECT_NE(line.find('#'), std::string::npos) << line;
  }
  EXPECT_GT(values, 30);
}

// Two crossed families of opaque round threads, each covering 1 - √½ of the area seen from above: a ray that
// leans by θ across a family sees its threads closer by √(1 + tan² of the lean across). Mean over the
// directions, by counting rays that meet a thread.
TEST(Covers, ShadeNetIsCrossedThreads) {
  const CoverOptics net(read_covers(kTable).cover("shade net 50 %", "test"));
  EXPECT_NEAR(net.perpendicular().total(), 0.5, 1e-12);
  const double radius = (1.0 - std::sqrt(0.5)) / 2.0;  // spacing 1
  // Whether a ray through x at height 0, leaning `lean` across, meets a thread: the nearest axis's distance.
  const auto open_share = [&](double lean) {
    constexpr int kPlaces = 2000;
    int open = 0;
    for (int i = 0; i < kPlaces; ++i) {
      const double x = (i + 0.5) / kPlaces - 0.5;
      bool met = false;
      for (int axis = -20; axis <= 20; ++axis)
        met = met || std::abs(x - axis) / std::sqrt(1 + lean * lean) < radius;
      open += met ? 0 : 1;
    }
    return static_cast<double>(open) / kPlaces;
  };
  for (const int angle_deg : {20, 45, 60, 70}) {
    const double slope = std::tan(angle_deg * std::numbers::pi / 180);
    double mean = 0.0;
    constexpr int kTurns = 180;
    for (int k = 0; k < kTurns; ++k) {
      const double turn = (k + 0.5) * std::numbers::pi / 2 / kTurns;
      mean += open_share(slope * std::sin(turn)) * open_share(slope * std::cos(turn)) / kTurns;
    }
    // A place in 2000 either way in each family, and the rounding of the file.
    EXPECT_NEAR(net.at(Angle::degrees(angle_deg)).regular, mean, 1.1e-3) << angle_deg;
  }
}

}  // namespace
}  // namespace sunfall
