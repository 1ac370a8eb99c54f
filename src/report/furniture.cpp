#include "report/furniture.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <sstream>
#include <vector>

namespace sunfall {

void draw_heading(Canvas& canvas, const PictureText& text, const std::string& subject) {
  const double width = canvas.width() - 2.0 * kPageMargin;
  TextStyle title{44.0, true};
  while (title.size > 30.0 && canvas.measure({}, text.title, title).width > 0.7 * width) title.size -= 2.0;
  const TextStyle line{24.0, false, ink::kQuiet};
  const Box drawn =
      canvas.text({kPageMargin, kPageMargin + 34.0}, canvas.fitted(text.title, 0.7 * width, title), title);
  const TextStyle what{24.0, false, ink::kText, Align::right};
  canvas.text({canvas.width() - kPageMargin, kPageMargin + 34.0},
              canvas.fitted(subject, width - drawn.width - 40.0, what), what);
  canvas.text({kPageMargin, kPageMargin + 78.0}, canvas.fitted(text.place, width, line), line);
  canvas.line({{kPageMargin, kPageMargin + 102.0}, {canvas.width() - kPageMargin, kPageMargin + 102.0}},
              {1.5, ink::kRule});
}

double draw_paragraph(Canvas& canvas, Point top_left, double width, const std::string& text,
                      const TextStyle& style, int most_lines) {
  const double line_height = 1.38 * style.size;
  std::vector<std::string> lines(1);
  std::istringstream words(clean_text(text));
  for (std::string word; words >> word;) {
    const std::string longer = lines.back().empty() ? word : lines.back() + " " + word;
    const bool is_last = static_cast<int>(lines.size()) == most_lines;
    if (is_last || lines.back().empty() || canvas.measure({}, longer, style).width <= width) {
      lines.back() = longer;
    } else {
      lines.push_back(word);
    }
  }
  double y = top_left.y;
  for (const std::string& line : lines) {
    canvas.text({top_left.x, y + style.size}, canvas.fitted(line, width, style), style);
    y += line_height;
  }
  return y;
}

double draw_legend(Canvas& canvas, Point top_left, double height, const LightScale& scale,
                   const std::string& quantity, const std::string& unit) {
  canvas.text({top_left.x, top_left.y + 22.0}, quantity, {22.0, true});
  canvas.text({top_left.x, top_left.y + 52.0}, unit, {20.0, false, ink::kQuiet});
  const Box bar{top_left.x, top_left.y + 78.0, 46.0, height - 88.0};
  PixelImage ramp{1, 256, {}};
  for (int i = 0; i < ramp.height; ++i) {
    ramp.pixels.push_back(opaque_pixel(light_colour(1.0 - (i + 0.5) / ramp.height)));
  }
  canvas.image(bar, ramp);
  canvas.outline(bar, {1.0, ink::kQuiet});
  for (const double tick : scale.ticks()) {
    const double y = bar.bottom() - bar.height * tick / scale.maximum;
    canvas.line({{bar.right(), y}, {bar.right() + 10.0, y}}, {1.5, ink::kQuiet});
    canvas.text({bar.right() + 18.0, y + 7.0}, tick_text(tick, scale.step), {20.0});
  }
  return top_left.y + height;
}

double draw_scale_bar(Canvas& canvas, Point top_left, double most_width, double units_per_metre) {
  const double length_m = round_down_125(most_width / units_per_metre);
  const double length = length_m * units_per_metre;
  const double y = top_left.y + 34.0;
  canvas.text({top_left.x, top_left.y + 18.0}, length_text(length_m), {20.0});
  canvas.fill({top_left.x, y, length, 8.0}, ink::kText);
  canvas.fill({top_left.x + 0.5 * length, y + 1.5, 0.5 * length - 1.5, 5.0}, ink::kPaper);
  return y + 8.0;
}

double draw_north_arrow(Canvas& canvas, Point top_left, double convergence_deg) {
  constexpr double kReach = 38.0;
  const Point centre{top_left.x + 30.0, top_left.y + 66.0};
  const double turn = -convergence_deg * std::numbers::pi / 180.0;  // true north from the page's up
  const auto at = [&](double across, double along) -> Point {
    return {centre.x + across * std::cos(turn) + along * std::sin(turn),
            centre.y + across * std::sin(turn) - along * std::cos(turn)};
  };
  canvas.fill_rings({{at(0, kReach), at(-17, -kReach), at(0, -0.62 * kReach)}}, ink::kText);
  canvas.outline_rings({{at(0, kReach), at(17, -kReach), at(0, -0.62 * kReach)}}, {1.5, ink::kText});
  const Point letter = at(0, kReach + 18.0);
  canvas.text({letter.x, letter.y + 8.0}, "N", {22.0, true, ink::kText, Align::centre});
  const double x = top_left.x + 84.0;
  canvas.text({x, centre.y - 12.0}, "true north", {20.0});
  const double off = std::abs(convergence_deg);
  const char* side = convergence_deg > 0.0 ? "east" : "west";
  const std::string grid = off < 0.05 ? "the same" : fmt::format("{:.1f}° {} of it", off, side);
  const TextStyle note{17.0, false, ink::kQuiet};
  canvas.text({x, centre.y + 14.0}, "grid north is up,", note);
  canvas.text({x, centre.y + 38.0}, grid, note);
  return top_left.y + 110.0;
}

double draw_ceiling_badge(Canvas& canvas, Point top_left, double width) {
  const Box badge{top_left.x, top_left.y, width, 44.0};
  canvas.fill(badge, ink::kAccent);
  canvas.text({badge.middle().x, badge.y + 30.0}, "Cloudless ceiling",
              {22.0, true, ink::kPaper, Align::centre});
  return draw_paragraph(canvas, {top_left.x, badge.bottom() + 10.0}, width,
                        "Light without any cloud: real months are darker.", {18.0, false, ink::kAccent});
}

std::string light_text(double value) {
  return std::isfinite(value) ? fmt::format("{:.1f}", value) : "no value";
}

std::string tick_text(double value, double step) {
  const int decimals = std::max(0, -static_cast<int>(std::floor(std::log10(step) + 1e-9)));
  return fmt::format("{:.{}f}", value, decimals);
}

std::string length_text(double length_m) {
  return length_m >= 1000.0 ? fmt::format("{:g} km", length_m / 1000.0) : fmt::format("{:g} m", length_m);
}

}  // namespace sunfall
