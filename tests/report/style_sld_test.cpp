// The style is well-formed, shaped as OGC 02-070 has it, and shows the light scale's colours.

#include "report/style_sld.h"

#include <cmath>

#include "report_support.h"

namespace sunfall {
namespace {

using StyleTest = FolderTest;

RasterStyle style_to(double largest) {
  RasterStyle style;
  style.scale = LightScale::holding(largest);
  return style;
}

std::vector<XmlElement> entries_of(const std::vector<XmlElement>& elements) {
  std::vector<XmlElement> entries;
  for (const XmlElement& element : elements) {
    if (element.path.ends_with("/ColorMapEntry")) entries.push_back(element);
  }
  return entries;
}

Colour colour_of(const std::string& hexadecimal_colour) {
  const int rgb = std::stoi(hexadecimal_colour.substr(1), nullptr, 16);
  return ink::of(rgb >> 16, (rgb >> 8) & 255, rgb & 255);
}

// The schema's sequences: NamedLayer (Name, UserStyle), UserStyle (Name, Title, FeatureTypeStyle), Rule
// (RasterSymbolizer), RasterSymbolizer (Opacity, ColorMap).
TEST_F(StyleTest, HasTheShapeOfTheSchema) {
  write_raster_sld(folder_ / "style-dli.sld", style_to(38.2));
  const auto elements = elements_of(content(folder_ / "style-dli.sld"));
  std::vector<std::string> paths;
  for (const XmlElement& element : elements) {
    if (!element.path.ends_with("/ColorMapEntry")) paths.push_back(element.path);
  }
  const std::string layer = "/StyledLayerDescriptor/NamedLayer";
  const std::string rule = layer + "/UserStyle/FeatureTypeStyle/Rule";
  EXPECT_EQ(paths, (std::vector<std::string>{
                       "/StyledLayerDescriptor", layer, layer + "/Name", layer + "/UserStyle",
                       layer + "/UserStyle/Name", layer + "/UserStyle/Title",
                       layer + "/UserStyle/FeatureTypeStyle", rule, rule + "/RasterSymbolizer",
                       rule + "/RasterSymbolizer/Opacity", rule + "/RasterSymbolizer/ColorMap"}));
  EXPECT_EQ(elements.front().attributes.at("version"), "1.0.0");
  EXPECT_EQ(elements.front().attributes.at("xmlns"), "http://www.opengis.net/sld");
  EXPECT_EQ(elements[10].attributes.at("type"), "ramp");
}

TEST_F(StyleTest, EntriesRiseFromTransparentNodataToTheRoundMaximum) {
  for (const double largest : {38.2, 4.2, 0.07, 100.0, 0.0}) {
    const RasterStyle style = style_to(largest);
    const auto entries = entries_of(elements_of(raster_sld(style)));
    ASSERT_GE(entries.size(), 33U);
    ASSERT_LE(entries.size(), 60U);
    EXPECT_EQ(entries[0].attributes.at("quantity"), "-9999");
    EXPECT_EQ(entries[0].attributes.at("opacity"), "0");
    EXPECT_EQ(entries[1].attributes.at("quantity"), "0");
    EXPECT_EQ(entries[1].attributes.at("color"), hexadecimal(light_colour(0.0)));
    EXPECT_EQ(entries.back().attributes.at("color"), hexadecimal(light_colour(1.0)));
    EXPECT_NEAR(std::stod(entries.back().attributes.at("quantity")), style.scale.maximum, 1e-9);
    for (std::size_t i = 1; i < entries.size(); ++i) {
      EXPECT_GT(std::stod(entries[i].attributes.at("quantity")),
                std::stod(entries[i - 1].attributes.at("quantity")));
      EXPECT_EQ(entries[i].attributes.at("opacity"), i > 0 ? "1" : "0");
    }
  }
}

// A reader draws straight lines in sRGB between entries; nobody sees the difference to the pictures.
TEST_F(StyleTest, ItsRampIsTheLightScale) {
  const RasterStyle style = style_to(38.2);
  const auto entries = entries_of(elements_of(raster_sld(style)));
  for (int i = 0; i <= 1000; ++i) {
    const double value = style.scale.maximum * i / 1000.0;
    std::size_t above = 2;
    while (above + 1 < entries.size() && std::stod(entries[above].attributes.at("quantity")) < value) ++above;
    const double low = std::stod(entries[above - 1].attributes.at("quantity"));
    const double high = std::stod(entries[above].attributes.at("quantity"));
    const Colour a = colour_of(entries[above - 1].attributes.at("color"));
    const Colour b = colour_of(entries[above].attributes.at("color"));
    const double t = (value - low) / (high - low);
    const Colour shown{std::lerp(a.red, b.red, t), std::lerp(a.green, b.green, t),
                       std::lerp(a.blue, b.blue, t)};
    // A just noticeable difference is about 2.3 (Mahy, Van Eycken and Oosterlinck 1994).
    EXPECT_LT(colour_difference(to_lab(shown), to_lab(style.scale.colour(value))), 2.3 / 2.0) << value;
  }
}

TEST_F(StyleTest, TakesAnyTitle) {
  RasterStyle style = style_to(40.0);
  style.title = "<Light> & \"shade\" \xFF\x01";
  const auto elements = elements_of(raster_sld(style));
  EXPECT_EQ(elements[5].text, "<Light> & \"shade\" \xEF\xBF\xBD , mol m-2 d-1");
}

}  // namespace
}  // namespace sunfall
