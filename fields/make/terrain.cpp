#include "terrain.h"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "noise.h"

namespace alder_reach {
namespace {

constexpr double kTurn = 2.0 * std::numbers::pi;

// Seeds of the noises.
constexpr unsigned kHillCrest = 11;
constexpr unsigned kHillFoot = 23;
constexpr unsigned kCounty = 37;
constexpr unsigned kTerrace = 41;
constexpr unsigned kSoil = 53;
constexpr unsigned kWest = 67;

// The river runs northward along the farm's west side: its middle line.
double river_x(double y) {
  return 55.0 + 24.0 * std::sin(kTurn * (y - 40.0) / 560.0) +
         220.0 * (1.0 - std::cos(kTurn * (y - 300.0) / 5200.0));
}

// The valley floor with its terrace, and the low hills west of the river.
double valley(Point point, double east_of_river) {
  const double away = std::abs(east_of_river);
  double height = 8.6 + 0.0035 * std::min(away, 900.0);
  if (east_of_river > 0.0) {
    const double edge = 300.0 + 30.0 * noise(point.x / 140.0, point.y / 140.0, kTerrace);
    height += 1.7 * smooth_step(edge - 16.0, edge + 16.0, east_of_river);
  } else {
    height += 42.0 * smooth_step(500.0, 2300.0, away) *
              (0.8 + 0.5 * layered_noise(point.x / 700.0, point.y / 700.0, kWest, 3));
  }
  return height;
}

// The escarpment whose foot crosses the farm's south-east from the south edge to the east edge. It
// keeps the morning sun of winter from the plots below it.
double escarpment(Point point) {
  constexpr double kHeight_m = 58.0;
  constexpr double kRise_m = 215.0;  // from foot to crest on the map
  constexpr Point kFoot{335.0, 0.0};
  constexpr Point kAlong{0.7634, 0.6459};  // unit vector, towards the north-east
  const Point offset{point.x - kFoot.x, point.y - kFoot.y};
  const double along = offset.x * kAlong.x + offset.y * kAlong.y;
  double behind = offset.x * kAlong.y - offset.y * kAlong.x;
  // Seen from far it winds; seen from near, gullies cut it. It ends short of the river.
  behind += 330.0 * (noise(along / 1300.0, 0.37, kHillFoot + 5) - noise(250.0 / 1300.0, 0.37, kHillFoot + 5));
  behind +=
      30.0 * layered_noise(along / 120.0, behind / 420.0, kHillFoot, 3) * smooth_step(-40.0, 120.0, behind);
  const double reach = smooth_step(-330.0, 60.0, along) * (1.0 - smooth_step(1300.0, 3600.0, along));
  const double crest = 1.0 + 0.22 * layered_noise(along / 520.0, behind / 900.0, kHillCrest, 3);
  const double rise =
      smooth_step(0.0, kRise_m, behind) * (1.0 - 0.6 * smooth_step(kRise_m + 60.0, 2200.0, behind));
  return kHeight_m * reach * crest * rise;
}

// What only the far horizon sees: a long ridge in the south with a gap where the river comes
// through, and rolling ground everywhere beyond the farm.
double county(Point point, double east_of_river) {
  const double gap = 1.0 - std::exp(-std::pow(east_of_river / 520.0, 2.0));
  const double ridge = 118.0 * std::exp(-std::pow((point.y + 3300.0 + 0.12 * point.x) / 620.0, 2.0)) * gap *
                       (0.85 + 0.35 * layered_noise(point.x / 800.0, point.y / 1100.0, kCounty, 4));
  const double away = smooth_step(900.0, 2600.0, distance(point, {360.0, 300.0}));
  const double rolling =
      13.0 * gap * away * (0.6 + layered_noise(point.x / 900.0, point.y / 900.0, kCounty + 9, 4));
  return ridge + std::max(0.0, rolling);
}

double with_river(double height, double east_of_river, double y) {
  const double away = std::abs(east_of_river);
  const double levee = 0.45 * smooth_step(14.0, 24.0, away) * (1.0 - smooth_step(28.0, 60.0, away));
  const double water = 7.1 - 0.0003 * y;
  return std::lerp(water, height + levee, smooth_step(11.5, 17.0, away));
}

// A cut or a bank of the given half widths at bottom and top, along a path.
double profile(Point point, const Path& path, double flat_m, double edge_m) {
  return 1.0 - smooth_step(flat_m, edge_m, distance_to_path(point, path));
}

double earthworks(Point point) {
  static const Path kDitch = {{476, 186}, {398, 206}, {243, 206}, {243, 378}, {72, 386}};
  static const Path kNorthTrack = {{430, 372}, {436, 470}, {452, 760}};
  static const Path kEastTrack = {{480, 345}, {585, 392}, {760, 416}};
  // A river arm that was cut off long ago.
  constexpr Point kOldArm{128.0, 128.0};
  double change = 0.0;
  change -= 1.15 * profile(point, kDitch, 0.5, 2.4);
  change += 0.35 * std::max(profile(point, kNorthTrack, 2.0, 4.0), profile(point, kEastTrack, 2.0, 4.0));
  const double wander = 9.0 * noise(point.x / 60.0, point.y / 60.0, kTerrace + 3);
  const double from_arm = std::abs(distance(point, kOldArm) - 62.0 - wander);
  change -= 0.95 * (1.0 - smooth_step(2.0, 9.0, from_arm)) * smooth_step(108.0, 132.0, point.x);
  return change;
}

// Fields ploughed in lands for generations keep low crowns.
double crowns(Point point) {
  struct Lands {
    Rectangle field;
    double land_m;
  };
  static const Lands kLands[] = {
      {{{170, 465}, 150, 120, 0}, 15.0}, {{{291, 478}, 164, 76, 0}, 12.7}, {{{312, 257}, 104, 124, 0}, 15.5}};
  double height = 0.0;
  for (const Lands& lands : kLands) {
    const double outside = distance_outside(lands.field, point);
    const double across = within(lands.field, point).y;
    height += 0.07 * std::cos(kTurn * across / lands.land_m) * (1.0 - smooth_step(0.0, 5.0, outside));
  }
  return height;
}

// Not ploughed or built on, the ground is never quite even.
double roughness(Point point) {
  return 0.16 * layered_noise(point.x / 45.0, point.y / 45.0, kSoil, 4) +
         0.025 * noise(point.x / 3.5, point.y / 3.5, kSoil + 7);
}

double natural_height(Point point) {
  const double east_of_river = point.x - river_x(point.y);
  const double dry =
      valley(point, east_of_river) + escarpment(point) + county(point, east_of_river) + roughness(point);
  return with_river(dry, east_of_river, point.y);
}

}  // namespace

double ground_height(Point point) {
  // The farmyard was levelled.
  static const Rectangle kYard{{430, 342}, 112, 70, 84};
  static const double kYardLevel_m = natural_height(kYard.middle) + 0.5;
  const double natural = natural_height(point) + earthworks(point) + crowns(point);
  const double outside = distance_outside(kYard, point);
  return std::lerp(kYardLevel_m, natural, smooth_step(0.0, 9.0, outside));
}

}  // namespace alder_reach
