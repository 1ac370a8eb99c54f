// A page of maps shows the right colours in the right places, with every number that a map needs.

#include "report/contact_sheet.h"

#include <cmath>
#include <numbers>

#include "report/sheet_layout.h"
#include "report_support.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr std::array<const char*, 12> kMonths{"January",   "February", "March",    "April",
                                              "May",       "June",     "July",     "August",
                                              "September", "October",  "November", "December"};

float value_at(int month, int column, int row) {
  return static_cast<float>(1.0 + 2.5 * month + 0.4 * column + 0.25 * row);
}

struct SheetShape {
  int columns = 12;
  int rows = 10;
  bool missing = false;
  bool all_missing = false;
  bool ceiling = false;
  bool plots = false;
  std::string title = "Alder Reach";
};

ContactSheet sheet_of(const SheetShape& shape) {
  ContactSheet sheet;
  sheet.context.text = {shape.title, "5.6654° E, 51.9692° N · EPSG:25831",
                        "twelve monthly means of global radiation", shape.ceiling};
  sheet.context.convergence_deg = 2.1;
  const GridFrame frame{shape.columns, shape.rows, 690000.0, 5760000.0, 2.0, ""};
  if (shape.plots) {
    const double east = frame.west + frame.columns * frame.cell_m;
    const double south = frame.north - frame.rows * frame.cell_m;
    sheet.context.plots = {{"P1", {{{frame.west, frame.north}, {frame.west, south}, frame.middle()}}},
                           {"a plot with a name that no map has room for",
                            {{{east, frame.north}, {east, south}, frame.middle()}}}};
  }
  for (int month = 0; month < 12; ++month) {
    Grid<float> light(frame);
    for (int row = 0; row < frame.rows; ++row) {
      for (int column = 0; column < frame.columns; ++column) {
        const bool hole = shape.all_missing || (shape.missing && column == 3 && row == 2);
        light.at(column, row) = hole ? kMissing : value_at(month, column % 12, row % 10);
      }
    }
    sheet.months.push_back({kMonths[month], light, numbers_of(light, 38.0)});
  }
  return sheet;
}

using ContactSheetTest = FolderTest;

TEST_F(ContactSheetTest, IsTidyForEveryShape) {
  const std::string long_title =
      "The very long name of an invented estate that goes on and on past every margin of any page, Alder "
      "Reach";
  const std::vector<SheetShape> shapes{
      {},
      {600, 500, true, false, true, true},
      {900, 150, true, false, true, true},
      {60, 600, true, false, true, true},
      {1, 1},
      {2000, 3, true, false, false, true},
      {3, 2000, true, false, false, true},
      {40, 40, false, true, true, true, long_title},
      {40, 40, false, false, false, false, std::string(5000, 'W')},
      {40, 40, false, false, false, false, ""},
  };
  for (const SheetShape& shape : shapes) {
    SCOPED_TRACE(std::to_string(shape.columns) + " x " + std::to_string(shape.rows));
    ContactSheet sheet = sheet_of(shape);
    expect_tidy(paint_maps(folder_ / "a.png", sheet.context, "Light month by month", sheet.months));
    expect_tidy(paint_maps(folder_ / "a.png", sheet.context, "Light of the year", {sheet.months.front()}));
    sheet.context.text.light =
        std::string(300, 'm') + " and a source that takes many words to describe, " + long_title;
    sheet.context.convergence_deg = -170.0;
    sheet.context.text.place = long_title + long_title;
    expect_tidy(paint_maps(folder_ / "a.png", sheet.context, long_title, sheet.months));
  }
}

