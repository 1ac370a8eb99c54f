#pragma once
// The sun over one place: its path on some days, the horizon in front of it, and the light that the
// months bring there.

#include <filesystem>
#include <string>
#include <vector>

#include "report/furniture.h"
#include "report/months_table.h"

namespace sunfall {

struct SunPoint {
  double azimuth_deg = 0.0;    // clockwise from true north
  double elevation_deg = 0.0;  // apparent; points below the horizontal are not drawn
  std::string hour;            // "12" at a full hour, else empty
};

// One day's path in the order of time, close enough together to be drawn as straight pieces.
struct SunDayPath {
  std::string name;  // "21 Jun"
  std::vector<SunPoint> points;
};

struct SunPathPicture {
  PictureText text;
  std::string subject = "The sun and its horizon";
  std::string clock = "local standard time";  // what the hours are: "local standard time, UTC+1"
  // The azimuth in the middle of the chart: 180 north of the tropics, 0 south of them.
  double centre_azimuth_deg = 180.0;
  // Elevation of the place's horizon, degrees, at azimuths 360/size apart, the first at true north;
  // missing where no input covers it. Empty: no horizon is drawn.
  std::vector<double> horizon_deg;
  std::vector<SunDayPath> days;  // from one solstice to the other
  std::vector<MonthLight> months;
};

// PNG or SVG by the file's extension. Throws Error(io).
void draw_sun_path(const std::filesystem::path& file, const SunPathPicture& picture);
Canvas paint_sun_path(const std::filesystem::path& file, const SunPathPicture& picture);

}  // namespace sunfall
