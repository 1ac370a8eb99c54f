#pragma once
// The chart of a sun-path picture: azimuth across, elevation upwards.

#include "report/canvas.h"
#include "report/sun_path.h"

namespace sunfall {

// Where a direction lies on the chart.
class SunChart {
 public:
  SunChart(const Box& box, const SunPathPicture& picture);

  const Box& box() const { return box_; }
  double first_azimuth_deg() const { return centre_azimuth_deg_ - 180.0; }
  double top_elevation_deg() const { return top_elevation_deg_; }
  // The azimuth, turned by whole turns into the chart's 360 degrees.
  double on_chart(double azimuth_deg) const;
  // `azimuth_deg` within, or a little outside, the chart's 360 degrees.
  Point at(double azimuth_deg, double elevation_deg) const;

 private:
  Box box_;
  double centre_azimuth_deg_;
  double top_elevation_deg_;
};

void draw_sun_chart(Canvas& canvas, const SunChart& chart, const SunPathPicture& picture);

}  // namespace sunfall