TEST_F(ContactSheetTest, EveryCellHasItsColourOnTheSharedScale) {
  const ContactSheet sheet = sheet_of({12, 10, true});
  draw_contact_sheet(folder_ / "a.png", sheet);
  const Pixels pixels(folder_ / "a.png");
  const SheetLayout layout = lay_out({12, 1.2});
  const LightScale scale = LightScale::holding(38.0);
  EXPECT_EQ(scale.maximum, 40.0);
  for (int month = 0; month < 12; ++month) {
    const Box map = layout.map(month);
    const double cell = map.width / 12.0;
    for (int row = 0; row < 10; ++row) {
      for (int column = 0; column < 12; ++column) {
        const Point middle{map.x + (column + 0.5) * cell, map.y + (row + 0.5) * cell};
        if (column == 3 && row == 2) {
          const Box hole{middle.x - 0.4 * cell, middle.y - 0.4 * cell, 0.8 * cell, 0.8 * cell};
          EXPECT_GT(pixels.count(hole, ink::kHatchGround), 20) << kMonths[month];
          EXPECT_LT(pixels.count(hole, ink::kHatchGround), 0.9 * hole.width * hole.height);
          continue;
        }
        EXPECT_EQ(pixels.at(middle.x, middle.y), rgb_of(scale.colour(value_at(month, column, row))))
            << kMonths[month] << " " << column << ", " << row;
      }
    }
  }
}

TEST_F(ContactSheetTest, NoMapIsWithoutItsNumbers) {
  ContactSheet sheet = sheet_of({12, 10, true, false, true, true});
  for (int month = 0; month < 12; ++month) {
    const double base = 1.0 + 2.0 * month;
    sheet.months[month].numbers = {base + 0.52, base + 0.04, base + 1.96, base + 3.0};
  }
  const Canvas canvas = paint_maps(folder_ / "a.png", sheet.context, "Light month by month", sheet.months);
  for (int month = 0; month < 12; ++month) {
    const int base = 1 + 2 * month;
    const auto at = [&](double tenths) { return light_text(base + tenths); };
    EXPECT_EQ(count_text(canvas, kMonths[month]), 1);
    EXPECT_EQ(count_text(canvas, std::to_string(base) + ".5"), 1) << "mean of " << kMonths[month];
    EXPECT_EQ(count_text(canvas, "min–max " + at(0.0) + "–" + at(2.0)), 1);
    EXPECT_EQ(count_text(canvas, "open field " + at(3.0)), 1);
  }
  for (const char* text :
       {"Alder Reach", "Light month by month", "Daily light integral", "mol\u00A0m⁻²\u00A0d⁻¹", "no value",
        "plot", "true north", "N", "Cloudless ceiling", "0", "5", "10", "25", "2.1° east of it"}) {
    EXPECT_EQ(count_text(canvas, text), 1) << text;
  }
  EXPECT_EQ(count_text(canvas, "P1"), 12);
}

TEST_F(ContactSheetTest, SaysOnlyWhatHolds) {
  const ContactSheet sheet = sheet_of({});
  const Canvas canvas = paint_maps(folder_ / "a.png", sheet.context, "Light month by month", sheet.months);
  for (const char* text : {"no value", "plot", "Cloudless ceiling"})
    EXPECT_EQ(count_text(canvas, text), 0) << text;
}

TEST_F(ContactSheetTest, AllMissingSaysSo) {
  const ContactSheet sheet = sheet_of({12, 10, false, true});
  const Canvas canvas = paint_maps(folder_ / "a.png", sheet.context, "Light month by month", sheet.months);
  EXPECT_EQ(count_text(canvas, "no value"), 13);  // twelve means and the legend
  EXPECT_EQ(count_text(canvas, "min–max no value"), 12);
}

