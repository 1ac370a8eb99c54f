#pragma once
// Where the sun is and how strong it is above the air.
//
// Directions are topocentric. "Geometric" is without refraction; "apparent" is where the light
// comes from. Source: IAU models as implemented by ERFA (epv00, aberration, precession and
// nutation 2000B, sidereal time 2006, topocentric parallax); Delta T from the polynomials of
// Espenak and Meeus. Valid 1950 to 2100; within 3e-4 degrees of Reda and Andreas (2004).

#include <chrono>
#include <vector>

#include "sunfall/angle.h"
#include "sunfall/time.h"

namespace sunfall {

struct Place {
  Angle latitude;   // north positive, geodetic WGS84
  Angle longitude;  // east positive
  double height_m = 0.0;
};

struct SunPosition {
  Azimuth azimuth;
  Angle elevation;           // geometric
  Angle apparent_elevation;  // with refraction of a standard atmosphere at the place's height
  double distance_au = 1.0;
};

// East, north (true) and up components of a unit vector towards something in the sky.
struct SkyDirection {
  double east = 0.0;
  double north = 0.0;
  double up = 1.0;
};
SkyDirection direction(Azimuth azimuth, Angle elevation);

inline constexpr double kSolarConstant_w_m2 = 1361.0;  // Kopp and Lean 2011

SunPosition sun_position(UtcTime time, const Place& place);

// Irradiance above the air on a plane facing the sun, W m-2: constant / distance².
double extraterrestrial_normal_w_m2(double distance_au);

// A day's rise, transit and set of the sun's centre through `threshold` geometric elevation
// (-0.8333 degrees for the usual almanac sunrise). Each is an event of the given local date. Near
// the midnight sun a date may lack a rise or a set: then its begin or its end stands for it; a set
// may come before the rise; of two, the one next to the transit counts. `rise` and `set` mean
// nothing where `kind` is always_up or never_up. Good to a second or two.
struct SunDay {
  enum class Kind { rises, always_up, never_up };
  Kind kind = Kind::rises;
  UtcTime rise{};
  UtcTime transit{};
  UtcTime set{};
};
SunDay sun_day(Date date, std::chrono::seconds utc_offset, const Place& place,
               Angle threshold = Angle::degrees(-0.8333));

// The sun over many equal steps. Step i runs from begin + i·step to begin + (i+1)·step.
// The ephemeris is evaluated by the full model every second day and interpolated between (error
// below 1e-5 degrees), so a year of 10-minute steps costs milliseconds.
struct SunTrack {
  UtcTime begin{};
  std::chrono::seconds step{600};
  // One more than the steps: the apparent direction at each step's edges. The sun's path within
  // a step is close to the great circle between its two edges.
  std::vector<SkyDirection> edges;
  // Mean over the step of max(0, sin of the geometric elevation).
  std::vector<float> mean_sine;
  // Extraterrestrial normal irradiance at mid-step, W m-2.
  std::vector<float> normal_w_m2;

  std::size_t size() const { return mean_sine.size(); }
};
SunTrack sun_track(UtcTime begin, std::chrono::seconds step, std::size_t count, const Place& place);

// Mean over a local-standard day of extraterrestrial irradiance on a level plane, MJ m-2 d-1,
// by integration of the true sun (no refraction).
double extraterrestrial_daily_mj_m2(Date date, std::chrono::seconds utc_offset, const Place& place);

}  // namespace sunfall
