#pragma once
// Vector files to order, for the tests of what reads them.

#include <filesystem>
#include <map>
#include <string>
#include <vector>

#include "sunfall/grid.h"

namespace sunfall::test {

// A feature with numbers and a label; fields that it lacks stay empty.
struct TestFeature {
  std::string wkt;  // empty: no geometry
  std::map<std::string, double> numbers;
  std::string label;  // the text field "kind"
};

// A layer "things" with the real fields "height", "base", "width" and "lad", and the text field "kind".
void make_things(const std::filesystem::path& file, const std::vector<TestFeature>& features,
                 const std::string& crs = "EPSG:32631");

// In metres east and south of 600000, 5800000.
std::string point(double east, double south);
std::string rectangle(double west, double north, double east, double south);

// Of a ring near there, closed or not; counter-clockwise above 0.
double signed_area_m2(const std::vector<MapPoint>& ring);

}  // namespace sunfall::test
