#include "report/sun_chart.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <map>

namespace sunfall {
namespace {

constexpr double kUnknownHeight = 24.0;  // of the hatched strip where the horizon is not known

// The chart ends above everything that it shows, at a full ten degrees.
double top_of(const SunPathPicture& picture) {
  double highest = 20.0;
  for (const SunDayPath& day : picture.days) {
    for (const SunPoint& point : day.points) highest = std::max(highest, point.elevation_deg);
  }
  for (const double elevation : picture.horizon_deg) {
    if (std::isfinite(elevation)) highest = std::max(highest, elevation);
  }
  return std::min(90.0, 10.0 * std::ceil((highest + 4.0) / 10.0));
}

void draw_axes(Canvas& canvas, const SunChart& chart) {
  const Box& box = chart.box();
  canvas.fill(box, ink::kAir);
  const LineStyle rule{1.0, ink::kRule};
  for (double elevation = 0.0; elevation <= chart.top_elevation_deg(); elevation += 10.0) {
    const double y = chart.at(0.0, elevation).y;
    canvas.line({{box.x, y}, {box.right(), y}}, rule);
    canvas.text({box.x - 14.0, y + 7.0}, fmt::format("{:.0f}°", elevation),
                {19.0, false, ink::kQuiet, Align::right});
  }
  const std::array<const char*, 4> winds{"N", "E", "S", "W"};
  for (int step = 0; step <= 12; ++step) {
    const double azimuth = chart.first_azimuth_deg() + 30.0 * step;
    const double x = chart.at(azimuth, 0.0).x;
    canvas.line({{x, box.y}, {x, box.bottom() + 8.0}}, rule);
    const int bearing = static_cast<int>(std::lround(std::fmod(azimuth + 720.0, 360.0))) % 360;
    canvas.text({x, box.bottom() + 32.0}, fmt::format("{}°", bearing),
                {19.0, false, ink::kQuiet, Align::centre});
    if (bearing % 90 == 0) {
      canvas.text({x, box.bottom() + 60.0}, winds[bearing / 90], {22.0, true, ink::kText, Align::centre});
    }
  }
}

// The day's path in pieces that do not jump across the chart's edge; a piece ends on the edge.
std::vector<std::vector<Point>> pieces_of(const SunChart& chart, const SunDayPath& day) {
  std::vector<std::vector<Point>> pieces(1);
  const SunPoint* before = nullptr;
  for (const SunPoint& point : day.points) {
    const double azimuth = chart.on_chart(point.azimuth_deg);
    if (before != nullptr) {
      const double from = chart.on_chart(before->azimuth_deg);
      const double jump = azimuth - from;
      if (std::abs(jump) > 180.0) {
        const double turn = jump > 0.0 ? -360.0 : 360.0;
        pieces.back().push_back(chart.at(azimuth + turn, point.elevation_deg));
        pieces.push_back({chart.at(from - turn, before->elevation_deg)});
      }
    }
    pieces.back().push_back(chart.at(azimuth, point.elevation_deg));
    before = &point;
  }
  return pieces;
}

// The same clock hour on all days, joined by a dashed line.
void draw_hour_lines(Canvas& canvas, const SunChart& chart, const std::vector<SunDayPath>& days) {
  std::map<std::string, std::vector<Point>> hours;
  for (const SunDayPath& day : days) {
    for (const SunPoint& point : day.points) {
      if (point.hour.empty()) continue;
      const Point next = chart.at(chart.on_chart(point.azimuth_deg), point.elevation_deg);
      std::vector<Point>& line = hours[point.hour];
      // Around a sun near the zenith the azimuth leaps, and the line would cross the whole chart.
      if (!line.empty() && std::abs(next.x - line.back().x) > 0.25 * chart.box().width) line.clear();
      line.push_back(next);
      if (line.size() > 1) canvas.line({line[line.size() - 2], next}, {1.2, ink::kQuiet, 0.6, 4.0});
    }
  }
}

void draw_paths(Canvas& canvas, const SunChart& chart, const std::vector<SunDayPath>& days) {
  draw_hour_lines(canvas, chart, days);
  for (std::size_t i = 0; i < days.size(); ++i) {
    const bool solstice = i == 0 || i + 1 == days.size();
    for (const std::vector<Point>& piece : pieces_of(chart, days[i])) {
      canvas.line(piece, {solstice ? 3.4 : 2.0, ink::kAccent});
    }
    for (const SunPoint& point : days[i].points) {
      if (point.hour.empty()) continue;
      canvas.dot(chart.at(chart.on_chart(point.azimuth_deg), point.elevation_deg), solstice ? 5.0 : 3.8,
                 ink::kAccent);
    }
  }
}

void draw_horizon(Canvas& canvas, const SunChart& chart, const std::vector<double>& horizon_deg) {
  const auto count = static_cast<int>(horizon_deg.size());
  if (count == 0) return;
  const double step_deg = 360.0 / count;
  const double foot = chart.box().bottom();
  const auto known = [&](int i) { return std::isfinite(horizon_deg[((i % count) + count) % count]); };
  const auto top = [&](int i) {
    const double elevation = horizon_deg[((i % count) + count) % count];
    return chart.at(i * step_deg, std::max(0.0, elevation));
  };
  const int first = static_cast<int>(std::floor(chart.first_azimuth_deg() / step_deg));
  const auto x_of = [&](int i) { return chart.at(i * step_deg, 0.0).x; };
  for (int i = first; i <= first + count; ++i) {
    if (known(i)) continue;
    const int begin = i;
    while (i <= first + count && !known(i)) ++i;
    canvas.hatch({x_of(begin - 1), foot - kUnknownHeight, x_of(i) - x_of(begin - 1), kUnknownHeight});
  }
  // One polygon a stretch of known horizon, so that no seams show.
  std::vector<Point> land;
  for (int i = first; i <= first + count + 1; ++i) {
    if (known(i)) {
      if (land.empty()) land.push_back({top(i).x, foot});
      land.push_back(top(i));
    }
    if (!land.empty() && (!known(i) || i == first + count + 1)) {
      land.push_back({land.back().x, foot});
      canvas.fill_rings({land}, ink::kLand, 0.88);
      land.clear();
    }
  }
}

// The day's name under the top of its path, or the next best point where nothing else stands.
void write_name(Canvas& canvas, const SunChart& chart, const SunDayPath& day, bool solstice) {
  std::vector<const SunPoint*> by_height;
  for (const SunPoint& point : day.points) {
    if (point.elevation_deg > 0.0) by_height.push_back(&point);
  }
  std::stable_sort(by_height.begin(), by_height.end(),
                   [](const SunPoint* a, const SunPoint* b) { return a->elevation_deg > b->elevation_deg; });
  const TextStyle style{17.0, solstice, ink::kText, Align::centre, ink::kPaper};
  for (const SunPoint* point : by_height) {
    const Point on_line = chart.at(chart.on_chart(point->azimuth_deg), point->elevation_deg);
    const Point baseline{on_line.x, on_line.y + 21.0};
    const Box label = canvas.measure(baseline, day.name, style);
    if (!chart.box().holds(label) || !canvas.is_free(label.grown(2.0))) continue;
    canvas.text(baseline, day.name, style);
    return;
  }
}

// The hours beside the marks of the longest day, on the line's outer side.
void write_hours(Canvas& canvas, const SunChart& chart, const SunDayPath& day) {
  for (std::size_t i = 0; i < day.points.size(); ++i) {
    const SunPoint& point = day.points[i];
    if (point.hour.empty() || point.elevation_deg <= 0.0) continue;
    const SunPoint& before = day.points[i > 0 ? i - 1 : i];
    const SunPoint& after = day.points[i + 1 < day.points.size() ? i + 1 : i];
    const Point a = chart.at(chart.on_chart(before.azimuth_deg), before.elevation_deg);
    const Point b = chart.at(chart.on_chart(after.azimuth_deg), after.elevation_deg);
    const double length = std::hypot(b.x - a.x, b.y - a.y);
    if (length <= 0.0) continue;
    // Perpendicular to the path, upwards.
    const double side = b.x >= a.x ? 1.0 : -1.0;
    const Point dot = chart.at(chart.on_chart(point.azimuth_deg), point.elevation_deg);
    const Point centre{dot.x + side * 22.0 * (b.y - a.y) / length,
                       dot.y - side * 22.0 * (b.x - a.x) / length};
    const TextStyle style{17.0, false, ink::kText, Align::centre, ink::kPaper};
    const Point baseline{centre.x, centre.y + 6.0};
    const Box label = canvas.measure(baseline, point.hour, style);
    if (chart.box().holds(label) && canvas.is_free(label.grown(2.0)))
      canvas.text(baseline, point.hour, style);
  }
}

// The day whose sun climbs highest.
const SunDayPath* longest_day(const std::vector<SunDayPath>& days) {
  const auto highest = [](const SunDayPath& day) {
    double top = -90.0;
    for (const SunPoint& point : day.points) top = std::max(top, point.elevation_deg);
    return top;
  };
  const auto lower = [&](const SunDayPath& a, const SunDayPath& b) { return highest(a) < highest(b); };
  return days.empty() ? nullptr : &*std::max_element(days.begin(), days.end(), lower);
}

}  // namespace

SunChart::SunChart(const Box& box, const SunPathPicture& picture)
    : box_(box), centre_azimuth_deg_(picture.centre_azimuth_deg), top_elevation_deg_(top_of(picture)) {}

double SunChart::on_chart(double azimuth_deg) const {
  const double turned = std::fmod(azimuth_deg - first_azimuth_deg(), 360.0);
  return first_azimuth_deg() + (turned < 0.0 ? turned + 360.0 : turned);
}

Point SunChart::at(double azimuth_deg, double elevation_deg) const {
  return {box_.x + (azimuth_deg - first_azimuth_deg()) / 360.0 * box_.width,
          box_.bottom() - elevation_deg / top_elevation_deg_ * box_.height};
}

void draw_sun_chart(Canvas& canvas, const SunChart& chart, const SunPathPicture& picture) {
  draw_axes(canvas, chart);
  {
    const Canvas::Clip clip(canvas, chart.box());
    draw_paths(canvas, chart, picture.days);
    draw_horizon(canvas, chart, picture.horizon_deg);
  }
  canvas.outline(chart.box(), {1.2, ink::kQuiet});
  if (const SunDayPath* longest = longest_day(picture.days)) write_hours(canvas, chart, *longest);
  for (std::size_t i = 0; i < picture.days.size(); ++i) {
    write_name(canvas, chart, picture.days[i], i == 0 || i + 1 == picture.days.size());
  }
}

}  // namespace sunfall
