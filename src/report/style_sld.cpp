#include "report/style_sld.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "core/whole_file.h"
#include "report/canvas.h"

namespace sunfall {
namespace {

std::string escaped(const std::string& text) {
  std::string safe;
  for (const char letter : clean_text(text)) {
    switch (letter) {
      case '&': safe += "&amp;"; break;
      case '<': safe += "&lt;"; break;
      case '>': safe += "&gt;"; break;
      case '"': safe += "&quot;"; break;
      default: safe += letter;
    }
  }
  return safe;
}

std::string entries(const RasterStyle& style) {
  const int steps = static_cast<int>(std::lround(style.scale.maximum / style.scale.step));
  // At least 32 pieces: a straight piece in sRGB then differs from the scale by less than an eye sees.
  const int pieces_per_step = std::max(4, static_cast<int>(std::ceil(32.0 / steps)));
  const int pieces = steps * pieces_per_step;
  std::string text = fmt::format(
      "              <ColorMapEntry color=\"#ffffff\" quantity=\"{:g}\" opacity=\"0\" label=\"no value\"/>\n",
      style.nodata);
  for (int i = 0; i <= pieces; ++i) {
    const double share = static_cast<double>(i) / pieces;
    text += fmt::format(
        "              <ColorMapEntry color=\"{}\" quantity=\"{:.10g}\" opacity=\"1\" label=\"{:.6g} "
        "{}\"/>\n",
        hexadecimal(light_colour(share)), share * style.scale.maximum, share * style.scale.maximum,
        escaped(style.unit));
  }
  return text;
}

}  // namespace

std::string raster_sld(const RasterStyle& style) {
  // `type` is no attribute of the 1.0.0 schema but is what its readers take; "ramp" is their default.
  return fmt::format(
      R"(<?xml version="1.0" encoding="UTF-8"?>
<StyledLayerDescriptor version="1.0.0" xmlns="http://www.opengis.net/sld" xmlns:ogc="http://www.opengis.net/ogc" xmlns:xlink="http://www.w3.org/1999/xlink" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance" xsi:schemaLocation="http://www.opengis.net/sld http://schemas.opengis.net/sld/1.0.0/StyledLayerDescriptor.xsd">
  <NamedLayer>
    <Name>{0}</Name>
    <UserStyle>
      <Name>{0}</Name>
      <Title>{1}, {2}</Title>
      <FeatureTypeStyle>
        <Rule>
          <RasterSymbolizer>
            <Opacity>1.0</Opacity>
            <ColorMap type="ramp">
{3}            </ColorMap>
          </RasterSymbolizer>
        </Rule>
      </FeatureTypeStyle>
    </UserStyle>
  </NamedLayer>
</StyledLayerDescriptor>
)",
      escaped(style.name), escaped(style.title), escaped(style.unit), entries(style));
}

void write_raster_sld(const std::filesystem::path& file, const RasterStyle& style) {
  write_whole_file(file, raster_sld(style));
}

}  // namespace sunfall
