#include "buildings.h"

#include <algorithm>
#include <cmath>

#include "terrain.h"

namespace alder_reach {
namespace {

// A ridge roof along the length.
Solid gable(std::string name, Rectangle plan, double eave_m, double ridge_m) {
  return {std::move(name),
          [=](Point point) -> std::optional<double> {
            if (distance_outside(plan, point) > 0.0) return std::nullopt;
            const double from_ridge = std::abs(within(plan, point).y) / (0.5 * plan.width_m);
            return std::lerp(ridge_m, eave_m, from_ridge);
          },
          plan.middle};
}

// A roof with one slope, low on the left of the length's direction, high on its right.
Solid lean_to(std::string name, Rectangle plan, double low_m, double high_m) {
  return {std::move(name),
          [=](Point point) -> std::optional<double> {
            if (distance_outside(plan, point) > 0.0) return std::nullopt;
            return std::lerp(high_m, low_m, 0.5 + within(plan, point).y / plan.width_m);
          },
          plan.middle};
}

Solid block(std::string name, Rectangle plan, double height_m) {
  return lean_to(std::move(name), plan, height_m, height_m);
}

// A round wall under a cone; `wall_m` 0 is a cone alone.
Solid drum(std::string name, Point middle, double radius_m, double wall_m, double top_m) {
  return {std::move(name),
          [=](Point point) -> std::optional<double> {
            const double away = distance(point, middle);
            if (away > radius_m) return std::nullopt;
            return std::lerp(top_m, wall_m, away / radius_m);
          },
          middle};
}

// A wall or hedge along a path. It is drawn at least 1.5 m thick: on 1 m cells that is the least
// that leaves no holes whichever way it runs.
Solid strip(std::string name, const Path& path, double thickness_m, double height_m) {
  return {std::move(name),
          [=](Point point) -> std::optional<double> {
            if (distance_to_path(point, path) > 0.5 * std::max(thickness_m, 1.5)) return std::nullopt;
            return height_m;
          },
          std::nullopt};
}

}  // namespace

std::vector<Solid> farm_solids() {
  return {
      // The yard.
      gable("barn", {{421, 358}, 38, 16, 84}, 6.0, 12.0),
      lean_to("machine shed", {{463, 364}, 30, 10, 84}, 4.2, 6.2),
      gable("packing shed", {{396, 326}, 24, 11, 174}, 4.0, 6.8),
      gable("house", {{468, 322}, 14, 9, 84}, 5.6, 9.6),
      block("chimney", {{473, 322.5}, 1.4, 1.4, 84}, 11.2),
      lean_to("stable", {{438, 314}, 18, 6, 84}, 2.8, 3.8),
      drum("silo", {444, 366}, 3.2, 12.4, 14.0),
      drum("slurry tank", {377, 356}, 7.5, 3.0, 3.0),
      // Out in the fields.
      gable("pump house", {{252, 388}, 5, 4, 0}, 2.6, 3.9),
      block("transformer tower", {{700, 402}, 3, 3, 8}, 9.0),
      drum("yew", {556, 398}, 4.5, 1.0, 9.5),
      block("straw stack", {{366, 392}, 12, 4, 84}, 4.2),
      // The walled garden, with a gate in its south and one in its west side.
      strip("garden wall, south and east", {{529, 428}, {552, 431}, {547, 467}, {499, 461}, {501, 446}}, 0.45,
            2.2),
      strip("garden wall, south-west corner", {{501.5, 442}, {504, 425}, {525, 427.6}}, 0.45, 2.2),
      // A clipped hedge across the north-east field, with a gap for a gate, and its return southwards.
      strip("hedge, west of the gate", {{572, 492}, {632, 498}}, 1.8, 3.6),
      strip("hedge, east of the gate", {{637, 498.5}, {706, 505}, {709, 452}}, 1.8, 3.6),
  };
}

double surface_height(Point point, const std::vector<Solid>& solids) {
  const double ground = ground_height(point);
  double surface = ground;
  for (const Solid& solid : solids) {
    const std::optional<double> top = solid.top_m(point);
    if (!top) continue;
    surface = std::max(surface, *top + (solid.foot ? ground_height(*solid.foot) : ground));
  }
  return surface;
}

}  // namespace alder_reach
