#include "report_support.h"

#include <cairo.h>
#include <expat.h>
#include <unistd.h>

#include <algorithm>
#include <cstring>
#include <fstream>
#include <iterator>

#include "report/furniture.h"

// Read by LeakSanitizer, and by nothing else: fontconfig, under cairo, keeps its patterns to the end.
extern "C" const char* __lsan_default_suppressions();
extern "C" const char* __lsan_default_suppressions() { return "leak:libfontconfig"; }

namespace sunfall {

namespace fs = std::filesystem;

void FolderTest::SetUp() {
  std::string pattern = (fs::path(testing::TempDir()) / "sunfall-report-XXXXXX").string();
  ASSERT_NE(::mkdtemp(pattern.data()), nullptr);
  folder_ = pattern;
}
void FolderTest::TearDown() { fs::remove_all(folder_); }

std::string FolderTest::content(const fs::path& file) {
  std::ifstream in(file, std::ios::binary);
  EXPECT_TRUE(in.good()) << file;
  return {std::istreambuf_iterator<char>(in), {}};
}
std::ptrdiff_t FolderTest::entries() const { return std::distance(fs::directory_iterator(folder_), {}); }

Pixels::Pixels(const fs::path& png) {
  cairo_surface_t* surface = cairo_image_surface_create_from_png(png.c_str());
  EXPECT_EQ(cairo_surface_status(surface), CAIRO_STATUS_SUCCESS) << png;
  width_ = cairo_image_surface_get_width(surface);
  height_ = cairo_image_surface_get_height(surface);
  const unsigned char* bytes = cairo_image_surface_get_data(surface);
  const int stride = cairo_image_surface_get_stride(surface);
  pixels_.resize(static_cast<std::size_t>(width_) * static_cast<std::size_t>(height_));
  for (int y = 0; y < height_; ++y) {
    std::memcpy(&pixels_[static_cast<std::size_t>(y) * width_],
                bytes + static_cast<std::ptrdiff_t>(y) * stride, static_cast<std::size_t>(width_) * 4);
  }
  cairo_surface_destroy(surface);
}

std::uint32_t Pixels::at(double x, double y) const {
  const auto column = static_cast<std::size_t>(x);
  const auto row = static_cast<std::size_t>(y);
  return pixels_.at(row * static_cast<std::size_t>(width_) + column) & 0xFFFFFFU;
}

int Pixels::count(const Box& box, const Colour& colour) const {
  int found = 0;
  for (int y = std::max(0, static_cast<int>(box.y)); y < std::min<double>(height_, box.bottom()); ++y) {
    for (int x = std::max(0, static_cast<int>(box.x)); x < std::min<double>(width_, box.right()); ++x) {
      if (at(x, y) == rgb_of(colour)) ++found;
    }
  }
  return found;
}

std::uint32_t rgb_of(const Colour& colour) { return opaque_pixel(colour) & 0xFFFFFFU; }

namespace {

struct XmlReader {
  std::vector<XmlElement> elements;
  std::vector<std::size_t> open;
};

void on_start(void* data, const XML_Char* name, const XML_Char** attributes) {
  auto& reader = *static_cast<XmlReader*>(data);
  const std::string above = reader.open.empty() ? "" : reader.elements[reader.open.back()].path;
  XmlElement element{above + "/" + name, {}, {}};
  for (; *attributes != nullptr; attributes += 2) element.attributes[attributes[0]] = attributes[1];
  reader.open.push_back(reader.elements.size());
  reader.elements.push_back(std::move(element));
}
void on_end(void* data, const XML_Char*) { static_cast<XmlReader*>(data)->open.pop_back(); }
void on_text(void* data, const XML_Char* text, int length) {
  auto& reader = *static_cast<XmlReader*>(data);
  reader.elements[reader.open.back()].text.append(text, static_cast<std::size_t>(length));
}

}  // namespace

std::vector<XmlElement> elements_of(const std::string& xml) {
  XmlReader reader;
  XML_Parser parser = XML_ParserCreate(nullptr);
  XML_SetUserData(parser, &reader);
  XML_SetElementHandler(parser, on_start, on_end);
  XML_SetCharacterDataHandler(parser, on_text);
  const XML_Status status = XML_Parse(parser, xml.data(), static_cast<int>(xml.size()), 1);
  EXPECT_EQ(status, XML_STATUS_OK) << XML_ErrorString(XML_GetErrorCode(parser)) << " in line "
                                   << XML_GetCurrentLineNumber(parser);
  XML_ParserFree(parser);
  return reader.elements;
}

void expect_tidy(const Canvas& canvas) {
  constexpr double kLeastSize = 16.0;
  const Box page = Box{0, 0, canvas.width(), canvas.height()}.grown(-(kPageMargin - 12.0));
  const auto& texts = canvas.texts();
  for (std::size_t i = 0; i < texts.size(); ++i) {
    EXPECT_GE(texts[i].size, kLeastSize) << texts[i].text;
    EXPECT_TRUE(page.holds(texts[i].box))
        << "'" << texts[i].text << "' at " << texts[i].box.x << ", " << texts[i].box.y << " leaves "
        << page.width << " x " << page.height;
    for (std::size_t j = 0; j < i; ++j) {
      EXPECT_FALSE(texts[i].box.overlaps(texts[j].box))
          << "'" << texts[i].text << "' on '" << texts[j].text << "'";
    }
  }
}

int count_text(const Canvas& canvas, const std::string& text) {
  return static_cast<int>(
      std::count_if(canvas.texts().begin(), canvas.texts().end(),
                    [&](const Canvas::WrittenText& written) { return written.text == text; }));
}

}  // namespace sunfall
