#include "geo/grid_points.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kLoneSpacing_deg = 0.5;
constexpr double kMetresPerDegree = 111e3;  // for grids in metres
constexpr double kRounding = 1e-4;          // of a spacing: coordinates are often floats

struct OnAxis {
  std::size_t left = 0;
  std::size_t right = 0;
  double to_right = 0.0;  // 0 at left, 1 at right
  bool inside = true;
};

double spacing_of(const std::vector<double>& axis) {
  if (axis.size() < 2) return 0.0;
  return std::abs(axis.back() - axis.front()) / static_cast<double>(axis.size() - 1);
}

void require_monotone(const std::vector<double>& axis, const char* name, const std::string& file) {
  const bool rising = axis.size() < 2 || axis[1] > axis[0];
  for (std::size_t i = 0; i < axis.size(); ++i) {
    const bool ordered = i == 0 || (rising ? axis[i] > axis[i - 1] : axis[i] < axis[i - 1]);
    if (std::isfinite(axis[i]) && ordered) continue;
    throw Error(ErrorKind::data, {.what = fmt::format("the grid's {} are not in order", name),
                                  .where = file,
                                  .found = fmt::format("{:g} as number {}", axis[i], i + 1),
                                  .remedy = "Take the file anew from its source"});
  }
}

// Where x lies on the axis; `turn` as in PointGrid.
OnAxis find_on(const std::vector<double>& axis, double x, double turn, double lone_spacing) {
  const std::size_t count = axis.size();
  const bool falling = count > 1 && axis.front() > axis.back();
  const auto index = [&](std::size_t i) { return falling ? count - 1 - i : i; };
  const auto at = [&](std::size_t i) { return axis[index(i)]; };
  if (turn > 0.0) {
    const double middle = 0.5 * (at(0) + at(count - 1));
    x = middle + std::remainder(x - middle, turn);
  }
  if (count == 1) return {0, 0, 0.0, std::abs(x - axis[0]) <= (0.5 + kRounding) * lone_spacing};
  std::size_t right = 0;
  while (right < count && at(right) < x) ++right;
  if (right > 0 && right < count) {
    const double gap = at(right) - at(right - 1);
    return {index(right - 1), index(right), (x - at(right - 1)) / gap, true};
  }
  const bool before = right == 0;
  const double gap = before ? at(1) - at(0) : at(count - 1) - at(count - 2);
  const double beyond = before ? at(0) - x : x - at(count - 1);
  const double round_the_globe = turn - (at(count - 1) - at(0));
  if (turn > 0.0 && std::abs(round_the_globe - gap) < 0.01 * gap) {
    // All round: the last column's neighbour is the first.
    const double from_last = before ? round_the_globe - beyond : beyond;
    return {index(count - 1), index(0), from_last / round_the_globe, true};
  }
  const std::size_t edge = index(before ? 0 : count - 1);
  return {edge, edge, 0.0, beyond <= (0.5 + kRounding) * gap};
}

[[noreturn]] void refuse_far(const PointGrid& grid, const OnAxis& column, const OnAxis& row,
                             const Place& place, double spacing) {
  const LonLat here{place.longitude.degrees(), place.latitude.degrees()};
  const LonLat near = grid.to_globe(grid.x[column.to_right > 0.5 ? column.right : column.left],
                                    grid.y[row.to_right > 0.5 ? row.right : row.left]);
  const std::string apart =
      grid.turn > 0.0 ? fmt::format("{:.3g}°", spacing) : fmt::format("{:.3g} km", spacing / 1000.0);
  throw Error(
      ErrorKind::data,
      {.what = "the file's grid does not reach the plan's map",
       .where = grid.file,
       .found = fmt::format("the map lies at {}; the nearest point of the file is {}, {:.0f} km away, "
                            "and its points are {} apart",
                            globe_text(here), globe_text(near), distance_km(here, near), apart),
       .remedy = "Take a file that covers the map, and check the CRS of the ground"});
}

}  // namespace

ChosenPoints choose_points(const PointGrid& grid, double x, double y, const Place& place, bool bilinear) {
  require_monotone(grid.x, "columns", grid.file);
  require_monotone(grid.y, "rows", grid.file);
  const double lone = kLoneSpacing_deg * (grid.turn > 0.0 ? 1.0 : kMetresPerDegree);
  const double dx = spacing_of(grid.x);
  const double dy = spacing_of(grid.y);
  const OnAxis column = find_on(grid.x, x, grid.turn, dy > 0.0 ? dy : lone);
  const OnAxis row = find_on(grid.y, y, 0.0, dx > 0.0 ? dx : lone);
  if (!column.inside || !row.inside) {
    const double spacing = std::max(dx, dy);
    refuse_far(grid, column, row, place, spacing > 0.0 ? spacing : lone);
  }
  ChosenPoints chosen;
  const auto add = [&](std::size_t c, std::size_t r, double weight) {
    if (weight > 0.0) chosen.points.push_back({c, r, weight});
  };
  const double right = bilinear ? column.to_right : std::round(column.to_right);
  const double upper = bilinear ? row.to_right : std::round(row.to_right);
  add(column.left, row.left, (1.0 - right) * (1.0 - upper));
  add(column.right, row.left, right * (1.0 - upper));
  add(column.left, row.right, (1.0 - right) * upper);
  add(column.right, row.right, right * upper);
  const LonLat here{place.longitude.degrees(), place.latitude.degrees()};
  for (const GridPoint& point : chosen.points) {
    const LonLat there = grid.to_globe(grid.x[point.column], grid.y[point.row]);
    chosen.words += fmt::format("{}{} ({:.0f} km away", chosen.words.empty() ? "" : "; ", globe_text(there),
                                distance_km(here, there));
    chosen.words += chosen.points.size() > 1 ? fmt::format(", weight {:.2f})", point.weight) : ")";
  }
  return chosen;
}

}  // namespace sunfall
