#include "report/sun_path.h"

#include <algorithm>
#include <cmath>

#include "report/sun_chart.h"

namespace sunfall {
namespace {

constexpr double kPageWidth = 2300.0;
constexpr double kPageHeight = 1300.0;
constexpr double kTableWidth = 620.0;

// Samples of what the chart shows, in a row.
void draw_key(Canvas& canvas, Point left, const SunPathPicture& picture) {
  const TextStyle style{18.0, false, ink::kQuiet};
  const double y = left.y;
  double x = left.x;
  canvas.line({{x, y}, {x + 40.0, y}}, {3.0, ink::kAccent});
  canvas.dot({x + 20.0, y}, 5.0, ink::kAccent);
  x = canvas.text({x + 52.0, y + 6.0}, "the sun's path with full hours, " + picture.clock, style).right() +
      44.0;
  const auto& horizon = picture.horizon_deg;
  if (std::any_of(horizon.begin(), horizon.end(), [](double e) { return std::isfinite(e); })) {
    canvas.fill({x, y - 11.0, 40.0, 22.0}, ink::kLand, 0.88);
    x = canvas.text({x + 52.0, y + 6.0}, "horizon of the place", style).right() + 44.0;
  }
  if (std::any_of(horizon.begin(), horizon.end(), [](double e) { return !std::isfinite(e); })) {
    canvas.hatch({x, y - 8.0, 40.0, 16.0});
    canvas.text({x + 52.0, y + 6.0}, "horizon not known", style);
  }
}

}  // namespace

Canvas paint_sun_path(const std::filesystem::path& file, const SunPathPicture& picture) {
  Canvas canvas(file, kPageWidth, kPageHeight);
  draw_heading(canvas, picture.text, picture.subject);
  const double top = kPageMargin + kHeadingHeight;
  const Box side{kPageWidth - kPageMargin - kTableWidth, top, kTableWidth, kPageHeight - kPageMargin - top};
  const Box chart_box{kPageMargin + 60.0, top + 40.0, side.x - 90.0 - kPageMargin - 60.0,
                      kPageHeight - kPageMargin - 160.0 - top - 40.0};
  canvas.text({kPageMargin, top + 18.0}, "Elevation of the sun", {19.0, false, ink::kQuiet});
  draw_sun_chart(canvas, SunChart(chart_box, picture), picture);
  canvas.text({chart_box.middle().x, chart_box.bottom() + 92.0}, "Azimuth, clockwise from true north",
              {19.0, false, ink::kQuiet, Align::centre});
  draw_key(canvas, {chart_box.x, kPageHeight - kPageMargin - 14.0}, picture);
  double y = side.y;
  if (picture.text.is_ceiling) y = draw_ceiling_badge(canvas, {side.x, y}, side.width) + 22.0;
  y = draw_months_table(canvas, {side.x, y, side.width, side.bottom() - y}, picture.months);
  draw_paragraph(canvas, {side.x, y + 14.0}, side.width, "Light: " + picture.text.light,
                 {17.0, false, ink::kQuiet}, 4);
  return canvas;
}

void draw_sun_path(const std::filesystem::path& file, const SunPathPicture& picture) {
  paint_sun_path(file, picture).save();
}

}  // namespace sunfall
