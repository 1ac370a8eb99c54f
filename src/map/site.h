#pragma once
// What every command needs to know of a plan before it works: where it lies, and the light there.

#include <map>
#include <string>
#include <vector>

#include "geo/geodesy.h"
#include "sunfall/dome.h"
#include "sunfall/light.h"
#include "sunfall/plan.h"

namespace sunfall {

struct Site {
  GridFrame frame;
  GeoPlace middle;  // height: the ground's at the middle of the map
  LightSeries series;
  double umol_per_joule = 0.0;     // of global radiation over the whole series
  std::vector<std::string> notes;  // assumptions that were made for the user
};
// Opens the ground and makes the light series. Throws Error.
Site open_site(const Plan& plan);

DomeLight dome_light_of(const Plan& plan, const Site& site);

// Gives back what the steps of the series take, so that maps of thirty years need no more memory than those
// of one. What the series is and where stays known.
void forget_steps(Site& site);

// Where a run came from, for every layer's metadata.
std::map<std::string, std::string> provenance_of(const Plan& plan, const Site& site);

// "5.6654° E, 51.9692° N"
std::string place_text(const Place& place);

// Photons 400-700 nm per joule of global radiation over the whole series, µmol J-1.
double umol_per_joule(const LightSeries& series);

}  // namespace sunfall
