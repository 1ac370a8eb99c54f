#pragma once
// What the report's tests share: a folder of their own, pixels of a PNG, the elements of an XML file.

#include <gtest/gtest.h>

#include <filesystem>
#include <map>
#include <string>
#include <vector>

#include "report/canvas.h"

namespace sunfall {

class FolderTest : public testing::Test {
 protected:
  void SetUp() override;
  void TearDown() override;
  static std::string content(const std::filesystem::path& file);
  std::ptrdiff_t entries() const;

  std::filesystem::path folder_;
};

// A PNG as cairo reads it back.
class Pixels {
 public:
  explicit Pixels(const std::filesystem::path& png);
  int width() const { return width_; }
  int height() const { return height_; }
  // 0xRRGGBB.
  std::uint32_t at(double x, double y) const;
  // The number of pixels of just this colour within the box.
  int count(const Box& box, const Colour& colour) const;

 private:
  int width_ = 0;
  int height_ = 0;
  std::vector<std::uint32_t> pixels_;
};
std::uint32_t rgb_of(const Colour& colour);

// The elements of a well-formed document in their order, as expat, a strict reader, finds them; a test
// failure where it is not well-formed.
struct XmlElement {
  std::string path;  // "/a/b"
  std::map<std::string, std::string> attributes;
  std::string text;
};
std::vector<XmlElement> elements_of(const std::string& xml);

// Every text keeps inside the page's margin (less a hair for rounding) and clear of every other, and none
// is smaller than may be read on a slide.
void expect_tidy(const Canvas& canvas);
// How many of the canvas's texts are this one.
int count_text(const Canvas& canvas, const std::string& text);

}  // namespace sunfall
