// The sun-path picture puts sun and horizon where they are.

#include "report/sun_path.h"

#include <cmath>
#include <numbers>

#include "report/sun_chart.h"
#include "report_support.h"

namespace sunfall {
namespace {

constexpr Box kChartBox{100, 100, 720, 300};

class SunPathTest : public FolderTest {
 protected:
  // The chart alone on a page.
  Pixels drawn(const SunChart& chart, const SunPathPicture& picture) const {
    Canvas canvas(folder_ / "chart.png", 900, 500);
    draw_sun_chart(canvas, chart, picture);
    canvas.save();
    return Pixels(folder_ / "chart.png");
  }
};

// The sun's path by spherical trigonometry, good enough to draw.
SunDayPath path_of(const std::string& name, double latitude_deg, double declination_deg) {
  const double degree = std::numbers::pi / 180.0;
  const double latitude = latitude_deg * degree;
  const double declination = declination_deg * degree;
  SunDayPath path{name, {}};
  for (int step = 0; step <= 288; ++step) {
    const double angle = (step / 12.0 - 12.3) * 15.0 * degree;
    const double sine = std::sin(latitude) * std::sin(declination) +
                        std::cos(latitude) * std::cos(declination) * std::cos(angle);
    const double azimuth = std::atan2(-std::cos(declination) * std::sin(angle),
                                      std::cos(latitude) * std::sin(declination) -
                                          std::sin(latitude) * std::cos(declination) * std::cos(angle));
    path.points.push_back({std::fmod(azimuth / degree + 360.0, 360.0), std::asin(sine) / degree,
                           step % 12 == 0 ? std::to_string(step / 12) : ""});
  }
  return path;
}

SunPathPicture picture_of(double latitude_deg, double centre_azimuth_deg) {
  SunPathPicture picture;
  picture.text = {"Alder Reach", "690,120 E 5,759,880 N · EPSG:25831",
                  "twelve monthly means of global radiation", false};
  picture.centre_azimuth_deg = centre_azimuth_deg;
  const std::vector<std::pair<std::string, double>> days{
      {"21 Jun", 23.44},         {"21 May, 21 Jul", 20.1},  {"21 Apr, 21 Aug", 11.7}, {"21 Mar, 21 Sep", 0.2},
      {"21 Feb, 21 Oct", -10.7}, {"21 Jan, 21 Nov", -20.0}, {"21 Dec", -23.44}};
  for (const auto& [name, declination] : days)
    picture.days.push_back(path_of(name, latitude_deg, declination));
  for (int i = 0; i < 720; ++i) picture.horizon_deg.push_back(i >= 220 && i <= 260 ? 18.0 : 4.0);
  for (const char* month :
       {"Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"}) {
    picture.months.push_back({month, 14.1, 17.6, 37.9});
  }
  return picture;
}

TEST_F(SunPathTest, IsTidyFromPoleToPole) {
  for (const double latitude : {78.0, 69.6, 51.97, 38.0, 23.4, 10.0, 0.0, -5.0, -23.4, -33.9, -54.8, -78.0}) {
    SCOPED_TRACE(latitude);
    SunPathPicture picture = picture_of(latitude, latitude >= 0.0 ? 180.0 : 0.0);
    expect_tidy(paint_sun_path(folder_ / "a.png", picture));
    picture.text.is_ceiling = true;
    picture.text.title = std::string(400, 'M');
    picture.text.light =
        std::string(50, 'w') + " many words about the light that fill line after line of the column";
    picture.months.push_back({"Year", 114.1, 117.6, 237.9});
    for (int i = 300; i < 500; ++i) picture.horizon_deg[i] = std::nan("");
    expect_tidy(paint_sun_path(folder_ / "a.png", picture));
  }
}

TEST_F(SunPathTest, NamesEveryDayThatHasASunAndTheHoursOfTheLongest) {
  const Canvas canvas = paint_sun_path(folder_ / "a.png", picture_of(51.97, 180.0));
  for (const char* text :
       {"21 Jun", "21 May, 21 Jul", "21 Apr, 21 Aug", "21 Mar, 21 Sep", "21 Feb, 21 Oct", "21 Jan, 21 Nov",
        "21 Dec", "E", "S", "W", "5", "12", "19", "beam", "sky", "both", "open", "horizon of the place"}) {
    EXPECT_EQ(count_text(canvas, text), 1) << text;
  }
  EXPECT_EQ(count_text(canvas, "N"), 2);
  EXPECT_EQ(count_text(canvas, "horizon not known"), 0);
  EXPECT_EQ(count_text(canvas, "31.7"), 12);  // beam and sky, both
}

TEST_F(SunPathTest, WorksWithNothingToShow) {
  SunPathPicture picture = picture_of(51.97, 180.0);
  picture.days.clear();
  picture.horizon_deg.clear();
  picture.months.clear();
  expect_tidy(paint_sun_path(folder_ / "a.png", picture));
  picture.horizon_deg.assign(360, std::nan(""));
  picture.months = {{"Jan", std::nan(""), std::nan(""), std::nan("")}};
  const Canvas canvas = paint_sun_path(folder_ / "a.png", picture);
  expect_tidy(canvas);
  EXPECT_EQ(count_text(canvas, "horizon of the place"), 0);
  EXPECT_EQ(count_text(canvas, "horizon not known"), 1);
  EXPECT_EQ(count_text(canvas, "–"), 4);
}

TEST_F(SunPathTest, TheChartTurnsToTheEquator) {
  const SunChart northern(kChartBox, picture_of(51.97, 180.0));
  EXPECT_DOUBLE_EQ(northern.at(180.0, 0.0).x, 460.0);
  EXPECT_DOUBLE_EQ(northern.at(90.0, 0.0).x, 280.0);
  EXPECT_DOUBLE_EQ(northern.top_elevation_deg(), 70.0);
  EXPECT_DOUBLE_EQ(northern.at(180.0, 35.0).y, 250.0);
  EXPECT_DOUBLE_EQ(northern.on_chart(-10.0), 350.0);
  EXPECT_DOUBLE_EQ(northern.on_chart(730.0), 10.0);
  const SunChart southern(kChartBox, picture_of(-33.9, 0.0));
  EXPECT_DOUBLE_EQ(southern.at(southern.on_chart(0.0), 0.0).x, 460.0);
  EXPECT_DOUBLE_EQ(southern.at(southern.on_chart(90.0), 0.0).x, 640.0);   // east to the right of north
  EXPECT_DOUBLE_EQ(southern.at(southern.on_chart(270.0), 0.0).x, 280.0);  // west to the left
}

// Only horizon and sun on a bare chart, so that each pixel is known.
TEST_F(SunPathTest, TheHorizonAndTheSunStandWhereTheyAre) {
  for (const double centre : {180.0, 0.0}) {
    SunPathPicture picture = picture_of(51.97, centre);
    picture.days = {{"", {}}};
    for (int azimuth = 0; azimuth <= 360; ++azimuth)
      picture.days[0].points.push_back({azimuth % 360 * 1.0, 33.0, ""});
    const SunChart chart(kChartBox, picture);
    const Pixels pixels = drawn(chart, picture);
    // The land lets 12 % of the air through; grid lines every 10 and 30 degrees are kept clear of.
    const auto mixed = [](double land, double air) { return 0.88 * land + 0.12 * air; };
    const Colour land{mixed(ink::kLand.red, ink::kAir.red), mixed(ink::kLand.green, ink::kAir.green),
                      mixed(ink::kLand.blue, ink::kAir.blue)};
    const auto expect_near = [&](double azimuth, double elevation, const Colour& colour, const char* what) {
      const Point point = chart.at(chart.on_chart(azimuth), elevation);
      const std::uint32_t pixel = pixels.at(point.x, point.y);
      for (const int shift : {0, 8, 16}) {
        EXPECT_NEAR((pixel >> shift) & 255U, (rgb_of(colour) >> shift) & 255U, 2)
            << what << " at " << azimuth;
      }
    };
    expect_near(115.0, 14.0, land, "the tall part of the horizon");  // samples 220 to 260 are 110° to 130°
    expect_near(125.0, 16.0, land, "the tall part of the horizon");
    expect_near(115.0, 23.0, ink::kAir, "above the tall part");
    expect_near(100.0, 14.0, ink::kAir, "left of the tall part");
    expect_near(137.0, 14.0, ink::kAir, "right of the tall part");
    for (const double azimuth : {5.0, 95.0, 185.0, 275.0, 355.0}) {
      expect_near(azimuth, 2.0, land, "the low horizon");
      expect_near(azimuth, 6.0, ink::kAir, "above the low horizon");
      expect_near(azimuth, 33.0, ink::kAccent, "the sun's path");
    }
  }
}

TEST_F(SunPathTest, APathAcrossTheEdgeDoesNotCrossTheChart) {
  SunPathPicture picture = picture_of(-33.9, 180.0);  // turned the wrong way on purpose
  picture.horizon_deg.clear();
  picture.days = {{"", {{40.0, 36.0, ""}, {20.0, 36.0, ""}, {340.0, 36.0, ""}, {320.0, 36.0, ""}}}};
  const SunChart chart(kChartBox, picture);
  const Pixels pixels = drawn(chart, picture);
  for (const double azimuth : {3.0, 15.0, 35.0, 325.0, 345.0, 357.0}) {
    const Point point = chart.at(azimuth, 36.0);
    EXPECT_EQ(pixels.at(point.x, point.y), rgb_of(ink::kAccent)) << azimuth;
  }
  for (const double azimuth : {45.0, 135.0, 185.0, 255.0, 315.0}) {
    const Point point = chart.at(azimuth, 36.0);
    EXPECT_NE(pixels.at(point.x, point.y), rgb_of(ink::kAccent)) << azimuth;
  }
}

TEST_F(SunPathTest, BarsAreAsLongAsTheirLight) {
  Canvas canvas(folder_ / "a.png", 800, 500);
  draw_months_table(canvas, {50, 50, 700, 400}, {{"Jan", 10.0, 20.0, 40.0}});
  canvas.save();
  const Pixels pixels(folder_ / "a.png");
  const double row = 50 + 68 + 26;  // the middle of the first row, of the greatest height 52
  int beam = 0;
  int sky = 0;
  for (int x = 0; x < 800; ++x) {
    beam += pixels.at(x, row) == rgb_of(ink::kAccent) ? 1 : 0;
    sky += pixels.at(x, row) == rgb_of(ink::kSky) ? 1 : 0;
  }
  // The open field's 40 take the bar's whole width of 700 - 62 - 4 · 76; a pixel at each end is mixed.
  const double width = 700.0 - 62.0 - 4.0 * 76.0;
  EXPECT_NEAR(beam, 0.25 * width, 2.0);
  EXPECT_NEAR(sky, 0.5 * width, 2.0);
}

TEST_F(SunPathTest, SavesPngAndSvg) {
  draw_sun_path(folder_ / "a.png", picture_of(51.97, 180.0));
  draw_sun_path(folder_ / "a.svg", picture_of(51.97, 180.0));
  EXPECT_EQ(Pixels(folder_ / "a.png").width(), 2300);
  EXPECT_GT(elements_of(content(folder_ / "a.svg")).size(), 100U);
}

}  // namespace
}  // namespace sunfall