TEST_F(ContactSheetTest, PlotOutlinesLieOnTheirEdges) {
  ContactSheet sheet = sheet_of({12, 10});
  const double east = 690000.0;
  const double north = 5760000.0;
  // Cells 4 to 8 across, 2 to 6 down; cells are 2 m.
  sheet.context.plots = {
      {"",
       {{{east + 8, north - 4}, {east + 16, north - 4}, {east + 16, north - 12}, {east + 8, north - 12}}}}};
  draw_contact_sheet(folder_ / "with.png", sheet);
  sheet.context.plots.clear();
  draw_contact_sheet(folder_ / "without.png", sheet);
  const Pixels with(folder_ / "with.png");
  const Pixels without(folder_ / "without.png");
  const Box map = lay_out({12, 1.2}).map(0);
  const double cell = map.width / 12.0;
  const Box plot{map.x + 4 * cell, map.y + 2 * cell, 4 * cell, 4 * cell};
  int changed = 0;
  for (double y = map.y + 2; y < map.bottom() - 2; ++y) {
    for (double x = map.x + 2; x < map.right() - 2; ++x) {
      if (with.at(x, y) == without.at(x, y)) continue;
      ++changed;
      const Box pixel{std::floor(x) + 0.5, std::floor(y) + 0.5, 0, 0};
      // Half of the rim's 3.4 and a pixel of antialiasing.
      EXPECT_TRUE(plot.grown(2.7).holds(pixel) && !plot.grown(-2.7).holds(pixel)) << x << ", " << y;
    }
  }
  EXPECT_GT(changed, 4 * 4 * cell);  // all four sides
}

TEST_F(ContactSheetTest, TheArrowPointsToTrueNorth) {
  for (const double convergence_deg : {0.0, 3.0, -20.0, 40.0}) {
    Canvas canvas(folder_ / "a.png", 600, 200);
    draw_north_arrow(canvas, {100, 20}, convergence_deg);
    const Canvas::WrittenText& letter = canvas.texts().front();
    ASSERT_EQ(letter.text, "N");
    // The letter stands beyond the tip. Grid north, up the page, bears `convergence` east of true
    // north, so true north lies as far west of up.
    const Point centre{100 + 30, 20 + 66};
    const double x = letter.box.middle().x - centre.x;
    const double y = centre.y - (letter.box.y + 0.76 * 22.0 - 8.0);
    EXPECT_NEAR(std::atan2(x, y) * 180.0 / std::numbers::pi, -convergence_deg, 0.5);
  }
}

TEST_F(ContactSheetTest, TheScaleBarIsAsLongAsItSays) {
  Canvas canvas(folder_ / "a.png", 600, 100);
  draw_scale_bar(canvas, {50, 20}, 300.0, 0.9);  // 300 units are 333 m
  EXPECT_EQ(canvas.texts().front().text, "200 m");
  canvas.save();
  const Pixels pixels(folder_ / "a.png");
  int length = 0;
  for (int x = 0; x < 600; ++x) length += pixels.at(x, 54) == rgb_of(ink::kText) ? 1 : 0;
  EXPECT_EQ(length, 180);
  EXPECT_EQ(length_text(2000.0), "2 km");
  EXPECT_EQ(length_text(0.5), "0.5 m");
}

TEST_F(ContactSheetTest, NumbersOfAGridLeaveTheMissingOut) {
  Grid<float> light(GridFrame{4, 1, 0, 0, 1.0, ""});
  light.values() = {kMissing, 2.0F, 7.0F, 3.0F};
  const MapNumbers numbers = numbers_of(light, 9.0);
  EXPECT_DOUBLE_EQ(numbers.mean, 4.0);
  EXPECT_DOUBLE_EQ(numbers.least, 2.0);
  EXPECT_DOUBLE_EQ(numbers.most, 7.0);
  EXPECT_DOUBLE_EQ(numbers.open_field, 9.0);
  light.values() = std::vector<float>(4, kMissing);
  EXPECT_TRUE(std::isnan(numbers_of(light, 9.0).mean));
}

// cairo numbers an SVG's parts through the whole process, so only a PNG is the same every time.
TEST_F(ContactSheetTest, SavesPngAndSvg) {
  const ContactSheet sheet = sheet_of({40, 30, true, false, true, true});
  for (const char* name : {"a.png", "b.png", "c.svg"}) draw_contact_sheet(folder_ / name, sheet);
  EXPECT_TRUE(content(folder_ / "a.png") == content(folder_ / "b.png"));
  EXPECT_GT(elements_of(content(folder_ / "c.svg")).size(), 100U);
  draw_map(folder_ / "year.png", {sheet.context, "Light of the year", sheet.months[5]});
  EXPECT_GT(Pixels(folder_ / "year.png").width(), 1000);
  EXPECT_EQ(entries(), 4);
}

}  // namespace
}  // namespace sunfall
