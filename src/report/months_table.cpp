#include "report/months_table.h"

#include <algorithm>
#include <array>
#include <cmath>

#include "report/furniture.h"

namespace sunfall {
namespace {

constexpr double kNameWidth = 62.0;
constexpr double kNumberWidth = 76.0;
constexpr double kLeastRow = 34.0;
constexpr double kMostRow = 52.0;
constexpr double kBarShare = 0.54;     // of a row's height
constexpr double kAroundRows = 190.0;  // headings above, notes below

double or_zero(double value) { return std::isfinite(value) ? value : 0.0; }

struct Columns {
  double bar;  // left edge of the bars
  double bar_width;
  std::array<double, 4> number;  // right edges: beam, sky, both, open field
};

Columns columns_of(const Box& box) {
  Columns columns{box.x + kNameWidth, box.width - kNameWidth - 4.0 * kNumberWidth, {}};
  for (int i = 0; i < 4; ++i) columns.number[i] = box.right() - (3 - i) * kNumberWidth;
  return columns;
}

void draw_headings(Canvas& canvas, const Columns& columns, double baseline) {
  const double square = 14.0;
  const std::array<const char*, 4> names{"beam", "sky", "both", "open"};
  const std::array<Colour, 2> colours{ink::kAccent, ink::kSky};
  for (std::size_t i = 0; i < names.size(); ++i) {
    const Box word =
        canvas.text({columns.number[i], baseline}, names[i], {18.0, false, ink::kQuiet, Align::right});
    if (i < 2) canvas.fill({word.x - square - 6.0, baseline - square + 1.0, square, square}, colours[i]);
  }
}

// `row` is as wide as the table.
void draw_row(Canvas& canvas, const Columns& columns, const Box& row, const MonthLight& month,
              double units_per_light) {
  const double baseline = row.middle().y + 7.0;
  canvas.text({row.x, baseline}, canvas.fitted(month.name, kNameWidth - 8.0, {19.0}), {19.0});
  const double beam = or_zero(month.beam) * units_per_light;
  const double sky = or_zero(month.sky) * units_per_light;
  const double height = kBarShare * row.height;
  const double y = row.middle().y - 0.5 * height;
  canvas.fill({columns.bar, y, beam, height}, ink::kAccent);
  canvas.fill({columns.bar + beam, y, sky, height}, ink::kSky);
  canvas.outline({columns.bar, y, or_zero(month.open_field) * units_per_light, height}, {1.2, ink::kQuiet});
  const std::array<double, 4> numbers{month.beam, month.sky, month.beam + month.sky, month.open_field};
  for (std::size_t i = 0; i < numbers.size(); ++i) {
    const std::string number = std::isfinite(numbers[i]) ? light_text(numbers[i]) : "–";
    canvas.text({columns.number[i], baseline}, number, {19.0, i == 2, ink::kText, Align::right});
  }
}

}  // namespace

double draw_months_table(Canvas& canvas, const Box& box, const std::vector<MonthLight>& months) {
  canvas.text({box.x, box.y + 22.0}, "Daily light integral", {22.0, true});
  canvas.text({box.x, box.y + 52.0}, kDliUnit, {20.0, false, ink::kQuiet});
  const Columns columns = columns_of(box);
  draw_headings(canvas, columns, box.y + 52.0);
  double largest = 0.0;
  for (const MonthLight& month : months) {
    largest = std::max({largest, or_zero(month.beam) + or_zero(month.sky), or_zero(month.open_field)});
  }
  const double units_per_light = largest > 0.0 ? columns.bar_width / largest : 0.0;
  const double rows = std::max(1.0, static_cast<double>(months.size()));
  const double row_height = std::clamp((box.height - kAroundRows) / rows, kLeastRow, kMostRow);
  double y = box.y + 68.0;
  for (const MonthLight& month : months) {
    canvas.line({{box.x, y}, {box.right(), y}}, {1.0, ink::kRule});
    draw_row(canvas, columns, {box.x, y, box.width, row_height}, month, units_per_light);
    y += row_height;
  }
  canvas.line({{box.x, y}, {box.right(), y}}, {1.0, ink::kRule});
  return draw_paragraph(canvas, {box.x, y + 8.0}, box.width,
                        "The thin frame of a bar is the open field, beam and sky together.",
                        {17.0, false, ink::kQuiet});
}

}  // namespace sunfall
