#include "report/contact_sheet.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>

#include "report/map_image.h"
#include "report/plot_outlines.h"
#include "report/sheet_layout.h"

namespace sunfall {
namespace {

bool is_missing(float value) { return !std::isfinite(value); }

bool any_missing(const std::vector<MapPanel>& maps) {
  return std::any_of(maps.begin(), maps.end(), [](const MapPanel& map) {
    return std::any_of(map.light.values().begin(), map.light.values().end(), is_missing);
  });
}

void draw_panel_map(Canvas& canvas, const Box& box, const MapPanel& panel, const LightScale& scale) {
  const auto& values = panel.light.values();
  if (std::any_of(values.begin(), values.end(), is_missing)) canvas.hatch(box);
  const double pixels = canvas.scale();
  canvas.image(box, light_image(panel.light, scale, static_cast<int>(std::lround(box.width * pixels)),
                                static_cast<int>(std::lround(box.height * pixels))));
}

// The colour that most of a map's plots lie on.
Colour ground_colour(const MapPanel& panel, const LightScale& scale) {
  const double mean = panel.numbers.mean;
  return std::isfinite(mean) ? scale.colour(mean) : ink::kHatchGround;
}

std::string range_text(const MapNumbers& numbers) {
  if (!std::isfinite(numbers.least)) return "no value";
  return light_text(numbers.least) + "–" + light_text(numbers.most);
}

// "January   mean 31.2" over "min–max 20.1–38.0   open field 38.4"; three lines where it is narrow.
void draw_caption(Canvas& canvas, const Box& box, const MapPanel& panel) {
  const TextStyle name{23.0, true};
  const TextStyle mean{23.0, true, ink::kAccent, Align::right};
  const TextStyle left{18.0, false, ink::kQuiet};
  const TextStyle right{18.0, false, ink::kQuiet, Align::right};
  const std::string mean_text = light_text(panel.numbers.mean);
  const Box number = canvas.text({box.right(), box.y + 31.0}, mean_text, mean);
  const Box word = canvas.text({number.x - 8.0, box.y + 31.0}, "mean", right);
  const double room = word.x - box.x - 16.0;
  canvas.text({box.x, box.y + 31.0}, canvas.fitted(panel.name, room, name), name);
  const std::string range = "min–max " + range_text(panel.numbers);
  const std::string open = "open field " + light_text(panel.numbers.open_field);
  const bool narrow = box.height > 80.0;
  canvas.text({box.x, box.y + 60.0}, range, left);
  if (narrow) {
    canvas.text({box.x, box.y + 86.0}, open, left);
  } else {
    canvas.text({box.right(), box.y + 60.0}, open, right);
  }
}

// A labelled sample of what the hatch or an outline means. Returns the y below.
double draw_swatch(Canvas& canvas, Point top_left, const std::string& label, bool hatched) {
  const Box swatch{top_left.x, top_left.y, 46.0, 26.0};
  if (hatched) canvas.hatch(swatch);
  canvas.outline(swatch, {hatched ? 1.0 : 2.0, hatched ? ink::kQuiet : ink::kText});
  canvas.text({swatch.right() + 18.0, swatch.bottom() - 6.0}, label, {20.0});
  return swatch.bottom() + 14.0;
}

void draw_side(Canvas& canvas, const SheetLayout& layout, const MapContext& context,
               const std::vector<MapPanel>& maps) {
  const Box& side = layout.side;
  const GridFrame& frame = maps.front().light.frame();
  double y = side.y;
  if (context.text.is_ceiling) y = draw_ceiling_badge(canvas, {side.x, y}, side.width) + 26.0;
  // Everything below the legend hangs from the column's foot; the legend takes what is left.
  constexpr double kBelowLegend = 560.0;
  y = draw_legend(canvas, {side.x, y}, side.bottom() - kBelowLegend - y, shared_scale(maps), context.quantity,
                  kDliUnit);
  y += 24.0;
  if (any_missing(maps)) y = draw_swatch(canvas, {side.x, y}, "no value", true);
  if (!context.plots.empty()) y = draw_swatch(canvas, {side.x, y}, "plot", false);
  const TextStyle note{17.0, false, ink::kQuiet};
  draw_paragraph(canvas, {side.x, y + 4.0}, side.width,
                 std::string(maps.size() > 1 ? "Beneath each map" : "Beneath the map") +
                     ": mean, lowest and highest cell, and the open field, in " + kDliUnit + ".",
                 note);
  y = side.bottom() - 340.0;
  y = draw_scale_bar(canvas, {side.x, y}, std::min(0.8 * side.width, layout.map_width),
                     layout.map_width / (frame.columns * frame.cell_m));
  y = draw_north_arrow(canvas, {side.x, y + 30.0}, context.convergence_deg);
  draw_paragraph(canvas, {side.x, y + 24.0}, side.width, "Light: " + context.text.light, note, 5);
}

}  // namespace

LightScale shared_scale(const std::vector<MapPanel>& maps) {
  double largest = 0.0;
  for (const MapPanel& map : maps) {
    for (const double value : {map.numbers.most, map.numbers.open_field}) {
      if (std::isfinite(value)) largest = std::max(largest, value);
    }
    for (const float value : map.light.values()) {
      if (std::isfinite(value)) largest = std::max(largest, static_cast<double>(value));
    }
  }
  return LightScale::holding(largest);
}

MapNumbers numbers_of(const Grid<float>& light, double open_field) {
  MapNumbers numbers;
  numbers.open_field = open_field;
  double sum = 0.0;
  std::size_t count = 0;
  for (const float value : light.values()) {
    if (is_missing(value)) continue;
    sum += value;
    ++count;
    numbers.least = std::fmin(numbers.least, value);  // fmin and fmax pass over the first NaN
    numbers.most = std::fmax(numbers.most, value);
  }
  if (count > 0) numbers.mean = sum / static_cast<double>(count);
  return numbers;
}

Canvas paint_maps(const std::filesystem::path& file, const MapContext& context, const std::string& subject,
                  const std::vector<MapPanel>& maps) {
  const GridFrame& frame = maps.front().light.frame();
  SheetRequest request;
  request.maps = static_cast<int>(maps.size());
  request.aspect = static_cast<double>(frame.columns) / frame.rows;
  const SheetLayout layout = lay_out(request);
  Canvas canvas(file, layout.width, layout.height);
  const LightScale scale = shared_scale(maps);
  draw_heading(canvas, context.text, subject);
  for (int i = 0; i < request.maps; ++i) {
    const Box box = layout.map(i);
    const MapPanel& panel = maps[static_cast<std::size_t>(i)];
    draw_panel_map(canvas, box, panel, scale);
    draw_plot_outlines(canvas, box, frame, context.plots, ground_colour(panel, scale));
    canvas.outline(box, {1.0, ink::kQuiet});
    draw_caption(canvas, layout.caption(i), panel);
  }
  draw_side(canvas, layout, context, maps);
  return canvas;
}

void draw_contact_sheet(const std::filesystem::path& file, const ContactSheet& sheet) {
  paint_maps(file, sheet.context, "Light month by month", sheet.months).save();
}

void draw_map(const std::filesystem::path& file, const SingleMap& map) {
  paint_maps(file, map.context, map.subject, {map.map}).save();
}

}  // namespace sunfall
